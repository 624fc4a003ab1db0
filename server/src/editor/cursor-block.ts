import type { Line } from './cursor-lines.ts';
import { lineStartAt, MOST_LINES_AWAY, readLine, unquoted, withoutQuotes } from './cursor-lines.ts';
import type { Cursor, PathStep } from './cursor-model.ts';

/** Where a cursor in block style stands, from the indentation of the lines above it. */
export function blockCursor(text: string, offset: number, section: string | undefined): Cursor {
  const lineStart = lineStartAt(text, offset);
  const before = text.slice(lineStart, offset);
  const line = readLine(before);
  const above = pathAbove(text, lineStart, line, section);
  const path = [...above.path, ...line.dashes.map((): PathStep => ({ kind: 'item' }))];
  const common = { inFlow: false, inComment: /(?:^|\s)#/.test(withoutQuotes(before)) };
  if (line.key !== undefined) {
    return {
      ...common,
      path: [...path, { kind: 'key', key: line.key }],
      writes: 'value',
      prefix: unquoted(before.slice(line.valueColumn)),
      start: lineStart + line.valueColumn,
      siblings: new Set(),
    };
  }
  return {
    ...common,
    path,
    writes: 'key',
    prefix: unquoted(before.slice(line.keyColumn)),
    start: lineStart + line.keyColumn,
    siblings: line.dashes.length === 0 ? above.siblings : new Set(keysBelow(text, lineStart, line.keyColumn)),
  };
}

/**
 * The keys above a line that it stands under, and those that stand beside it.
 *
 * @param section what the text as a whole stands under, where it is one entry of a section
 */
export function pathAbove(
  text: string,
  lineStart: number,
  { dashes: ownDashes, keyColumn }: Line,
  section: string | undefined,
): {
  readonly path: readonly PathStep[];
  readonly siblings: ReadonlySet<string>;
} {
  const column = ownDashes[0] ?? keyColumn;
  const isItem = ownDashes.length > 0;
  const steps: PathStep[] = [];
  const siblings = new Set<string>(keysBelow(text, lineStart, column));
  // A list may stand at the column of its key; what is looked for is then a key at that column, past the other items.
  let itemColumn = isItem ? column : -1;
  let level = isItem && keyAtColumn(text, lineStart - 1, column) ? column + 1 : column;
  let end = lineStart - 1;
  for (let count = 0; end >= 0 && count < MOST_LINES_AWAY; count++) {
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
  if (section !== undefined && level > 0 && end < 0) steps.unshift({ kind: 'key', key: section });
  return { path: steps, siblings };
}

function keyAtColumn(text: string, end: number, column: number): boolean {
  for (let at = end, count = 0; at >= 0 && count < MOST_LINES_AWAY; count++) {
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
  for (let count = 0; start > 0 && count < MOST_LINES_AWAY; count++) {
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
