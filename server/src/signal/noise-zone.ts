import type { Passing } from './noise-stretch.ts';

/**
 * What a zone of a sampling brings into the band, where the power is smooth over it.
 *
 * Every zone lands on the same record, so what becomes of it there is the same for each. Over one zone a smooth power
 * is a polynomial of the frequency in the record, a sum of Bernstein's polynomials; what lands of each of those is
 * found once, by sending noise through it as through a filter: they are nowhere negative, and together they are 1.
 */

const DEGREE = 4;
const CHOICES = [1, 4, 6, 4, 1];

/** The coefficients of Bernstein's polynomials from the values at 0, 1/4, ... 1. */
const COEFFICIENTS = [
  [1, 0, 0, 0, 0],
  [-13 / 12, 4, -3, 4 / 3, -1 / 4],
  [13 / 18, -32 / 9, 20 / 3, -32 / 9, 13 / 18],
  [-1 / 4, 4 / 3, -3, 4, -13 / 12],
  [0, 0, 0, 0, 1],
];

/** The value of the polynomial at 1/8 and at 3/8 from those at 0, 1/4, ... 1; at 7/8 and 5/8 the other way round. */
const BETWEEN = [
  [35 / 128, 35 / 32, -35 / 64, 7 / 32, -5 / 128],
  [-5 / 128, 15 / 32, 45 / 64, -5 / 32, 3 / 128],
];

/** How far off what lands may be, relative to it. */
const CLOSE = 5e-4;

/** A peak this much higher than all that has been seen may be hidden. */
const HIDDEN_RATIO = 16;

/** Each of Bernstein's polynomials over 0 .. Nyquist frequency, as what noise goes through. */
export function bernsteinFilters(nyquistHz: number): readonly Passing[] {
  return CHOICES.map((_, index) => ({
    leastDb(lowHz, highHz) {
      const highest = Math.min(Math.max(index / DEGREE, lowHz / nyquistHz), Math.min(highHz / nyquistHz, 1));
      return -10 * Math.log10(bernstein(index, highest));
    },
  }));
}

function bernstein(index: number, x: number): number {
  return CHOICES[index]! * x ** index * (1 - x) ** (DEGREE - index);
}

/**
 * What lands of the power in a whole zone; `undefined` where it is not smooth enough to be told so.
 *
 * @param powerAt the power by the frequency in the record over the Nyquist frequency, 0 to 1
 * @param greatest no less than the greatest power in the zone
 * @param landed what lands of each of Bernstein's polynomials
 */
export function landedOfSmooth(
  powerAt: (part: number) => number,
  greatest: () => number,
  landed: readonly number[],
  negligible: number,
): number | undefined {
  const values = CHOICES.map((_, index) => powerAt(index / DEGREE));
  const between = [powerAt(1 / 8), powerAt(3 / 8), powerAt(7 / 8), powerAt(5 / 8)];
  const backwards = [...values].reverse();
  const expected = [values, backwards].flatMap((from) => BETWEEN.map((weights) => weighted(weights, from)));
  const worst = Math.max(...between.map((value, index) => Math.abs(value - expected[index]!)));
  const highest = Math.max(...values, ...between);
  const whole = landed.reduce((total, part) => total + part, 0);
  const coefficients = COEFFICIENTS.map((row) => weighted(row, values));
  const sum = Math.max(weighted(landed, coefficients), 0);
  if (worst * whole > CLOSE * sum && highest * whole > negligible) return undefined;
  return greatest() > HIDDEN_RATIO * highest ? undefined : sum;
}

function weighted(weights: readonly number[], values: readonly number[]): number {
  return weights.reduce((sum, weight, index) => sum + weight * values[index]!, 0);
}
