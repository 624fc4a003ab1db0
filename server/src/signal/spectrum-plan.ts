/**
 * What a spectrum takes and gives: how many samples a record has, how long all of it lasts, how far apart its lines
 * are, and how far an average can be trusted.
 */

import { overlapCorrelation, windowFigures } from './window-figures.ts';
import type { WindowName } from './windows.ts';

/** Samples of a record for every line that is shown, as much as anti-alias filters need. Common practice; no source. */
export const SAMPLES_PER_LINE = 2.56;

/** Quotients this close to a whole number are that number but for rounding. */
const ROUNDING = 1e-9;

/** Up to so many neighbours of a record are added one by one. */
const MOST_NEIGHBOURS = 128;

/** How the length of one record is given. */
export type RecordLength =
  | { readonly by: 'lines'; readonly lines: number }
  | { readonly by: 'resolution'; readonly resolutionHz: number }
  | { readonly by: 'record'; readonly recordS: number };

export interface SpectrumSettings {
  readonly length: RecordLength;
  readonly window: WindowName;
  /** The part of each record that the next one shares, from 0 to less than 1. */
  readonly overlap: number;
  /** How many spectra are averaged, 1 or more. */
  readonly averages: number;
}

/** The record behind one spectrum, whatever its window. */
export interface SpectrumRecord {
  /** Samples of one record, at the last stage's rate. */
  readonly recordSamples: number;
  readonly recordS: number;
  /** From one line to the next: 1 / record. */
  readonly resolutionHz: number;
}

export interface SpectrumPlan extends SpectrumRecord {
  /** Lines that are shown. */
  readonly lines: number;
  /** From the first sample of the first record to the end of the last. */
  readonly totalS: number;
  /** How many records without overlap would average as well. */
  readonly independentAverages: number;
  /** Standard deviation of an averaged auto-spectrum's line over its true value. */
  readonly randomError: number;
  /** Two tones nearer than this are not told apart: the window's 6 dB bandwidth. */
  readonly leastSeparationHz: number;
}

/**
 * The plan of a spectrum of samples at `rateHz`, the last stage's.
 *
 * @returns `undefined` where the rate or the length makes no record: not above 0, or beyond what a double holds. An
 *   overlap outside 0 .. 1 counts as its nearer end, averages below 1 as 1, parts of an average not at all.
 */
export function planSpectrum(settings: SpectrumSettings, rateHz: number): SpectrumPlan | undefined {
  const record = recordAt(settings.length, rateHz);
  if (!record) return undefined;
  const { recordSamples, recordS, resolutionHz } = record;
  const overlap = within(settings.overlap);
  const averages = wholeAverages(settings.averages);
  const independentAverages = effectiveAverages(settings.window, overlap, averages);
  return {
    ...record,
    lines: settings.length.by === 'lines' ? settings.length.lines : linesOf(recordSamples),
    totalS: totalTimeS(recordS, overlap, averages),
    independentAverages,
    randomError: 1 / Math.sqrt(independentAverages),
    leastSeparationHz: leastSeparationHz(settings.window, resolutionHz),
  };
}

/**
 * One record of samples at `rateHz`, the last stage's: what is known of a spectrum without looking at its window.
 *
 * @returns `undefined` where the rate or the length makes no record: not above 0, or beyond what a double holds
 */
export function recordAt(length: RecordLength, rateHz: number): SpectrumRecord | undefined {
  const recordSamples = samplesOf(length, rateHz);
  const recordS = recordSamples / rateHz;
  const isRecord = recordSamples >= 1 && recordS > 0 && Number.isFinite(recordSamples) && Number.isFinite(recordS);
  return isRecord ? { recordSamples, recordS, resolutionHz: 1 / recordS } : undefined;
}

/**
 * Whole samples of one record: 2.56 x lines, rounded up so that every line is there; rate / resolution or rate x
 * record, to the nearest. 1 at least where the length is above 0.
 */
