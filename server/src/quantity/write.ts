import { shortestWithin, toDigits } from './decimal-text.ts';
import type { Dimension } from './dimension.ts';
import type { Quantity, Scalar } from './quantity.ts';
import { tableUnit, type Unit } from './unit.ts';
import { shiftedByTens } from './written-number.ts';

/** Reading gives a written value back to 1e-9; a little is left for the conversion itself. */
const WRITING_TOLERANCE = 0.9e-9;
const DEFAULT_RANGE_SEPARATOR = ' .. ';
const MESSAGE_DIGITS = 5;
const DECIBEL_DECIMALS = 2;
const LOGARITHMIC: ReadonlySet<Dimension> = new Set(['dbfs', 'decibel', 'slope']);

/**
 * Writes a value the way the file writes `like`: in its unit as spelled there, with its space or none, its `±`, its
 * amplitude word, its exponent, and its decimals where they end in zeros. No more digits than it takes to read
 * `valueBase` back within 1e-9 of it.
 *
 * @param valueBase on the scale of `Scalar.value` of `like` (fractions for a `like` in fs, decibels for one in dB)
 * @param like the quantity it replaces or stands beside; of a range, the high end is imitated
 * @param fallbackUnit used where `like` is missing or bare; `undefined` writes a bare number
 */
export function writeLike(valueBase: number, like: Quantity | undefined, fallbackUnit: Unit | undefined): string {
  if (!like) return writeIn(valueBase, fallbackUnit);
  if (like.kind === 'range') return writeScalarLike(valueBase, like.high, fallbackUnit);
  if (like.kind === 'scalar') return writeScalarLike(valueBase, like, fallbackUnit);
  return like.sign + writeScalarLike(Math.abs(valueBase), like.limit, fallbackUnit);
}

/** Writes a range the way the file writes `like`, a bare low end included. See `writeLike`. */
export function writeRangeLike(
  lowBase: number,
  highBase: number,
  like: Quantity | undefined,
  fallbackUnit: Unit | undefined,
): string {
  if (like?.kind !== 'range') {
    const plain = like?.kind === 'symmetric' ? like.limit : like;
    return [lowBase, highBase].map((end) => writeLike(end, plain, fallbackUnit)).join(DEFAULT_RANGE_SEPARATOR);
  }
  const high = writeScalarLike(highBase, like.high, fallbackUnit);
  const lowIsBare = like.low.unitSpan === undefined && like.low.unit !== undefined;
  const low = lowIsBare
    ? numberLike(lowBase, like.low, like.low.unit)
    : writeScalarLike(lowBase, like.low, like.high.unit ?? fallbackUnit);
  return low + like.separator + high;
}

function writeScalarLike(valueBase: number, like: Scalar, fallbackUnit: Unit | undefined): string {
  const unit = like.unit ?? fallbackUnit;
  const number = numberLike(valueBase, like, unit);
  const amplitude = like.amplitude ? ` ${like.amplitude}` : '';
  if (!unit) return number + amplitude;
  const closeUp = like.unitSpan !== undefined && like.unitSpan.start === like.number.end;
  return `${number}${closeUp ? '' : ' '}${like.unitText || unit.symbol}${amplitude}`;
}

function numberLike(valueBase: number, like: Scalar, unit: Unit | undefined): string {
  const { exponent } = like.number;
  const mantissa = shortestWithin(shiftedByTens(inUnits(valueBase, unit), -exponent), WRITING_TOLERANCE);
  if (mantissa.includes('e') || !Number.isFinite(valueBase)) return writeNumber(valueBase, unit);
  const [digits = '', power] = like.number.text.split(/(?=[eE])/);
  const padded = /\.\d*0$/.test(digits) ? withDecimals(mantissa, like.number.decimals) : mantissa;
  return padded + (power ?? '');
}

function withDecimals(number: string, decimals: number): string {
  const [whole = '', fraction = ''] = number.split('.');
  return `${whole}.${fraction.padEnd(decimals, '0')}`;
}

function writeIn(valueBase: number, unit: Unit | undefined): string {
  const number = writeNumber(valueBase, unit);
  return unit ? `${number} ${unit.symbol}` : number;
}

function writeNumber(valueBase: number, unit: Unit | undefined): string {
  return shortestWithin(inUnits(valueBase, unit), WRITING_TOLERANCE);
}

