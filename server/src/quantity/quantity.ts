import type { Dimension } from './dimension.ts';
import { findUnit, ownUnit, tableUnit, type Unit } from './unit.ts';
import { otherSpelling } from './unit-suggestion.ts';
import { looksLikeUnit, scanUnitWord } from './unit-word.ts';
import { isDigit, powerOfTen, scanNumber, valueTimesTens, type WrittenNumber } from './written-number.ts';

export type { WrittenNumber } from './written-number.ts';

/** Offsets in the text that was read: `start` inclusive, `end` exclusive, in UTF-16 units. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** How a sinusoid's size is told; peak where nothing is said. */
export type Amplitude = 'peak' | 'rms' | 'p-p';

/** One number with its unit: `25.6 kHz`, `1.4 g rms`, `0.453 fs`, `-80 dBFS`, `16`. */
export interface Scalar {
  readonly kind: 'scalar';
  /** In the base unit of the dimension (see `Dimension`), before `amplitude` is considered; finite, never `-0`. */
  readonly value: number;
  /** `undefined` for a bare number. */
  readonly unit: Unit | undefined;
  readonly dimension: Dimension;
  /** Half a unit of the last digit written, in the base unit. */
  readonly halfDigit: number;
  readonly amplitude?: Amplitude;
  readonly number: WrittenNumber;
  /** Where the unit stands; `undefined` for a bare number, and for a low end that took the high end's unit. */
  readonly unitSpan: Span | undefined;
  /** The unit as spelled (`µs` where `unit.symbol` is `us`); `''` without a span. */
  readonly unitText: string;
}

/** `5 Hz .. 10 kHz`, `600..3000 rpm`. The ends stand as written: the low one may be above the high one. */
export interface Range {
  readonly kind: 'range';
  readonly low: Scalar;
  readonly high: Scalar;
  /** What stands between the ends: `..` with the spaces around it. */
  readonly separator: string;
}

/** `±10 V`, `+/-10 V`: from `-limit` to `limit`. The limit has no sign of its own. */
export interface Symmetric {
  readonly kind: 'symmetric';
  readonly limit: Scalar;
  /** `±` or `+/-`, with the spaces behind it. */
  readonly sign: string;
}

export type Quantity = Scalar | Range | Symmetric;

export interface QuantityProblem extends Span {
  readonly kind: /** No number, half a range, or something behind the quantity: `start` and `end` tell which part. */
    | 'not-a-quantity'
    /** A number, and behind it what can't be a unit, or a unit of the table in another spelling (`suggestion`). */
    | 'unknown-unit'
    /** NaN, infinite, or beyond what a number can hold. */
    | 'not-finite'
    /** `1_000`, `1,000`, `1,5`, `0x10`: digits that are not written plainly. */
    | 'digit-separator'
    /** `peak`, `rms` or `p-p` behind something that is no amplitude, such as a frequency or a level in dBFS. */
    | 'amplitude-misplaced'
    /** More than 256 characters. */
    | 'too-long';
  /** What stands at the span. */
  readonly text: string;
  /** What to write at the span instead, where that is certain. */
  readonly suggestion?: string;
}

export type QuantityReading =
  | { readonly quantity: Quantity; readonly problem?: undefined }
  | { readonly problem: QuantityProblem; readonly quantity?: undefined };

const LONGEST_QUANTITY = 256;
const SHOWN_TEXT = 40;
const PLUS = 43;
const PLUS_MINUS = 0xb1;
const NOT_A_NUMBER = /^[-+\u2212]?(?:\.?nan|\.?inf|infinity|∞)(?![\p{L}\d])/iu;
const WITHOUT_AMPLITUDE: ReadonlySet<Dimension> = new Set([
  'frequency',
  'rate',
  'rotation',
  'of-rate',
  'dbfs',
  'decibel',
  'slope',
  'bits',
  'data',
  'data-rate',
  'sensitivity',
]);

/**
 * Reads the text of one scalar. Spans are relative to it. Never throws; time is linear in the length, and a text of
 * more than 256 characters is refused unread.
 *
 * A word behind the number that may be a unit but is not in the table gives a scalar of dimension `other`: whether an
 * own unit may stand here is for the reader of the key to say.
 */
