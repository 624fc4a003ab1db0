import type { RecordLength } from '../signal/spectrum-plan.ts';
import { type Field, type Fields, placeOf, readFieldsOf } from './fields.ts';
import { sharedInPlace } from './in-place.ts';
import type { Given, Spectrum } from './model.ts';
import { readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import type { MapNode } from './tree.ts';
import { listed, readChoice, readNumber, reportValue, reportWrongKind } from './values.ts';
import type { WindowChoice } from './window-choices.ts';

/** The keys that say how long a record is: one of them stands in every `spectrum`. */
const LENGTH_KEYS = ['lines', 'resolution', 'record'] as const;
type LengthKey = (typeof LENGTH_KEYS)[number];

/** What was read: kept as an object, so that all who inherit one map share what was made of it. */
interface ReadMap {
  readonly spectrum: Spectrum | undefined;
}

/**
 * The `spectrum` of a channel. `undefined` where its record has no one length, or where a value of it can't be read:
 * what follows from the others would then be wrong.
 */
export function readSpectrum(reader: Reader, field: Field | undefined): Given<Spectrum> | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  const { node, entry, inherited } = field;
  if (node.kind !== 'map') {
    reportWrongKind(reader, field);
    return undefined;
  }
  const { spectrum } = sharedInPlace(reader, field, node, 'spectrum', readMap);
  const place = placeOf(entry, node);
  return spectrum && (inherited ? { value: spectrum, place, inherited } : { value: spectrum, place });
}

function readMap(reader: Reader, field: Field, node: MapNode): ReadMap {
  const fields = readFieldsOf(reader, 'spectrum', field, node);
  const of = (key: string): Field | undefined => fields.byKey.get(key);
  const length = readLength(reader, fields, field);
  const window = readChoice<WindowChoice>(reader, of('window'));
  const overlap = readValue(reader, of('overlap'));
  const averages = readNumber(reader, of('averages'));
  const separateHz = readValue(reader, of('separate'));
  const isWhole = (key: string, value: unknown): boolean => value !== undefined || !fields.byKey.has(key);
  const understood = isWhole('window', window) && isWhole('overlap', overlap) && isWhole('averages', averages);
  return { spectrum: length && understood ? { length, window, overlap, averages, separateHz } : undefined };
}

function readLength(reader: Reader, fields: Fields, field: Field): Given<RecordLength> | undefined {
  const given = LENGTH_KEYS.filter((key) => fields.byKey.has(key));
  const [first, ...others] = given;
  if (first === undefined) {
    const message = `\`spectrum\` does not say how long a record is: it takes one of ${listed(LENGTH_KEYS)}.`;
    reportValue(reader, field, 'wrong-kind', fields.place, message);
    return undefined;
  }
  const lengths = given.map((key) => lengthBy(reader, key, fields.byKey.get(key) as Field));
  for (const key of others) {
    const other = fields.byKey.get(key) as Field;
    const message = `\`${key}\` and \`${first}\` both say how long a record is; only one of them can stand here.`;
    reportValue(reader, other, 'wrong-kind', placeOf(other.entry, other.node), message);
  }
  return others.length === 0 ? lengths[0] : undefined;
}

function lengthBy(reader: Reader, by: LengthKey, field: Field): Given<RecordLength> | undefined {
  if (by === 'lines') {
    const lines = readNumber(reader, field);
    return lines && { ...lines, value: { by, lines: lines.value } };
  }
  const value = readValue(reader, field);
  if (!value) return undefined;
  return {
    ...value,
    value: by === 'record' ? { by, recordS: value.value } : { by, resolutionHz: value.value },
  };
}
