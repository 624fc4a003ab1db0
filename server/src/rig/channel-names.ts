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
    const range = channelRange(entry.name);
    const size = range?.count ?? 1;
    if (this.#count + size > MOST_CHANNELS) {
      this.#beyond = entry;
      return true;
    }
    const isNew = range ? this.#takeAll(entry) : this.#takeOne(entry);
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

  #takeAll(entry: Entry): boolean {
    const own = namesOf(entry);
    const taken = own.filter((name) => this.#names.has(name));
    for (const name of own) this.#names.add(name);
    const [first] = taken;
    if (first === undefined) return true;
    const isRead = taken.length < own.length;
    this.problems.push(overlappingName(entry, first, taken.length, isRead, this.#firstOf(first)));
    return isRead;
  }

  #firstOf(name: string): Entry | undefined {
    for (; this.#mapped < this.entries.length; this.#mapped++) {
      const entry = this.entries[this.#mapped]!;
      for (const own of namesOf(entry)) if (!this.#firsts.has(own)) this.#firsts.set(own, entry);
    }
    return this.#firsts.get(name);
  }
}

function namesOf(entry: Entry): readonly string[] {
  if (!channelRange(entry.name)) return [entry.name];
  let names = expanded.get(entry);
  if (!names) {
    names = channelNames(entry.name);
    expanded.set(entry, names);
  }
  return names;
}
