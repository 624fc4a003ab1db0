/**
 * The figures of merit of a window, computed from its shape: those of table 1 in F. J. Harris, On the use of windows for
 * harmonic analysis with the discrete Fourier transform, Proc. IEEE 1978. One bin is 1 / record. Levels are relative to
 * a sinusoid on its bin.
 */

import { decibels } from './decibel.ts';
import { spectrumOf } from './spectrum-fft.ts';
import { WINDOWS, type WindowName, windowSamples } from './windows.ts';

export interface WindowFigures {
  /** The mean weight: what a sinusoid's line keeps of its peak. */
  readonly coherentGain: number;
  /** Width of the rectangle that passes as much white noise, in bins. */
  readonly noiseBandwidthBins: number;
  /** How much lower a sinusoid half-way between two bins is shown, positive dB. */
  readonly scallopingLossDb: number;
  /** Level of the highest side lobe, negative dB. */
  readonly highestSideLobeDb: number;
  /** Full width of the main lobe at half of the power, in bins. */
  readonly bandwidth3DbBins: number;
  /** Full width of the main lobe at half of the amplitude, in bins. */
  readonly bandwidth6DbBins: number;
  /** How fast the side lobes fall far from the line, positive dB an octave. */
  readonly sideLobeFallDbPerOctave: number;
}

/** Samples that stand for a continuous record; sums over them are integrals to about 1e-7. */
const SAMPLES = 4096;

/** Half-way down an amplitude, and a power. */
const HALF_AMPLITUDE = 0.5;
const HALF_POWER = Math.SQRT1_2;

/** Where side lobes are looked for, before the highest is followed to its peak. */
const LOBE_SAMPLES = 2048;
const PLACES_PER_BIN = 32;

/** Places at which the overlapping parts of two records are compared. */
const OVERLAP_PLACES = 512;

const computedFigures = new Map<WindowName, WindowFigures>();

/** All figures of a window, for records of many samples. Computed once a window. */
export function windowFigures(window: WindowName): WindowFigures {
  const known = computedFigures.get(window);
  if (known !== undefined) return known;
  const figures = figuresOf(window);
  computedFigures.set(window, figures);
  return figures;
}

/**
 * Correlation of two neighbouring records of white noise after the window, by the part `overlap` (0 .. 1) of each that
 * they share: the integral of w(t) w(t + 1 - overlap) over that of w(t)^2. 0 without overlap, 1 where they are the same.
 * Source: Harris 1978, equation for c(r).
 */
export function overlapCorrelation(window: WindowName, overlap: number): number {
  if (!(overlap > 0)) return 0;
  return sharedPower(window, Math.min(overlap, 1)) / sharedPower(window, 1);
}

function sharedPower(window: WindowName, overlap: number): number {
  const { weightAt } = WINDOWS[window];
  const shift = 1 - overlap;
  let sum = 0;
  for (let n = 0; n < OVERLAP_PLACES; n++) {
    const place = ((n + 0.5) / OVERLAP_PLACES) * overlap - 0.5;
    sum += weightAt(place) * weightAt(place + shift);
  }
  return (sum * overlap) / OVERLAP_PLACES;
}

function figuresOf(window: WindowName): WindowFigures {
  const samples = windowSamples(window, SAMPLES);
  const sum = samples.reduce((total, weight) => total + weight, 0);
  const power = samples.reduce((total, weight) => total + weight * weight, 0);
  return {
    coherentGain: sum / SAMPLES,
    noiseBandwidthBins: (SAMPLES * power) / (sum * sum),
    scallopingLossDb: -decibels(relativeAmplitude(samples, 0.5)),
    highestSideLobeDb: highestSideLobeDb(window, samples),
    bandwidth3DbBins: mainLobeWidth(samples, HALF_POWER),
    bandwidth6DbBins: mainLobeWidth(samples, HALF_AMPLITUDE),
    sideLobeFallDbPerOctave: decibels(2) * (WINDOWS[window].jumps.derivative + 1),
  };
}

/** What a line `offsetBins` away shows of a sinusoid, 1 on its bin. */
function relativeAmplitude(samples: Float64Array, offsetBins: number): number {
  let sum = 0;
  let shown = 0;
  // Windows are even about the middle: only cosines are left.
  samples.forEach((weight, n) => {
    sum += weight;
    shown += weight * Math.cos(2 * Math.PI * offsetBins * (n / samples.length - 0.5));
  });
  return shown / sum;
}

/** Full width, in bins, within which the main lobe is above `level`, by bisection on its falling side. */
function mainLobeWidth(samples: Float64Array, level: number): number {
  let above = 0;
  let below = 0.5;
  while (below < samples.length / 2 && relativeAmplitude(samples, below) >= level) below += 0.5;
  for (let step = 0; step < 50; step++) {
    const middle = (above + below) / 2;
    if (relativeAmplitude(samples, middle) >= level) above = middle;
    else below = middle;
  }
  return above + below;
}

function highestSideLobeDb(window: WindowName, samples: Float64Array): number {
  const { re, im } = spectrumOf(windowSamples(window, LOBE_SAMPLES), LOBE_SAMPLES * PLACES_PER_BIN);
  const amplitudes = re.map((real, k) => Math.hypot(real, im[k]!));
  // Not before half of the amplitude: a flat top has hollows of its own.
  let hollow = amplitudes.findIndex((amplitude) => amplitude < HALF_AMPLITUDE * amplitudes[0]!);
  while (hollow < amplitudes.length - 1 && amplitudes[hollow]! > amplitudes[hollow + 1]!) hollow++;
  const highest = amplitudes.reduce(
    (best, amplitude, k) => (k > hollow && amplitude > amplitudes[best]! ? k : best),
    hollow,
  );
  return decibels(lobePeak(samples, (highest - 1) / PLACES_PER_BIN, (highest + 1) / PLACES_PER_BIN));
}

/** The most that is shown between two offsets, in bins, within one lobe: a third closer at a time. */
function lobePeak(samples: Float64Array, lowBins: number, highBins: number): number {
  const shownAt = (offsetBins: number): number => Math.abs(relativeAmplitude(samples, offsetBins));
  let [low, high] = [lowBins, highBins];
  for (let step = 0; step < 20; step++) {
    const third = (high - low) / 3;
    if (shownAt(low + third) < shownAt(high - third)) low += third;
    else high -= third;
  }
  return shownAt((low + high) / 2);
}
