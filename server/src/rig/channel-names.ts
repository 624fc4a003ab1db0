import { channelNames, channelRange } from './channel-range.ts';
import type { Entry } from './entry.ts';
import { duplicateName, overlappingName } from './entry-problems.ts';
import { MOST_CHANNELS } from './limits.ts';
import type { PlacedProblem } from './placed-problem.ts';

/** The names of an entry with a brace range, worked out once: they are asked for after every keystroke. */
const expanded = new WeakMap<Entry, readonly string[]>();

/** The entries of `channels` as they are met, in document order: which are read, and what is wrong with their names. */
export class ChannelNames {
  /** The entries that are read. */
  readonly entries: Entry[] = [];
  readonly problems: PlacedProblem[] = [];
  readonly #names = new Set<string>();
  /** The first entry of each name, of so many entries: worked out where a name is met again. */
  readonly #firsts = new Map<string, Entry>();
  #mapped = 0;
  #count = 0;
  /** The first entry past the limit. */
  #beyond: Entry | undefined;

  /** The first entry that no longer fits into the number of channels that a file may have: it and what follows is not read. */
  get beyond(): Entry | undefined {
    return this.#beyond;
  }

  /** Takes an entry with a key; false where it is not read, for all of its names are taken. */
  take(entry: Entry): boolean {
    if (this.#beyond) return true;
    const names = namesOf(entry);
    const size = names?.length ?? 1;
    if (this.#count + size > MOST_CHANNELS) {
      this.#beyond = entry;
      return true;
    }
    const isNew = names ? this.#takeAll(entry, names) : this.#takeOne(entry);
    if (!isNew) return false;
    this.#count += size;
    this.entries.push(entry);
    return true;
  }

  #takeOne(entry: Entry): boolean {
    const known = this.#names.size;
    this.#names.add(entry.name);
    if (this.#names.size > known) return true;
    this.problems.push(duplicateName(entry, 'channel', this.#firstOf(entry.name)));
    return false;
  }

  #takeAll(entry: Entry, names: readonly string[]): boolean {
    let taken = 0;
    let first: string | undefined;
    for (const name of names) {
      const known = this.#names.size;
      this.#names.add(name);
      if (this.#names.size > known) continue;
      taken++;
      first ??= name;
    }
    if (first === undefined) return true;
    const isRead = taken < names.length;
    this.problems.push(overlappingName(entry, first, taken, isRead, this.#firstOf(first)));
    return isRead;
  }

  #firstOf(name: string): Entry | undefined {
    for (; this.#mapped < this.entries.length; this.#mapped++) {
      const entry = this.entries[this.#mapped]!;
      for (const own of namesOf(entry) ?? [entry.name]) if (!this.#firsts.has(own)) this.#firsts.set(own, entry);
    }
    return this.#firsts.get(name);
  }
}

/** The names of the channels that an entry with a brace range stands for; `undefined` for a plain name. */
function namesOf(entry: Entry): readonly string[] | undefined {
  if (!entry.name.includes('{')) return undefined;
  const known = expanded.get(entry);
  if (known) return known;
  const names = channelRange(entry.name) && channelNames(entry.name);
  if (names) expanded.set(entry, names);
  return names;
}
