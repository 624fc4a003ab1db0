import type { Curve } from './curve.ts';
import { attenuationOfLnPower, lnPowerOfAttenuation } from './decibel.ts';

/** A ripple or stop band of 0 dB would leave no filter to speak of; the reader refuses it. */
export const LEAST_DB = 1e-9;

/**
 * Chebyshev, x = 1 at the pass edge: A = 10 log10(1 + e^2 T(x)^2), e^2 = 10^(ripple / 10) - 1.
 * An even order starts at the ripple.
 */
export function chebyshevPrototype(order: number, rippleDb: number): Curve {
  const ripple = Math.max(rippleDb, LEAST_DB);
  const lnPower = lnPowerOfAttenuation(ripple);
  const at = (x: number): number => attenuationOfLnPower(lnPower + 2 * lnChebyshev(order, x));
  return {
    at,
    least(low, high) {
      if (low >= 1) return at(low);
      return zeroWithin(order, low, high) ? 0 : Math.min(at(low), at(high));
    },
    greatest(low, high) {
      if (high >= 1) return at(high);
      return peakWithin(order, low, high) ? ripple : Math.max(at(low), at(high));
    },
  };
}

/** Where Chebyshev's curve is 3.0103 dB down, relative to its pass edge; the pass edge where the ripple is no less. */
export function chebyshevCutoff(order: number, rippleDb: number): number {
  return coshOfPart(order, -lnPowerOfAttenuation(Math.max(rippleDb, LEAST_DB)) / 2);
}

/**
 * Inverse Chebyshev, x = 1 at the stop edge: A = 10 log10(1 + 1 / (d^2 T(1 / x)^2)), d^2 = 1 / (10^(stopband / 10) - 1).
 * It has `order / 2` nulls (rounded down) above the stop edge.
 */
export function inverseChebyshevPrototype(order: number, stopbandDb: number): Curve {
  const stopband = Math.max(stopbandDb, LEAST_DB);
  const lnPower = lnPowerOfAttenuation(stopband);
  const at = (x: number): number => attenuationOfLnPower(lnPower - 2 * lnChebyshev(order, 1 / x));
  return {
    at,
    least(low, high) {
      if (low <= 1) return at(low);
      return peakWithin(order, 1 / high, 1 / low) ? stopband : Math.min(at(low), at(high));
    },
    greatest(low, high) {
      if (high <= 1) return at(high);
      return zeroWithin(order, 1 / high, 1 / low) ? Infinity : Math.max(at(low), at(high));
    },
  };
}

/** Where inverse Chebyshev's curve is 3.0103 dB down, relative to its stop edge. */
export function inverseChebyshevCutoff(order: number, stopbandDb: number): number {
  return 1 / coshOfPart(order, lnPowerOfAttenuation(Math.max(stopbandDb, LEAST_DB)) / 2);
}

/** ln |T(x)| for x >= 0, without overflow; `-Infinity` at a zero. */
function lnChebyshev(order: number, x: number): number {
  // cos(order acos x), counted from the middle, where acos has lost the small x.
  if (x < 0.5) {
    const angle = order * Math.asin(x);
    return Math.log(Math.abs(order % 2 === 1 ? Math.sin(angle) : Math.cos(angle)));
  }
  if (x <= 1) return Math.log(Math.abs(Math.cos(order * Math.acos(x))));
  const exponent = order * Math.acosh(x);
  return exponent - Math.LN2 + Math.log1p(Math.exp(-2 * exponent));
}

/** cosh(acosh(e^lnValue) / order), 1 where the value is under 1. */
function coshOfPart(order: number, lnValue: number): number {
  if (lnValue <= 0) return 1;
  // acosh(v) = ln v + ln(1 + sqrt(1 - 1 / v^2))
  const acosh = lnValue + Math.log1p(Math.sqrt(-Math.expm1(-2 * lnValue)));
  return Math.cosh(acosh / order);
}

/** Whether the polynomial is 0 somewhere in low .. high (of which only what is under 1 counts). */
function zeroWithin(order: number, low: number, high: number): boolean {
  const [first, last] = halfTurns(order, low, high);
  return Math.floor(last - 0.5) >= Math.ceil(first - 0.5);
}

/** Whether the polynomial is 1 or -1 somewhere in low .. high (of which only what is under 1 counts). */
function peakWithin(order: number, low: number, high: number): boolean {
  const [first, last] = halfTurns(order, low, high);
  return Math.floor(last) >= Math.ceil(first);
}

/** order acos(x) / pi over the interval: whole at the peaks, half-way between at the zeros. */
function halfTurns(order: number, low: number, high: number): readonly [number, number] {
  const scale = order / Math.PI;
  return [scale * Math.acos(Math.min(high, 1)), scale * Math.acos(Math.min(low, 1))];
}
