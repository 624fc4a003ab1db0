import type { Entry } from '../rig/entry.ts';
import { NAMED_SECTIONS } from '../rig/entry.ts';
import type { TreeNode, TreePair } from '../rig/tree.ts';
import type { PathStep } from './cursor-model.ts';

/** The word under a cursor in text that has been read. */
export interface Pointed {
  /** The steps from the top of the file to the map that the word's pair stands in, or to the list it is an item of. */
  readonly path: readonly PathStep[];
  /** The pair whose key or value the cursor is on. */
  readonly pair: TreePair | undefined;
  readonly on: 'key' | 'value';
  /** The innermost node under the cursor. */
  readonly node: TreeNode | undefined;
}

/** Finds what stands at an offset of an entry's text; `undefined` between words. */
export function pointedAt(entry: Entry, offset: number): Pointed | undefined {
  const section = NAMED_SECTIONS.find((name) => name === entry.section);
  const path: PathStep[] = section === undefined ? [] : [{ kind: 'key', key: section }];
  if (!entry.key) return undefined;
  return within({ key: entry.key, value: entry.value }, path, offset);
}

function within(pair: TreePair, path: readonly PathStep[], offset: number): Pointed | undefined {
  if (holds(pair.key, offset)) return { path, pair, on: 'key', node: pair.key };
  if (!holds(pair.value, offset)) return undefined;
  const inner: readonly PathStep[] = [...path, { kind: 'key', key: pair.key.text }];
  return inside(pair.value, inner, offset) ?? leaf(pair.value, path, pair);
}

function inside(node: TreeNode, path: readonly PathStep[], offset: number): Pointed | undefined {
  if (node.kind === 'map') {
    for (const pair of node.pairs) {
      const found = within(pair, path, offset);
      if (found) return found;
    }
  }
  if (node.kind === 'list') {
    for (const item of node.items) {
      if (!holds(item, offset)) continue;
      const inner: readonly PathStep[] = [...path, { kind: 'item' }];
      return inside(item, inner, offset) ?? leaf(item, inner, undefined);
    }
  }
  return undefined;
}

function leaf(node: TreeNode, path: readonly PathStep[], pair: TreePair | undefined): Pointed | undefined {
  return node.kind === 'scalar' || node.kind === 'alias' ? { path, pair, on: 'value', node } : undefined;
}

function holds({ start, end }: TreeNode, offset: number): boolean {
  return offset >= start && offset <= end;
}
