import type { Position, TextEdit } from 'vscode-languageserver-types';

/** What a client does with positions and edits; kept apart from the server's own way of doing it. */
export const TextDocument = {
  /** The position of an offset; lines end at `\n`, `\r\n` or `\r`, as the protocol has it. */
  position(text: string, offset: number): Position {
    const lines = text.slice(0, offset).split(/\r\n|\n|\r(?!\n)/);
    return { line: lines.length - 1, character: lines.at(-1)!.length };
  },

  offset(text: string, { line, character }: Position): number {
    let at = 0;
    for (let count = 0; count < line; count++) {
      const rest = /\r\n|\n|\r/.exec(text.slice(at));
      if (!rest) return text.length;
      at += rest.index + rest[0].length;
    }
    return at + character;
  },

  /** The text after edits that all apply to it as it stands. */
  applied(text: string, edits: readonly TextEdit[]): string {
    return [...edits]
      .map(({ range, newText }) => ({
        start: TextDocument.offset(text, range.start),
        end: TextDocument.offset(text, range.end),
        newText,
      }))
      .sort((a, b) => b.start - a.start)
      .reduce((current, { start, end, newText }) => current.slice(0, start) + newText + current.slice(end), text);
  },
};
