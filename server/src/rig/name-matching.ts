import { channelNames } from './channel-range.ts';
import { MOST_PATTERN_CHARACTERS } from './limits.ts';
import { type NamePart, namePartsOf } from './name-pattern.ts';

/** What names are told by: text, brace ranges, and `*` for anything at all. */
export interface NamePattern {
  readonly text: string;
  /** `undefined` for a plain name, and for one so long that it is taken for one. */
  readonly parts: readonly PatternPart[] | undefined;
}

type PatternPart = NamePart | { readonly kind: 'any' };

const ANY: PatternPart = { kind: 'any' };
const SPECIAL = /\*|\{\d+\.\.\d+\}/;

/** Reads a pattern; every text is one. */
export function namePattern(text: string): NamePattern {
  if (text.length > MOST_PATTERN_CHARACTERS || !SPECIAL.test(text)) return { text, parts: undefined };
  const pieces = text.split(/\*+/);
  const parts = pieces.flatMap((piece, index): readonly PatternPart[] => {
    const own = piece === '' ? [] : namePartsOf(piece);
    return index === 0 ? own : [ANY, ...own];
  });
  return { text, parts };
}

/**
 * Whether a pattern takes in a channel: all that it stands for, where its name has a brace range, since what is said of
 * it is said of all of them.
 */
export function coversChannel(pattern: NamePattern, name: string): boolean {
  if (pattern.text === name) return true;
  const { parts } = pattern;
  if (!parts || name.length > MOST_PATTERN_CHARACTERS) return false;
  if (parts.length === 1 && parts[0] === ANY) return true;
  return channelNames(name).every((one) => matches(parts, one));
}

/** Follows all ways to read the name at once, so that time is in proportion to the pattern times the name. */
function matches(parts: readonly PatternPart[], name: string): boolean {
  let reached: ReadonlySet<number> = new Set([0]);
  for (const part of parts) {
    const next = new Set<number>();
    for (const at of reached) for (const end of endsOf(part, name, at)) next.add(end);
    if (next.size === 0) return false;
    reached = next;
  }
  return reached.has(name.length);
}

/** Where a part that begins at an offset of a name may end. */
function endsOf(part: PatternPart, name: string, at: number): readonly number[] {
  switch (part.kind) {
    case 'text':
      return name.startsWith(part.text, at) ? [at + part.text.length] : [];
    case 'any':
      return Array.from({ length: name.length - at + 1 }, (_, more) => at + more);
    case 'numbers': {
      const digits = /^\d{0,15}/.exec(name.slice(at, at + 15))![0];
      const ends: number[] = [];
      for (let length = 1; length <= digits.length; length++) {
        const written = digits.slice(0, length);
        const number = Number(written);
        const isWithin = number >= part.low && number <= part.high;
        if (isWithin && String(number).padStart(part.width, '0') === written) ends.push(at + length);
      }
      return ends;
    }
  }
}