export function readQuantity(text: string): QuantityReading {
  if (text.length > LONGEST_QUANTITY) return { problem: failure('too-long', text, 0, text.length) };
  const start = skipSpaces(text, 0);
  const sign = symmetricSign(text, start);
  const first = readScalar(text, start + sign.length);
  if (first.kind !== 'scalar') return { problem: first };
  const firstEnd = endOf(text, first);
  const next = skipSpaces(text, firstEnd);
  if (sign !== '') return readSymmetric(text, start, sign, first, next);
  if (next === text.length) return { quantity: first };
  if (!text.startsWith('..', next) || text[next + 2] === '.') return { problem: notAQuantity(text, next) };

  const second = readScalar(text, skipSpaces(text, next + 2));
  if (second.kind !== 'scalar') return { problem: second };
  const end = skipSpaces(text, endOf(text, second));
  if (end < text.length) return { problem: notAQuantity(text, end) };
  const low = withUnitOf(first, second);
  if (!low) return { problem: failure('not-finite', text, start, firstEnd) };
  const separator = text.slice(firstEnd, second.number.start);
  return { quantity: { kind: 'range', low, high: second, separator } };
}

function readSymmetric(text: string, start: number, sign: string, limit: Scalar, next: number): QuantityReading {
  if (/^[-+\u2212]/.test(limit.number.text)) return { problem: notAQuantity(text, start) };
  if (next < text.length) return { problem: notAQuantity(text, next) };
  return { quantity: { kind: 'symmetric', limit, sign } };
}

/**
 * A bare number read in a unit: `600` in rpm is 10 Hz. `undefined` where the value would not be finite.
 * The scalar's own unit, if it has one, is replaced.
 */
export function inUnit(scalar: Scalar, unit: Unit): Scalar | undefined {
  const value = valueIn(scalar.number, unit);
  const halfDigit = halfDigitIn(scalar.number, unit);
  if (!Number.isFinite(value) || !Number.isFinite(halfDigit)) return undefined;
  return { ...scalar, value, halfDigit, unit, dimension: unit.dimension };
}

/**
 * The peak of the sinusoid, in the base unit: rms times the square root of 2, half of a peak-to-peak value. A density
 * is no sinusoid and stays as it is.
 */
export function peakOf(scalar: Scalar): number {
  if (scalar.dimension === 'density') return scalar.value;
  if (scalar.amplitude === 'rms') return scalar.value * Math.SQRT2;
  return scalar.amplitude === 'p-p' ? scalar.value / 2 : scalar.value;
}

function readScalar(text: string, start: number): Scalar | QuantityProblem {
  const number = scanNumber(text, start);
  if (!number) return numberMissing(text, start);
  const plainEnd = plainDigitsEnd(text, number);
  if (plainEnd !== number.end) return notPlainDigits(text, number, plainEnd);

  const unitStart = skipSpaces(text, number.end);
  const unitEnd = amplitudeAfter(text, number.end) ? unitStart : scanUnitWord(text, unitStart);
  if (unitEnd === unitStart) return scalarOf(text, number, undefined, undefined, '');
  const unitText = text.slice(unitStart, unitEnd);
  const unit = tableUnit(unitText) ?? rarerUnit(unitText);
  if (!unit) return failure('unknown-unit', text, unitStart, unitEnd, otherSpelling(unitText));
  return scalarOf(text, number, unit, { start: unitStart, end: unitEnd }, unitText);
}

function scalarOf(
  text: string,
  number: WrittenNumber,
  unit: Unit | undefined,
  unitSpan: Span | undefined,
  unitText: string,
): Scalar | QuantityProblem {
  const value = valueIn(number, unit);
  const halfDigit = halfDigitIn(number, unit);
  if (!Number.isFinite(value) || !Number.isFinite(halfDigit)) {
    return failure('not-finite', text, number.start, number.end);
  }
  const dimension = unit === undefined ? 'number' : unit.dimension;
  const end = unitSpan === undefined ? number.end : unitSpan.end;
  const amplitude = amplitudeAfter(text, end);
  if (!amplitude) return { kind: 'scalar', value, unit, dimension, halfDigit, number, unitSpan, unitText };
  if (WITHOUT_AMPLITUDE.has(dimension)) {
    const start = skipSpaces(text, end);
    return failure('amplitude-misplaced', text, start, start + amplitude.length);
  }
  return { kind: 'scalar', value, unit, dimension, halfDigit, amplitude, number, unitSpan, unitText };
}

function valueIn(number: WrittenNumber, unit: Unit | undefined): number {
  return unit ? (valueTimesTens(number, unit.tens) * unit.times) / unit.over : number.value;
}

