import { findUnit, type Unit } from '../quantity/unit.ts';
import { clipped, type Field, type Fields, innerPlace, placeOf, reportMissingKeys } from './fields.ts';
import { dimensionOf, measuredOf } from './levels.ts';
import type { Given, Measured, Sensor } from './model.ts';
import type { Place } from './place.ts';
import { DIMENSION_NAMES, type Ends, readEnds, readValue } from './quantities.ts';
import { readNoise } from './read-noise.ts';
import type { Reader } from './reader.ts';
import { given, readChoice, readNumber, reportValue } from './values.ts';

/** How sharp a mounted resonance is where nothing is said. */
const USUAL_Q = 30;

/** The keys of a sensor, which a channel may write itself. */
export const SENSOR_KEYS = [
  'measures',
  'sensitivity',
  'rated',
  'excitation',
  'range',
  'resonance',
  'q',
  'corner',
  'low-corner',
  'noise',
] as const;

/** Reads the fields of a sensor, whether it is named, written in place, or its keys stand in a channel. */
export function readSensor(reader: Reader, fields: Fields, name: string, place: Place): Sensor {
  const field = (key: string): Field | undefined => fields.byKey.get(key);
  const measures = readChoice<Measured>(reader, field('measures'));
  const range = readRange(reader, field('range'), measures?.value);
  const scale =
    readSensitivity(reader, field('sensitivity'), measures?.value) ??
    readBridge(reader, fields, range) ??
    (measures?.value === 'voltage' && !field('sensitivity')
      ? { sensitivity: { ...measures, value: 1 }, unit: VOLT }
      : undefined);
  const means = measures ?? impliedMeasure(scale?.unit, scale?.sensitivity);
  return {
    kind: 'sensor',
    name,
    place,
    measures: means,
    sensitivity: scale?.sensitivity,
    unit: scale?.unit.symbol,
    resonanceHz: readValue(reader, field('resonance')),
    q: readNumber(reader, field('q'))?.value ?? USUAL_Q,
    cornerHz: readValue(reader, field('corner')),
    lowCornerHz: readValue(reader, field('low-corner')),
    range: range?.magnitude,
    noise: readSensorNoise(reader, field('noise'), means?.value),
  };
}

const VOLT = findUnit('V') as Unit;

interface Scale {
  readonly sensitivity: Given<number>;
  /** Of what is measured. */
  readonly unit: Unit;
}

function readSensitivity(reader: Reader, field: Field | undefined, measures: Measured | undefined): Scale | undefined {
  const ends = field && readEnds(reader, field, undefined);
  const unit = ends?.high.unit?.per;
  if (!field || !ends || !unit) return undefined;
  if (!goesWith(unit, measures)) {
    reportOtherUnit(reader, field, unit, measures);
    return undefined;
  }
  return { sensitivity: given(field, ends.highValue, ends.written), unit };
}

interface SensorRange {
  readonly magnitude: Given<number>;
  readonly unit: Unit | undefined;
}

function readRange(reader: Reader, field: Field | undefined, measures: Measured | undefined): SensorRange | undefined {
  const ends: Ends | undefined = field && readEnds(reader, field);
  if (!field || !ends) return undefined;
  const { unit } = ends.high;
  if (unit && !goesWith(unit, measures)) {
    reportOtherUnit(reader, field, unit, measures);
    return undefined;
  }
  const magnitude = Math.max(Math.abs(ends.lowValue), Math.abs(ends.highValue));
  if (magnitude > 0) return { magnitude: given(field, magnitude, ends.written), unit };
  const node = field.node;
  const place = node.kind === 'scalar' ? innerPlace(field.entry, node) : placeOf(field.entry, node);
  reportValue(reader, field, 'out-of-range', place, '`range` must be above 0.');
  return undefined;
}

/** In volts, or in what the sensor measures. */
function readSensorNoise(reader: Reader, field: Field | undefined, measures: Measured | undefined): Sensor['noise'] {
  const read = readNoise(reader, field);
  if (!field || !read || read.of.dimension === 'voltage' || goesWith(read.of, measures)) return read?.noise;
  reportOtherUnit(reader, field, read.of, measures);
  return undefined;
}

/** A bridge: volts per measured unit are rated times excitation over range. */
function readBridge(reader: Reader, fields: Fields, range: SensorRange | undefined): Scale | undefined {
  const rated = readValue(reader, fields.byKey.get('rated'));
  const excitation = readValue(reader, fields.byKey.get('excitation'));
  if (!fields.byKey.has('rated') || fields.byKey.has('sensitivity')) return undefined;
  reportMissingKeys(reader, fields, ['excitation', 'range']);
  if (!rated || !excitation || !range?.unit) return undefined;
  const { written: _, ...place } = rated;
  const value = (rated.value * excitation.value) / range.magnitude.value;
  return { sensitivity: { ...place, value }, unit: range.unit };
}

function goesWith(unit: Unit, measures: Measured | undefined): boolean {
  if (measures === undefined || measures === 'other') return true;
  if (measures === 'speed') return unit.dimension === 'rotation' || unit.dimension === 'velocity';
  return dimensionOf(measures) === unit.dimension;
}

function reportOtherUnit(reader: Reader, field: Field, unit: Unit, measures: Measured | undefined): void {
  const node = field.node;
  const place = node.kind === 'scalar' ? innerPlace(field.entry, node) : placeOf(field.entry, node);
  const what = unit.dimension === 'other' ? `\`${clipped(unit.symbol)}\`` : DIMENSION_NAMES[unit.dimension];
  const message = `\`${field.row.key}\` is in ${unit.symbol}, so for ${what}, but \`measures\` says ${measures}.`;
  reportValue(reader, field, 'unit-mismatch', place, message);
}

function impliedMeasure(unit: Unit | undefined, sensitivity: Given<number> | undefined): Given<Measured> | undefined {
  if (!unit || !sensitivity) return undefined;
  const { written: _, ...place } = sensitivity;
  return { ...place, value: measuredOf(unit.dimension) };
}
