import type { Arrival, Chain } from '../chain/model.ts';

/** A stretch of the true axis that the map shows; where there are several, the axis is broken between them. */
export interface Stretch {
  readonly lowHz: number;
  readonly highHz: number;
}

/** Up to so many folds of the record's Nyquist frequency are drawn on one unbroken axis. */
const MOST_ZONES = 16;
/** The least part of the axis beyond the last thing that matters. */
const ROOM = 1.06;
const MOST_STRETCHES = 4;

/**
 * The stretches of true frequency that tell a channel's story: one from 0 to a little beyond the last arrival that
 * matters where that is legible, otherwise the first two zones and the zones around the loudest folds.
 */
export function stretchesOf(chain: Chain, arrivals: readonly Arrival[]): readonly Stretch[] {
  const nyquistHz = chain.stages.at(-1)!.nyquistHz;
  const first: Stretch = { lowHz: 0, highHz: 2 * nyquistHz };
  const matter = arrivals.filter((arrival) => mattersAt(arrival, chain));
  const farthest = matter.reduce((high, { trueHighHz }) => Math.max(high, trueHighHz), 0);
  if (farthest * ROOM <= MOST_ZONES * nyquistHz) {
    return [{ lowHz: 0, highHz: Math.max(first.highHz, farthest * ROOM) }];
  }
  const around = [...matter]
    .filter(({ trueHighHz }) => trueHighHz > first.highHz)
    .sort((a, b) => Number(b.overLimit) - Number(a.overLimit) || b.level - a.level)
    .map((arrival) => zonesAround(arrival, nyquistHz));
  let chosen: readonly Stretch[] = [first];
  for (const stretch of around) {
    const apart = chosen.filter((other) => !touch(other, stretch));
    const joined = chosen.filter((other) => touch(other, stretch)).reduce(together, stretch);
    const fits = joined.highHz - joined.lowHz <= MOST_ZONES * nyquistHz && apart.length < MOST_STRETCHES;
    if (fits) chosen = [...apart, joined];
  }
  return [...chosen].sort((a, b) => a.lowHz - b.lowHz);
}

function touch(a: Stretch, b: Stretch): boolean {
  return a.lowHz <= b.highHz && b.lowHz <= a.highHz;
}

function together(a: Stretch, b: Stretch): Stretch {
  return { lowHz: Math.min(a.lowHz, b.lowHz), highHz: Math.max(a.highHz, b.highHz) };
}

/** Whether an arrival has to be seen where it comes from: what may spoil the band, and what is in it. */
function mattersAt(arrival: Arrival, chain: Chain): boolean {
  if (arrival.overLimit || !arrival.folded) return true;
  return arrival.level > chain.foldLimit - 40;
}

/** The zone that an arrival comes from, with its neighbours. */
function zonesAround({ atHz }: Arrival, nyquistHz: number): Stretch {
  const zone = Math.floor(atHz / nyquistHz);
  return { lowHz: Math.max(0, zone - 1) * nyquistHz, highHz: (zone + 2) * nyquistHz };
}
