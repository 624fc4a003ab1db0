import type { Entry } from '../rig/entry.ts';
import type { Place } from '../rig/place.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { MapNode, ScalarNode, TreeNode } from '../rig/tree.ts';
import type { NewValue, Quote, TextStyle } from './written-value.ts';
import { pairText, scalarText, valueText } from './written-value.ts';

/**
 * Edits that write as the file is written: its quotes, its indentation, its line ends, its braces. Each function
 * answers `undefined` where the text is not of a kind that it can edit without harm.
 */

/** Puts a text in place of a scalar, inside the quotes that it had; the place may be that between its quotes. */
export function replaceScalar(snapshot: Snapshot, place: Place, text: string): TextEdit | undefined {
  const start = snapshot.startOf(place.entry);
  if (start === undefined) return undefined;
  const { start: from, end: to } = withQuotes(place);
  const old = place.entry.text.slice(from, to);
  if (/^[|>]/.test(old)) return undefined;
  const style = styleAt(snapshot, place.entry, from);
  return { start: start + from, end: start + to, text: scalarText(text, style, quoteOf(old)) };
}

/**
 * Puts a text in place of a part of a scalar, or behind it where `start` and `end` are one. A plain scalar gets quotes
 * where the whole needs them.
 */
export function replacePart(snapshot: Snapshot, place: Place, text: string): TextEdit | undefined {
  const { entry } = place;
  const scalar = scalarAround(entry, place);
  const start = snapshot.startOf(entry);
  if (start === undefined) return undefined;
  if (scalar?.style !== 'plain') return { start: start + place.start, end: start + place.end, text };
  const whole = entry.text.slice(scalar.start, place.start) + text + entry.text.slice(place.end, scalar.end);
  return replaceScalar(snapshot, { entry, start: scalar.start, end: scalar.end }, whole);
}

/** The key or value that a place is in. */
function scalarAround(entry: Entry, place: Place): ScalarNode | undefined {
  if (entry.key && contains(entry.key, place)) return entry.key;
  return scalarIn(entry.value, place);
}

function scalarIn(node: TreeNode, place: Place): ScalarNode | undefined {
  if (node.kind === 'scalar') return contains(node, place) ? node : undefined;
  if (node.kind === 'list') return firstScalar(node.items, place);
  if (node.kind === 'map')
    return firstScalar(
      node.pairs.flatMap(({ key, value }) => [key, value]),
      place,
    );
  return undefined;
}

function firstScalar(nodes: readonly TreeNode[], place: Place): ScalarNode | undefined {
  for (const node of nodes) {
    const found = scalarIn(node, place);
    if (found) return found;
  }
  return undefined;
}

function contains(node: TreeNode, place: Place): boolean {
  return node.start <= place.start && place.end <= node.end;
}

/** A place between quotes, with its quotes. */
function withQuotes({ entry, start, end }: Place): { readonly start: number; readonly end: number } {
  const before = entry.text[start - 1];
  const isBetween = (before === '"' || before === "'") && entry.text[end] === before;
  return isBetween ? { start: start - 1, end: end + 1 } : { start, end };
}