function inUnits(valueBase: number, unit: Unit | undefined): number {
  return unit ? shiftedByTens((valueBase * unit.over) / unit.times, -unit.tens) : valueBase;
}

/**
 * The units that messages use, the largest first; a value is shown in the first of which it makes at least one, or
 * else in the last. Minutes are left out, because 100 s says more than 1.6667 min.
 */
const SHOWN: Partial<Record<Dimension, readonly string[]>> = {
  frequency: ['GHz', 'MHz', 'kHz', 'Hz'],
  rate: ['GS/s', 'MS/s', 'kS/s', 'S/s'],
  rotation: ['rpm'],
  time: ['h', 's', 'ms', 'us', 'ns', 'ps'],
  voltage: ['V', 'mV', 'uV'],
  current: ['A', 'mA'],
  resistance: ['ohm'],
  acceleration: ['m/s2'],
  velocity: ['m/s', 'mm/s'],
  displacement: ['m', 'mm', 'um'],
  pressure: ['MPa', 'kPa', 'Pa'],
  force: ['kN', 'N'],
  torque: ['N.m'],
  strain: ['ue'],
  temperature: ['K'],
  angle: ['deg'],
  dbfs: ['dBFS'],
  decibel: ['dB'],
  slope: ['dB/oct'],
  ratio: ['%', 'ppm'],
  bits: ['bit'],
  data: ['TB', 'GB', 'MB', 'kB', 'B'],
  'data-rate': ['TB/s', 'GB/s', 'MB/s', 'kB/s', 'B/s'],
  'of-rate': ['fs'],
};

/** The least magnitude shown in a unit, where that is not 1: 90 min is 5400 s, and 0.1 % is not 1000 ppm. */
const LEAST_SHOWN: ReadonlyMap<string, number> = new Map([
  ['h', 2],
  ['%', 0.01],
]);

/** A frequency as messages show it: `9.6 kHz`, `13.107 MHz`; at most so many significant digits. */
export function formatHz(hz: number, digits = MESSAGE_DIGITS): string {
  return formatQuantity(hz, 'frequency', digits);
}

/**
 * A value as messages show it: `9.6 kHz`, `-64.08 dBFS`, `25 ppm`.
 *
 * @param valueBase in the base unit of the dimension
 * @param of a unit to show it in, or a dimension, whose fitting unit is chosen; `number`, `other`, `density` and
 *   `sensitivity` have none and show the number alone
 * @param digits the most significant digits (whole numbers keep theirs); left out, 5, and 2 decimals for decibels
 */
export function formatQuantity(valueBase: number, of: Dimension | Unit, digits?: number): string {
  if (typeof of !== 'string') return `${shownNumber(inUnits(valueBase, of), of.dimension, digits)} ${of.symbol}`;
  const units = SHOWN[of]?.map((symbol) => tableUnit(symbol)!);
  if (!units) return shownNumber(valueBase, of, digits);
  const fitting = valueBase === 0 ? homeUnit(units) : fittingUnit(valueBase, units, of, digits);
  return formatQuantity(valueBase, fitting, digits);
}

/** Judged after rounding: 999.9999 Hz is 1 kHz, not 1000 Hz. */
function fittingUnit(valueBase: number, units: readonly Unit[], dimension: Dimension, digits?: number): Unit {
  const fits = (unit: Unit): boolean => {
    const shown = Number(shownNumber(inUnits(valueBase, unit), dimension, digits));
    return Math.abs(shown) >= (LEAST_SHOWN.get(unit.symbol) ?? 1);
  };
  return units.find(fits) ?? units.at(-1)!;
}

/** The unit of a zero. */
function homeUnit(units: readonly Unit[]): Unit {
  return units.find(({ factor }) => factor === 1) ?? units[0]!;
}

function shownNumber(value: number, dimension: Dimension, digits: number | undefined): string {
  if (!Number.isFinite(value)) return String(value);
  if (digits === undefined && LOGARITHMIC.has(dimension)) return String(Number(value.toFixed(DECIBEL_DECIMALS)));
  const most = digits ?? MESSAGE_DIGITS;
  const isLargeWhole = Math.abs(value) >= 10 ** most && Math.abs(value) < 1e15;
  return isLargeWhole ? String(Math.round(value)) : toDigits(value, most);
}
