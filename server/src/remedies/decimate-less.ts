import type { Channel } from '../rig/model.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { dataCost, outcomeOf } from './describe.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import type { PlacedStep } from './steps.ts';
import { stepsOfFinding, stepValue, withStep } from './steps.ts';

/** How many smaller factors are tried. */
const MOST_FACTORS = 128;

export const decimateLess: RemedyDefinition = {
  name: 'decimate-less',
  kind: 'setting',
  finds: 'The largest decimation factor below the present one at which the finding is gone.',
  why: 'Keeping more samples moves the fold of the decimation up, away from the band. It costs data in proportion.',
  answers: [
    'band-over-nyquist',
    'thin-margin',
    'fold-in-band',
    'fold-unlevelled',
    'filter-short',
    'step-without-filter',
    'on-nyquist',
    'band-droop',
    'practice-unmet',
    'noise-folds',
  ],
  search: (search) => stepsOfFinding(search).flatMap((placed) => decimatedLess(search, placed)),
};

function decimatedLess(search: Search, placed: PlacedStep): readonly Proposal[] {
  const { channel } = search;
  if (!channel) return [];
  const today = placed.step.factor.value;
  const found = firstCured(search, factorsBelow(today), (factor) => decimatedBy(channel, placed, factor));
  const edited = found && stepValue(search, placed, 'decimate', String(found.value));
  if (!found || !edited) return [];
  return [
    {
      does: `Decimate by ${found.value} instead of ${today}`,
      outcome: `${outcomeOf(search, found.after)} (${dataCost(1 / today, 1 / found.value)})`,
      ...edited,
    },
  ];
}

function factorsBelow(today: number): readonly number[] {
  const count = Math.max(0, Math.min(MOST_FACTORS, today - 2));
  return Array.from({ length: count }, (_, index) => today - 1 - index);
}

function decimatedBy(channel: Channel, { index, step }: PlacedStep, factor: number): Channel {
  const { written: _, ...given } = step.factor;
  return withStep(channel, index, { ...step, factor: { ...given, value: factor } });
}
