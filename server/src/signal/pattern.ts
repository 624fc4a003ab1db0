import { transformOf } from './any-length-fft.ts';

/**
 * Sampling in a periodic pattern: of every `slots` slots some are taken. The record keeps the slots, with zeros in the
 * gaps, and is scaled so that a tone keeps its level.
 *
 * G[k] = (1 / P) sum over the taken n of exp(-j 2 pi k n / P); a tone at f arrives also at every f + k rate / P, folded,
 * at |G[k] / G[0]| of its level. It is multiplication by a periodic sequence, whose spectrum is the sum of copies
 * weighted by that sequence's Fourier series.
 * Source: Oppenheim and Schafer, Discrete-Time Signal Processing, the modulation theorem and the discrete Fourier series.
 */

/** Which slots are taken, from 0, in any order. */
export interface SlotPattern {
  readonly slots: number;
  readonly taken: readonly number[];
}

/** What a pattern makes of a tone. */
export interface PatternGains {
  readonly kind: 'gains';
  readonly slots: number;
  /** |G[k] / G[0]| for k = 0 .. slots - 1; symmetric, gains[k] = gains[slots - k]. */
  readonly gains: Float64Array;
  /** Every k whose gain is not negligible, the strongest first. The first is 0. */
  readonly strongest: Uint32Array;
}

/** Why a pattern can't be worked out. */
export type PatternFailure =
  /** `slots` is no whole number from 1 on. */
  | { readonly kind: 'slots-not-whole'; readonly slots: number }
  | { readonly kind: 'too-many-slots'; readonly slots: number; readonly most: number }
  | { readonly kind: 'none-taken' }
  /** A taken slot is no whole number in 0 .. slots - 1. */
  | { readonly kind: 'slot-outside'; readonly slot: number }
  | { readonly kind: 'slot-repeated'; readonly slot: number };

/** Slots that a pattern may have. */
export const MOST_SLOTS = 100_000;

/** Gains below this are rounding, 240 dB down. */
export const NEGLIGIBLE_GAIN = 1e-12;

/** The gain of every image that a pattern makes. */
export function patternImages({ slots, taken }: SlotPattern): PatternGains | PatternFailure {
  if (!Number.isInteger(slots) || slots < 1) return { kind: 'slots-not-whole', slots };
  if (slots > MOST_SLOTS) return { kind: 'too-many-slots', slots, most: MOST_SLOTS };
  if (taken.length === 0) return { kind: 'none-taken' };
  const comb = new Float64Array(slots);
  for (const slot of taken) {
    if (!Number.isInteger(slot) || slot < 0 || slot >= slots) return { kind: 'slot-outside', slot };
    if (comb[slot] === 1) return { kind: 'slot-repeated', slot };
    comb[slot] = 1;
  }
  return { kind: 'gains', slots, ...rankedGains(comb, taken.length) };
}

function rankedGains(comb: Float64Array, takenCount: number): Pick<PatternGains, 'gains' | 'strongest'> {
  const slots = comb.length;
  const { re, im } = transformOf(comb);
  const gains = new Float64Array(slots);
  gains[0] = 1;
  const kept = [0];
  for (let k = 1; k < slots; k++) {
    // Of a real sequence, k and slots - k are conjugates; rounding must not tell them apart.
    const twin = Math.min(k, slots - k);
    gains[k] = Math.min(Math.hypot(re[twin]!, im[twin]!) / takenCount, 1);
    if (gains[k]! >= NEGLIGIBLE_GAIN) kept.push(k);
    else gains[k] = 0;
  }
  return {
    gains,
    strongest: Uint32Array.from(kept).sort((first, second) => gains[second]! - gains[first]! || first - second),
  };
}
