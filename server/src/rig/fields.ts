import { nearest } from '../quantity/spelling.ts';
import { ASTERISK } from './characters.ts';
import type { Entry } from './entry.ts';
import { MOST_ALIAS_EXPANSIONS } from './limits.ts';
import { anchoredMap, followAlias, inheritance, MERGE_KEY, type MergedMap, mergedMap } from './merging.ts';
import type { Inheritance } from './model.ts';
import type { Place } from './place.ts';
import { hasSaidEnough, placedProblem, type Reader, report } from './reader.ts';
import type { MapNode, ScalarNode, TreeNode } from './tree.ts';
import { rowsOf, UNCOMPUTED_CONTEXTS } from './vocabulary.ts';
import type { ContextName, KeyRow, ValueKind } from './vocabulary-kinds.ts';

/** A value on its way to being read: what it should be, and where it stands. */
export interface Field {
  readonly kind: ValueKind;
  /** The row it is read for; the items of a list share their list's. */
  readonly row: KeyRow;
  /** The way to it through the entry's maps and lists: `rate`, `then[1].decimate`. */
  readonly path: string;
  /** Never an alias. */
  readonly node: TreeNode;
  /** The entry that `node` is part of. */
  readonly entry: Entry;
  readonly inherited: Inheritance | undefined;
}

/** The fields of one map by key. */
export interface Fields {
  readonly context: ContextName;
  readonly byKey: Map<string, Field>;
  /** Where a key that is missing would be missed: the entry's name, or the map itself where it is written in place. */
  readonly place: Place;
  /** `''`, or the path of the map with a dot behind it. */
  readonly prefix: string;
  /** True where no map stands, which has been said: what it would lack is then not worth saying. */
  readonly unreadable?: true;
}

/** The value behind an entry's key or in a list, with an alias followed; `undefined` where that leads nowhere. */
export function resolved(
  reader: Reader,
  node: TreeNode,
  entry: Entry,
  inherited: Inheritance | undefined,
): Pick<Field, 'node' | 'entry' | 'inherited'> | undefined {
  if (node.kind !== 'alias') return { node, entry, inherited };
  if (!countExpansions(reader, 1, { entry, start: node.start, end: node.end })) return undefined;
  const { anchors } = reader.scope;
  const epoch = entry === reader.entry ? reader.epoch : reader.scope.epochOf(entry);
  const { target, problem } = followAlias(node, entry, anchors, epoch);
  if (problem) {
    report(reader, problem);
    return undefined;
  }
  return { ...target, inherited: inheritance('alias', target.entry, target.node) };
}

/** The place of a node of an entry's text. */
export function placeOf(entry: Entry, node: TreeNode): Place {
  return { entry, start: node.start, end: node.end };
}

/** Where an entry's own name stands; the whole text of an entry without one. */
export function namePlace(entry: Entry): Place {
  return entry.key ? placeOf(entry, entry.key) : { entry, start: 0, end: entry.text.length };
}

/**
 * The fields of an entry's value, merge keys and aliases followed. Anything but a map is said to be wrong, and has no
 * fields.
 */
export function readEntryFields(reader: Reader, context: ContextName): Fields {
  const { entry } = reader;
  const place = namePlace(entry);
  const found = resolved(reader, entry.value, entry, undefined);
  if (!found) return { context, byKey: new Map(), place, prefix: '', unreadable: true };
  if (found.node.kind === 'empty') return { context, byKey: new Map(), place, prefix: '' };
  if (found.node.kind !== 'map') {
    report(reader, {
      name: 'wrong-kind',
      place: placeOf(found.entry, found.node),
      message: `\`${clipped(entry.name)}\` needs keys of its own beneath it; here stands ${describeNode(found.node)}.`,
      about: '',
    });
    return { context, byKey: new Map(), place, prefix: '', unreadable: true };
  }
  const inherited = found.inherited;
  return readMapFields(reader, context, found.node, found.entry, inherited, place, '');
}

