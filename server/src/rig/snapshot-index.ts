import type { Entry } from './entry.ts';

/** From this many entries on between the unchanged ends, a new table is worth its making. */
const MOST_SEARCHED = 256;

/** Entries by their index. The table of a long list is made once, when it is first needed, and shared by later lists. */
class IndexTable {
  readonly entries: readonly Entry[];
  #indices: ReadonlyMap<Entry, number> | undefined;

  constructor(entries: readonly Entry[]) {
    this.entries = entries;
  }

  indexOf(entry: Entry): number {
    this.#indices ??= new Map(this.entries.map((each, index) => [each, index]));
    return this.#indices.get(entry) ?? -1;
  }
}

/**
 * Finds where entries stand in a list. The list differs from that of an earlier snapshot only between two unchanged
 * ends, so that the earlier one's table still serves for these, and an edit costs no new table.
 */
export class EntryIndex {
  readonly #entries: readonly Entry[];
  readonly #table: IndexTable;
  /** So many entries at the start are those of the table. */
  readonly #head: number;
  /** And so many at the end. */
  readonly #tail: number;

  private constructor(entries: readonly Entry[], table: IndexTable, head: number, tail: number) {
    this.#entries = entries;
    this.#table = table;
    this.#head = head;
    this.#tail = tail;
  }

  static of(entries: readonly Entry[]): EntryIndex {
    return new EntryIndex(entries, new IndexTable(entries), entries.length, 0);
  }

  /** The index of a list that has the first `head` and the last `tail` entries in common with this one's. */
  edited(entries: readonly Entry[], head: number, tail: number): EntryIndex {
    const sharedHead = Math.min(this.#head, head);
    // As long as the list is the table's own, all of its end is the table's too.
    const isWhole = this.#head === this.#table.entries.length && this.#head === this.#entries.length;
    const sharedTail = isWhole ? tail : Math.min(this.#tail, tail);
    if (entries.length - sharedHead - sharedTail > MOST_SEARCHED) return EntryIndex.of(entries);
    return new EntryIndex(entries, this.#table, sharedHead, sharedTail);
  }

  /** -1 for an entry that is not in the list. */
  indexOf(entry: Entry): number {
    const known = this.#table.indexOf(entry);
    if (known >= 0 && known < this.#head) return known;
    const fromEnd = this.#table.entries.length - known;
    if (known >= 0 && fromEnd <= this.#tail) return this.#entries.length - fromEnd;
    const end = this.#entries.length - this.#tail;
    for (let index = this.#head; index < end; index++) {
      if (this.#entries[index] === entry) return index;
    }
    return -1;
  }
}