function samplesOf(length: RecordLength, rateHz: number): number {
  switch (length.by) {
    case 'lines':
      return Math.ceil(SAMPLES_PER_LINE * length.lines * (1 - ROUNDING));
    case 'resolution':
      return nearestCount(rateHz / length.resolutionHz);
    case 'record':
      return nearestCount(rateHz * length.recordS);
  }
}

function nearestCount(samples: number): number {
  return samples > 0 ? Math.max(1, Math.round(samples)) : Number.NaN;
}

/** Lines that a record of so many samples shows: samples / 2.56, rounded down. */
export function linesOf(recordSamples: number): number {
  return Math.floor((recordSamples / SAMPLES_PER_LINE) * (1 + ROUNDING));
}

/** How long averaging takes: record x (1 + (averages - 1) (1 - overlap)). */
export function totalTimeS(recordS: number, overlap: number, averages: number): number {
  return recordS * (1 + (averages - 1) * (1 - overlap));
}

/** The most averages that `availableS` has room for; 0 where one record is longer than that. */
export function averagesThatFit(recordS: number, overlap: number, availableS: number): number {
  const room = availableS * (1 + ROUNDING) - recordS;
  if (!(room >= 0)) return 0;
  const step = recordS * (1 - within(overlap));
  return step > 0
    ? Math.min(1 + Math.floor((room / step) * (1 + ROUNDING)), Number.MAX_SAFE_INTEGER)
    : Number.MAX_SAFE_INTEGER;
}

/**
 * How many records without overlap would leave the same random error: with K averages and c(r) the correlation of two
 * records that share the part r, K / (1 + 2 sum over j of (1 - j / K) c(1 - j (1 - overlap))^2), j = 1 .. K - 1.
 *
 * Source: P. D. Welch, The use of fast Fourier transform for the estimation of power spectra, IEEE Trans. Audio and
 * Electroacoustics 1967; Bendat and Piersol, Random Data, the chapter on errors of spectral estimates. From memory.
 *
 * @param overlap 0 .. 1; others count as the nearer end
 * @param averages parts of one do not count, less than 1 is 1
 */
export function effectiveAverages(window: WindowName, overlap: number, averages: number): number {
  const count = wholeAverages(averages);
  const step = 1 - within(overlap);
  const sharing = Math.min(count - 1, Math.floor((1 - ROUNDING) / step));
  const term = (j: number): number => (1 - j / count) * overlapCorrelation(window, 1 - j * step) ** 2;
  // No more than there are records, whatever rounding does.
  return Math.max(1, count / (1 + 2 * sumOfNeighbours(term, sharing)));
}

/** Sum of term(1) .. term(last); past MOST_NEIGHBOURS by the trapezoidal rule over as many places. */
function sumOfNeighbours(term: (j: number) => number, last: number): number {
  const steps = Math.min(last, MOST_NEIGHBOURS);
  if (!(steps > 0)) return 0;
  const width = last / steps;
  let sum = 0;
  for (let k = 1; k <= steps; k++) sum += term(k * width);
  // The sum runs from 1 and is no integral from 0: the half terms at both ends are put right. Nothing at width 1.
  return width * sum + ((width - 1) / 2) * (term(0) - term(last));
}

/** The least distance at which two tones of equal level are told apart: the 6 dB bandwidth of the window. Harris 1978. */
export function leastSeparationHz(window: WindowName, resolutionHz: number): number {
  return windowFigures(window).bandwidth6DbBins * resolutionHz;
}

/** Whether two tones `separateHz` apart are told apart. */
export function tellsApart(window: WindowName, resolutionHz: number, separateHz: number): boolean {
  return separateHz >= leastSeparationHz(window, resolutionHz) * (1 - ROUNDING);
}

function within(overlap: number): number {
  return overlap > 0 ? Math.min(overlap, 1) : 0;
}

function wholeAverages(averages: number): number {
  return averages > 1 ? Math.floor(Math.min(averages, Number.MAX_SAFE_INTEGER)) : 1;
}
