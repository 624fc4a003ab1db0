import { channelCount } from './channel-range.ts';
import {
  type Field,
  type Fields,
  innerPlace,
  itemsOf,
  namePlace,
  placeOf,
  readFieldsOf,
  reportMissingKeys,
} from './fields.ts';
import { readFilterUses } from './filter-uses.ts';
import { readHears } from './hears.ts';
import { sharedInPlace } from './in-place.ts';
import { readChannelLevel, readChannelLevels } from './levels.ts';
import type { Channel, Given, Level, Limit, Peak, Sensor, Undeclared } from './model.ts';
import { findThing } from './names.ts';
import type { Place } from './place.ts';
import { readFrequencyRange, readFullScale, readValue } from './quantities.ts';
import { readFollows } from './read-follows.ts';
import { readGroupName } from './read-group.ts';
import { readPulses } from './read-pulses.ts';
import { readSensor, SENSOR_KEYS } from './read-sensor.ts';
import { readSpectrum } from './read-spectrum.ts';
import { readSteps } from './read-steps.ts';
import { readPattern } from './read-uneven.ts';
import type { Reader } from './reader.ts';
import type { MapNode } from './tree.ts';
import { checkUncomputed } from './uncomputed.ts';
import { alternative, given, readChoice, readNumber, readText, reportValue, scalarOf } from './values.ts';

/**
 * Reads the fields of a channel, defaults among them, into a channel.
 *
 * @param reader the reading of the channel's entry; or of `defaults`, whose values are checked in the same way
 */
export function channelOf(reader: Reader, fields: Fields): Channel {
  const { byKey } = fields;
  const sensor = readChannelSensor(reader, fields);
  const digitizerField = byKey.get('digitizer');
  const digitizerNode = digitizerField && scalarOf(reader, digitizerField);
  const digitizer = digitizerField && digitizerNode && findThing(reader, digitizerField, digitizerNode, 'digitizer');
  const rateHz = readValue(reader, byKey.get('rate'));
  const band = readFrequencyRange(reader, byKey.get('band'));
  const pulses = readPulses(reader, byKey.get('pulses'));
  const hears = readHears(reader, byKey.get('hears'), sensor?.thing);
  const filterField = byKey.get('filter');
  const resolveField = byKey.get('resolve');
  checkUncomputed(reader, fields);
  readText(reader, byKey.get('note'));
  return {
    kind: 'channel',
    count: channelCount(reader.entry.name),
    name: reader.entry.name,
    place: namePlace(reader.entry),
    complete: rateHz !== undefined && (band !== undefined || pulses !== undefined),
    sensor: sensor?.thing,
    sensorPlace: sensor?.place,
    digitizer,
    digitizerPlace: digitizerField && digitizerNode && innerPlace(digitizerField.entry, digitizerNode),
    rateHz,
    gain: readNumber(reader, byKey.get('gain')),
    fullScale: readFullScale(reader, byKey.get('full-scale')),
    filters: isNone(filterField) ? [] : readFilterUses(reader, filterField, 'analogue'),
    filterPlace: filterField && placeOf(filterField.entry, filterField.node),
    pattern: readPattern(reader, byKey.get('pattern')),
    pulses,
    steps: readSteps(reader, byKey.get('then')),
    band,
    sampling: readChoice(reader, byKey.get('sampling')),
    foldLimit: readFoldLimit(reader, byKey.get('fold-limit'), sensor?.thing),
    undeclared: readUndeclared(reader, byKey.get('undeclared'), sensor?.thing),
    flatnessDb: readValue(reader, byKey.get('flatness')),
    heard: hears.heard,
    unheard: hears.unheard,
    peak: readPeak(reader, byKey.get('peak'), sensor?.thing),
    headroomDb: readValue(reader, byKey.get('headroom')),
    resolve: resolveField && readChannelLevel(reader, resolveField, sensor?.thing),
    spectrum: readSpectrum(reader, byKey.get('spectrum')),
    follows: readFollows(reader, byKey.get('follows')),
    group: readGroupName(reader, byKey.get('group')),
  };
}

/** Says which keys a channel lacks. One that is read for its edges has no band. */
export function reportMissingChannelKeys(reader: Reader, fields: Fields): void {
  reportMissingKeys(reader, fields, fields.byKey.has('pulses') ? ['rate'] : ['rate', 'band']);
}

/**
 * Gives a channel the defaults that it does not override. A channel that describes its sensor in one way does without
 * what the defaults say of it in the other.
 */
export function addDefaults(fields: Fields, defaults: ReadonlyMap<string, Field>): void {
  const { byKey } = fields;
  const names = byKey.has('sensor');
  const describes = SENSOR_KEYS.some((key) => byKey.has(key));
  for (const [key, field] of defaults) {
    if (byKey.has(key)) continue;
    if (names && IS_SENSOR_KEY.has(key)) continue;
    if (describes && key === 'sensor') continue;
    byKey.set(key, field);
  }
}

