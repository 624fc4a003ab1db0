import { type Field, itemsOf, pairsOf, placeOf } from './fields.ts';
import { quantityOfLevel, quantityOfSensor, readChannelLevel } from './levels.ts';
import type { Given, HeardSource, Level, Sensor, Source } from './model.ts';
import { findThing } from './names.ts';
import type { Place } from './place.ts';
import { reportLevelOfNoise } from './read-broadband.ts';
import { type AllHeard, type Reader, report, type SourceSet } from './reader.ts';
import type { MapNode, ScalarNode } from './tree.ts';
import { alternative, readChoice, reportWrongKind, scalarOf } from './values.ts';

const NOTHING: AllHeard = { heard: [], unheard: [] };

/** The sources that reach a channel: see the key `hears`. */
export function readHears(reader: Reader, field: Field | undefined, sensor: Sensor | undefined): AllHeard {
  const all = allHeard(reader.scope.sources, sensor);
  if (!field || field.node.kind === 'empty') return all;
  switch (field.node.kind) {
    case 'scalar':
      return readChoice(reader, field)?.value === 'none' ? NOTHING : all;
    case 'list':
      return { heard: readList(reader, field), unheard: [] };
    case 'map':
      return readLevels(reader, field, field.node, sensor, all);
    default:
      reportWrongKind(reader, field);
      return all;
  }
}

/**
 * What `hears: all` means to a channel: every source but those whose level is in a quantity that its sensor does not
 * measure. Sources without a level, in volts or in dBFS reach every channel.
 */
export function allHeard(set: SourceSet, sensor: Sensor | undefined): AllHeard {
  const quantity = quantityOfSensor(sensor);
  const known = set.allHeard.get(quantity);
  if (known) return known;
  const heard: HeardSource[] = [];
  const unheard: Source[] = [];
  for (const source of set.sources) {
    const level = source.levels[0]?.value;
    const due = level && quantityOfLevel(level);
    if (due === undefined || due === quantity) heard.push({ source, level: undefined, mention: undefined });
    else unheard.push(source);
  }
  const result = { heard, unheard };
  set.allHeard.set(quantity, result);
  return result;
}

function readList(reader: Reader, field: Field): readonly HeardSource[] {
  if (field.node.kind !== 'list') return [];
  const named = new Map<Source, Place>();
  for (const item of itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of)) {
    const node = scalarOf(reader, item);
    const source = node && findThing(reader, item, node, 'source');
    if (source && node && !named.has(source)) named.set(source, placeOf(item.entry, node));
  }
  return inFileOrder(reader, named).map(([source, mention]) => ({ source, level: undefined, mention }));
}

function inFileOrder<T>(reader: Reader, named: ReadonlyMap<Source, T>): readonly (readonly [Source, T])[] {
  return reader.scope.sources.sources.flatMap((source) => {
    const value = named.get(source);
    return value === undefined ? [] : [[source, value] as const];
  });
}

interface Named {
  readonly mention: Place;
  readonly level: Given<Level> | 'none' | undefined;
}

function readLevels(reader: Reader, field: Field, node: MapNode, sensor: Sensor | undefined, all: AllHeard): AllHeard {
  const named = new Map<Source, Named>();
  const merged = pairsOf(reader, node, field.entry);
  for (const problem of merged.problems) report(reader, problem);
  const kind = alternative(field.kind, 'map-of').value;
  for (const { key, keyEntry, value, entry, inherited } of merged.pairs) {
    const path = `${field.path}.${key.text}`;
    const pair: Field = { kind, row: field.row, path, node: value, entry, inherited: inherited ?? field.inherited };
    const source = findThing(reader, { ...pair, entry: keyEntry }, key, 'source');
    const level = readLevel(reader, pair, sensor, source);
    if (source) named.set(source, { mention: placeOf(keyEntry, key), level });
  }
  const heard: HeardSource[] = [];
  const usually = new Map(all.heard.map((one) => [one.source, one]));
  for (const source of reader.scope.sources.sources) {
    const own = named.get(source);
    if (own?.level === 'none') continue;
    const one = own ? { source, level: own.level, mention: own.mention } : usually.get(source);
    if (one) heard.push(one);
  }
  return { heard, unheard: all.unheard.filter((source) => !named.has(source)) };
}

function readLevel(
  reader: Reader,
  field: Field,
  sensor: Sensor | undefined,
  source: Source | undefined,
): Named['level'] {
  const { node } = field;
  if (node.kind === 'empty') return undefined;
  if (node.kind === 'scalar' && (node as ScalarNode).text === 'none') return 'none';
  const level = readChannelLevel(reader, field, sensor);
  if (level === undefined || source?.type !== 'broadband') return level;
  reportLevelOfNoise(reader, field, source.name, level);
  return undefined;
}
