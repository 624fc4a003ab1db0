import type { Scalar } from './quantity.ts';

/** What the arithmetic itself may add to a difference, relative to the value. */
const ROUNDING = 1e-12;

/** A rate written with few digits (`51 kHz`) must not pass for one that is plainly another (51.2 kHz). */
const MOST_RELATIVE = 1e-3;

/**
 * Whether a written frequency stands for an exact one: `3413.33 Hz` for 13.1072 MHz / 3840. False where the exact one
 * is not finite. However few digits are written, the two may differ by a thousandth at most.
 */
export function matchesExact(written: Scalar, exactHz: number): boolean {
  const { value, halfDigit } = written;
  const slack = Math.min(halfDigit, MOST_RELATIVE * Math.abs(value));
  return Math.abs(value - exactHz) <= slack + ROUNDING * Math.abs(value);
}
