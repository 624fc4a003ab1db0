import { pathAbove } from './cursor-block.ts';
import { lineStartAt, readLine, unquoted, withoutQuotes } from './cursor-lines.ts';
import type { Cursor, PathStep } from './cursor-model.ts';

/** Lines that a flow map or list may run over above the cursor. */
const MOST_FLOW_LINES = 200;

/** A flow map or list that is open at the cursor: where it began, and what it stands under. */
interface OpenFlow {
  readonly start: number;
  readonly path: readonly PathStep[];
}

/**
 * The outermost flow map or list that begins on a line in block style and is still open at the cursor.
 *
 * @param section what the text as a whole stands under, where it is one entry of a section
 */
export function openFlow(text: string, offset: number, section: string | undefined): OpenFlow | undefined {
  let outermost: OpenFlow | undefined;
  let start = lineStartAt(text, offset);
  for (let count = 0; count < MOST_FLOW_LINES; count++) {
    const lineEnd = text.indexOf('\n', start);
    const head = text.slice(start, Math.min(offset, lineEnd < 0 ? text.length : lineEnd));
    outermost = openedOn(text, start, head, offset, section) ?? outermost;
    // What stands at the margin is a key of its own, whatever is left open above it.
    if (start === 0 || /^\S/.test(head)) break;
    start = lineStartAt(text, start - 1);
  }
  return outermost;
}

function openedOn(
  text: string,
  start: number,
  head: string,
  offset: number,
  section: string | undefined,
): OpenFlow | undefined {
  const line = readLine(head);
  const valueColumn = line.key === undefined ? line.keyColumn : line.valueColumn;
  const opened = valueColumn + /^(?:[&!]\S*\s+)*/.exec(head.slice(valueColumn))![0].length;
  if (!/[{[]/.test(head[opened] ?? '') || !isOpen(text.slice(start + opened, offset))) return undefined;
  const items = line.dashes.map((): PathStep => ({ kind: 'item' }));
  const own: readonly PathStep[] = line.key === undefined ? [] : [{ kind: 'key', key: line.key }];
  return { start: start + opened, path: [...pathAbove(text, start, line, section).path, ...items, ...own] };
}

function isOpen(text: string): boolean {
  let depth = 0;
  for (const character of withoutQuotesAndComments(text)) {
    if (character === '{' || character === '[') depth++;
    else if (character === '}' || character === ']') depth--;
    if (depth === 0) return false;
  }
  return depth > 0;
}

function withoutQuotesAndComments(text: string): string {
  return withoutQuotes(text).replaceAll(/(?<=^|\s)#[^\n]*/g, (run) => ' '.repeat(run.length));
}

interface OpenBracket {
  readonly type: '{' | '[';
  key: string | undefined;
  readonly keys: string[];
}

/**
 * Reads an open flow map or list up to the cursor, which stands at the text's end.
 *
 * @param base the offset of `text` in the whole
 * @param above what the map or list stands under
 */
export function flowCursor(text: string, base: number, above: readonly PathStep[]): Cursor {
  const stack: OpenBracket[] = [];
  let inComment = false;
  let wordStart = 0;
  /** Nothing of the word has been read yet: only then does a quote open a quoted one. */
  let isWordStart = true;
  let index = 0;
  const beginWord = (): void => {
    wordStart = index;
    isWordStart = true;
  };
  while (index < text.length) {
    const character = text[index]!;
    const top = stack.at(-1);
    if (isWordStart && (character === '"' || character === "'")) {
      const end = quoteEnd(text, index);
      if (end < 0) break;
      index = end;
      isWordStart = false;
      continue;
    }
    if (character === '#' && /\s/.test(text[index - 1] ?? ' ')) {
      const end = text.indexOf('\n', index);
      inComment = end < 0;
      if (inComment) break;
      index = end;
      if (isWordStart) beginWord();
      continue;
    }
    index++;
    if (character === '{' || character === '[') {
      stack.push({ type: character, key: undefined, keys: [] });
      beginWord();
    } else if (character === '}' || character === ']') {
      stack.pop();
      beginWord();
    } else if (character === ',') {
      if (top) top.key = undefined;
      beginWord();
    } else if (character === ':' && top?.type === '{' && endsKey(text, wordStart, index)) {
      top.key = unquoted(text.slice(wordStart, index - 1).trim()).replace(/["']$/, '');
      top.keys.push(top.key);
      beginWord();
    } else if (character.trim() !== '') isWordStart = false;
  }
  const top = stack.at(-1);
  // What is replaced stands on one line, so a word that runs over lines begins on its last.
  const from = Math.max(wordStart, lineStartAt(text, text.length));
  const begins = inComment ? index : from + text.slice(from).search(/\S|$/);
  return {
    path: [...above, ...stack.flatMap(stepsInto)],
    writes: top?.type === '[' || top?.key !== undefined ? 'value' : 'key',
    inFlow: true,
    prefix: unquoted(text.slice(begins)),
    start: base + begins,
    siblings: new Set(top?.keys),
    inComment,
  };
}

/** Whether the colon ahead of `behind` ends a key: one within a word does not, one behind a quoted key always does. */
function endsKey(text: string, wordStart: number, behind: number): boolean {
  return /^$|[\s"'{}[\],]/.test(text[behind] ?? '') || /^\s*["']/.test(text.slice(wordStart, behind));
}

function stepsInto({ type, key }: OpenBracket): PathStep[] {
  if (type === '[') return [{ kind: 'item' }];
  return key === undefined ? [] : [{ kind: 'key', key }];
}

function quoteEnd(text: string, start: number): number {
  const quote = text[start];
  for (let index = start + 1; index < text.length; index++) {
    if (text[index] === '\\' && quote === '"') index++;
    else if (text[index] === quote) return index + 1;
  }
  return -1;
}
