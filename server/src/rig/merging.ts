import { nearest } from '../quantity/spelling.ts';
import { type AnchorTable, type AnchorTarget, findAnchor, standsInside } from './anchors.ts';
import type { Entry } from './entry.ts';
import {
  MOST_ALIAS_EXPANSIONS,
  MOST_COMPARED_NAMES,
  MOST_DEPTH,
  MOST_INHERITED_PROBLEMS,
  MOST_MERGED_PAIRS,
} from './limits.ts';
import type { Inheritance } from './model.ts';
import type { Place } from './place.ts';
import type { Report } from './reader.ts';
import type { AliasNode, MapNode, ScalarNode, TreeNode } from './tree.ts';

/** The key that merges other maps into its own. */
export const MERGE_KEY = '<<';

/** A pair of a map with its merge keys followed and its alias, if its value was one, resolved. */
export interface MergedPair {
  readonly key: ScalarNode;
  readonly keyEntry: Entry;
  readonly value: TreeNode;
  /** The entry that `value` is part of. */
  readonly entry: Entry;
  /** Where the value comes from when the map does not say it itself. */
  readonly inherited: Inheritance | undefined;
}

/** A map with everything it merges, and what was wrong on the way. */
export interface MergedMap {
  /** Own pairs first; of several of one key, the one that counts. */
  readonly pairs: readonly MergedPair[];
  readonly problems: readonly Report[];
  /** How many aliases had to be followed, those inside aliased maps counted each time. */
  readonly expansions: number;
}

/** What following an alias gave. */
export type Followed =
  | { readonly target: AnchorTarget; readonly problem?: undefined }
  | { readonly target?: undefined; readonly problem: Report };

const mergedMaps = new WeakMap<AnchorTable, Map<TreeNode, MergedMap>>();

/** Follows an alias to the node it stands for; the node is never itself an alias. */
export function followAlias(alias: AliasNode, entry: Entry, table: AnchorTable, epoch: number): Followed {
  const target = findAnchor(table, alias, entry, epoch);
  const place: Place = { entry, start: alias.start, end: alias.end };
  if (!target || target.node.kind === 'alias') {
    const near = table.byName.size <= MOST_COMPARED_NAMES ? nearest(alias.name, table.byName.keys()) : undefined;
    return {
      problem: {
        name: 'unknown-name',
        place,
        message: `No anchor \`&${alias.name}\` stands before this alias${near ? `; \`&${near}\` is the nearest` : ''}.`,
        about: `*${alias.name}`,
        ...(near ? { cure: { kind: 'replace', text: `*${near}` } as const } : {}),
      },
    };
  }
  if (standsInside(alias, entry, target)) {
    return {
      problem: {
        name: 'wrong-kind',
        place,
        message: `\`*${alias.name}\` stands inside the very thing it stands for, so it has no value.`,
        about: `*${alias.name}`,
      },
    };
  }
  return { target };
}

/**
 * The pairs of a map, merge keys and aliases followed, as YAML has it: a map's own key outweighs a merged one, and of
 * several merged maps the first that has a key gives it.
 *
 * Maps behind anchors are merged once for each table of anchors and kept: what an alias inside an anchor-setting entry
 * means depends on the table alone. This keeps nested aliases from multiplying.
 */
export function mergedMap(node: MapNode, entry: Entry, table: AnchorTable, epoch: number, depth = 0): MergedMap {
  const merging: Merging = {
    table,
    epoch,
    entry,
    depth,
    pairs: [],
    seen: new Set(),
    merged: new Set(),
    problems: [],
    expansions: 0,
  };
  const merges: TreeNode[] = [];
  for (const { key, value } of node.pairs) {
    if (key.text === MERGE_KEY && key.style === 'plain') merges.push(value);
    else if (hasRoom(merging, key, merging.entry)) addOwnPair(merging, key, value);
  }
  for (const merge of merges) addMerge(merging, merge, true);
  return merging;
}

interface Merging {
  readonly table: AnchorTable;
  readonly epoch: number;
  readonly entry: Entry;
  /** How many anchored maps this one is merged into. */
  readonly depth: number;
  readonly pairs: MergedPair[];
  readonly seen: Set<string>;
  /** Anchored maps that have been merged in. */
  readonly merged: Set<TreeNode>;
  readonly problems: Report[];
  expansions: number;
}

/** Whether one more pair may be kept: what many merge must not grow with every merge. */
function hasRoom(merging: Merging, node: TreeNode, entry: Entry): boolean {
  if (merging.pairs.length < MOST_MERGED_PAIRS) return true;
  if (merging.problems.some(({ name }) => name === 'too-much')) return false;
  merging.problems.push({
    name: 'too-much',
    place: { entry, start: node.start, end: node.end },
    message: `More than ${MOST_MERGED_PAIRS} keys would come together here; the rest is not read.`,
    about: MERGE_KEY,
  });
  return false;
}

