import { keyRow } from '../rig/vocabulary.ts';
import type { ContextName, ThingKind, ValueKind } from '../rig/vocabulary-kinds.ts';
import type { PathStep } from './cursor-model.ts';

/** What may stand at a place of a rig file. */
export interface Expectation {
  /** The contexts whose keys may stand here. */
  readonly contexts: readonly ContextName[];
  /** The kinds of thing, or of check, whose names are keys here. */
  readonly namesAsKeys: readonly (ThingKind | 'check')[];
  /** The values that may stand here. */
  readonly values: readonly ValueKind[];
}

/** What the vocabulary says may stand at the end of a path from the top of a rig file. */
export function expectedAt(path: readonly PathStep[]): Expectation {
  let kinds: readonly ValueKind[] = [{ kind: 'map', context: 'rig' }];
  for (const step of path) {
    kinds = step.kind === 'item' ? kinds.flatMap(itemsOf) : kinds.flatMap((kind) => valuesBehind(kind, step.key));
  }
  const flat = kinds.flatMap(alternatives);
  return {
    contexts: [...new Set(flat.flatMap(contextsOf))],
    namesAsKeys: flat.flatMap((kind) => (kind.kind === 'map-of' ? [kind.keys] : [])),
    values: flat,
  };
}

function valuesBehind(kind: ValueKind, key: string): readonly ValueKind[] {
  return alternatives(kind).flatMap((one): readonly ValueKind[] => {
    if (one.kind === 'section') return [{ kind: 'map', context: one.context }];
    if (one.kind === 'map-of') return [one.value];
    return contextsOf(one).flatMap((context) => keyRow(context, key)?.value ?? []);
  });
}

function itemsOf(kind: ValueKind): readonly ValueKind[] {
  return alternatives(kind).flatMap((one): readonly ValueKind[] => {
    if (one.kind === 'list') return [one.of];
    return one.kind === 'tuple' ? one.of : [];
  });
}

function contextsOf(kind: ValueKind): readonly ContextName[] {
  if (kind.kind === 'map') return [kind.context];
  if (kind.kind === 'name' && kind.inPlace !== undefined) return [kind.inPlace];
  return [];
}

function alternatives(kind: ValueKind): readonly ValueKind[] {
  return kind.kind === 'alternatives' ? kind.of.flatMap(alternatives) : [kind];
}