/** The fields of a map written in place of a name, or behind a key that takes a map. */
export function readFieldsOf(reader: Reader, context: ContextName, field: Field, node: MapNode): Fields {
  const place = { entry: field.entry, start: node.start, end: Math.min(node.end, node.start + 1) };
  return readMapFields(reader, context, node, field.entry, field.inherited, place, `${field.path}.`);
}

function readMapFields(
  reader: Reader,
  context: ContextName,
  node: MapNode,
  entry: Entry,
  inherited: Inheritance | undefined,
  place: Place,
  prefix: string,
): Fields {
  const byKey = new Map<string, Field>();
  const fields: Fields = { context, byKey, place, prefix };
  const rows = rowsOf(context);
  if (entry === reader.entry && entry.aliases.length === 0) {
    for (const { key, value } of node.pairs) {
      if (key.text === MERGE_KEY && key.style === 'plain')
        return addMergedFields(reader, fields, node, entry, inherited);
      addField(reader, fields, rows.get(key.text), key, entry, value, entry, inherited);
    }
    return fields;
  }
  return addMergedFields(reader, fields, node, entry, inherited);
}

/** The pairs of a map wherever it stands, merge keys and aliases followed. */
export function pairsOf(reader: Reader, node: MapNode, entry: Entry): MergedMap {
  const { anchors, epochOf } = reader.scope;
  if (entry === reader.entry) return mergedMap(node, entry, anchors, reader.epoch);
  if (entry.anchors.length > 0) return anchoredMap(node, entry, anchors);
  return mergedMap(node, entry, anchors, epochOf(entry));
}

function addMergedFields(
  reader: Reader,
  fields: Fields,
  node: MapNode,
  entry: Entry,
  inherited: Inheritance | undefined,
): Fields {
  const merged = pairsOf(reader, node, entry);
  for (const problem of merged.problems) report(reader, problem);
  if (!countExpansions(reader, merged.expansions, fields.place)) return { ...fields, unreadable: true };
  const rows = rowsOf(fields.context);
  for (const pair of merged.pairs) {
    const origin = pair.inherited ?? (inherited && inheritance(inherited.from, pair.entry, pair.value));
    addField(reader, fields, rows.get(pair.key.text), pair.key, pair.keyEntry, pair.value, pair.entry, origin);
  }
  return fields;
}

function addField(
  reader: Reader,
  fields: Fields,
  row: KeyRow | undefined,
  key: ScalarNode,
  keyEntry: Entry,
  node: TreeNode,
  entry: Entry,
  inherited: Inheritance | undefined,
): void {
  const { byKey, prefix, context } = fields;
  if (byKey.has(key.text)) return;
  const path = prefix === '' ? key.text : prefix + key.text;
  if (!row) {
    reportUnknownKey(reader, context, key, keyEntry, path, [...rowsOf(context).keys()]);
    return;
  }
  byKey.set(key.text, { kind: row.value, row, path, node, entry, inherited });
  if (!row.computed && keyEntry === reader.entry && !UNCOMPUTED_CONTEXTS.has(context))
    noteNotComputed(reader, row.key, placeOf(keyEntry, key));
  // Of an alias that led nowhere that has been said.
  if (node.kind === 'empty' && entry === keyEntry && entry.text.charCodeAt(node.start) !== ASTERISK) {
    report(reader, {
      name: 'wrong-kind',
      place: placeOf(keyEntry, key),
      message: `\`${key.text}\` has no value; write it like \`${key.text}: ${row.example}\`.`,
      about: path,
    });
  }
}

/** Says that a key is known but not computed; the sayings of a file are folded into one for each key. */
export function noteNotComputed(reader: Reader, what: string, place: Place): void {
  reader.notComputed.push(
    placedProblem({
      name: 'not-computed',
      place,
      message: `\`${what}\` is known, but this version does not compute it: nothing is said of its effect on the data.`,
      about: what,
    }),
  );
}

