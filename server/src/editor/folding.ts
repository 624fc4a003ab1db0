import type { FoldingRange } from 'vscode-languageserver-types';
import { FoldingRangeKind } from 'vscode-languageserver-types';
import type { Snapshot } from '../rig/snapshot.ts';
import type { TreeNode } from '../rig/tree.ts';

/** Sections, entries, and maps and lists inside them that take more than one line; runs of comment lines. */
export function foldingOf(snapshot: Snapshot): FoldingRange[] {
  const ranges: FoldingRange[] = [];
  const add = (start: number, end: number): void => {
    const startLine = snapshot.positionAt(start).line;
    const endLine = snapshot.positionAt(end).line;
    if (endLine > startLine) ranges.push({ startLine, endLine });
  };
  let section: { readonly start: number; end: number } | undefined;
  for (const entry of snapshot.entries) {
    const offset = snapshot.startOf(entry) ?? 0;
    // A section's own line stands ahead of its entries.
    if (entry.section === undefined || !section) {
      if (section) add(section.start, section.end);
      section = { start: offset + (entry.key?.start ?? 0), end: offset };
    }
    section.end = Math.max(section.end, offset + entry.value.end);
    if (!entry.key) continue;
    if (entry.section !== undefined) add(offset + entry.key.start, offset + entry.value.end);
    addNested(entry.value, offset, add);
  }
  if (section) add(section.start, section.end);
  return [...ranges, ...comments(snapshot.text())];
}

function addNested(node: TreeNode, offset: number, add: (start: number, end: number) => void): void {
  if (node.kind === 'map') {
    for (const pair of node.pairs) {
      if (pair.value.kind !== 'map' && pair.value.kind !== 'list') continue;
      add(offset + pair.key.start, offset + pair.value.end);
      addNested(pair.value, offset, add);
    }
  } else if (node.kind === 'list') {
    for (const item of node.items) {
      if (item.kind === 'map') add(offset + item.start, offset + item.end);
      addNested(item, offset, add);
    }
  }
}

function comments(text: string): FoldingRange[] {
  const ranges: FoldingRange[] = [];
  let first = -1;
  const lines = text.split('\n');
  for (let line = 0; line <= lines.length; line++) {
    const isComment = /^\s*#/.test(lines[line] ?? '');
    if (isComment && first < 0) first = line;
    if (isComment || first < 0) continue;
    if (line - 1 > first) ranges.push({ startLine: first, endLine: line - 1, kind: FoldingRangeKind.Comment });
    first = -1;
  }
  return ranges;
}
