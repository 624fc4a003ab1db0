import type { Response } from './response.ts';

/**
 * A nominal attenuation in dB along one axis (Hz, or a frequency relative to an edge), with its exact extremes over
 * closed intervals. `Response` is a curve with its tolerance worked in.
 */
export interface Curve {
  at(x: number): number;
  least(low: number, high: number): number;
  greatest(low: number, high: number): number;
}

/** A point where a curve turns, or a null of it (`Infinity` dB). */
export interface Turn {
  readonly x: number;
  readonly db: number;
}

/** A curve that never falls. */
export function risingCurve(at: (x: number) => number): Curve {
  return { at, least: (low) => at(low), greatest: (_low, high) => at(high) };
}

/**
 * A curve that is monotone between the turns given.
 *
 * @param turns ascending in `x`; one that is no turn after all does no harm as long as the curve has that value there
 */
export function turningCurve(at: (x: number) => number, turns: readonly Turn[]): Curve {
  const positions = Float64Array.from(turns, (turn) => turn.x);
  const values = Float64Array.from(turns, (turn) => turn.db);
  return {
    at,
    least(low, high) {
      let least = Math.min(at(low), at(high));
      for (let i = firstAtOrAbove(positions, low); i < positions.length && positions[i]! <= high; i++) {
        if (values[i]! < least) least = values[i]!;
      }
      return least;
    },
    greatest(low, high) {
      let greatest = Math.max(at(low), at(high));
      for (let i = firstAtOrAbove(positions, low); i < positions.length && positions[i]! <= high; i++) {
        if (values[i]! > greatest) greatest = values[i]!;
      }
      return greatest;
    },
  };
}

/** Index of the first of ascending `positions` at or above `x`; their number where there is none. */
export function firstAtOrAbove(positions: ArrayLike<number>, x: number): number {
  let low = 0;
  let high = positions.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (positions[middle]! < x) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * The response that a curve over frequency promises, worst of the whole tolerance.
 *
 * With every frequency of a filter scaled by s in 1 - t .. 1 + t, what it does over low .. high is what the nominal
 * one does over low / (1 + t) .. high / (1 - t).
 *
 * @param tolerance relative, not negative; from 1 on the filter may stand anywhere above
 * @param greatestHz where the frequency axis ends: `Infinity` ahead of a converter, half the rate after it
 * @param passes how often the signal runs through it
 */
export function responseOf(curve: Curve, tolerance: number, greatestHz = Infinity, passes = 1): Response {
  const above = 1 + tolerance;
  const below = Math.max(0, 1 - tolerance);
  const lowest = (hz: number): number => Math.min(hz / above, greatestHz);
  // 0 / 0 would be no number where the tolerance is all of the frequency.
  const highest = (hz: number): number => (hz === 0 ? 0 : Math.min(hz / below, greatestHz));
  return {
    attenuationDb: (frequencyHz) => passes * curve.at(Math.min(frequencyHz, greatestHz)),
    leastDb: (lowHz, highHz) => passes * curve.least(lowest(lowHz), highest(highHz)),
    greatestDb: (lowHz, highHz) => passes * curve.greatest(lowest(lowHz), highest(highHz)),
  };
}
