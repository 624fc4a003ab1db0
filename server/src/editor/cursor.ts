/** One step from the top of a rig file down to the cursor: into the value of a key, or into an item of a list. */
export type PathStep = { readonly kind: 'key'; readonly key: string } | { readonly kind: 'item' };

/**
 * Where a cursor stands in a text that may be unfinished: the steps down to the map, list or value it is in, and
 * whether a key or a value is being written.
 */
export interface Cursor {
  readonly path: readonly PathStep[];
  /** `key`: a key of the map at `path`, or an item's first word; `value`: the value at `path`. */
  readonly writes: 'key' | 'value';
  /** What is written so far, up to the cursor, without its quote. */
  readonly prefix: string;
  /** Offset at which `prefix` begins, its quote included. */
  readonly start: number;
  /** Keys that the same map has already. */
  readonly siblings: ReadonlySet<string>;
  readonly inComment: boolean;
}

/** Lines looked at above the cursor: an entry of more lines than this is no longer completed in full. */
const MOST_LINES_UP = 5_000;

const KEY_LINE =
  /^(\s*)((?:- +)*)(?:"((?:[^"\\]|\\.)*)"|'((?:[^']|'')*)'|([^\s#'"{[&*!|>%@`-][^#]*?|-[^\s][^#]*?))\s*:(?:\s+(.*))?$/;

interface Line {
  /** Nothing, or a comment alone. */
  readonly isBlank: boolean;
  readonly indent: number;
  /** Columns of the dashes of list items that the line begins with. */
  readonly dashes: readonly number[];
  readonly key: string | undefined;
  /** Column of the key, behind any dashes. */
  readonly keyColumn: number;
  readonly value: string;
  readonly valueColumn: number;
}

/** Finds out where a cursor stands, from the text alone: what has been typed so far need not be YAML yet. */
export function cursorIn(text: string, offset: number): Cursor {
  const lineStart = lineStartAt(text, offset);
  const before = text.slice(lineStart, offset);
  const trimmed = text.trimStart();
  if (trimmed.startsWith('{') || trimmed.startsWith('[')) return flowCursor(text.slice(0, offset), 0, []);
  const open = openFlow(text, lineStart, offset);
  if (open) return flowCursor(text.slice(open.start, offset), open.start, open.path);
  return blockCursor(text, lineStart, before);
}

function blockCursor(text: string, lineStart: number, before: string): Cursor {
  const line = readLine(before);
  const inComment = /(?:^|\s)#/.test(withoutQuotes(before));
  const above = pathAbove(text, lineStart, beginningOf(line));
  const items = line.dashes.map((): PathStep => ({ kind: 'item' }));
  const path = [...above.path, ...items];
  if (line.key !== undefined) {
    const valueStart = lineStart + line.valueColumn;
    return {
      path: [...path, { kind: 'key', key: line.key }],
      writes: 'value',
      prefix: unquoted(before.slice(line.valueColumn)),
      start: valueStart,
      siblings: new Set(),
      inComment,
    };
  }
  const begins = line.dashes.length === 0 ? before.search(/\S|$/) : line.keyColumn;
  return {
    path,
    writes: 'key',
    prefix: unquoted(before.slice(begins)),
    start: lineStart + begins,
    siblings: line.dashes.length === 0 ? above.siblings : new Set(),
    inComment,
  };
}

/** The keys above a line that it stands under, and those that stand beside it. */
function pathAbove(
  text: string,
  lineStart: number,
  { column, isItem }: { readonly column: number; readonly isItem: boolean },
): {
  readonly path: readonly PathStep[];
  readonly siblings: ReadonlySet<string>;
} {
  const steps: PathStep[] = [];
  const siblings = new Set<string>(keysBelow(text, lineStart, column));
  // A list may stand at the column of its key; what is looked for is then a key at that column, past the other items.
  let itemColumn = isItem ? column : -1;
  let level = isItem && keyAtColumn(text, lineStart - 1, column) ? column + 1 : column;
  let end = lineStart - 1;
  for (let count = 0; end >= 0 && count < MOST_LINES_UP; count++) {
    const start = lineStartAt(text, end);
    const line = readLine(text.slice(start, end));
    end = start - 1;
    if (line.isBlank || (line.dashes[0] !== undefined && line.dashes[0] === itemColumn)) continue;
    if (steps.length === 0 && line.key !== undefined && line.keyColumn === column) siblings.add(line.key);
    if (level === 0 && steps.length > 0) break;
    const opens = line.value === '' || /^[&!]\S+\s*$/.test(line.value);
    const isAbove = line.key !== undefined && line.keyColumn < level && opens;
    const dashes = line.dashes.filter((dash) => dash < level);
    if (!isAbove && dashes.length === 0) continue;
    if (isAbove) {
      steps.unshift({ kind: 'key', key: line.key! });
      level = line.keyColumn;
      itemColumn = -1;
    }
    for (const dash of dashes.reverse()) {
      steps.unshift({ kind: 'item' });
      itemColumn = dash;
      level = keyAtColumn(text, end, dash) ? dash + 1 : dash;
    }
  }
  return { path: steps, siblings };
}

function keyAtColumn(text: string, end: number, column: number): boolean {
  for (let at = end, count = 0; at >= 0 && count < MOST_LINES_UP; count++) {
    const start = lineStartAt(text, at);
    const line = readLine(text.slice(start, at));
    at = start - 1;
    if (line.isBlank) continue;
    if (line.indent > column || line.dashes[0] === column) continue;
    return line.indent === column && line.key !== undefined && line.value === '';
  }
  return false;
}

function keysBelow(text: string, lineStart: number, column: number): readonly string[] {
  const keys: string[] = [];
  let start = text.indexOf('\n', lineStart) + 1;
  for (let count = 0; start > 0 && count < MOST_LINES_UP; count++) {
    const next = text.indexOf('\n', start);
    const raw = text.slice(start, next < 0 ? undefined : next);
    start = next + 1;
    const line = readLine(raw);
    if (line.isBlank) continue;
    if (line.indent < column) break;
    if (line.key !== undefined && line.keyColumn === column && line.dashes.length === 0) keys.push(line.key);
  }
  return keys;
}

function readLine(raw: string): Line {
  const text = raw.replace(/\r$/, '');
  const dashes: number[] = [];
  let column = text.search(/\S|$/);
  while (/^-(?:\s|$)/.test(text.slice(column))) {
    dashes.push(column);
    column += 1 + text.slice(column + 1).search(/\S|$/);
  }
  const match = KEY_LINE.exec(text);
  const key = match && (match[3] ?? match[4] ?? match[5]);
  const value = match?.[6] ?? '';
  return {
    isBlank: /^\s*(?:#|$)/.test(text),
    indent: text.search(/\S|$/),
    dashes,
    key: key ?? undefined,
    keyColumn: column,
    value: value.replace(/(?:^|\s)#.*$/, '').trim(),
    valueColumn: match ? text.length - value.length : text.length,
  };
}

/** The outermost flow map or list that is open at the cursor, where it began, and what it stands under. */
function openFlow(
  text: string,
  lineStart: number,
  offset: number,
): { readonly start: number; readonly path: readonly PathStep[] } | undefined {
  let start = lineStart;
  for (let count = 0; count < 200; count++) {
    const lineEnd = text.indexOf('\n', start);
    const head = text.slice(start, Math.min(offset, lineEnd < 0 ? text.length : lineEnd));
    const opened = firstBracket(head);
    if (opened >= 0 && isOpen(text.slice(start + opened, offset))) {
      const line = readLine(head.slice(0, opened));
      const above = pathAbove(text, start, beginningOf(line));
      const own: PathStep[] = line.key === undefined ? [] : [{ kind: 'key', key: line.key }];
      return {
        start: start + opened,
        path: [...above.path, ...line.dashes.map((): PathStep => ({ kind: 'item' })), ...own],
      };
    }
    // A flow map may run over lines; the line it begins on is indented less than those it goes on in.
    if (start === 0 || (count === 0 && /^\S/.test(head))) return undefined;
    start = lineStartAt(text, start - 1);
  }
  return undefined;
}

function firstBracket(line: string): number {
  const clean = withoutQuoted(line);
  const match = /(?:^|[:\-,]\s+|\s)(?:&\S+\s+)?([{[])/.exec(clean);
  return match ? match.index + match[0].length - 1 : -1;
}

function isOpen(text: string): boolean {
  let depth = 0;
  for (const character of withoutQuoted(text)) {
    if (character === '{' || character === '[') depth++;
    else if (character === '}' || character === ']') depth--;
    if (depth === 0) return false;
  }
  return depth > 0;
}

/** Quoted stretches as blanks, so that brackets and hashes in them do not count. */
function withoutQuotes(text: string): string {
  return text.replaceAll(/"(?:[^"\\\n]|\\.)*"|(?<=[\s:,[{])'(?:[^'\n]|'')*'/g, (run) => ' '.repeat(run.length));
}

/** Quoted stretches and comments as blanks. */
function withoutQuoted(text: string): string {
  return withoutQuotes(text).replaceAll(/(?<=^|\s)#[^\n]*/g, (run) => ' '.repeat(run.length));
}

/** `lastIndexOf` takes a negative start for 0: the first line has to be told apart. */
function lineStartAt(text: string, offset: number): number {
  return offset <= 0 ? 0 : text.lastIndexOf('\n', offset - 1) + 1;
}

/** Where a line's own words begin: at its first dash, or at its key. */
function beginningOf({ dashes, keyColumn }: Line): { readonly column: number; readonly isItem: boolean } {
  return { column: dashes[0] ?? keyColumn, isItem: dashes.length > 0 };
}

interface OpenBracket {
  readonly type: '{' | '[';
  key: string | undefined;
  keys: string[];
}

/** Reads an open flow map or list up to the cursor, which stands at the text's end. */
function flowCursor(text: string, base: number, above: readonly PathStep[]): Cursor {
  const stack: OpenBracket[] = [];
  let wordStart = 0;
  let index = 0;
  while (index < text.length) {
    const character = text[index]!;
    const top = stack.at(-1);
    if (character === '"' || character === "'") {
      const end = quoteEnd(text, index);
      if (end < 0) break;
      index = end;
      continue;
    }
    if (character === '#' && /\s/.test(text[index - 1] ?? ' ')) {
      const end = text.indexOf('\n', index);
      if (end < 0)
        return { path: above, writes: 'key', prefix: '', start: base + index, siblings: new Set(), inComment: true };
      index = end;
    } else if (character === '{' || character === '[') {
      stack.push({ type: character, key: undefined, keys: [] });
      wordStart = index + 1;
    } else if (character === '}' || character === ']') {
      stack.pop();
      wordStart = index + 1;
    } else if (character === ',') {
      if (top) top.key = undefined;
      wordStart = index + 1;
    } else if (character === ':' && top?.type === '{' && /[\s"'{[]|^$/.test(text[index + 1] ?? '')) {
      top.key = unquoted(text.slice(wordStart, index).trim()).replace(/["']$/, '');
      top.keys.push(top.key);
      wordStart = index + 1;
    }
    index++;
  }
  const path = [...above, ...stack.flatMap(stepsInto)];
  const top = stack.at(-1);
  const word = text.slice(wordStart);
  const begins = wordStart + word.search(/\S|$/);
  return {
    path,
    writes: top?.type === '[' || top?.key !== undefined ? 'value' : 'key',
    prefix: unquoted(text.slice(begins)),
    start: base + begins,
    siblings: new Set(top?.keys),
    inComment: false,
  };
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

function unquoted(text: string): string {
  return text.replace(/^["']/, '');
}
