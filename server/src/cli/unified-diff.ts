import { FILE_HEADERS_ONLY, formatPatch } from 'diff';
import type { TextEdit } from '../rig/text-edit.ts';
import { applyTextEdits, orderedEdits } from '../rig/text-edit.ts';

/** Lines that stay, shown on either side of lines that change. */
const CONTEXT = 3;

/** Lines that change: `before` stands from line `start` on, counted from 0, and `after` comes in its place. */
interface Change {
  readonly start: number;
  readonly before: readonly string[];
  readonly after: readonly string[];
}

/**
 * What edits make of a text, as a unified diff (the format of POSIX `diff -u`, which `patch` and `git apply` read). It
 * is made from the edits and not by comparing, so that its cost is in proportion to the text however much changes.
 *
 * @param before what the file holds ahead of the text: a byte order mark, or nothing
 */
export function unifiedDiff(path: string, text: string, edits: readonly TextEdit[], before: string): string {
  const shifted = edits.map((edit) => ({ ...edit, start: edit.start + before.length, end: edit.end + before.length }));
  return diffOf(path, before + text, shifted);
}

function diffOf(path: string, text: string, edits: readonly TextEdit[]): string {
  const lines = linesOf(text);
  let shift = 0;
  const hunks = grouped(changesOf(text, lines, edits)).map((group) => {
    const first = Math.max(0, group[0]!.start - CONTEXT);
    const last = Math.min(lines.length, endOf(group.at(-1)!) + CONTEXT);
    const shown: string[] = [];
    let at = first;
    let grows = 0;
    for (const { start, before, after } of group) {
      shown.push(...marked(' ', lines.slice(at, start)), ...marked('-', before), ...marked('+', after));
      at = start + before.length;
      grows += after.length - before.length;
    }
    shown.push(...marked(' ', lines.slice(at, last)));
    const hunk = {
      oldStart: first + 1,
      oldLines: last - first,
      newStart: first + 1 + shift,
      newLines: last - first + grows,
      lines: shown,
    };
    shift += grows;
    return hunk;
  });
  const headers = { oldFileName: path, newFileName: path, oldHeader: 'as it is', newHeader: 'fixed' };
  return formatPatch({ ...headers, hunks }, FILE_HEADERS_ONLY);
}

/** The changes in the order of the text, each without the lines that it has in common with what comes in its place. */
function changesOf(text: string, lines: readonly string[], edits: readonly TextEdit[]): readonly Change[] {
  const starts: number[] = [];
  let offset = 0;
  for (const line of lines) {
    starts.push(offset);
    offset += line.length;
  }
  const lineAt = (position: number): number => lastAtMost(starts, position);
  const changes: Change[] = [];
  let pending: TextEdit[] = [];
  let first = 0;
  let last = -1;
  const close = (): void => {
    if (pending.length === 0) return;
    const from = starts[first] ?? 0;
    const to = starts[last + 1] ?? text.length;
    const moved = pending.map(({ start, end, text: put }) => ({ start: start - from, end: end - from, text: put }));
    changes.push(trimmed(first, lines.slice(first, last + 1), linesOf(applyTextEdits(text.slice(from, to), moved))));
    pending = [];
  };
  for (const edit of orderedEdits(edits, text.length)) {
    const from = lineAt(edit.start);
    if (from > last) {
      close();
      first = from;
    }
    last = Math.max(last, lineAt(edit.end));
    pending.push(edit);
  }
  close();
  return changes.filter(({ before, after }) => before.length + after.length > 0);
}

function trimmed(start: number, before: readonly string[], after: readonly string[]): Change {
  const shorter = Math.min(before.length, after.length);
  let head = 0;
  while (head < shorter && before[head] === after[head]) head++;
  let tail = 0;
  while (tail < shorter - head && before.at(-1 - tail) === after.at(-1 - tail)) tail++;
  return {
    start: start + head,
    before: before.slice(head, before.length - tail),
    after: after.slice(head, after.length - tail),
  };
}

/** Changes so close that their contexts would touch, together. */
function grouped(changes: readonly Change[]): readonly (readonly Change[])[] {
  const groups: Change[][] = [];
  for (const change of changes) {
    const group = groups.at(-1);
    if (group && change.start - endOf(group.at(-1)!) <= 2 * CONTEXT) group.push(change);
    else groups.push([change]);
  }
  return groups;
}

function endOf({ start, before }: Change): number {
  return start + before.length;
}

/** The lines with their ends; the last may have none. */
function linesOf(text: string): readonly string[] {
  return text.match(/[^\n]*\n|[^\n]+$/g) ?? [];
}

function marked(mark: ' ' | '-' | '+', lines: readonly string[]): readonly string[] {
  return lines.flatMap((line) =>
    line.endsWith('\n') ? [mark + line.slice(0, -1)] : [mark + line, '\\ No newline at end of file'],
  );
}

/** The index of the last number that is at most `value`; the first where none is. */
function lastAtMost(ascending: readonly number[], value: number): number {
  let low = 0;
  let high = ascending.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (ascending[middle]! <= value) low = middle;
    else high = middle;
  }
  return low;
}
