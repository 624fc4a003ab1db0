import { chainOf } from '../chain/chain.ts';
import { formatHz } from '../quantity/write.ts';
import type { Channel } from '../rig/model.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { dataCost, outcomeOf } from './describe.ts';
import { rateEdits, ratesAbove, ratesBelow, sampledAt } from './rates.ts';
import { isOfScan, scanProposals } from './scan-rates.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';

/** How many rates of its neighbours a channel is tried at for the sake of rates that go together. */
const MOST_NEIGHBOUR_RATES = 8;

export const sampleElsewhere: RemedyDefinition = {
  name: 'sample-elsewhere',
  kind: 'setting',
  finds:
    'The rate nearest the present one, above or below, that the digitizer can run and at which the finding is gone.',
  why: 'A line folds to a place that depends on the rate: a little to the side, it may land outside the band. The band and the amount of data hardly change.',
  answers: [
    'rate-unreachable',
    'rates-conflict',
    'rate-over-converter',
    'bandpass-straddles',
    'settling-short',
    'fold-in-band',
    'fold-unlevelled',
    'on-nyquist',
    'pulse-missed',
    'pattern-image',
    'interleave-image',
    'filter-short',
    'thin-margin',
    'noise-folds',
  ],
  search: searchElsewhere,
};

function searchElsewhere(search: Search): readonly Proposal[] {
  const { channel, context } = search;
  const today = channel?.rateHz?.value;
  if (!channel || today === undefined) return [];
  if (context.finding.check === 'rates-conflict') return neighbourRates(search, channel, today);
  if (isOfScan(search)) return scanProposals(search, ratesBelow(channel, today));
  const found = firstCured(search, nearestFirst(channel, today), (hz) => sampledAt(channel, hz));
  if (found?.after.chain?.recordedBand.mirrored) {
    // The right way up is worth a rate that is a little further off.
    const upright = firstCured(search, nearestFirst(channel, today), (hz) => uprightAt(channel, hz));
    if (upright) return [upright, found].flatMap(({ value }) => bandpassProposal(search, channel, today, value));
  }
  return found ? proposal(search, today, found.value, outcomeOf(search, found.after)) : [];
}

/** The channel at another rate, if that records its band the right way up. */
function uprightAt(channel: Channel, hz: number): Channel | undefined {
  const other = sampledAt(channel, hz);
  return other && !chainOf(other)?.recordedBand.mirrored ? other : undefined;
}

function bandpassProposal(search: Search, channel: Channel, today: number, hz: number): readonly Proposal[] {
  const other = sampledAt(channel, hz);
  const band = other && chainOf(other)?.recordedBand;
  if (!band) return [];
  const where = `the band is recorded at ${formatHz(band.lowHz)} .. ${formatHz(band.highHz)}`;
  return proposal(search, today, hz, band.mirrored ? `${where}, upside down` : where);
}

/** The reachable rates on both sides, the nearest first. */
function* nearestFirst(channel: Channel, today: number): Generator<number> {
  const above = ratesAbove(channel, today);
  const below = ratesBelow(channel, today);
  let up = 0;
  let down = 0;
  while (up < above.length || down < below.length) {
    const higher = above[up];
    const lower = below[down];
    if (lower === undefined || (higher !== undefined && higher - today <= today - lower)) {
      up++;
      yield higher as number;
    } else {
      down++;
      yield lower;
    }
  }
}

/** Which rates go together is for the whole digitizer to say: the proof decides among those its other channels have. */
function neighbourRates(search: Search, channel: Channel, today: number): readonly Proposal[] {
  const rates = new Set<number>();
  for (const { channel: other } of search.context.results) {
    const rate = other.rateHz?.value;
    if (other.digitizer === channel.digitizer && rate !== undefined && rate !== today) rates.add(rate);
  }
  const nearest = [...rates]
    .sort((a, b) => Math.abs(Math.log(a / today)) - Math.abs(Math.log(b / today)))
    .slice(0, MOST_NEIGHBOUR_RATES);
  return nearest.flatMap((hz) => proposal(search, today, hz, 'the digitizer runs its rates together'));
}

function proposal(search: Search, today: number, hz: number, outcome: string): readonly Proposal[] {
  const edited = rateEdits(search, hz);
  if (!edited) return [];
  const cost = dataCost(today, hz);
  return [{ does: `Sample at ${formatHz(hz)}`, outcome: outcome === '' ? cost : `${outcome} (${cost})`, ...edited }];
}
