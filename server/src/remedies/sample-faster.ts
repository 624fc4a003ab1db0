import { formatHz } from '../quantity/write.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { dataCost, outcomeOf } from './describe.ts';
import { rateEdits, ratesAbove, sampledAt } from './rates.ts';
import { isOfScan, scanProposals } from './scan-rates.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';

export const sampleFaster: RemedyDefinition = {
  name: 'sample-faster',
  kind: 'setting',
  finds: 'The lowest rate above the present one that the digitizer can run and at which the finding is gone.',
  why: 'A higher rate moves the Nyquist frequency away from the band, so that what folds into the band comes from further up, where the filters take more off. It costs data in proportion.',
  answers: [
    'band-over-nyquist',
    'thin-margin',
    'fold-in-band',
    'fold-unlevelled',
    'filter-short',
    'no-filter',
    'step-without-filter',
    'on-nyquist',
    'pulse-missed',
    'pattern-image',
    'interleave-image',
    'band-droop',
    'practice-unmet',
    'scan-skew',
    'noise-folds',
    'step-too-coarse',
    'jitter-limited',
  ],
  search: searchFaster,
};

function searchFaster(search: Search): readonly Proposal[] {
  const { channel } = search;
  const today = channel?.rateHz?.value;
  if (!channel || today === undefined) return [];
  if (isOfScan(search)) return scanProposals(search, ratesAbove(channel, today));
  const found = firstCured(search, ratesAbove(channel, today), (hz) => sampledAt(channel, hz));
  const edited = found && rateEdits(search, found.value);
  if (!found || !edited) return [];
  return [
    {
      does: `Sample at ${formatHz(found.value)}`,
      outcome: `${outcomeOf(search, found.after)} (${dataCost(today, found.value)})`,
      ...edited,
    },
  ];
}
