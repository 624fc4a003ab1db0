import type { TextEdit as ProtocolTextEdit } from 'vscode-languageserver-types';
import type { Quote, TextStyle } from '../remedies/written-value.ts';
import { scalarText } from '../remedies/written-value.ts';
import type { Position } from '../rig/place.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import { protocolRange } from './convert.ts';
import type { Cursor } from './cursor-model.ts';

/** What a completion takes the place of, and how it is written there. */
export interface Slot {
  readonly range: ProtocolTextEdit['range'];
  /** The quote that has been opened ahead of the cursor. */
  readonly quote: Quote;
  readonly style: TextStyle;
  /** A colon stands there already. */
  readonly colonFollows: boolean;
}

/**
 * The slot at a cursor: the word that has been begun, and of a value what stands behind the cursor too. None where that
 * is more than a word: a map, a list, an alias.
 */
export function slotAt(snapshot: Snapshot, position: Position, cursor: Cursor): Slot | undefined {
  const offset = snapshot.offsetAt(position);
  const first = snapshot.sliceText(cursor.start, Math.min(offset, cursor.start + 1));
  const quote = first === '"' || first === "'" ? first : '';
  const lineEnd = snapshot.offsetAt({ line: position.line, character: Number.MAX_SAFE_INTEGER });
  const behind = snapshot.sliceText(offset, lineEnd);
  if (cursor.writes === 'value' && quote === '' && /^[{[&*!|>]/.test(behind)) return undefined;
  const length = lengthBehind(behind, cursor, quote);
  const isJson = snapshot.style === 'flow' && /"\s*:/.test(snapshot.sliceText(0, 2_000));
  return {
    range: protocolRange(snapshot, cursor.start, offset + length),
    quote,
    style: { json: isJson, flow: cursor.inFlow, lineEnd: '\n' },
    colonFollows: /^\s*:/.test(behind.slice(length)),
  };
}

/** A word as it is written in a slot. */
export function wordIn(slot: Slot, word: string): string {
  return scalarText(word, slot.style, slot.quote);
}

/** How many characters behind the cursor belong to the word that is replaced. */
function lengthBehind(behind: string, { writes, inFlow, prefix }: Cursor, quote: Quote): number {
  if (quote !== '') return /^[^"',{}[\]]*["']/.exec(behind)?.[0].length ?? 0;
  // A key in front of which another is begun stays.
  if (writes === 'key') return prefix === '' ? 0 : /^[\w.-]*/.exec(behind)![0].length;
  const value = inFlow ? /^[^,{}[\]]*/.exec(behind)![0] : behind;
  return value.replace(/(?:^|\s)#.*$/, '').trimEnd().length;
}