function addOwnPair(merging: Merging, key: ScalarNode, value: TreeNode): void {
  if (merging.seen.has(key.text)) return;
  merging.seen.add(key.text);
  const { entry } = merging;
  if (value.kind !== 'alias') {
    merging.pairs.push({ key, keyEntry: entry, value, entry, inherited: undefined });
    return;
  }
  const target = follow(merging, value);
  // An alias that leads nowhere leaves its key without a value, which says no more than has been said.
  const node: TreeNode = target?.node ?? { kind: 'empty', start: value.start, end: value.end };
  const inherited = target && inheritance('alias', target.entry, node);
  merging.pairs.push({ key, keyEntry: entry, value: node, entry: target?.entry ?? entry, inherited });
}

function addMerge(merging: Merging, merge: TreeNode, listAllowed: boolean): void {
  if (merge.kind === 'alias') {
    const target = follow(merging, merge);
    if (!target) return;
    if (target.node.kind === 'map') addAnchored(merging, target.node, target.entry);
    else addWrongMerge(merging, merge);
  } else if (merge.kind === 'map') {
    const merged = mergedMap(merge, merging.entry, merging.table, merging.epoch, merging.depth);
    merging.expansions = Math.min(merging.expansions + merged.expansions, MOST_ALIAS_EXPANSIONS + 1);
    addMerged(merging, merged);
  } else if (merge.kind === 'list' && listAllowed) {
    for (const item of merge.items) addMerge(merging, item, false);
  } else addWrongMerge(merging, merge);
}

function addAnchored(merging: Merging, node: MapNode, entry: Entry): void {
  const merged = anchoredMap(node, entry, merging.table, merging.depth + 1);
  merging.expansions = Math.min(merging.expansions + merged.expansions, MOST_ALIAS_EXPANSIONS + 1);
  // The same map once more adds nothing but work.
  if (merging.merged.has(node)) return;
  merging.merged.add(node);
  addMerged(merging, merged);
}

function addMerged(merging: Merging, merged: MergedMap): void {
  for (const problem of merged.problems) {
    if (merging.problems.length < MOST_INHERITED_PROBLEMS) merging.problems.push(problem);
  }
  for (const pair of merged.pairs) {
    if (merging.seen.has(pair.key.text)) continue;
    if (!hasRoom(merging, pair.key, pair.keyEntry)) return;
    merging.seen.add(pair.key.text);
    const inherited = pair.inherited ?? inheritance('merge', pair.entry, pair.value);
    merging.pairs.push(pair.inherited ? pair : { ...pair, inherited });
  }
}

function addWrongMerge(merging: Merging, node: TreeNode): void {
  merging.problems.push({
    name: 'wrong-kind',
    place: { entry: merging.entry, start: node.start, end: node.end },
    message: 'Only a map, or a list of maps, can be merged: `<<: *name` or `<<: [*first, *second]`.',
    about: MERGE_KEY,
  });
}

function follow(merging: Merging, alias: AliasNode): AnchorTarget | undefined {
  merging.expansions++;
  const { target, problem } = followAlias(alias, merging.entry, merging.table, merging.epoch);
  if (problem) merging.problems.push(problem);
  return target;
}

/** The merged pairs of a map in an anchor-setting entry. */
export function anchoredMap(node: MapNode, entry: Entry, table: AnchorTable, depth = 0): MergedMap {
  let known = mergedMaps.get(table);
  if (!known) {
    known = new Map();
    mergedMaps.set(table, known);
  }
  const order = table.orders.get(entry) ?? 0;
  if (depth > MOST_DEPTH) mergeInOrder(table, known, order);
  let merged = known.get(node);
  if (!merged) {
    merged = mergedMap(node, entry, table, order, depth);
    known.set(node, merged);
  }
  return merged;
}

/**
 * Merges every anchored map up to an entry, first things first. An alias leads only to a node that ends before it, so
 * in this order each map finds what it merges done, and a chain of any length needs no deep recursion.
 */
function mergeInOrder(table: AnchorTable, known: Map<TreeNode, MergedMap>, lastOrder: number): void {
  for (let order = 0; order <= lastOrder; order++) {
    const entry = table.entries[order]!;
    const nodes = entry.anchors.map(({ node }) => node).sort((a, b) => a.end - b.end);
    for (const node of nodes) {
      if (node.kind === 'map' && !known.has(node)) known.set(node, mergedMap(node, entry, table, order));
    }
  }
}

export function inheritance(from: Inheritance['from'], entry: Entry, node: TreeNode): Inheritance {
  return { from, place: { entry, start: node.start, end: node.end } };
}
