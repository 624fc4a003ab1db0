/**
 * How much of a strong line shows at a distance from it: an upper bound over every side lobe from there on.
 *
 * Near the line it is measured, on the transforms of records of several lengths. Far from it, it follows from the
 * jumps of the window: a function whose derivative number m jumps by J in all has a transform of J / (2 pi f)^(m + 1)
 * and less of higher order. Source: Harris, On the use of windows for harmonic analysis with the discrete Fourier
 * transform, Proc. IEEE 1978, section on the rate of fall; Bracewell, The Fourier Transform and Its Applications.
 */

import { decibels } from './decibel.ts';
import { spectrumOf } from './spectrum-fft.ts';
import { WINDOWS, type WindowJumps, type WindowName, windowSamples } from './windows.ts';

/** The shortest record for which the bound is claimed; 25 lines. */
export const SHORTEST_RECORD_SAMPLES = 64;

/** Half of the shortest record: nearer than this no record ends. From here on the law of the jumps bounds them all. */
const MEASURED_BINS = SHORTEST_RECORD_SAMPLES / 2;

/** Up to here the law is raised to what was measured, where terms of higher order still matter. */
const FITTED_TO_BINS = 8 * MEASURED_BINS;

const PLACES_PER_BIN = 32;

/** Lengths that are measured: the shortest, whose aliases raise the lobes most, and one nearly continuous. */
const SHORT_LENGTHS = Array.from({ length: 16 }, (_, more) => SHORTEST_RECORD_SAMPLES + more);
const LONG_RECORD_SAMPLES = 2048;

/** For lobes between two places, and lengths between those measured. */
const ALLOWANCE = 10 ** (0.1 / 20);

interface Envelope {
  /** Amplitude at offset k / PLACES_PER_BIN or beyond it, 1 on the line. */
  readonly near: Float64Array;
  /** Amplitude x offset^order, from MEASURED_BINS on. */
  readonly farScale: number;
  readonly farOrder: number;
}

const measuredEnvelopes = new Map<WindowName, Envelope>();

/**
 * The most, in dB relative to the line itself, that a sinusoid can show anywhere `offsetBins` or farther away from it,
 * up to half of the rate. 0 on the line, never rising with the offset, -Infinity at an infinite one. The main lobe is
 * part of it. It holds for every record of `SHORTEST_RECORD_SAMPLES` or more and every place of the line between two
 * bins; it says nothing of what a line and its own mirror image add up to.
 *
 * @param offsetBins either way; what has no value is taken as 0
 */
export function sideLobeEnvelopeDb(window: WindowName, offsetBins: number): number {
  const offset = Math.abs(offsetBins);
  const { near, farScale, farOrder } = envelopeOf(window);
  // Down to the place before: the envelope only falls.
  const amplitude = offset >= MEASURED_BINS ? farScale / offset ** farOrder : near[Math.floor(offset * PLACES_PER_BIN)];
  return decibels(amplitude ?? 1);
}

function envelopeOf(window: WindowName): Envelope {
  const known = measuredEnvelopes.get(window);
  if (known !== undefined) return known;
  const envelope = measuredEnvelope(window);
  measuredEnvelopes.set(window, envelope);
  return envelope;
}

function measuredEnvelope(window: WindowName): Envelope {
  const { jumps } = WINDOWS[window];
  const farOrder = jumps.derivative + 1;
  const long = relativeAmplitudes(window, LONG_RECORD_SAMPLES);
  const farScale = ALLOWANCE * aliasGain(jumps) * Math.max(fittedScale(long, farOrder), jumpScale(window, farOrder));
  const all = [long, ...SHORT_LENGTHS.map((length) => relativeAmplitudes(window, length))];
  const near = new Float64Array(MEASURED_BINS * PLACES_PER_BIN);
  let most = farScale / MEASURED_BINS ** farOrder;
  for (let place = near.length - 1; place >= 0; place--) {
    // Only the line itself is 0 dB; a flat top swings above it by less than a hundredth of a dB, which is left out.
    for (const amplitudes of all) most = Math.max(most, Math.min(1, ALLOWANCE * (amplitudes[place] ?? 0)));
    near[place] = most;
  }
  return { near, farScale, farOrder };
}

/** At every place up to half of the rate, 1 on the line. */
function relativeAmplitudes(window: WindowName, length: number): Float64Array {
  const samples = windowSamples(window, length);
  const sum = samples.reduce((total, weight) => total + weight, 0);
  return amplitudesAtPlaces(samples).map((amplitude) => amplitude / sum);
}

/** |transform| at every place, or within half a place of it where the length is no power of two. */
function amplitudesAtPlaces(samples: Float64Array): Float64Array {
  const { size, re, im } = spectrumOf(samples, samples.length * PLACES_PER_BIN);
  const places = Math.floor((samples.length / 2) * PLACES_PER_BIN) + 1;
  const finer = size / samples.length / PLACES_PER_BIN;
  return Float64Array.from({ length: places }, (_, place) => {
    const k = Math.min(Math.round(place * finer), re.length - 1);
    return Math.hypot(re[k]!, im[k]!);
  });
}

/** The scale of the law that is above everything measured from MEASURED_BINS to FITTED_TO_BINS. */
function fittedScale(amplitudes: Float64Array, order: number): number {
  let scale = 0;
  for (let place = MEASURED_BINS * PLACES_PER_BIN; place < FITTED_TO_BINS * PLACES_PER_BIN; place++) {
    scale = Math.max(scale, amplitudes[place]! * (place / PLACES_PER_BIN) ** order);
  }
  return scale;
}

/** The scale of the law by the jumps alone. */
function jumpScale(window: WindowName, order: number): number {
  const samples = windowSamples(window, LONG_RECORD_SAMPLES);
  const mean = samples.reduce((total, weight) => total + weight, 0) / samples.length;
  return WINDOWS[window].jumps.total / (2 * Math.PI) ** order / mean;
}

/**
 * How much sampling raises the law at worst, at half of the rate, where the copies that stand at multiples of the rate
 * add up: with x = pi offset / samples, x / sin x of a jump; its square for a slope; x^3 cos x / sin^3 x, never above
 * 1, for a curvature that jumps on samples, and the sum of 1 / |1 + 2 m|^3 over all m for one that jumps between them.
 */
function aliasGain({ derivative, atEndsOnly }: WindowJumps): number {
  if (derivative === 0) return Math.PI / 2;
  if (derivative === 1) return (Math.PI / 2) ** 2;
  return atEndsOnly ? 1 : 2.1036;
}
