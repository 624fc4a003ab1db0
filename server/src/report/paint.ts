/** How a stretch of text in a terminal is to be seen. */
export type Ink = 'error' | 'warning' | 'hint' | 'quiet' | 'strong';

/** Colours a stretch of text, or leaves it as it is. */
export type Paint = (text: string, ink: Ink) => string;

export const PLAIN: Paint = (text) => text;

const CODES: Readonly<Record<Ink, readonly [on: number, off: number]>> = {
  error: [31, 39],
  warning: [33, 39],
  hint: [36, 39],
  quiet: [2, 22],
  strong: [1, 22],
};

/** Colours by the escape sequences of ECMA-48. */
export const COLOURED: Paint = (text, ink) => `\u001b[${CODES[ink][0]}m${text}\u001b[${CODES[ink][1]}m`;
