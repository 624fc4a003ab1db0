/** The checks of the document itself, which reading decides. */
export type ProblemName =
  | 'syntax'
  | 'unknown-key'
  | 'unknown-name'
  | 'duplicate-name'
  | 'missing-key'
  | 'wrong-kind'
  | 'unit-missing'
  | 'unit-mismatch'
  | 'out-of-range'
  | 'unused-name'
  | 'too-much'
  | 'not-computed';

/** What a remedy may do about a problem, decided where the problem is found. */
export type Cure =
  /** Put this text in place of the problem's own. */
  | { readonly kind: 'replace'; readonly text: string }
  /** Write this text after the problem's own. */
  | { readonly kind: 'append'; readonly text: string }
  /** Write this key into the map that the problem stands at; the value is left to fill in where none is given. */
  | { readonly kind: 'add-key'; readonly key: string; readonly value?: string };

/** Something about the text itself; positions are in the entry's own text. */
export interface Problem {
  readonly name: ProblemName;
  readonly start: number;
  readonly end: number;
  readonly message: string;
  /** What tells this problem from others of its name in one entry: the key, name or unit it is about. */
  readonly about?: string;
  /** Where it is no more than this, whatever its name usually is. */
  readonly severity?: 'hint';
  readonly cure?: Cure;
}
