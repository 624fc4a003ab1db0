import type { Entry } from './entry.ts';
import type { Place, Position, PositionRange } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { editBlocks, readBlocks } from './snapshot-blocks.ts';
import { BlockSnapshot } from './snapshot-store.ts';
import { orderedEdits, type TextEdit } from './text-edit.ts';

export type { TextEdit } from './text-edit.ts';

/** One state of a rig file's text, read. A value: an edit makes a new one, and this one stays as it is. */
export interface Snapshot {
  readonly style: 'block' | 'flow';
  /** In document order. */
  readonly entries: readonly Entry[];
  /** What is wrong with the document as a whole; what is wrong with an entry alone stands at the entry. */
  readonly problems: readonly PlacedProblem[];
  /** In UTF-16 units. */
  readonly length: number;
  readonly lineCount: number;
  text(): string;
  sliceText(start: number, end: number): string;
  /** The offset nearest to the position that exists. */
  offsetAt(position: Position): number;
  positionAt(offset: number): Position;
  /** The offset of an entry's text; `undefined` for an entry of another snapshot. */
  startOf(entry: Entry): number | undefined;
  /** A place as lines and characters; line 0, character 0 for a place in an entry of another snapshot. */
  rangeOf(place: Place): PositionRange;
  /** The innermost entry whose text holds the offset. */
  entryAt(offset: number): Entry | undefined;
}

/** Reads a rig file from nothing. Never throws, whatever the text. */
export function readSnapshot(text: string): Snapshot {
  const { style, list } = readBlocks(text, []);
  return new BlockSnapshot(style, list, text);
}

/**
 * The snapshot after edits that all apply to the same text; it equals a read of the edited text from nothing, and keeps
 * the very entries of blocks whose text stays, also where they move. Work is in proportion to the edited blocks.
 *
 * @param snapshot one that this module has made
 * @param edits in any order; of two that overlap the later one is dropped
 */
export function editSnapshot(snapshot: Snapshot, edits: readonly TextEdit[]): Snapshot {
  if (!(snapshot instanceof BlockSnapshot)) throw new TypeError('Not a snapshot of readSnapshot or editSnapshot');
  const ordered = orderedEdits(edits, snapshot.length);
  if (ordered.length === 0) return snapshot;
  const { style, list } = editBlocks(snapshot, ordered);
  return new BlockSnapshot(style, list, undefined);
}
