import { decibels, ratioOf } from './decibel.ts';

/** Levels on a converter's scale: a sinusoid whose peak is full scale is 0 dBFS. */

/**
 * Peak volts of a full-scale sinusoid at the digitizer's input: half the span of the converter's full scale, over the
 * gain ahead of it. ±10 V at gain 1 is 10 V; 0..5 V is 2.5 V.
 */
export function fullScalePeakV(lowV: number, highV: number, gain: number): number {
  return Math.abs(highV - lowV) / 2 / Math.abs(gain);
}

/** dBFS of a sinusoid of `peakV`; `-Infinity` at 0 V. */
export function dbfsOfPeak(peakV: number, fullScaleV: number): number {
  return decibels(Math.abs(peakV) / fullScaleV);
}

/** Peak volts of a sinusoid at a level. */
export function peakOfDbfs(levelDbfs: number, fullScaleV: number): number {
  return ratioOf(levelDbfs) * fullScaleV;
}

/** dBFS of noise of `rmsV`: 20 log10(sqrt 2 rms / full scale), so that a sinusoid of that rms has the same figure. */
export function dbfsOfRms(rmsV: number, fullScaleV: number): number {
  return dbfsOfPeak(peakOfRms(rmsV), fullScaleV);
}

/** Peak of a sinusoid of this root mean square. */
export function peakOfRms(rms: number): number {
  return rms * Math.SQRT2;
}

/** Peak of a sinusoid of this peak-to-peak value. */
export function peakOfPeakToPeak(peakToPeak: number): number {
  return peakToPeak / 2;
}
