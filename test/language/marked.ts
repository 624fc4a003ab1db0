/** The mark that stands for the cursor in fixtures: a sign that no rig file has. */
const MARK = '▮';

/** A text and a place in it. */
export interface Marked {
  readonly text: string;
  readonly offset: number;
  readonly position: { readonly line: number; readonly character: number };
}

/** A text with a cursor mark, as the text without it and the cursor's place. */
export function marked(fixture: string): Marked {
  const offset = fixture.indexOf(MARK);
  if (offset < 0 || fixture.indexOf(MARK, offset + 1) >= 0) throw new Error('A fixture has one cursor mark.');
  const before = fixture.slice(0, offset);
  const lines = before.split('\n');
  return {
    text: before + fixture.slice(offset + MARK.length),
    offset,
    position: { line: lines.length - 1, character: lines.at(-1)!.length },
  };
}

/** A text with the cursor where `piece`, which it holds once, has its mark: `rate: ▮25.6 kHz`. */
export function markedAt(text: string, piece: string): string {
  const plain = piece.replace(MARK, '');
  const at = text.indexOf(plain);
  if (at < 0 || text.indexOf(plain, at + 1) >= 0) throw new Error(`The text should hold "${plain}" once.`);
  return text.slice(0, at) + piece + text.slice(at + plain.length);
}
