/** Puts `text` in place of what stands from `start` to `end`; offsets in the whole text, before any edit. */
export interface TextEdit {
  readonly start: number;
  readonly end: number;
  readonly text: string;
}

/**
 * The edits in the order of the text, within its bounds. Edits that overlap an earlier one are dropped: they say two
 * things about one place.
 *
 * @param length the length of the text that they apply to
 */
export function orderedEdits(edits: readonly TextEdit[], length: number): readonly TextEdit[] {
  const clamped = edits.map(({ start, end, text }) => {
    const from = Math.max(0, Math.min(start, end, length));
    return { start: from, end: Math.max(from, Math.min(Math.max(start, end), length)), text };
  });
  clamped.sort((a, b) => a.start - b.start || a.end - b.end);
  let last = 0;
  return clamped.filter((edit) => {
    if (edit.start < last) return false;
    last = edit.end;
    return true;
  });
}

/** The text with all edits made; they may come in any order. */
export function applyTextEdits(text: string, edits: readonly TextEdit[]): string {
  let result = '';
  let last = 0;
  for (const { start, end, text: replacement } of orderedEdits(edits, text.length)) {
    result += text.slice(last, start) + replacement;
    last = end;
  }
  return result + text.slice(last);
}
