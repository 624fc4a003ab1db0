import { decibels } from './decibel.ts';

/**
 * Noise that an uncertain sampling instant makes of a sinusoid, in dB relative to it: 20 log10(2 pi f sigma), less the
 * processing gain of the band that is kept. `-Infinity` without jitter.
 *
 * The formula is of small angles: where 2 pi f sigma nears 1 it says more than is so.
 * Source: IEEE Std 1241.
 *
 * @param jitterS rms aperture uncertainty in s
 * @param gainDb see `processingGainDb`; 0 for the noise over the whole of 0 .. rate / 2
 */
export function jitterNoiseDb(frequencyHz: number, jitterS: number, gainDb: number): number {
  return decibels(2 * Math.PI * Math.abs(frequencyHz) * Math.abs(jitterS)) - gainDb;
}
