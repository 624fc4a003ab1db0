import {
  AMPERSAND,
  ASTERISK,
  BYTE_ORDER_MARK,
  CARRIAGE_RETURN,
  COLON,
  DASH,
  DOUBLE_QUOTE,
  HASH,
  LINE_FEED,
  OPEN_BRACE,
  OPEN_BRACKET,
  SINGLE_QUOTE,
  SPACE,
} from './characters.ts';
import { MOST_DEPTH } from './limits.ts';
import type { EmptyNode, ListNode, MapNode, ScalarNode, TreeNode, TreePair } from './tree.ts';
import { flowCollection } from './yaml-tree-flow.ts';
import { alias, isBlank, nameEnd, plainScalar, quotedScalar, skipSpaces } from './yaml-tree-scalars.ts';

/*
 * Reads the YAML that rig files are made of: maps and lists by indentation, brackets, plain and quoted scalars on one
 * line, anchors on values, aliases, comments. It is some ten times as fast as the library and gives the very same tree,
 * or, for whatever is unusual or wrong, none: then the library reads the text, and says what is wrong with it.
 *
 * Every function takes the offset at which it starts to read and gives a node, whose end is where to go on, or
 * `undefined`.
 */

/** The tree of a text with nothing wrong and nothing unusual in it; `undefined` for any other. */
export function readDirectly(text: string): TreeNode | undefined {
  if (text.charCodeAt(0) === BYTE_ORDER_MARK) return undefined;
  const at = nextLine(text, 0, true);
  if (at < 0 || at === text.length) return undefined;
  const code = text.charCodeAt(at);
  const root =
    code === OPEN_BRACE || code === OPEN_BRACKET
      ? flowCollection(text, at, 0, 0)
      : blockMap(text, at, columnOf(text, at), 0);
  return root && nextLine(text, root.end, false) === text.length ? root : undefined;
}

/** A map whose keys stand at column `indent`, the first one at `start`. */
function blockMap(text: string, start: number, indent: number, depth: number): MapNode | undefined {
  if (depth >= MOST_DEPTH - 1) return undefined;
  const pairs: TreePair[] = [];
  let end = start;
  for (let at = start; ; ) {
    const key = blockKey(text, at);
    if (!key) return undefined;
    const value = blockValue(text, skipSpaces(text, key.end) + 1, indent, depth, true);
    if (!value) return undefined;
    pairs.push({ key, value });
    end = value.end;
    at = nextLine(text, end, false);
    if (at < 0) return undefined;
    const column = at === text.length ? -1 : columnOf(text, at);
    if (column > indent) return undefined;
    if (column < indent) return { kind: 'map', start, end, pairs, flow: false };
  }
}

/** A list whose dashes stand at column `indent`, the first one at `start`. */
function blockList(text: string, start: number, indent: number, depth: number): ListNode | undefined {
  if (depth >= MOST_DEPTH - 1) return undefined;
  const items: TreeNode[] = [];
  let end = start + 1;
  for (let at = start; ; ) {
    const item = listItem(text, at + 1, indent, depth);
    if (!item) return undefined;
    items.push(item);
    end = Math.max(end, item.end);
    at = nextLine(text, item.end, false);
    if (at < 0) return undefined;
    const column = at === text.length ? -1 : columnOf(text, at);
    if (column > indent) return undefined;
    if (column < indent || !isDash(text, at)) return { kind: 'list', start, end, items, flow: false };
  }
}

/** What follows a dash: a map that starts on its line, or any value. */
function listItem(text: string, afterDash: number, indent: number, depth: number): TreeNode | undefined {
  const at = skipSpaces(text, afterDash);
  if (blockKey(text, at)) return blockMap(text, at, columnOf(text, at), depth + 1);
  return blockValue(text, afterDash, indent, depth, false);
}