/** Puts any value in place of a node. */
export function replaceNode(
  snapshot: Snapshot,
  entry: Entry,
  node: TreeNode,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  if (start === undefined) return undefined;
  const style = styleAt(snapshot, entry, node.start);
  const { text } = entry;
  if (node.kind === 'empty') {
    const gap = /\s/.test(text[node.start - 1] ?? ' ') ? '' : ' ';
    return [{ start: start + node.start, end: start + node.start, text: gap + valueText(value, style) }];
  }
  if (typeof value === 'string' && node.kind === 'scalar') {
    const edit = replaceScalar(snapshot, { entry, start: node.start, end: node.end }, value);
    if (edit) return [edit];
  }
  const end = significantEnd(node, text);
  const blockOnLinesBelow = !isFlowNode(node) && text.slice(node.start, end).includes('\n');
  if (!blockOnLinesBelow) return [{ start: start + node.start, end: start + end, text: valueText(value, style) }];
  // A block below its key: what stands between the key and the block's end goes, comments among it do not.
  if (/#/.test(text.slice(node.start, end))) return undefined;
  const colon = text.lastIndexOf(':', node.start - 1);
  if (colon < 0 || text.slice(colon + 1, node.start).trim() !== '') return undefined;
  return [{ start: start + colon + 1, end: start + end, text: ` ${valueText(value, style)}` }];
}

/**
 * Writes a key into a map: over the value of the key that it has, or as a new last pair. A thing that is an alias
 * becomes a map that merges it; one that is empty becomes a map.
 */
export function setKey(
  snapshot: Snapshot,
  entry: Entry,
  node: TreeNode,
  key: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  if (node.kind === 'map') {
    const own = node.pairs.find((pair) => pair.key.text === key);
    if (own) return replaceNode(snapshot, entry, own.value, value);
    return node.flow || node.pairs.length === 0
      ? addToFlowMap(snapshot, entry, node, key, value)
      : addToBlockMap(snapshot, entry, node, key, value);
  }
  if (node.kind === 'alias') {
    const merged = new Map<string, NewValue>([
      ['<<', { kind: 'alias', name: node.name }],
      [key, value],
    ]);
    return replaceNode(snapshot, entry, node, merged);
  }
  if (node.kind === 'empty') return beginMap(snapshot, entry, node, key, value);
  return undefined;
}

/** Writes a key into the map of a whole entry: a channel, say. */
export function setEntryKey(
  snapshot: Snapshot,
  entry: Entry,
  key: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  return setKey(snapshot, entry, entry.value, key, value);
}

function addToBlockMap(
  snapshot: Snapshot,
  entry: Entry,
  node: MapNode,
  key: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  const first = node.pairs[0];
  if (start === undefined || !first) return undefined;
  const style = styleAt(snapshot, entry, node.start);
  const indent = ' '.repeat(columnOf(entry.text, first.key.start));
  const at = start + lineEndAfter(entry.text, significantEnd(node, entry.text));
  return [{ start: at, end: at, text: style.lineEnd + indent + pairText(key, value, style) }];
}

function addToFlowMap(
  snapshot: Snapshot,
  entry: Entry,
  node: MapNode,
  key: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  if (start === undefined) return undefined;
  const { text } = entry;
  const style: TextStyle = { ...styleAt(snapshot, entry, node.start), flow: true };
  const pair = pairText(key, value, style);
  const last = node.pairs.at(-1);
  const open = text.indexOf('{', node.start);
  if (!last) {
    const close = text.lastIndexOf('}', node.end);
    if (open < 0 || close <= open || text.slice(open + 1, close).trim() !== '') return undefined;
    return [{ start: start + open + 1, end: start + close, text: ` ${pair} ` }];
  }
  const end = Math.max(significantEnd(last.value, text), last.key.end);
  return afterLastItem(text, last.key.start, end, pair, style).map((edit) => shifted(edit, start));
}

/** After the last of the items between braces, on a line of its own where that one has one; offsets of the entry. */
function afterLastItem(text: string, itemStart: number, itemEnd: number, added: string, style: TextStyle): TextEdit[] {
  const lineStart = text.lastIndexOf('\n', itemStart - 1) + 1;
  const before = text.slice(lineStart, itemStart);
  const lineEnd = lineEndAfter(text, itemEnd);
  const rest = /^(\s*)(,?)\s*(#.*)?$/.exec(text.slice(itemEnd, lineEnd));
  if (lineStart === 0 || before.trim() !== '' || !rest) return [insertion(itemEnd, `, ${added}`)];
  if (rest[2] === ',') return [insertion(lineEnd, `${style.lineEnd}${before}${added},`)];
  if (rest[3] === undefined) return [insertion(itemEnd, `,${style.lineEnd}${before}${added}`)];
  return [insertion(itemEnd, ','), insertion(lineEnd, style.lineEnd + before + added)];
}

/** The first key of a thing that has nothing after its colon. */
function beginMap(
  snapshot: Snapshot,
  entry: Entry,
  node: TreeNode,
  key: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  if (start === undefined || !entry.key || node !== entry.value) return undefined;
  if (isFlowEntry(snapshot, entry)) return replaceNode(snapshot, entry, node, new Map([[key, value]]));
  const style = styleAt(snapshot, entry, node.start);
  const indent = ' '.repeat(columnOf(entry.text, entry.key.start) + 2);
  const at = start + lineEndAfter(entry.text, Math.max(node.start, entry.key.end));
  return [{ start: at, end: at, text: style.lineEnd + indent + pairText(key, value, style) }];
}

/** How the text is written at an offset of an entry. */
export function styleAt(snapshot: Snapshot, entry: Entry, offset: number): TextStyle {
  const json = snapshot.style === 'flow' && hasQuotedKeys(snapshot);
  return {
    json,
    flow: isFlowEntry(snapshot, entry) || insideFlow(entry.value, offset),
    lineEnd: lineEndOf(snapshot, entry),
  };
}

/** True where the entry is a pair of a map in braces rather than lines of its own. */
export function isFlowEntry(snapshot: Snapshot, entry: Entry): boolean {
  if (snapshot.style === 'flow') return true;
  const start = snapshot.startOf(entry);
  if (start === undefined) return false;
  return !entry.text.endsWith('\n') && start + entry.text.length < snapshot.length;
}

function insideFlow(node: TreeNode, offset: number): boolean {
  if (offset < node.start || offset >= node.end) return false;
  if (node.kind === 'map') {
    if (node.flow) return offset > node.start;
    return node.pairs.some(({ value }) => insideFlow(value, offset));
  }
  if (node.kind === 'list') {
    if (node.flow) return offset > node.start;
    return node.items.some((item) => insideFlow(item, offset));
  }
  return false;
}

function hasQuotedKeys(snapshot: Snapshot): boolean {
  const key = snapshot.entries[0]?.key;
  return key?.style === 'double-quoted';
}

function lineEndOf(snapshot: Snapshot, entry: Entry): '\n' | '\r\n' {
  const own = entry.text.indexOf('\n');
  if (own >= 0) return entry.text[own - 1] === '\r' ? '\r\n' : '\n';
  // A file of one line, or an entry that is part of one: what the first other entry with a line end has.
  for (const other of snapshot.entries) {
    const at = other.text.indexOf('\n');
    if (at >= 0) return other.text[at - 1] === '\r' ? '\r\n' : '\n';
  }
  const start = snapshot.startOf(entry) ?? 0;
  return snapshot.sliceText(Math.max(0, start - 200), start).includes('\r\n') ? '\r\n' : '\n';
}

function isFlowNode(node: TreeNode): boolean {
  return node.kind === 'map' || node.kind === 'list' ? node.flow : node.kind !== 'scalar' || node.style !== 'block';
}

/** Where a node's own text ends, trailing comments and blank lines left out. */
export function significantEnd(node: TreeNode, text: string): number {
  if (node.kind === 'map' && !node.flow) {
    const last = node.pairs.at(-1);
    return last ? Math.max(significantEnd(last.value, text), last.key.end + 1) : node.end;
  }
  if (node.kind === 'list' && !node.flow) {
    const last = node.items.at(-1);
    return last ? significantEnd(last, text) : node.end;
  }
  if (node.kind === 'empty') return node.start;
  return text.slice(0, node.end).trimEnd().length;
}

/** The end of the line that an offset is on, before its line end. */
export function lineEndAfter(text: string, offset: number): number {
  const found = text.indexOf('\n', offset);
  if (found < 0) return text.length;
  return text[found - 1] === '\r' && found - 1 >= offset ? found - 1 : found;
}

export function columnOf(text: string, offset: number): number {
  return offset - (text.lastIndexOf('\n', offset - 1) + 1);
}

function quoteOf(text: string): Quote {
  const first = text[0];
  return first === '"' || first === "'" ? first : '';
}

function insertion(at: number, text: string): TextEdit {
  return { start: at, end: at, text };
}

function shifted(edit: TextEdit, by: number): TextEdit {
  return { start: edit.start + by, end: edit.end + by, text: edit.text };
}
