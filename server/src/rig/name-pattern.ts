/** A piece of a name that may stand for several. */
export type NamePart = { readonly kind: 'text'; readonly text: string } | BraceRange;

/** `{01..64}` as it stands in a name. */
export interface BraceRange {
  readonly kind: 'numbers';
  readonly low: number;
  readonly high: number;
  /** Every number has at least so many digits: 0 where neither end is written with a leading zero. */
  readonly width: number;
  /** Offsets in the name, braces included. */
  readonly start: number;
  readonly end: number;
}

const BRACES = /\{(\d+)\.\.(\d+)\}/g;

/** Numbers of more digits are not told apart. */
const MOST_DIGITS = 15;

/** The parts of a name; a name without ranges is one text. Leading zeros keep their width, as in a shell. */
export function namePartsOf(name: string): readonly NamePart[] {
  const parts: NamePart[] = [];
  let at = 0;
  for (const match of name.matchAll(BRACES)) {
    const [text, first = '', last = ''] = match;
    if (match.index > at) parts.push({ kind: 'text', text: name.slice(at, match.index) });
    const isPadded = (digits: string): boolean => digits.length > 1 && digits.startsWith('0');
    const width = isPadded(first) || isPadded(last) ? Math.max(first.length, last.length) : 0;
    at = match.index + text.length;
    parts.push({ kind: 'numbers', low: numberOf(first), high: numberOf(last), width, start: match.index, end: at });
  }
  if (at < name.length || parts.length === 0) parts.push({ kind: 'text', text: name.slice(at) });
  return parts;
}

/** `Infinity` for a number of too many digits, zeros among them: no name is that long. */
function numberOf(digits: string): number {
  return digits.length > MOST_DIGITS ? Infinity : Number(digits);
}

/** How many numbers a range stands for; 0 or less where it is upside down, `Infinity` where that can't be counted. */
export function sizeOf({ low, high }: BraceRange): number {
  return low === Infinity || high === Infinity ? Infinity : high - low + 1;
}

/** Every name that the parts stand for, the last range counting fastest. */
export function namesOf(parts: readonly NamePart[]): readonly string[] {
  let names: readonly string[] = [''];
  for (const part of parts) {
    const endings = part.kind === 'numbers' ? numbersOf(part) : [part.text];
    names = names.flatMap((name) => endings.map((ending) => name + ending));
  }
  return names;
}

function numbersOf({ low, high, width }: BraceRange): readonly string[] {
  return Array.from({ length: high - low + 1 }, (_, index) => String(low + index).padStart(width, '0'));
}
