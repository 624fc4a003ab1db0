import { type Curve, risingCurve } from './curve.ts';

const DB_PER_NEPER_OF_POWER = 10 / Math.LN10;

/** From here on the polynomial is summed from its highest power down, lest x^100 overflow. */
const LARGE = 16;

/**
 * Bessel, x = 1 at the cutoff, 3.0103 dB down (magnitude normalisation).
 *
 * The squared magnitude of the reverse Bessel polynomial theta_n(jw) is a polynomial in w^2 whose coefficients are
 * all positive, (2n - k)! (2n - 2k)! / (k! ((n - k)!)^2) 2^(2k - 2n), so nothing cancels at any order.
 * Source: Krall and Frink, A new class of orthogonal polynomials, 1949; Thomson 1949.
 */
export function besselPrototype(order: number): Curve {
  const coefficients = besselSquaredMagnitude(order);
  const cutoff = besselCutoff(coefficients);
  const lnLeading = Math.log(coefficients[order]!);
  return risingCurve((x) => {
    const w = x * cutoff;
    if (w < LARGE) return DB_PER_NEPER_OF_POWER * Math.log1p(excess(coefficients, w * w));
    const inverse = 1 / (w * w);
    const lnSum = lnLeading + Math.log(descending(coefficients, inverse));
    return DB_PER_NEPER_OF_POWER * (2 * order * Math.log(w) + lnSum);
  });
}

/** Coefficients of |theta(jw) / theta(0)|^2 in powers of w^2, the first being 1. */
export function besselSquaredMagnitude(order: number): Float64Array {
  const coefficients = new Float64Array(order + 1);
  coefficients[0] = 1;
  for (let k = 0; k < order; k++) {
    const left = order - k;
    const ratio = (4 * left * left) / ((2 * order - k) * (2 * left) * (2 * left - 1) * (k + 1));
    coefficients[k + 1] = coefficients[k]! * ratio;
  }
  return coefficients;
}

function excess(coefficients: Float64Array, y: number): number {
  let sum = 0;
  for (let k = coefficients.length - 1; k > 0; k--) sum = (sum + coefficients[k]!) * y;
  return sum;
}

/** Sum over k of c[k] / c[order] x inverse^(order - k). */
function descending(coefficients: Float64Array, inverse: number): number {
  const leading = coefficients[coefficients.length - 1]!;
  let sum = 0;
  for (let k = 0; k < coefficients.length; k++) sum = sum * inverse + coefficients[k]! / leading;
  return sum;
}

/** The angular frequency w that is 3.0103 dB down, of a squared magnitude as above: that of a delay of 1 at 0 Hz. */
export function besselCutoff(coefficients: Float64Array): number {
  return Math.sqrt(whereExcessIsOne(coefficients));
}

/** Newton's method from above, where the convex, rising excess brings it down to the root without overshoot. */
function whereExcessIsOne(coefficients: Float64Array): number {
  let y = 2 * coefficients.length;
  for (let step = 0; step < 200; step++) {
    let value = 0;
    let slope = 0;
    for (let k = coefficients.length - 1; k >= 0; k--) {
      slope = slope * y + value;
      value = value * y + coefficients[k]!;
    }
    const next = y - (value - 2) / slope;
    if (!(next < y)) break;
    y = next;
  }
  return y;
}
