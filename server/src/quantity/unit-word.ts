import { isDigit } from './written-number.ts';

const LONGEST_OWN_UNIT = 16;
const POINT = 46;
const BEYOND_ASCII = /[\p{L}°√²³·℃]/u;
/** An own unit: `lux`, `%RH`, `L/min`, `kg.m2`. */
const OWN_UNIT = /^[\p{L}%°][\p{L}\d%°²³·/^.]*$/u;

function isLetter(code: number): boolean {
  return (code >= 97 && code <= 122) || (code >= 65 && code <= 90);
}

function beginsUnit(text: string, at: number): boolean {
  const code = text.charCodeAt(at);
  return isLetter(code) || code === 37 /* % */ || (code > 127 && BEYOND_ASCII.test(text.charAt(at)));
}

/** Inside a unit: digits, `/`, `^`, brackets, and a point that something follows (two points are a range). */
function continuesUnit(text: string, at: number): boolean {
  const code = text.charCodeAt(at);
  if (isDigit(code) || code === 47 /* / */ || code === 94 /* ^ */ || code === 40 || code === 41) return true;
  return code === POINT && beginsUnit(text, at + 1);
}

/** The end of the unit word that starts at `at`; `at` itself where none does. */
export function scanUnitWord(text: string, at: number): number {
  if (!beginsUnit(text, at)) return at;
  let end = at + 1;
  while (isLetter(text.charCodeAt(end))) end += 1;
  while (end < text.length && (beginsUnit(text, end) || continuesUnit(text, end))) end += 1;
  return end;
}

/** Whether a word may be somebody's own unit: made of what units are made of, and at most 16 characters long. */
export function looksLikeUnit(word: string): boolean {
  return word.length <= LONGEST_OWN_UNIT && OWN_UNIT.test(word) && !/[./^·]$/.test(word);
}
