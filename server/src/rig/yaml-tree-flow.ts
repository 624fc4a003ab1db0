import {
  AMPERSAND,
  ASTERISK,
  CARRIAGE_RETURN,
  CLOSE_BRACE,
  CLOSE_BRACKET,
  COLON,
  COMMA,
  DOUBLE_QUOTE,
  HASH,
  LINE_FEED,
  OPEN_BRACE,
  OPEN_BRACKET,
  SINGLE_QUOTE,
  SPACE,
  TAB,
} from './characters.ts';
import { MOST_DEPTH } from './limits.ts';
import type { EmptyNode, ScalarNode, TreeNode, TreePair } from './tree.ts';
import { alias, nameEnd, plainScalar, quotedScalar, skipSpaces } from './yaml-tree-scalars.ts';

/**
 * Maps and lists in brackets, in their usual forms; `undefined` for whatever is unusual or wrong.
 *
 * @param start the offset of the opening bracket
 * @param leastIndent how far the lines after the first are indented at least
 * @param depth how many maps and lists it stands in
 */
export function flowCollection(text: string, start: number, leastIndent: number, depth: number): TreeNode | undefined {
  if (depth >= MOST_DEPTH - 1) return undefined;
  return text.charCodeAt(start) === OPEN_BRACE
    ? flowMap(text, start, leastIndent, depth)
    : flowList(text, start, leastIndent, depth);
}

function flowMap(text: string, start: number, leastIndent: number, depth: number): TreeNode | undefined {
  const pairs: TreePair[] = [];
  let at = skipFlowSpace(text, start + 1, leastIndent);
  for (;;) {
    if (at < 0) return undefined;
    if (text.charCodeAt(at) === CLOSE_BRACE) return { kind: 'map', start, end: at + 1, pairs, flow: true };
    const key = flowScalar(text, at);
    if (!key) return undefined;
    const colon = skipSpaces(text, key.end);
    const value = text.charCodeAt(colon) === COLON ? flowValue(text, colon + 1, leastIndent, depth) : emptyAt(key.end);
    if (!value) return undefined;
    pairs.push({ key, value });
    at = afterItem(text, value.end, leastIndent, CLOSE_BRACE);
  }
}

function flowList(text: string, start: number, leastIndent: number, depth: number): TreeNode | undefined {
  const items: TreeNode[] = [];
  let at = skipFlowSpace(text, start + 1, leastIndent);
  for (;;) {
    if (at < 0) return undefined;
    if (text.charCodeAt(at) === CLOSE_BRACKET) return { kind: 'list', start, end: at + 1, items, flow: true };
    const item = flowNode(text, at, leastIndent, depth);
    if (!item) return undefined;
    items.push(item);
    at = afterItem(text, item.end, leastIndent, CLOSE_BRACKET);
  }
}

/** The offset of the next item or of the closing bracket; negative where neither a comma nor that bracket follows. */
function afterItem(text: string, end: number, leastIndent: number, closer: number): number {
  const at = skipFlowSpace(text, end, leastIndent);
  if (at < 0) return at;
  const code = text.charCodeAt(at);
  if (code === closer) return at;
  return code === COMMA ? skipFlowSpace(text, at + 1, leastIndent) : -1;
}

function flowScalar(text: string, at: number): ScalarNode | undefined {
  const code = text.charCodeAt(at);
  return code === DOUBLE_QUOTE || code === SINGLE_QUOTE ? quotedScalar(text, at) : plainScalar(text, at, true);
}

/** What follows the colon of a pair: nothing, or a node with or without an anchor. */
function flowValue(text: string, afterColon: number, leastIndent: number, depth: number): TreeNode | undefined {
  const at = skipFlowSpace(text, afterColon, leastIndent);
  if (at < 0) return undefined;
  const code = text.charCodeAt(at);
  if (code === COMMA || code === CLOSE_BRACE) return emptyAt(skipSpaces(text, afterColon));
  return flowNode(text, at, leastIndent, depth);
}

function flowNode(text: string, at: number, leastIndent: number, depth: number): TreeNode | undefined {
  switch (text.charCodeAt(at)) {
    case OPEN_BRACE:
    case OPEN_BRACKET:
      return flowCollection(text, at, leastIndent, depth + 1);
    case ASTERISK:
      return alias(text, at);
    case AMPERSAND:
      return anchored(text, at, leastIndent, depth);
    default:
      return flowScalar(text, at);
  }
}

function anchored(text: string, at: number, leastIndent: number, depth: number): TreeNode | undefined {
  const end = nameEnd(text, at + 1);
  if (end === undefined || text.charCodeAt(end) !== SPACE) return undefined;
  const start = skipSpaces(text, end);
  const code = text.charCodeAt(start);
  if (code === AMPERSAND || code === ASTERISK || code === HASH) return undefined;
  const node = flowNode(text, start, leastIndent, depth);
  return node && { ...node, anchor: text.slice(at + 1, end) };
}

function emptyAt(offset: number): EmptyNode {
  return { kind: 'empty', start: offset, end: offset };
}

/**
 * Skips white space, line ends and comments between the parts of a flow collection. Negative for a line that is not
 * indented enough, a comment without a space before it, a document marker, and the end of the text.
 */
function skipFlowSpace(text: string, from: number, leastIndent: number): number {
  let at = from;
  for (;;) {
    const code = text.charCodeAt(at);
    if (code === SPACE || code === TAB) {
      at++;
    } else if (code === LINE_FEED || (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) === LINE_FEED)) {
      at = indented(text, code === LINE_FEED ? at + 1 : at + 2, leastIndent);
      if (at < 0) return at;
    } else if (code === HASH) {
      const before = text.charCodeAt(at - 1);
      if (before !== SPACE && before !== TAB && before !== LINE_FEED) return -1;
      const feed = text.indexOf('\n', at);
      if (feed < 0) return -1;
      at = feed;
    } else {
      return at < text.length ? at : -1;
    }
  }
}

/** The offset of a line's first character that is no space; negative where it is too far to the left. */
function indented(text: string, lineStart: number, leastIndent: number): number {
  const at = skipSpaces(text, lineStart);
  if (at - lineStart >= leastIndent && at > lineStart) return at;
  const code = text.charCodeAt(at);
  if (code === LINE_FEED || code === CARRIAGE_RETURN || code === HASH) return at;
  if (at - lineStart < leastIndent) return -1;
  return text.startsWith('---', at) || text.startsWith('...', at) ? -1 : at;
}
