/**
 * The windows that records are weighted with, as functions of the place in the record.
 *
 * Source of the shapes: F. J. Harris, On the use of windows for harmonic analysis with the discrete Fourier transform,
 * Proc. IEEE 1978, unless a window names its own.
 */

import { besselI0 } from './modified-bessel.ts';

/** Names of the windows. Figures at the end are the shape parameters of Harris's table. */
export type WindowName =
  | 'rectangle'
  | 'triangle'
  | 'hann'
  | 'hamming'
  | 'blackman'
  | 'blackman-exact'
  | 'blackman-harris-3'
  | 'blackman-harris'
  | 'nuttall'
  | 'flat-top'
  | 'kaiser-bessel-2'
  | 'kaiser-bessel-2.5'
  | 'kaiser-bessel-3'
  | 'kaiser-bessel-3.5'
  | 'gaussian-2.5'
  | 'gaussian-3'
  | 'gaussian-3.5'
  | 'tukey-0.25'
  | 'tukey-0.5'
  | 'tukey-0.75';

/** The lowest derivative of a window (0 outside the record) that is not continuous; it sets how side lobes fall. */
export interface WindowJumps {
  /** 0 is the weight itself, 1 its slope, 2 its curvature. */
  readonly derivative: 0 | 1 | 2;
  /** The sizes of all its jumps added, for a record of length 1. */
  readonly total: number;
  /** Whether all of them are at the ends of the record. */
  readonly atEndsOnly: boolean;
}

export interface WindowShape {
  /** The weight at a place in the record from -1/2, the start, to 1/2, the end. 1 in the middle. */
  readonly weightAt: (place: number) => number;
  readonly jumps: WindowJumps;
}

/** Every window by its name. */
export const WINDOWS: Readonly<Record<WindowName, WindowShape>> = {
  rectangle: cosineSum([1]),
  triangle: {
    weightAt: (place) => 1 - 2 * Math.abs(place),
    // The slope goes from 0 to 2, to -2, to 0.
    jumps: { derivative: 1, total: 8, atEndsOnly: false },
  },
  hann: cosineSum([0.5, 0.5]),
  hamming: cosineSum([0.54, 0.46]),
  blackman: cosineSum([0.42, 0.5, 0.08]),
  'blackman-exact': cosineSum([7938 / 18608, 9240 / 18608, 1430 / 18608]),
  'blackman-harris-3': cosineSum([0.42323, 0.49755, 0.07922]),
  'blackman-harris': cosineSum([0.35875, 0.48829, 0.14128, 0.01168]),
  // Source: A. H. Nuttall, Some windows with very good sidelobe behavior, IEEE Trans. ASSP 1981, four terms of least
  // side lobe; from memory.
  nuttall: cosineSum([0.3635819, 0.4891775, 0.1365995, 0.0106411]),
  // Source: ISO 18431-2, Mechanical vibration and shock, Signal processing, time domain windows; from memory.
  'flat-top': cosineSum([1, 1.933, 1.286, 0.388, 0.0322]),
  'kaiser-bessel-2': kaiserBessel(2),
  'kaiser-bessel-2.5': kaiserBessel(2.5),
  'kaiser-bessel-3': kaiserBessel(3),
  'kaiser-bessel-3.5': kaiserBessel(3.5),
  'gaussian-2.5': gaussian(2.5),
  'gaussian-3': gaussian(3),
  'gaussian-3.5': gaussian(3.5),
  'tukey-0.25': tukey(0.25),
  'tukey-0.5': tukey(0.5),
  'tukey-0.75': tukey(0.75),
};

/** The names of all windows, in the order of the table. */
export const WINDOW_NAMES = Object.keys(WINDOWS) as readonly WindowName[];

/**
 * The weights of a record of `count` samples, the first at the record's start, the last one sample before its end (so
 * that the record repeats without a seam, as the discrete Fourier transform has it).
 */
export function windowSamples(window: WindowName, count: number): Float64Array {
  const { weightAt } = WINDOWS[window];
  return Float64Array.from({ length: count }, (_, n) => weightAt(n / count - 0.5));
}

/** Sum of a[k] cos(2 pi k place), scaled to 1 in the middle. */
function cosineSum(given: readonly number[]): WindowShape {
  const peak = given.reduce((sum, coefficient) => sum + coefficient, 0);
  const coefficients = given.map((coefficient) => coefficient / peak);
  /** The even derivatives at an end, but for their factor of (2 pi)^order. */
  const endSum = (order: 0 | 2): number =>
    Math.abs(coefficients.reduce((sum, coefficient, k) => sum + (k % 2 === 0 ? 1 : -1) * coefficient * k ** order, 0));
  // Coefficients that are meant to cancel at the ends do so but for rounding.
  const startsAtZero = endSum(0) < 1e-12;
  return {
    weightAt: (place) =>
      coefficients.reduce((sum, coefficient, k) => sum + coefficient * Math.cos(2 * Math.PI * k * place), 0),
    jumps: startsAtZero
      ? { derivative: 2, total: 2 * (2 * Math.PI) ** 2 * endSum(2), atEndsOnly: true }
      : { derivative: 0, total: 2 * endSum(0), atEndsOnly: true },
  };
}

/** I0(pi alpha sqrt(1 - (2 place)^2)) / I0(pi alpha). */
function kaiserBessel(alpha: number): WindowShape {
  const beta = Math.PI * alpha;
  const scale = besselI0(beta);
  return {
    weightAt: (place) => besselI0(beta * Math.sqrt(Math.max(0, 1 - 4 * place * place))) / scale,
    jumps: { derivative: 0, total: 2 / scale, atEndsOnly: true },
  };
}

/** exp(-(2 alpha place)^2 / 2), cut off at the ends of the record. */
function gaussian(alpha: number): WindowShape {
  const weightAt = (place: number): number => Math.exp(-2 * (alpha * place) ** 2);
  return { weightAt, jumps: { derivative: 0, total: 2 * weightAt(0.5), atEndsOnly: true } };
}

/** Flat, with half a period of a cosine over `taper` / 2 of the record at either end. */
function tukey(taper: number): WindowShape {
  const flatTo = (1 - taper) / 2;
  return {
    weightAt(place) {
      const past = Math.abs(place) - flatTo;
      return past <= 0 ? 1 : (1 + Math.cos((2 * Math.PI * past) / taper)) / 2;
    },
    // The curvature of the cosine begins and ends at its greatest.
    jumps: { derivative: 2, total: 2 * ((2 * Math.PI) / taper) ** 2, atEndsOnly: false },
  };
}
