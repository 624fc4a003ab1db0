import type { Dimension } from '../quantity/dimension.ts';
import { inUnit, peakOf, type Quantity, type Scalar } from '../quantity/quantity.ts';
import { findUnit, type Unit } from '../quantity/unit.ts';
import { suggestUnit } from '../quantity/unit-suggestion.ts';
import { clipped, type Field, innerPlace, innerSpan } from './fields.ts';
import type { FrequencyRange, FullScale, Given } from './model.ts';
import type { Cure } from './problem.ts';
import type { Reader } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import {
  alternative,
  given,
  quantityOf,
  reportNotComputable,
  reportValue,
  reportWrongKind,
  withinBounds,
} from './values.ts';
import type { QuantityKind } from './vocabulary-kinds.ts';

/** Two ends of a quantity in base units: equal for a single value, opposite for a symmetric one. */
export interface Ends {
  readonly low: Scalar;
  readonly high: Scalar;
  /** The quantity as written. */
  readonly written: Quantity;
  readonly lowValue: number;
  readonly highValue: number;
}

/** What a sensor can measure, and so what may stand where its unit is due. */
const MEASURABLE: ReadonlySet<Dimension> = new Set<Dimension>([
  'acceleration',
  'velocity',
  'displacement',
  'strain',
  'pressure',
  'force',
  'torque',
  'temperature',
  'voltage',
  'current',
  'resistance',
  'rotation',
  'angle',
  'other',
]);

/**
 * Reads the quantity of a field, checks it against the field's kind and brings it into base units.
 *
 * @param measuredUnit the unit in which a bare number is read where the kind has no unit of its own
 */
export function readEnds(reader: Reader, field: Field, measuredUnit?: Unit): Ends | undefined {
  const written = quantityOf(reader, field);
  if (!written) return undefined;
  const kind = alternative(field.kind, 'quantity');
  if (!kind.forms.includes(written.kind === 'scalar' ? 'value' : written.kind)) {
    reportWrongForm(reader, field, written, kind);
    return undefined;
  }
  const baseUnit = kind.baseUnit === undefined ? measuredUnit : findUnit(kind.baseUnit);
  const first = written.kind === 'scalar' ? written : written.kind === 'range' ? written.low : written.limit;
  const second = written.kind === 'range' ? written.high : first;
  if (!checkScalar(reader, field, kind, second, baseUnit)) return undefined;
  if (first !== second && first.dimension !== 'number' && !checkScalar(reader, field, kind, first, baseUnit)) {
    return undefined;
  }
  const high = inBaseUnits(second, baseUnit);
  const low = first === second ? high : inBaseUnits(first, baseUnit);
  if (!high || !low) {
    reportNotComputable(reader, field);
    return undefined;
  }
  const lowValue = written.kind === 'symmetric' ? -peakOf(high) : peakOf(low);
  const ends = { low, high, written, lowValue, highValue: peakOf(high) };
  return checkEnds(reader, field, kind, ends) ? ends : undefined;
}

function reportWrongForm(reader: Reader, field: Field, written: Quantity, kind: QuantityKind): void {
  if (written.kind === 'range' && written.low.dimension === 'number' && written.high.dimension === 'number') {
    reportWrongKind(reader, field);
    return;
  }
  const node = field.node as ScalarNode;
  const wanted = kind.forms.includes('value') ? 'one value' : kind.forms.includes('symmetric') ? 'two ends' : 'a range';
  const message = `\`${field.row.key}\` takes ${wanted}, such as \`${field.row.example}\`; here stands \`${clipped(node.text)}\`.`;
  reportValue(reader, field, 'wrong-kind', innerPlace(field.entry, node), message);
}

/** A bare number in the unit that is due; anything else as it is. */
function inBaseUnits(scalar: Scalar, unit: Unit | undefined): Scalar | undefined {
  return scalar.dimension === 'number' && unit ? inUnit(scalar, unit) : scalar;
}

/** Whether a scalar has a unit that may stand here; a missing one is flagged, but serves. */
function checkScalar(
  reader: Reader,
  field: Field,
  kind: QuantityKind,
  scalar: Scalar,
  baseUnit: Unit | undefined,
): boolean {
  if (scalar.dimension === 'number') {
    reportUnitMissing(reader, field, baseUnit);
    return baseUnit !== undefined;
  }
  const fits = kind.dimensions.includes(scalar.dimension) || (kind.measured && MEASURABLE.has(scalar.dimension));
  if (!fits) {
    reportUnitMismatch(reader, field, kind, scalar);
    return false;
  }
  return true;
}

