import {
  type Field,
  type Fields,
  itemsOf,
  namePlace,
  placeOf,
  readEntryFields,
  readFieldsOf,
  reportMissingKeys,
} from './fields.ts';
import { readSourceLevel } from './levels.ts';
import type { FrequencyRange, Given, Level, Source } from './model.ts';
import type { Place } from './place.ts';
import { readFrequencyRange, readValue } from './quantities.ts';
import { readBroadband } from './read-broadband.ts';
import { type Reader, report } from './reader.ts';
import { checkUncomputed } from './uncomputed.ts';
import { alternative, readChoice, readNumber, readTruth, reportWrongKind } from './values.ts';
import { SOURCE_TYPES, type SourceTypeRow } from './vocabulary-sources.ts';

/** The name of the source that `mains` stands for. */
export const MAINS = 'mains';
const MAINS_TOLERANCE = 0.01;

/** Reads an entry of `sources`. `undefined` for one without a readable frequency, or without a readable density. */
export function readSource(reader: Reader): Source | undefined {
  const fields = readEntryFields(reader, 'source');
  checkUncomputed(reader, fields);
  const type = sourceType(reader, fields);
  if (!type) return undefined;
  reportMissingKeys(reader, fields, type.needs);
  const { name } = reader.entry;
  const place = namePlace(reader.entry);
  const { name: kind } = type;
  if (kind === 'broadband') return readBroadband(reader, fields, name, place);
  return sourceOf(reader, fields, kind, name, place, 0);
}

/** Reads the top-level key `mains`: a frequency, or a map with the keys of a source. */
export function readMains(reader: Reader, field: Field): Source | undefined {
  const { node } = field;
  const place = namePlace(reader.entry);
  if (node.kind === 'map') {
    const fields = readFieldsOf(reader, 'mains', field, node);
    reportMissingKeys(reader, fields, ['frequency']);
    return sourceOf(reader, fields, 'tone', MAINS, place, MAINS_TOLERANCE);
  }
  if (node.kind === 'list') {
    reportWrongKind(reader, field);
    return undefined;
  }
  const frequency = readFrequencyRange(reader, field);
  const fields: Fields = { context: 'mains', byKey: new Map(), place, prefix: '' };
  return frequency && { ...sourceBase(reader, fields, MAINS, place, MAINS_TOLERANCE), type: 'tone', frequency };
}

/** The kind of source that its keys make it; a key that belongs to another kind is said to be one too many. */
function sourceType(reader: Reader, fields: Fields): SourceTypeRow | undefined {
  const has = (key: string): boolean => fields.byKey.has(key);
  const type = SOURCE_TYPES.find(({ needs, also }) => needs.some(has) || also.some(has));
  if (!type) {
    if (fields.byKey.size > 0 || reader.own.length === 0) reportMissingKeys(reader, fields, ['frequency']);
    return undefined;
  }
  for (const other of SOURCE_TYPES) {
    if (other === type) continue;
    for (const key of [...other.needs, ...other.also]) {
      const field = fields.byKey.get(key);
      if (!field) continue;
      const message = `\`${key}\` is not read: \`${type.needs.find(has) ?? type.also.find(has)}\` makes this a ${type.name} source.`;
      report(reader, { name: 'wrong-kind', place: placeOf(field.entry, field.node), message, about: field.path });
    }
  }
  return type;
}

type KindWithLines = Exclude<SourceTypeRow['name'], 'broadband'>;

function sourceOf(
  reader: Reader,
  fields: Fields,
  kind: KindWithLines,
  name: string,
  place: Place,
  tolerance: number,
): Source | undefined {
  const base = sourceBase(reader, fields, name, place, tolerance);
  const range = (key: string): Given<FrequencyRange> | undefined => readFrequencyRange(reader, fields.byKey.get(key));
  switch (kind) {
    case 'tone': {
      const frequency = range('frequency');
      return frequency && { ...base, type: 'tone', frequency };
    }
    case 'rotating': {
      const order = readNumber(reader, fields.byKey.get('order'))?.value;
      const speed = range('speed');
      return order !== undefined && speed ? { ...base, type: 'rotating', order, speed } : undefined;
    }
    case 'modulated': {
      const carrier = range('carrier');
      const modulation = range('modulation');
      const sidebands = readNumber(reader, fields.byKey.get('sidebands'))?.value ?? 1;
      const sidebandsFallDb = readValue(reader, fields.byKey.get('sidebands-fall'))?.value ?? 0;
      if (!carrier || !modulation) return undefined;
      return { ...base, type: 'modulated', carrier, modulation, sidebands, sidebandsFallDb };
    }
  }
}

type SourceBase = Omit<Extract<Source, { type: 'tone' }>, 'type' | 'frequency'>;

function sourceBase(reader: Reader, fields: Fields, name: string, place: Place, tolerance: number): SourceBase {
  const field = (key: string): Field | undefined => fields.byKey.get(key);
  const levels = readLevels(reader, field('level'));
  const said = readChoice<'sensor' | 'wiring'>(reader, field('enters'))?.value;
  return {
    kind: 'source',
    name,
    place,
    harmonics: readNumber(reader, field('harmonics'))?.value ?? 1,
    levels,
    fallsDbPerOctave: readValue(reader, field('falls'))?.value ?? 0,
    tolerance: readValue(reader, field('tolerance'))?.value ?? tolerance,
    wanted: readTruth(reader, field('wanted'))?.value ?? false,
    enters: said ?? (levels[0]?.value.kind === 'measured' ? 'sensor' : 'wiring'),
    entersSaid: said !== undefined,
  };
}

function readLevels(reader: Reader, field: Field | undefined): readonly Given<Level>[] {
  if (!field || field.node.kind === 'empty') return [];
  if (field.node.kind !== 'list') {
    const level = readSourceLevel(reader, field);
    return level ? [level] : [];
  }
  const levels: Given<Level>[] = [];
  for (const item of itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of)) {
    const level = readSourceLevel(reader, item);
    if (!level) return levels;
    levels.push(level);
  }
  return levels;
}
