import type { Scalar } from './quantity.ts';

/** What the arithmetic itself may add to a difference, relative to the value. */
const ROUNDING = 1e-12;

/** A rate written with few digits (`51 kHz`) must not pass for one that is plainly another (51.2 kHz). */
const MOST_RELATIVE = 1e-3;

/**
 * Whether two frequencies written by hand are the same: within half a unit of the last digit written, of the coarser
 * one. `13.107 MHz` is `13.1072 MHz`. The dimensions are not compared: `3000 rpm` is `50 Hz`.
 */
export function sameFrequency(a: Scalar, b: Scalar): boolean {
  return isWithin(a.value, b.value, Math.max(a.halfDigit, b.halfDigit));
}

/**
 * Whether a written frequency stands for an exact one: `3413.33 Hz` for 13.1072 MHz / 3840. False where the exact one
 * is not finite. However few digits are written, the two may differ by a thousandth at most.
 */
export function matchesExact(written: Scalar, exactHz: number): boolean {
  return isWithin(written.value, exactHz, Math.min(written.halfDigit, MOST_RELATIVE * Math.abs(written.value)));
}

function isWithin(a: number, b: number, halfDigit: number): boolean {
  return Math.abs(a - b) <= halfDigit + ROUNDING * Math.abs(a);
}
