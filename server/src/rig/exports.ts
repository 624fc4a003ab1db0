import type { Core } from './core.ts';
import { namePlace } from './fields.ts';
import type { Thing } from './model.ts';
import { byKind, type Exported, type Exports, type NamedKind } from './used-things.ts';

const exportsByCore = new WeakMap<Core, Exports>();

/**
 * What a file offers to those that use it: its named things, ahead of those that it uses itself. `mains` as a key of
 * its own is the file's alone; the same object for the same core.
 */
export function exportsOf(core: Core): Exports {
  const known = exportsByCore.get(core);
  if (known) return known;
  const { isComplete, gap } = core.joined;
  const exports: Exports = { things: byKind((kind) => exportedOf(core, kind)), isComplete, gap };
  exportsByCore.set(core, exports);
  return exports;
}

function exportedOf({ named, joined, scope }: Core, kind: NamedKind): ReadonlyMap<string, Exported> {
  const things: ReadonlyMap<string, Thing> = scope.things[kind];
  const exported = new Map<string, Exported>();
  const hidden = new Set<string>();
  for (const entry of named[kind]) {
    hidden.add(entry.name);
    if (entry.section) exported.set(entry.name, { thing: things.get(entry.name), place: namePlace(entry) });
  }
  for (const [name, { thing, place }] of joined.things[kind]) {
    if (!hidden.has(name)) exported.set(name, { thing, place });
  }
  return exported;
}
