import type { TextEdit } from '../rig/snapshot.ts';
import { orderedEdits } from '../rig/text-edit.ts';

/** A stretch of the original text that is still there, or text that an edit has put in. */
type Piece = { readonly start: number; readonly end: number } | { readonly text: string };

/** What a text that has been edited several times is made of; its pieces, one after the other, are the text. */
export type EditHistory = readonly Piece[];

export function unedited(length: number): EditHistory {
  return length > 0 ? [{ start: 0, end: length }] : [];
}

/** The pieces after more edits; the edits count in the text as the pieces give it. */
export function editedFurther(history: EditHistory, edits: readonly TextEdit[]): EditHistory {
  const length = history.reduce((sum, piece) => sum + lengthOf(piece), 0);
  const result: Piece[] = [];
  let index = 0;
  let pieceStart = 0;
  /** Takes over, or drops, what stands from `from` to `to`. */
  const pass = (from: number, to: number, keep: boolean): void => {
    while (index < history.length) {
      const piece = history[index] as Piece;
      const pieceEnd = pieceStart + lengthOf(piece);
      const start = Math.max(from, pieceStart);
      const end = Math.min(to, pieceEnd);
      if (keep && start < end) result.push(part(piece, start - pieceStart, end - pieceStart));
      if (pieceEnd > to) return;
      index++;
      pieceStart = pieceEnd;
    }
  };
  let at = 0;
  for (const { start, end, text } of orderedEdits(edits, length)) {
    pass(at, start, true);
    if (text !== '') result.push({ text });
    pass(start, end, false);
    at = end;
  }
  pass(at, length, true);
  return result;
}

/** The edits of the original text that lead to what the pieces give. */
export function editsOf(history: EditHistory, length: number): readonly TextEdit[] {
  const edits: TextEdit[] = [];
  let at = 0;
  let text = '';
  const close = (next: number): void => {
    if (next > at || text !== '') edits.push({ start: at, end: next, text });
    text = '';
  };
  for (const piece of history) {
    if ('text' in piece) {
      text += piece.text;
      continue;
    }
    close(piece.start);
    at = piece.end;
  }
  close(length);
  return edits;
}

function lengthOf(piece: Piece): number {
  return 'text' in piece ? piece.text.length : piece.end - piece.start;
}

function part(piece: Piece, from: number, to: number): Piece {
  if ('text' in piece) return { text: piece.text.slice(from, to) };
  return { start: piece.start + from, end: piece.start + to };
}
