import { nearest } from '../quantity/spelling.ts';
import { MOST_COMPARED_NAMES } from './limits.ts';
import type { NameList } from './reader.ts';

/** Longer names are not looked for by their misspellings. */
const LONGEST_NAME = 64;

/**
 * The names of a long list by everything that is left of them when one letter is taken out, so that those within one
 * slip of a word are found without comparing it with all: a file may name thousands of sensors, and misspell them all.
 * Kept with the list, which never changes.
 */
const indexes = new WeakMap<NameList, ReadonlyMap<string, readonly string[]>>();

/** The name that a word most likely meant; among more than a few hundred, only one within a slip. */
export function nearestName(list: NameList, word: string): string | undefined {
  if (list.names.length <= MOST_COMPARED_NAMES) return nearest(word, list.names);
  if (word.length > LONGEST_NAME) return undefined;
  const index = indexOf(list);
  const candidates = new Set(withoutOneLetter(word).flatMap((rest) => index.get(rest) ?? []));
  return nearest(word, [...candidates].slice(0, MOST_COMPARED_NAMES));
}

function indexOf(list: NameList): ReadonlyMap<string, readonly string[]> {
  const known = indexes.get(list);
  if (known) return known;
  const index = new Map<string, string[]>();
  for (const name of list.names) {
    if (name.length > LONGEST_NAME) continue;
    for (const rest of withoutOneLetter(name)) {
      const names = index.get(rest);
      if (!names) index.set(rest, [name]);
      else if (names.length < MOST_COMPARED_NAMES) names.push(name);
    }
  }
  indexes.set(list, index);
  return index;
}

/** The word itself, and the word with each of its letters taken out, in lower case. */
function withoutOneLetter(word: string): readonly string[] {
  const lower = word.toLowerCase();
  return [lower, ...Array.from(lower, (_, at) => lower.slice(0, at) + lower.slice(at + 1))];
}