function reportUnitMissing(reader: Reader, field: Field, baseUnit: Unit | undefined): void {
  const node = field.node as ScalarNode;
  const { key, example } = field.row;
  const place = innerPlace(field.entry, node);
  if (!baseUnit) {
    reportValue(
      reader,
      field,
      'unit-missing',
      place,
      `\`${key}\` has no unit, so it can't be read; write it like \`${example}\`.`,
    );
    return;
  }
  const { symbol } = baseUnit;
  const message = `\`${key}\` has no unit; it is read as ${clipped(node.text)} ${symbol}.`;
  reportValue(reader, field, 'unit-missing', place, message, unitCure(field, node, symbol));
}

/** In JSON a number with a unit is a string, and so has to be quoted whole. */
function unitCure(field: Field, node: ScalarNode, symbol: string): Cure {
  const json = node.style === 'plain' && field.entry.key?.style === 'double-quoted';
  if (json) return { kind: 'replace', text: `"${node.text} ${symbol}"` };
  return { kind: 'append', text: ` ${symbol}` };
}

function reportUnitMismatch(reader: Reader, field: Field, kind: QuantityKind, scalar: Scalar): void {
  const node = field.node as ScalarNode;
  const { key, example } = field.row;
  const symbol = scalar.unit?.symbol ?? '';
  const { unitSpan } = scalar;
  const place = unitSpan ? innerSpan(field.entry, node, unitSpan.start, unitSpan.end) : innerPlace(field.entry, node);
  const near =
    scalar.dimension === 'other' ? suggestUnit(symbol, kind.measured ? undefined : kind.dimensions) : undefined;
  const fault =
    scalar.dimension === 'other'
      ? `\`${symbol}\` is no unit that fits \`${key}\``
      : `\`${symbol}\` is ${DIMENSION_NAMES[scalar.dimension]}, which \`${key}\` is not`;
  const message = near ? `${fault}; \`${near}\` is the nearest.` : `${fault}; write it like \`${example}\`.`;
  reportValue(reader, field, 'unit-mismatch', place, message, near ? { kind: 'replace', text: near } : undefined);
}

/** Dimensions as a message names them. */
export const DIMENSION_NAMES: Readonly<Record<Dimension, string>> = {
  frequency: 'a frequency',
  rate: 'a sample rate',
  rotation: 'a speed of rotation',
  time: 'a time',
  voltage: 'a voltage',
  current: 'a current',
  resistance: 'a resistance',
  acceleration: 'an acceleration',
  velocity: 'a velocity',
  displacement: 'a displacement',
  pressure: 'a pressure',
  force: 'a force',
  torque: 'a torque',
  strain: 'a strain',
  temperature: 'a temperature',
  angle: 'an angle',
  dbfs: 'a level relative to full scale',
  decibel: 'a ratio in dB',
  slope: 'a slope',
  ratio: 'a ratio',
  bits: 'a number of bits',
  data: 'an amount of data',
  'data-rate': 'a data rate',
  'of-rate': 'a fraction of a rate',
  density: 'a noise density',
  sensitivity: 'a sensitivity',
  number: 'a number without a unit',
  other: 'a unit of its own',
};

function checkEnds(reader: Reader, field: Field, kind: QuantityKind, ends: Ends): boolean {
  const { lowValue, highValue, written } = ends;
  // A level relative to full scale is logarithmic: its sign says nothing.
  if (ends.high.dimension !== 'dbfs') {
    const { unit } = ends.high;
    if (!withinBounds(reader, field, lowValue, kind.bounds, unit)) return false;
    if (!withinBounds(reader, field, highValue, kind.bounds, unit)) return false;
  }
  if (written.kind === 'scalar') return true;
  const node = field.node as ScalarNode;
  if (lowValue > highValue) {
    const message = `The range \`${clipped(node.text)}\` is upside down: its low end is above its high end.`;
    reportValue(reader, field, 'out-of-range', innerPlace(field.entry, node), message);
    return false;
  }
  if (kind.width && lowValue === highValue) {
    const message = `The range \`${clipped(node.text)}\` has no width; \`${field.row.key}\` needs some.`;
    reportValue(reader, field, 'out-of-range', innerPlace(field.entry, node), message);
    return false;
  }
  return true;
}

/** One value in base units (Hz, s, V, dB, a fraction). */
export function readValue(reader: Reader, field: Field | undefined, measuredUnit?: Unit): Given<number> | undefined {
  const ends = field && readEnds(reader, field, measuredUnit);
  return ends && field && given(field, ends.highValue, ends.written);
}

/** A frequency or a range of them; one value is a range of no width. */
export function readFrequencyRange(reader: Reader, field: Field | undefined): Given<FrequencyRange> | undefined {
  const ends = field && readEnds(reader, field);
  return ends && field && given(field, { lowHz: ends.lowValue, highHz: ends.highValue }, ends.written);
}

/** The ends of a converter's input. */
export function readFullScale(reader: Reader, field: Field | undefined): Given<FullScale> | undefined {
  const ends = field && readEnds(reader, field);
  return ends && field && given(field, { lowV: ends.lowValue, highV: ends.highValue }, ends.written);
}
