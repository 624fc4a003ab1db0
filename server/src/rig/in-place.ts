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
  name: 'filter' | 'sensor' | 'spectrum',
  read: (reader: Reader, field: Field, node: MapNode) => T,
): T {
  if (field.entry === reader.entry) return read(reader, field, node);
  const known = reader.scope.inPlace.get(node);
  if (known) {
    for (const { problem, place, related } of known.problems) report(reader, { ...problem, place, related });
    return known.thing as T;
  }
  const before = reader.origin.length;
  // Whoever comes first must not show in what all share: the thing is read as if nobody in particular inherited it.
  const from = field.entry.section === undefined && field.entry.name === 'defaults' ? 'defaults' : 'merge';
  const place = { entry: field.entry, start: node.start, end: node.end };
  const expansions = reader.expansions;
  reader.expansions = 0;
  const thing = read(reader, { ...field, path: name, inherited: { from, place } }, node);
  reader.expansions += expansions;
  reader.scope.inPlace.set(node, { thing, problems: reader.origin.slice(before) });
  return thing;
}