/** A key with its colon behind it. */
function blockKey(text: string, at: number): ScalarNode | undefined {
  const code = text.charCodeAt(at);
  const key = code === DOUBLE_QUOTE || code === SINGLE_QUOTE ? quotedScalar(text, at) : plainScalar(text, at, false);
  if (!key || key.end - at > 1000) return undefined;
  const colon = skipSpaces(text, key.end);
  return text.charCodeAt(colon) === COLON && isBlank(text.charCodeAt(colon + 1)) && colon - at < 1000 ? key : undefined;
}

/**
 * The value after a colon or a dash, on its line or below it.
 *
 * @param indent the column of the map or list that it is a value of
 * @param isInMap whether a list may stand below it at that very column
 */
function blockValue(text: string, from: number, indent: number, depth: number, isInMap: boolean): TreeNode | undefined {
  const at = skipSpaces(text, from);
  switch (text.charCodeAt(at)) {
    case OPEN_BRACE:
    case OPEN_BRACKET:
      return flowCollection(text, at, indent + 1, depth + 1);
    case ASTERISK:
      return alias(text, at);
    case DOUBLE_QUOTE:
    case SINGLE_QUOTE:
      return quotedScalar(text, at);
    case AMPERSAND:
      return anchored(text, at, indent, depth, isInMap);
    case HASH:
    case LINE_FEED:
    case CARRIAGE_RETURN:
      return valueBelow(text, at, indent, depth, isInMap);
    default:
      return at === text.length ? emptyAt(at) : plainScalar(text, at, false);
  }
}

function anchored(text: string, at: number, indent: number, depth: number, isInMap: boolean): TreeNode | undefined {
  const end = nameEnd(text, at + 1);
  if (end === undefined || !isBlank(text.charCodeAt(end))) return undefined;
  const next = text.charCodeAt(skipSpaces(text, end));
  if (next === AMPERSAND || next === ASTERISK) return undefined;
  const node = blockValue(text, end, indent, depth, isInMap);
  return node && { ...node, anchor: text.slice(at + 1, end) };
}

/** A map or list on the lines below, or nothing. */
function valueBelow(text: string, at: number, indent: number, depth: number, isInMap: boolean): TreeNode | undefined {
  const below = nextLine(text, at, false);
  if (below < 0) return undefined;
  if (below === text.length) return emptyAt(at);
  const column = columnOf(text, below);
  const isList = isDash(text, below);
  if (column > indent)
    return isList ? blockList(text, below, column, depth + 1) : blockMap(text, below, column, depth + 1);
  return column === indent && isList && isInMap ? blockList(text, below, column, depth + 1) : emptyAt(at);
}

function isDash(text: string, at: number): boolean {
  return text.charCodeAt(at) === DASH && isBlank(text.charCodeAt(at + 1));
}

function emptyAt(offset: number): EmptyNode {
  return { kind: 'empty', start: offset, end: offset };
}

/** How many characters stand before an offset on its line. */
function columnOf(text: string, at: number): number {
  let start = at;
  while (start > 0 && text.charCodeAt(start - 1) !== LINE_FEED) start--;
  return at - start;
}

/**
 * From the end of a value over a comment, blank lines and comment lines to the first character of the next line that
 * says something, or to the end of the text. Negative where anything else follows the value on its line, and for tabs.
 */
function nextLine(text: string, from: number, isLineStart: boolean): number {
  let canBeContent = isLineStart;
  let canBeComment = isLineStart;
  for (let at = from; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === SPACE) {
      canBeComment = true;
    } else if (code === LINE_FEED) {
      canBeContent = true;
      canBeComment = true;
    } else if (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) === LINE_FEED) {
      canBeComment = true;
    } else if (code === HASH && (canBeComment || text.charCodeAt(from - 1) === SPACE)) {
      const feed = text.indexOf('\n', at);
      if (feed < 0) return text.length;
      canBeContent = true;
      at = feed;
    } else {
      return canBeContent && code > SPACE ? at : -1;
    }
  }
  return text.length;
}
