import { reachableRates } from '../chain/reachable.ts';
import { readQuantity } from '../quantity/quantity.ts';
import { tableUnit } from '../quantity/unit.ts';
import { writeLike } from '../quantity/write.ts';
import type { Channel, Given } from '../rig/model.ts';
import { channelValue } from './channel-edit.ts';
import type { Proposal } from './definition.ts';
import type { Search } from './search.ts';

/** How many rates are tried on either side of today's. */
const MOST_RATES = 96;

/** How far above and below today's rate others are looked for. */
const SEARCHED_RATIO = 64;

/** Digits that tell a reachable rate from its neighbours; the rate that the clock makes is then meant exactly. */
const RATE_DIGITS = 6;

/** Two rates are the same one within this. */
const SAME_RATE = 1e-9;

/** The reachable rates above a rate, ascending. */
export function ratesAbove({ digitizer }: Channel, rateHz: number): readonly number[] {
  return reachableRates(digitizer, rateHz, rateHz * SEARCHED_RATIO, MOST_RATES)
    .filter((hz) => hz > rateHz * (1 + SAME_RATE))
    .sort((a, b) => a - b)
    .slice(0, MOST_RATES);
}

/** The reachable rates below a rate, descending. */
export function ratesBelow({ digitizer }: Channel, rateHz: number): readonly number[] {
  return reachableRates(digitizer, rateHz / SEARCHED_RATIO, rateHz, MOST_RATES, 'high')
    .filter((hz) => hz < rateHz * (1 - SAME_RATE))
    .sort((a, b) => b - a)
    .slice(0, MOST_RATES);
}

/** The channel at another rate, as it would be read from the text that {@link rateEdits} writes. */
export function sampledAt(channel: Channel, rateHz: number): Channel | undefined {
  const given = channel.rateHz;
  if (!given) return undefined;
  const read = readQuantity(rateText(channel, rateHz)).quantity;
  if (read?.kind !== 'scalar') return undefined;
  const { inherited: _, ...own } = given;
  const rate: Given<number> = { ...own, value: read.value, written: read };
  return { ...channel, rateHz: rate };
}

/** A rate in the unit that the channel's rate is written in. */
export function rateText({ rateHz: given, digitizer }: Channel, rateHz: number): string {
  // A list says which rates there are as they were written; a clock's rates are fractions with no end.
  const hz = digitizer?.rates ? rateHz : Number(rateHz.toPrecision(RATE_DIGITS));
  return writeLike(hz, given?.written, tableUnit(hz >= 1000 ? 'kHz' : 'Hz'));
}

/** The edits that sample a channel at another rate. */
export function rateEdits(search: Search, rateHz: number): Pick<Proposal, 'edits' | 'shared'> | undefined {
  const { channel } = search;
  return channel && channelValue(search, 'rate', (other) => other.rateHz, rateText(channel, rateHz));
}
