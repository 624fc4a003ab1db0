import { styleOf } from '../rig/blocks.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import { blockCursor } from './cursor-block.ts';
import { flowCursor, openFlow } from './cursor-flow.ts';
import type { Cursor } from './cursor-model.ts';

/** Where a cursor stands in a rig file. Only the entry under it is read, where that is a piece of its own. */
export function cursorAt(snapshot: Snapshot, offset: number): Cursor {
  const entry = snapshot.style === 'block' ? snapshot.entryAt(offset) : undefined;
  const start = entry && snapshot.startOf(entry);
  if (!entry || start === undefined) return cursorIn(snapshot.text(), offset);
  // Entries of a map in braces begin at their key, those below a line of their own at that line's margin.
  const isPiece = entry.section === undefined ? snapshot.positionAt(start).character === 0 : /^[ \t]/.test(entry.text);
  if (!isPiece) return cursorIn(snapshot.text(), offset);
  const cursor = cursorIn(entry.text, offset - start, entry.section);
  return {
    ...cursor,
    start: start + cursor.start,
    siblings: cursor.path.length === 0 ? topLevelKeys(snapshot) : cursor.siblings,
  };
}

/**
 * Finds out where a cursor stands, from the text alone: what has been typed so far need not be YAML yet.
 *
 * @param section what the text stands under, where it is one entry of a section
 */
export function cursorIn(text: string, offset: number, section?: string): Cursor {
  if (section === undefined && styleOf(text) === 'flow') return flowCursor(text.slice(0, offset), 0, []);
  const open = openFlow(text, offset, section);
  if (open) return flowCursor(text.slice(open.start, offset), open.start, open.path);
  return blockCursor(text, offset, section);
}

function topLevelKeys(snapshot: Snapshot): ReadonlySet<string> {
  const keys = new Set<string>();
  for (const { section, name } of snapshot.entries) if (section === undefined) keys.add(name);
  return keys;
}
