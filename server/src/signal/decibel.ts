/** Decibels and the ratios they stand for. Amplitude ratios unless the name says power. */

const DB_PER_NEPER_OF_POWER = 10 / Math.LN10;

/** 10 log10 2, 3.0103 dB: half of the power, where a filter's cutoff stands. */
export const HALF_POWER_DB = 10 * Math.log10(2);

/** `20 log10 ratio` of an amplitude ratio; `-Infinity` at 0. */
export function decibels(ratio: number): number {
  return 20 * Math.log10(ratio);
}

/** The amplitude ratio that `db` stands for; 0 at `-Infinity`. */
export function ratioOf(db: number): number {
  return 10 ** (db / 20);
}

/** `10 log10 ratio` of a power ratio; `-Infinity` at 0. */
export function powerDecibels(ratio: number): number {
  return 10 * Math.log10(ratio);
}

/** The power ratio that `db` stands for; 0 at `-Infinity`. */
export function powerRatioOf(db: number): number {
  return 10 ** (db / 10);
}

/**
 * `10 log10(1 + e^lnPower)`: the attenuation of every response of the form `1 + power`, given the natural logarithm
 * of that power, so that a high order far out in the stop band does not overflow.
 */
export function attenuationOfLnPower(lnPower: number): number {
  // Past this the 1 is less than half a unit in the last place.
  if (lnPower > 37) return lnPower * DB_PER_NEPER_OF_POWER;
  return Math.log1p(Math.exp(lnPower)) * DB_PER_NEPER_OF_POWER;
}

/** `ln(10^(db / 10) - 1)`, the inverse of `attenuationOfLnPower`; `-Infinity` at 0 dB. */
export function lnPowerOfAttenuation(db: number): number {
  const neper = db / DB_PER_NEPER_OF_POWER;
  return neper > 37 ? neper : Math.log(Math.expm1(neper));
}
