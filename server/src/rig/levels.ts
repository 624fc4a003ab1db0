import type { Dimension } from '../quantity/dimension.ts';
import { peakOf, type Scalar } from '../quantity/quantity.ts';
import { findUnit, ownUnit, type Unit } from '../quantity/unit.ts';
import { type Field, innerPlace, namePlace, placeOf } from './fields.ts';
import type { Given, Level, Measured, Sensor } from './model.ts';
import { DIMENSION_NAMES, type Ends, readEnds } from './quantities.ts';
import { type Reader, report } from './reader.ts';
import { given, reportValue } from './values.ts';

/** What each dimension is to a sensor; `other` for those that no word of `measures` stands for. */
export function measuredOf(dimension: Dimension): Measured {
  switch (dimension) {
    case 'acceleration':
    case 'velocity':
    case 'displacement':
    case 'strain':
    case 'pressure':
    case 'force':
    case 'torque':
    case 'temperature':
    case 'voltage':
    case 'current':
      return dimension;
    case 'rotation':
      return 'speed';
    default:
      return 'other';
  }
}

/** The dimension that a word of `measures` stands for; `undefined` for `other`. */
export function dimensionOf(measured: Measured): Dimension | undefined {
  if (measured === 'other') return undefined;
  if (measured === 'sound-pressure') return 'pressure';
  if (measured === 'speed') return 'rotation';
  return measured;
}

/** The unit of what a sensor measures, as its sensitivity names it. */
export function unitOf(sensor: Sensor | undefined): Unit | undefined {
  return sensor?.unit === undefined ? undefined : (findUnit(sensor.unit) ?? ownUnit(sensor.unit));
}

/**
 * What two levels must share to be compared: their dimension, or their symbol where it is a unit of somebody's own.
 * `undefined` for what is not in a measured unit.
 */
export function quantityOfLevel(level: Level): string | undefined {
  if (level.kind !== 'measured') return undefined;
  return quantityOfUnit(findUnit(level.unit) ?? ownUnit(level.unit));
}

/** As {@link quantityOfLevel}, for what a sensor measures; `undefined` where that is not known. */
export function quantityOfSensor(sensor: Sensor | undefined): string | undefined {
  const unit = unitOf(sensor);
  if (unit) return quantityOfUnit(unit);
  return sensor?.measures && dimensionOf(sensor.measures.value);
}

function quantityOfUnit(unit: Unit): string {
  return unit.dimension === 'other' ? `unit ${unit.symbol}` : unit.dimension;
}

/** A scalar as a level. On a channel (`sensor` given), volts are the measured unit of a sensor of voltage. */
function levelOf(scalar: Scalar, peak: number, sensor: Sensor | undefined): Level {
  if (scalar.dimension === 'dbfs') return { kind: 'dbfs', dbfs: scalar.value };
  if (scalar.dimension === 'voltage' && sensor?.measures?.value !== 'voltage') return { kind: 'volts', peakV: peak };
  const symbol = scalar.unit?.symbol ?? '';
  const measured = measuredOf(scalar.dimension);
  const words = sensor?.measures?.value;
  const same = words !== undefined && dimensionOf(words) === scalar.dimension;
  return { kind: 'measured', peak, measured: same ? words : measured, unit: symbol };
}

/** The level of a source, which belongs to no one channel. */
export function readSourceLevel(reader: Reader, field: Field): Given<Level> | undefined {
  const ends = readEnds(reader, field);
  if (!ends || !isAboveZero(reader, field, ends)) return undefined;
  return given(field, levelOf(ends.high, peakOf(ends.high), undefined), ends.written);
}

/** A level of a channel's own, above zero, comparable with what its sensor measures. */
export function readChannelLevel(reader: Reader, field: Field, sensor: Sensor | undefined): Given<Level> | undefined {
  const ends = readChannelEnds(reader, field, sensor);
  if (!ends || !isAboveZero(reader, field, ends)) return undefined;
  return given(field, levelOf(ends.high, ends.highValue, sensor), ends.written);
}

/** The ends of a channel's own value, and what they are as levels. */
export interface LevelEnds {
  readonly ends: Ends;
  readonly low: Level;
  readonly high: Level;
}

/** Both ends of a channel's own value as levels. */
export function readChannelLevels(reader: Reader, field: Field, sensor: Sensor | undefined): LevelEnds | undefined {
  const ends = readChannelEnds(reader, field, sensor);
  if (!ends) return undefined;
  const high = levelOf(ends.high, ends.highValue, sensor);
  const low = ends.written.kind === 'scalar' ? high : levelOf(ends.low, ends.lowValue, sensor);
  return { ends, low, high };
}

/** A channel's own value in base units, if its unit goes with what the channel measures. */
export function readChannelEnds(reader: Reader, field: Field, sensor: Sensor | undefined): Ends | undefined {
  const ends = readEnds(reader, field, unitOf(sensor));
  if (!ends) return undefined;
  const { dimension, unit } = ends.high;
  if (dimension === 'dbfs' || dimension === 'ratio' || dimension === 'voltage' || !unit) return ends;
  const due = quantityOfSensor(sensor);
  if (due === undefined || due === quantityOfUnit(unit)) return ends;
  reportOtherQuantity(reader, field, unit, sensor);
  return undefined;
}

/** An inherited value is right where it stands and wrong on this channel, so it is the channel that is told. */
function reportOtherQuantity(reader: Reader, field: Field, unit: Unit, sensor: Sensor | undefined): void {
  const what = unit.dimension === 'other' ? `in ${unit.symbol}` : DIMENSION_NAMES[unit.dimension];
  const measured = sensor?.measures?.value ?? 'something else';
  const own = unitOf(sensor)?.symbol;
  const message = `\`${field.row.key}\` is ${what}, but this channel measures ${measured}${own ? ` in ${own}` : ''}, so the two can't be compared.`;
  const origin = placeOf(field.entry, field.node);
  const inherited = field.inherited !== undefined || field.entry !== reader.entry;
  report(reader, {
    name: 'unit-mismatch',
    place: inherited
      ? namePlace(reader.entry)
      : field.node.kind === 'scalar'
        ? innerPlace(field.entry, field.node)
        : origin,
    message,
    about: field.path,
    ...(inherited ? { related: [{ place: origin, message: 'It comes from here.' }] } : {}),
  });
}

function isAboveZero(reader: Reader, field: Field, ends: Ends): boolean {
  if (ends.high.dimension === 'dbfs' || (Number.isFinite(ends.highValue) && ends.highValue > 0)) return true;
  const place = field.node.kind === 'scalar' ? innerPlace(field.entry, field.node) : placeOf(field.entry, field.node);
  reportValue(reader, field, 'out-of-range', place, `\`${field.row.key}\` is an amplitude and must be above 0.`);
  return false;
}
