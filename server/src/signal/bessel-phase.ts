import { besselCutoff, besselSquaredMagnitude } from './bessel.ts';
import type { PrototypePhase } from './prototype-phase.ts';

/**
 * Bessel, x = 1 at the cutoff, without its poles, which no polynomial of a high order gives away.
 *
 * The ratios r of reverse Bessel polynomials, r(k) = 2k - 1 - w^2 / r(k - 1) at jw, stay above the real axis, so that
 * the angles of all of them add up to the phase without a jump. The delay is 1 - w^(2n) / |theta(jw)|^2, in which
 * the highest power cancels. Source: Krall and Frink 1949; the Wronskian of spherical Bessel functions, Abramowitz and
 * Stegun 10.1.
 */
export function besselPhase(order: number): PrototypePhase {
  const coefficients = besselSquaredMagnitude(order);
  const cutoff = besselCutoff(coefficients);
  return {
    phaseRad: (over, under) => phaseAt(order, over * cutoff, under),
    scaledDelay: (over, under) => cutoff * delayAt(coefficients, over * cutoff, under),
  };
}

function phaseAt(order: number, over: number, under: number): number {
  const square = over * over;
  let re = under;
  let im = Math.abs(over);
  let phase = -Math.atan2(im, re);
  for (let k = 2; k <= order; k++) {
    const part = square / (re * re + im * im);
    re = (2 * k - 1) * under - part * re;
    im *= part;
    phase -= Math.atan2(im, re);
  }
  return over < 0 ? -phase : phase;
}

/** Delay over under^2: the sums are of products of even powers of both, which are brought to a size of 1 first. */
function delayAt(coefficients: Float64Array, over: number, under: number): number {
  const size = Math.max(Math.abs(over), under);
  const overSquare = (over / size) ** 2;
  const underSquare = (under / size) ** 2;
  const order = coefficients.length - 1;
  let lower = 0;
  let power = 1;
  for (let k = 0; k < order; k++) {
    lower = lower * underSquare + coefficients[k]! * power;
    power *= overSquare;
  }
  return lower / (lower * underSquare + coefficients[order]! * power) / (size * size);
}
