import { clipped, type Field, innerPlace } from './fields.ts';
import { nearestName } from './nearest-name.ts';
import type { Place } from './place.ts';
import { hasSaidEnough, mention, type Reader, report, type Things } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import { scalarOf } from './values.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/** A name as it stands in the text. */
export interface ReadName {
  readonly name: string;
  readonly place: Place;
}

const KIND_NAMES: Readonly<Record<ThingKind, string>> = {
  clock: 'clock',
  digitizer: 'digitizer',
  sensor: 'sensor',
  filter: 'filter',
  source: 'source',
  group: 'group',
  channel: 'channel',
};

/** The name in a field that takes nothing but one. */
export function readName(reader: Reader, field: Field): ReadName | undefined {
  const node = scalarOf(reader, field);
  return node && { name: node.text, place: innerPlace(field.entry, node) };
}

/** The thing of that name; where there is none, that is said, with the nearest name there is. */
export function findThing<K extends keyof Things>(
  reader: Reader,
  field: Field,
  node: ScalarNode,
  kind: K,
): ReturnType<Things[K]['get']> {
  const name = node.text;
  const thing = reader.scope.things[kind].get(name) as ReturnType<Things[K]['get']>;
  const place = innerPlace(field.entry, node);
  mention(reader, kind, name, place);
  reader.lookups.push({ kind, name, thing });
  if (!thing) noteMissing(reader, name, place, kind);
  return thing;
}

/** Whether a thing of that name exists; its being there is all that is asked. */
export function nameExists(reader: Reader, name: ReadName, kind: Exclude<ThingKind, 'channel'>): boolean {
  const names = reader.scope.names[kind];
  mention(reader, kind, name.name, name.place);
  noteMissing(reader, name.name, name.place, kind);
  return names.set.has(name.name);
}

/** A name that exists may still stand for nothing that could be read, of which its own entry tells. */
function noteMissing(reader: Reader, name: string, place: Place, kind: Exclude<ThingKind, 'channel'>): void {
  const { names: all, knowsAllNames } = reader.scope;
  const known = all[kind];
  reader.lookups.push({ kind, name, names: known, knowsAllNames });
  if (!knowsAllNames || known.set.has(name) || hasSaidEnough(reader, place.entry)) return;
  const near = nearestName(known, name);
  const what = KIND_NAMES[kind];
  const message = near
    ? `There is no ${what} \`${clipped(name)}\`; \`${near}\` is the nearest.`
    : known.names.length === 0
      ? `There is no ${what} \`${clipped(name)}\`: this file names no ${what}s.`
      : `There is no ${what} \`${clipped(name)}\`.`;
  report(reader, {
    name: 'unknown-name',
    place,
    message,
    about: clipped(name),
    cure: near ? { kind: 'replace', text: near } : undefined,
  });
}
