import { formatHz } from '../quantity/write.ts';
import type { Channel } from '../rig/model.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { dataCost, outcomeOf } from './describe.ts';
import { rateEdits, ratesAbove, ratesBelow, sampledAt } from './rates.ts';
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
    'fold-in-band',
    'fold-unlevelled',
    'on-nyquist',
    'filter-short',
    'thin-margin',
  ],
  search: searchElsewhere,
};

function searchElsewhere(search: Search): readonly Proposal[] {
  const { channel, context } = search;
  const today = channel?.rateHz?.value;
  if (!channel || today === undefined) return [];
  if (context.finding.check === 'rates-conflict') return neighbourRates(search, channel, today);
  const found = firstCured(search, nearestFirst(channel, today), (hz) => sampledAt(channel, hz));
  return found ? proposal(search, today, found.value, outcomeOf(search, found.after)) : [];
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
