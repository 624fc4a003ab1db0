import type { Field } from './fields.ts';
import { type Reader, report } from './reader.ts';
import type { MapNode } from './tree.ts';

/**
 * Reads a thing written in place. One that stands in inherited text is read once for all who inherit it, so that
 * they share one object, and its problems are noted with each of them.
 */
export function sharedInPlace<T extends object>(
  reader: Reader,
  field: Field,
  node: MapNode,
  read: (reader: Reader, field: Field, node: MapNode) => T,
): T {
  if (field.entry === reader.entry) return read(reader, field, node);
  const known = reader.scope.inPlace.get(node);
  if (known) {
    for (const { problem, place, related } of known.problems) report(reader, { ...problem, place, related });
    return known.thing as T;
  }
  const before = reader.origin.length;
  const thing = read(reader, field, node);
  reader.scope.inPlace.set(node, { thing, problems: reader.origin.slice(before) });
  return thing;
}