function halfDigitIn({ exponent, decimals }: WrittenNumber, unit: Unit | undefined): number {
  const power = exponent - decimals;
  return unit ? (0.5 * powerOfTen(power + unit.tens) * unit.times) / unit.over : 0.5 * powerOfTen(power);
}

/** The end of a scalar in its text, its amplitude word included. */
function endOf(text: string, scalar: Scalar): number {
  const end = scalar.unitSpan === undefined ? scalar.number.end : scalar.unitSpan.end;
  return scalar.amplitude ? skipSpaces(text, end) + scalar.amplitude.length : end;
}

/** A density, a sensitivity, or an own unit; not another spelling of a unit in the table. */
function rarerUnit(word: string): Unit | undefined {
  if (otherSpelling(word) !== undefined) return undefined;
  return findUnit(word) ?? (looksLikeUnit(word) ? ownUnit(word) : undefined);
}

/** A bare low end takes the unit and the amplitude of the high one. */
function withUnitOf(low: Scalar, high: Scalar): Scalar | undefined {
  if (low.unit || !high.unit) return low;
  const taken = inUnit(low, high.unit);
  return taken && high.amplitude && !low.amplitude ? { ...taken, amplitude: high.amplitude } : taken;
}

/** The amplitude word that follows `end` after a space. */
function amplitudeAfter(text: string, end: number): Amplitude | undefined {
  const at = skipSpaces(text, end);
  const code = text.charCodeAt(at);
  if (at === end || (code !== 112 /* p */ && code !== 114) /* r */) return undefined;
  const found = (['peak', 'rms', 'p-p'] as const).find((word) => text.startsWith(word, at));
  if (!found) return undefined;
  const next = at + found.length;
  return next === text.length || isSpace(text.charCodeAt(next)) || text.startsWith('..', next) ? found : undefined;
}

/** `±` or `+/-` and the spaces behind it, as written; `''` where there is none. */
function symmetricSign(text: string, start: number): string {
  const code = text.charCodeAt(start);
  if (code !== PLUS_MINUS && code !== PLUS) return '';
  const length = code === PLUS_MINUS ? 1 : text.startsWith('+/-', start) ? 3 : 0;
  return length === 0 ? '' : text.slice(start, skipSpaces(text, start + length));
}

/** Space, tab, line breaks, and the unbreakable and thin spaces that text is pasted with. */
function isSpace(code: number): boolean {
  if (code < 0xa0) return code === 32 || (code >= 9 && code <= 13);
  return code === 0xa0 || code === 0x2009 || code === 0x202f;
}

function skipSpaces(text: string, start: number): number {
  let at = start;
  while (isSpace(text.charCodeAt(at))) at += 1;
  return at;
}

/** The number's end, or that of the run of digits and separators (`1_000`, `1,000`, `0x1F`) it begins. */
function plainDigitsEnd(text: string, number: WrittenNumber): number {
  const { end } = number;
  const code = text.charCodeAt(end);
  const separated = (code === 95 || code === 44 || code === 39) && isDigit(text.charCodeAt(end + 1));
  const based = number.text === '0' && /^[xob][\da-f]+$/i.test(text.slice(end, scanUnitWord(text, end)));
  if (!separated && !based) return end;
  let runEnd = end + 1;
  while (runEnd < text.length && /[\da-f_,']|\.(?!\.)/i.test(text.slice(runEnd, runEnd + 2))) runEnd += 1;
  return runEnd;
}

function notPlainDigits(text: string, number: WrittenNumber, end: number): QuantityProblem {
  const run = text.slice(number.start, end);
  const plain = /^[-+\u2212]?[\d_.]+$/.test(run) ? run.replaceAll('_', '') : undefined;
  return failure('digit-separator', text, number.start, end, plain);
}

function numberMissing(text: string, start: number): QuantityProblem {
  const word = NOT_A_NUMBER.exec(text.slice(start));
  if (word) return failure('not-finite', text, start, start + word[0].length);
  return notAQuantity(text, start < text.length ? start : 0);
}

function notAQuantity(text: string, start: number): QuantityProblem {
  return failure('not-a-quantity', text, start, text.length);
}

function failure(
  kind: QuantityProblem['kind'],
  text: string,
  start: number,
  end: number,
  suggestion?: string,
): QuantityProblem {
  const problem = { kind, start, end, text: text.slice(start, Math.min(end, start + SHOWN_TEXT)) };
  return suggestion === undefined ? problem : { ...problem, suggestion };
}