/** Says that a key is none of its context, and which one it may have been meant to be. */
export function reportUnknownKey(
  reader: Reader,
  context: ContextName,
  key: ScalarNode,
  entry: Entry,
  path: string,
  known: readonly string[],
): void {
  if (hasSaidEnough(reader, entry)) return;
  const near = nearest(key.text, known);
  report(reader, {
    name: 'unknown-key',
    place: innerPlace(entry, key),
    message: `\`${clipped(key.text)}\` is not a key of ${CONTEXT_NAMES[context]}${near ? `; \`${near}\` is the nearest` : ''}, so it is not read.`,
    about: clipped(path),
    cure: near ? { kind: 'replace', text: near } : undefined,
  });
}

const CONTEXT_NAMES: Readonly<Record<ContextName, string>> = {
  rig: 'a rig file',
  clock: 'a clock',
  digitizer: 'a digitizer',
  sensor: 'a sensor',
  filter: 'a filter',
  source: 'a source',
  group: 'a group',
  channel: 'a channel',
  run: '`run`',
  acceptance: 'an acceptance',
  step: 'a step',
  pattern: '`pattern`',
  pulses: '`pulses`',
  spectrum: '`spectrum`',
  interleave: '`interleave`',
  mains: '`mains`',
};

/** Says which required keys are missing. A key that is there without a readable value is not missing. */
export function reportMissingKeys(reader: Reader, fields: Fields, keys: readonly string[]): void {
  for (const key of keys) {
    if (!fields.byKey.has(key)) reportMissingKey(reader, fields, key, rowsOf(fields.context).get(key)?.example);
  }
}

export function reportMissingKey(reader: Reader, fields: Fields, key: string, example: string | undefined): void {
  if (fields.unreadable) return;
  report(reader, {
    name: 'missing-key',
    place: fields.place,
    message: `\`${key}\` is missing${example ? `; write it like \`${key}: ${example}\`` : ''}.`,
    about: fields.prefix + key,
    cure: { kind: 'add-key', key },
  });
}

/** The items of a list as fields of the given kind, aliases followed. */
export function itemsOf(reader: Reader, field: Field, items: readonly TreeNode[], kind: ValueKind): readonly Field[] {
  return items.flatMap((item, index) => {
    const found = resolved(reader, item, field.entry, field.inherited);
    return found ? [{ kind, row: field.row, path: `${field.path}[${index + 1}]`, ...found }] : [];
  });
}

/** The text of a scalar without its quotes, where the two correspond character by character; else all of it. */
export function innerPlace(entry: Entry, node: ScalarNode): Place {
  return innerSpan(entry, node, 0, node.text.length);
}

/** The place of a stretch of a scalar's text; all of the scalar where escapes or folding blur it. */
export function innerSpan(entry: Entry, node: ScalarNode, start: number, end: number): Place {
  const quotes = node.style === 'plain' ? 0 : 1;
  if (node.style === 'block' || node.end - node.start !== node.text.length + 2 * quotes) return placeOf(entry, node);
  return { entry, start: node.start + quotes + start, end: node.start + quotes + end };
}

export function describeNode(node: TreeNode): string {
  if (node.kind === 'map') return 'a map';
  if (node.kind === 'list') return 'a list';
  if (node.kind === 'scalar') return `\`${clipped(node.text)}\``;
  return 'nothing';
}

/** A text short enough for a message. */
export function clipped(text: string): string {
  const line = text.replace(/\s+/g, ' ');
  return line.length <= 60 ? line : `${line.slice(0, 57)}...`;
}

/** Whether so many more aliases may be followed; where the limit is passed, that is said. */
function countExpansions(reader: Reader, count: number, place: Place): boolean {
  if (count === 0) return true;
  const before = reader.expansions;
  reader.expansions += count;
  if (reader.expansions <= MOST_ALIAS_EXPANSIONS) return true;
  if (before <= MOST_ALIAS_EXPANSIONS) {
    report(reader, {
      name: 'too-much',
      place,
      message: `More than ${MOST_ALIAS_EXPANSIONS} aliases would have to be followed here; the rest is not read.`,
      about: 'aliases',
    });
  }
  return false;
}
