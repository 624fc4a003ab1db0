import { type Curve, risingCurve } from './curve.ts';
import { attenuationOfLnPower } from './decibel.ts';

/** Butterworth, x = 1 at the cutoff: A = 10 log10(1 + x^(2 order)). */
export function butterworthPrototype(order: number): Curve {
  const twice = 2 * order;
  return risingCurve((x) => attenuationOfLnPower(twice * Math.log(x)));
}

/** Identical buffered single poles, x = 1 at the corner of each: A = 10 order log10(1 + x^2). */
export function singlePolesPrototype(order: number): Curve {
  return risingCurve((x) => order * attenuationOfLnPower(2 * Math.log(x)));
}

/** Where all `order` poles together are 3.0103 dB down, relative to the corner of each: sqrt(2^(1 / order) - 1). */
export function singlePolesCutoff(order: number): number {
  return Math.sqrt(Math.expm1(Math.LN2 / order));
}
