import type { BlockKind, SplitState } from './blocks.ts';
import { type Entry, NAMED_SECTIONS, type NamedSection } from './entry.ts';
import { clipped } from './fields.ts';
import { MOST_SYNTAX_FINDINGS } from './limits.ts';
import type { PlacedProblem } from './placed-problem.ts';
import type { Problem } from './problem.ts';
import { countLineEnds, lineStarts } from './text-lines.ts';
import type { MapNode, ScalarNode, TreeNode, TreePair } from './tree.ts';
import { readYaml } from './yaml-tree.ts';

/** One block and what it says. Never changed but for {@link lineStartsOf}'s table, which is made when first asked for. */
export interface Block {
  readonly kind: BlockKind;
  readonly text: string;
  readonly before: SplitState;
  readonly lineEnds: number;
  readonly entries: readonly PlacedEntry[];
  /** What is wrong with the block as a part of the document. */
  readonly problems: readonly PlacedProblem[];
  lineStarts: readonly number[] | undefined;
}

/** An entry and the offset of its text in its block. */
export interface PlacedEntry {
  readonly entry: Entry;
  readonly start: number;
}

const SECTIONS: ReadonlySet<string> = new Set(NAMED_SECTIONS);

/** Reads one block alone; what it says depends on its text, its kind and its section, and on nothing else. */
export function readBlock(kind: BlockKind, text: string, before: SplitState): Block {
  const made = { kind, text, before, lineEnds: countLineEnds(text), lineStarts: undefined };
  switch (kind) {
    case 'prelude':
      return { ...made, entries: [], problems: [] };
    case 'marker':
      return { ...made, entries: [], problems: [markerProblem(text)] };
    case 'entry':
      return { ...made, entries: [{ entry: readEntry(text, before.section), start: 0 }], problems: [] };
    case 'head':
      return { ...made, entries: [{ entry: readEntry(text, undefined), start: 0 }], problems: [] };
    case 'whole':
      return { ...made, ...readWhole(text) };
  }
}

export function lineStartsOf(block: Block): readonly number[] {
  block.lineStarts ??= lineStarts(block.text);
  return block.lineStarts;
}

/** An entry that holds no key: a place for problems of the document. */
export function placeholder(text: string): Entry {
  const value = { kind: 'empty', start: 0, end: 0 } as const;
  return { section: undefined, name: '', key: undefined, value, text, problems: [], anchors: [], aliases: [] };
}

function markerProblem(text: string): PlacedProblem {
  const message = text.startsWith('---')
    ? 'A rig file is one document: this line starts a second one. What follows is read as part of the first.'
    : 'A rig file is one document: this line ends it. What follows is read as part of it.';
  return {
    problem: { name: 'syntax', start: 0, end: 3, message },
    place: { entry: placeholder(text), start: 0, end: 3 },
    related: [],
  };
}

function readEntry(text: string, section: NamedSection | undefined): Entry {
  const { root, problems } = readYaml(text);
  return entryOf(section, root, text, problems);
}

/** The entry that a whole text is. */
function entryOf(section: NamedSection | undefined, root: TreeNode, text: string, problems: readonly Problem[]): Entry {
  const pair = root.kind === 'map' ? root.pairs[0] : undefined;
  const found = [...problems];
  if (root.kind === 'map') noteSecondPair(root, found);
  if (!pair && found.length === 0) found.push(noKeyProblem(root));
  return finishEntry(section, pair, pair?.value ?? root, text, found);
}

function finishEntry(
  section: NamedSection | undefined,
  pair: TreePair | undefined,
  value: TreeNode,
  text: string,
  problems: Problem[],
): Entry {
  const anchors: { name: string; node: TreeNode }[] = [];
  const aliases = new Set<string>();
  if (pair?.key.anchor !== undefined) anchors.push({ name: pair.key.anchor, node: pair.key });
  gather(value, anchors, aliases, problems);
  return {
    section,
    name: pair?.key.text ?? '',
    key: pair?.key,
    value,
    text,
    problems: problems.slice(0, MOST_SYNTAX_FINDINGS),
    anchors,
    aliases: [...aliases],
  };
}

