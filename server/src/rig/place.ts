import type { Entry } from './entry.ts';

/**
 * A stretch of an entry's text. It stays true through edits that leave the entry alone. An entry is part of one file:
 * that or, with `uses`, another one, which whoever knows the files can tell by the entry.
 */
export interface Place {
  readonly entry: Entry;
  readonly start: number;
  readonly end: number;
}

/** A line and a character (UTF-16), both from 0, as the language-server protocol counts them. */
export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface PositionRange {
  readonly start: Position;
  readonly end: Position;
}
