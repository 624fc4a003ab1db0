import type { Entry } from './entry.ts';
import type { AliasNode, TreeNode } from './tree.ts';

/** What an alias stands for: a node, and the entry whose text it is part of. */
export interface AnchorTarget {
  readonly entry: Entry;
  readonly node: TreeNode;
}

interface PlacedAnchor extends AnchorTarget {
  /** Place of the entry among those that set anchors. */
  readonly order: number;
}

/**
 * Every anchor that the file's entries set.
 *
 * A table is the same object as before exactly where the entries that set anchors are the same ones in the same order,
 * so that its identity, with an entry's epoch, stands for "every alias in that entry means what it meant".
 */
export interface AnchorTable {
  /** The entries that set anchors, in document order. */
  readonly entries: readonly Entry[];
  readonly byName: ReadonlyMap<string, readonly PlacedAnchor[]>;
  /** The place of each entry among `entries`, which is its epoch. */
  readonly orders: ReadonlyMap<Entry, number>;
}

/** Makes the table of the entries that set anchors; the previous one where they are unchanged. */
export function anchorTable(entries: readonly Entry[], previous: AnchorTable | undefined): AnchorTable {
  if (previous && sameItems(previous.entries, entries)) return previous;
  const byName = new Map<string, PlacedAnchor[]>();
  for (const [order, entry] of entries.entries()) {
    for (const { name, node } of entry.anchors) {
      const known = byName.get(name);
      if (known) known.push({ entry, node, order });
      else byName.set(name, [{ entry, node, order }]);
    }
  }
  return { entries, byName, orders: new Map(entries.map((entry, order) => [entry, order])) };
}

/** True for two lists of the very same items in the same order. */
export function sameItems<T>(a: readonly T[], b: readonly T[]): boolean {
  if (a.length !== b.length) return false;
  for (let index = 0; index < a.length; index++) if (a[index] !== b[index]) return false;
  return true;
}

/**
 * The node that an alias stands for: the latest anchor of its name before it, in its own entry or in those before.
 *
 * @param epoch how many anchor-setting entries stand before the alias's entry
 */
export function findAnchor(
  table: AnchorTable,
  alias: AliasNode,
  entry: Entry,
  epoch: number,
): AnchorTarget | undefined {
  for (let index = entry.anchors.length - 1; index >= 0; index--) {
    const anchor = entry.anchors[index]!;
    if (anchor.name === alias.name && anchor.node.start < alias.start) return { entry, node: anchor.node };
  }
  const named = table.byName.get(alias.name);
  if (!named) return undefined;
  let low = 0;
  let high = named.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (named[middle]!.order < epoch) low = middle + 1;
    else high = middle;
  }
  return named[low - 1];
}

/** True for an alias that stands inside the very node it stands for: following it would never end. */
export function standsInside(alias: AliasNode, entry: Entry, target: AnchorTarget): boolean {
  return target.entry === entry && target.node.start <= alias.start && alias.start < target.node.end;
}
