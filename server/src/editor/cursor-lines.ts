/** Lines looked at above or below the cursor: an entry of more lines than this is no longer completed in full. */
export const MOST_LINES_AWAY = 5_000;

const KEY_LINE =
  /^(\s*)((?:- +)*)(?:"((?:[^"\\]|\\.)*)"|'((?:[^']|'')*)'|([^\s#'"{[&*!|>%@`-][^#]*?|-[^\s][^#]*?))\s*:(?:\s+(.*))?$/;

/** One line of a text in block style, or the beginning of one. */
export interface Line {
  /** Nothing, or a comment alone. */
  readonly isBlank: boolean;
  readonly indent: number;
  /** Columns of the dashes of list items that the line begins with. */
  readonly dashes: readonly number[];
  readonly key: string | undefined;
  /** Column of the key, behind any dashes. */
  readonly keyColumn: number;
  readonly value: string;
  readonly valueColumn: number;
}

export function readLine(raw: string): Line {
  const text = raw.replace(/\r$/, '');
  const dashes: number[] = [];
  let column = text.search(/\S|$/);
  while (/^-(?:\s|$)/.test(text.slice(column))) {
    dashes.push(column);
    column += 1 + text.slice(column + 1).search(/\S|$/);
  }
  const match = KEY_LINE.exec(text);
  const key = match && (match[3] ?? match[4] ?? match[5]);
  const value = match?.[6] ?? '';
  return {
    isBlank: /^\s*(?:#|$)/.test(text),
    indent: text.search(/\S|$/),
    dashes,
    key: key ?? undefined,
    keyColumn: column,
    value: value.replace(/(?:^|\s)#.*$/, '').trim(),
    valueColumn: match ? text.length - value.length : text.length,
  };
}

/** `lastIndexOf` takes a negative start for 0: the first line has to be told apart. */
export function lineStartAt(text: string, offset: number): number {
  return offset <= 0 ? 0 : text.lastIndexOf('\n', offset - 1) + 1;
}

/** Quoted stretches as blanks, so that brackets and hashes in them do not count. */
export function withoutQuotes(text: string): string {
  return text.replaceAll(/"(?:[^"\\\n]|\\.)*"|(?<=[\s:,[{])'(?:[^'\n]|'')*'/g, (run) => ' '.repeat(run.length));
}

/** What has been written of a scalar, without the quote it begins with. */
export function unquoted(text: string): string {
  return text.replace(/^["']/, '');
}