/** Anchors and aliases in document order, and keys that a map has twice. */
function gather(
  node: TreeNode,
  anchors: { name: string; node: TreeNode }[],
  aliases: Set<string>,
  problems: Problem[],
): void {
  if (node.anchor !== undefined) anchors.push({ name: node.anchor, node });
  if (node.kind === 'alias') aliases.add(node.name);
  if (node.kind === 'list') for (const item of node.items) gather(item, anchors, aliases, problems);
  if (node.kind !== 'map') return;
  const seen = new Set<string>();
  for (const { key, value } of node.pairs) {
    if (seen.has(key.text)) problems.push(duplicate(key.start, key.end, key.text));
    seen.add(key.text);
    if (key.anchor !== undefined) anchors.push({ name: key.anchor, node: key });
    gather(value, anchors, aliases, problems);
  }
}

function duplicate(start: number, end: number, name: string): Problem {
  return {
    name: 'duplicate-name',
    start,
    end,
    message: `\`${clipped(name)}\` is given twice here; the first one counts.`,
    about: clipped(name),
  };
}

function noKeyProblem(root: TreeNode): Problem {
  const { start, end } = root;
  const message =
    root.kind === 'list'
      ? "A list can't stand here: a name and a colon are due."
      : 'A colon and a value are missing after this.';
  return { name: 'syntax', start, end, message };
}

function noteSecondPair({ pairs }: MapNode, problems: Problem[]): void {
  const second = pairs[1];
  if (!second || problems.length > 0) return;
  const { start, end } = second.key;
  problems.push({ name: 'syntax', start, end, message: 'This key is not indented like the ones beside it.' });
}

/** A top-level key with its value, or a document in flow style: the pairs of its sections become entries. */
function readWhole(text: string): {
  readonly entries: readonly PlacedEntry[];
  readonly problems: readonly PlacedProblem[];
} {
  const { root, problems } = readYaml(text);
  const isOne =
    root.kind !== 'map' || root.pairs.length === 0 || (root.pairs.length === 1 && !isSection(root.pairs[0]!));
  if (isOne) return { entries: [{ entry: entryOf(undefined, root, text, problems), start: 0 }], problems: [] };
  const entries: PlacedEntry[] = [];
  for (const pair of root.pairs) {
    const isAlone = root.pairs.length === 1;
    if (!isSection(pair)) {
      entries.push(sliceOf(undefined, pair, text));
      continue;
    }
    entries.push(
      isAlone ? headOf(pair, 0, text) : headOf(pair, pair.key.start, text.slice(pair.key.start, pair.value.end)),
    );
    for (const inner of pair.value.pairs) entries.push(sliceOf(pair.key.text as NamedSection, inner, text));
  }
  return { entries, problems: documentProblems(text, problems) };
}

function isSection(pair: TreePair): pair is TreePair & { readonly value: MapNode } {
  return SECTIONS.has(pair.key.text) && pair.value.kind === 'map';
}

function headOf({ key, value }: TreePair, start: number, text: string): PlacedEntry {
  const at = value.start - start;
  const anchor = value.anchor === undefined ? {} : { anchor: value.anchor };
  const empty = { kind: 'empty', start: at, end: at, ...anchor } as const;
  const shiftedKey = shifted(key, -start) as ScalarNode;
  return { entry: finishEntry(undefined, { key: shiftedKey, value: empty }, empty, text, []), start };
}

function sliceOf(section: NamedSection | undefined, { key, value }: TreePair, text: string): PlacedEntry {
  const start = key.start;
  const slice = text.slice(start, Math.max(key.end, value.end));
  const pair = { key: shifted(key, -start) as ScalarNode, value: shifted(value, -start) };
  return { entry: finishEntry(section, pair, pair.value, slice, []), start };
}

/** The same node with all offsets moved. */
function shifted(node: TreeNode, by: number): TreeNode {
  const start = node.start + by;
  const end = node.end + by;
  switch (node.kind) {
    case 'map': {
      const pairs = node.pairs.map(({ key, value }) => ({
        key: shifted(key, by) as ScalarNode,
        value: shifted(value, by),
      }));
      return { ...node, start, end, pairs };
    }
    case 'list':
      return { ...node, start, end, items: node.items.map((item) => shifted(item, by)) };
    default:
      return { ...node, start, end };
  }
}

function documentProblems(text: string, problems: readonly Problem[]): readonly PlacedProblem[] {
  if (problems.length === 0) return [];
  const entry = placeholder(text);
  return problems
    .slice(0, MOST_SYNTAX_FINDINGS)
    .map((problem) => ({ problem, place: { entry, start: problem.start, end: problem.end }, related: [] }));
}
