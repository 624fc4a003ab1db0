import { powerDecibels } from './decibel.ts';

/**
 * The noise of an ideal quantizer: an error spread evenly over one step, white over 0 .. rate / 2.
 * Source: Bennett, Spectra of quantized signals, 1948; IEEE Std 1241.
 */

/** What one step of a converter of `bits` bits is worth, in the unit of `span` (the whole of it: ±10 V is 20 V). */
export function quantizerStep(span: number, bits: number): number {
  return Math.abs(span) / 2 ** bits;
}

/** Rms of the error over the whole of 0 .. rate / 2, in the unit of `step`: step / sqrt 12. */
export function quantizerNoiseRms(step: number): number {
  return Math.abs(step) / Math.sqrt(12);
}

/** Rms of the error inside a band of that width; more than half the rate is half the rate. */
export function quantizerNoiseRmsInBand(step: number, rateHz: number, bandwidthHz: number): number {
  const share = Math.min(Math.max((2 * bandwidthHz) / rateHz, 0), 1);
  return quantizerNoiseRms(step) * Math.sqrt(share);
}

/** A full-scale sinusoid over the error in 0 .. rate / 2, in dB: 20 bits log10 2 + 10 log10 1.5. */
export function idealSignalToNoiseDb(bits: number): number {
  return 20 * bits * Math.log10(2) + 10 * Math.log10(1.5);
}

/**
 * By how many dB white noise falls when only a band of that width is kept: 10 log10(rate / (2 bandwidth)). Never
 * negative: a band wider than half the rate holds all of the noise. `Infinity` for a band without width.
 */
export function processingGainDb(rateHz: number, bandwidthHz: number): number {
  return Math.max(powerDecibels(rateHz / (2 * Math.max(bandwidthHz, 0))), 0);
}