const IS_SENSOR_KEY: ReadonlySet<string> = new Set(SENSOR_KEYS);

interface UsedSensor {
  readonly thing: Sensor | undefined;
  readonly place: Place;
}

function readChannelSensor(reader: Reader, fields: Fields): UsedSensor | undefined {
  const field = fields.byKey.get('sensor');
  const key = SENSOR_KEYS.find((one) => fields.byKey.has(one));
  if (!field) {
    if (!key) return undefined;
    const place = namePlace(reader.entry);
    return { thing: readSensor(reader, fields, '', place), place };
  }
  if (key) {
    const other = fields.byKey.get(key) as Field;
    const message = `\`${key}\` is not read, because \`sensor\` already says which sensor this is.`;
    reportValue(reader, other, 'wrong-kind', placeOf(other.entry, other.node), message);
  }
  const { node, entry } = field;
  if (node.kind === 'map')
    return { thing: sharedInPlace(reader, field, node, 'sensor', readInPlace), place: placeOf(entry, node) };
  const scalar = scalarOf(reader, field);
  return scalar && { thing: findThing(reader, field, scalar, 'sensor'), place: innerPlace(entry, scalar) };
}

function readInPlace(reader: Reader, field: Field, node: MapNode): Sensor {
  const fields = readFieldsOf(reader, 'sensor', field, node);
  checkUncomputed(reader, fields);
  return readSensor(reader, fields, '', placeOf(field.entry, node));
}

function isNone(field: Field | undefined): boolean {
  return field?.node.kind === 'scalar' && field.node.text === 'none';
}

function readFoldLimit(reader: Reader, field: Field | undefined, sensor: Sensor | undefined): Given<Limit> | undefined {
  if (!field) return undefined;
  const levels = readChannelLevels(reader, field, sensor);
  if (!levels) return undefined;
  const { ends, high } = levels;
  const { dimension, value } = ends.high;
  if (dimension !== 'dbfs' && ends.highValue <= 0) {
    const message = '`fold-limit` must be above 0: nothing is filtered perfectly.';
    reportValue(reader, field, 'out-of-range', placeOf(field.entry, field.node), message);
    return undefined;
  }
  return given<Limit>(field, dimension === 'ratio' ? { kind: 'ratio', ratio: value } : high, ends.written);
}

function readUndeclared(
  reader: Reader,
  field: Field | undefined,
  sensor: Sensor | undefined,
): Given<Undeclared> | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  if (field.node.kind !== 'list') {
    const level = readChannelLevel(reader, field, sensor);
    return level && { ...level, value: { kind: 'level', level: level.value } };
  }
  const pairs = itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of);
  const points = pairs.map((pair) => readUndeclaredPoint(reader, pair, sensor));
  const complete = points.filter((point) => point !== undefined);
  if (complete.length < points.length || complete.length === 0) return undefined;
  const ascending = complete.every(
    (point, index) => index === 0 || point.frequencyHz > complete[index - 1]!.frequencyHz,
  );
  if (ascending) return given(field, { kind: 'points', points: complete });
  const message = 'The frequency of each pair of `undeclared` must be above that of the one before.';
  reportValue(reader, field, 'out-of-range', placeOf(field.entry, field.node), message);
  return undefined;
}

function readUndeclaredPoint(
  reader: Reader,
  pair: Field,
  sensor: Sensor | undefined,
): { readonly frequencyHz: number; readonly level: Level } | undefined {
  const kinds = alternative(pair.kind, 'tuple').of;
  if (pair.node.kind !== 'list' || pair.node.items.length !== kinds.length) {
    const message = 'Each item of `undeclared` is a pair, such as `[10 kHz, -40 dBFS]`.';
    reportValue(reader, pair, 'wrong-kind', placeOf(pair.entry, pair.node), message);
    return undefined;
  }
  const [first, second] = itemsOf(reader, pair, pair.node.items, kinds[0]!);
  const frequency = readValue(reader, first);
  const level = second && readChannelLevel(reader, { ...second, kind: kinds[1]! }, sensor);
  return frequency && level && { frequencyHz: frequency.value, level: level.value };
}

function readPeak(reader: Reader, field: Field | undefined, sensor: Sensor | undefined): Given<Peak> | undefined {
  if (!field) return undefined;
  const levels = readChannelLevels(reader, field, sensor);
  if (!levels) return undefined;
  const { ends, low, high } = levels;
  const single = ends.written.kind === 'scalar';
  if (ends.low.amplitude === 'rms' || ends.high.amplitude === 'rms') {
    const message = '`peak` is the largest value that is reached, which an rms value does not tell.';
    reportValue(reader, field, 'wrong-kind', placeOf(field.entry, field.node), message);
    return undefined;
  }
  if (single && ends.high.dimension !== 'dbfs' && ends.highValue <= 0) {
    reportValue(reader, field, 'out-of-range', placeOf(field.entry, field.node), '`peak` must be above 0.');
    return undefined;
  }
  return given(field, { low, high, single }, ends.written);
}
