import type { Block } from './blocks-read.ts';
import type { Entry } from './entry.ts';
import { tooManyChannels } from './entry-problems.ts';
import { MOST_CHANNELS } from './limits.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { EntryIndex } from './snapshot-index.ts';
import { lastNotAbove } from './text-lines.ts';

/**
 * The blocks of a document with running sums over them, so that an offset, a line or an entry is found without looking
 * at every block. A value: {@link BlockList.spliced} makes a new one, at the cost of copying arrays of numbers.
 */
export class BlockList {
  readonly blocks: readonly Block[];
  /** All entries of all blocks, those past the limit of channels too. */
  readonly entries: readonly Entry[];
  /** The number of channels among them. */
  readonly channels: number;
  /** The indices of the blocks that are problems of the document, ascending. */
  readonly #troubled: readonly number[];
  /** For each block, and after the last: characters, line ends and entries ahead of it. */
  readonly #sums: BlockSums;
  readonly #index: EntryIndex;

  private constructor(blocks: readonly Block[], contents: BlockContents, sums: BlockSums, index: EntryIndex) {
    this.blocks = blocks;
    this.entries = contents.entries;
    this.channels = contents.channels;
    this.#troubled = contents.troubled;
    this.#sums = sums;
    this.#index = index;
  }

  static of(blocks: readonly Block[]): BlockList {
    const contents = contentsOf(blocks);
    return new BlockList(blocks, contents, sumsOf(blocks), EntryIndex.of(contents.entries));
  }

  /** The list with `fresh` in place of the blocks from `from` up to `to`. */
  spliced(from: number, to: number, fresh: readonly Block[]): BlockList {
    const old = this.#sums.entries;
    const removed = contentsOf(this.blocks.slice(from, to));
    const added = contentsOf(fresh);
    const contents: BlockContents = {
      entries: replaced(this.entries, old[from]!, old[to]!, added.entries),
      channels: this.channels - removed.channels + added.channels,
      troubled: [
        ...this.#troubled.filter((index) => index < from),
        ...added.troubled.map((index) => index + from),
        ...this.#troubled.filter((index) => index >= to).map((index) => index + fresh.length - (to - from)),
      ],
    };
    const sums: BlockSums = {
      characters: splicedSums(this.#sums.characters, from, to, fresh, charactersOf),
      lineEnds: splicedSums(this.#sums.lineEnds, from, to, fresh, lineEndsOf),
      entries: splicedSums(old, from, to, fresh, entriesOf),
    };
    const index = this.#index.edited(contents.entries, old[from]!, this.entries.length - old[to]!);
    return new BlockList(replaced(this.blocks, from, to, fresh), contents, sums, index);
  }

  get length(): number {
    return this.startOf(this.blocks.length);
  }

  get lineEnds(): number {
    return this.lineOf(this.blocks.length);
  }

  /** The offset of a block; of the end of the text for the index after the last. */
  startOf(index: number): number {
    return this.#sums.characters[index]!;
  }

  /** The line on which a block starts. */
  lineOf(index: number): number {
    return this.#sums.lineEnds[index]!;
  }

  /** The index of the block that holds an offset, -1 without blocks; the last block holds the end of the text. */
  indexAt(offset: number): number {
    const found = lastNotAbove(this.#sums.characters, Math.max(0, offset));
    return Math.min(found, this.blocks.length - 1);
  }

  /** The index of the block that holds a line, -1 without blocks. */
  indexAtLine(line: number): number {
    return Math.min(lastNotAbove(this.#sums.lineEnds, line), this.blocks.length - 1);
  }

  /** The offset of an entry, or of the text of a problem of the document; `undefined` for one of another document. */
  startOfEntry(entry: Entry): number | undefined {
    const index = this.#index.indexOf(entry);
    if (index >= 0) return this.#startOfIndexed(index);
    const home = this.#troubled.find((block) =>
      this.blocks[block]!.problems.some(({ place }) => place.entry === entry),
    );
    return home === undefined ? undefined : this.startOf(home);
  }

  /** The problems of the document. A `...` is one only where something follows it. */
  problems(): readonly PlacedProblem[] {
    const last = this.blocks.length - 1;
    return this.#troubled.flatMap((index) => {
      const { kind, text, problems } = this.blocks[index]!;
      return index === last && kind === 'marker' && text.startsWith('...') ? [] : problems;
    });
  }

  #startOfIndexed(index: number): number {
    const block = lastNotAbove(this.#sums.entries, index);
    const placed = this.blocks[block]!.entries[index - this.#sums.entries[block]!]!;
    return this.startOf(block) + placed.start;
  }
}

interface BlockContents {
  readonly entries: readonly Entry[];
  readonly channels: number;
  readonly troubled: readonly number[];
}

interface BlockSums {
  readonly characters: Int32Array;
  readonly lineEnds: Int32Array;
  readonly entries: Int32Array;
}

function contentsOf(blocks: readonly Block[]): BlockContents {
  const entries: Entry[] = [];
  const troubled: number[] = [];
  let channels = 0;
  for (let index = 0; index < blocks.length; index++) {
    const block = blocks[index]!;
    if (block.problems.length > 0) troubled.push(index);
    for (const { entry } of block.entries) {
      entries.push(entry);
      if (entry.section === 'channels') channels++;
    }
  }
  return { entries, channels, troubled };
}

function charactersOf({ text }: Block): number {
  return text.length;
}

function lineEndsOf({ lineEnds }: Block): number {
  return lineEnds;
}

function entriesOf({ entries }: Block): number {
  return entries.length;
}

function sumsOf(blocks: readonly Block[]): BlockSums {
  const none = new Int32Array(1);
  return {
    characters: splicedSums(none, 0, 0, blocks, charactersOf),
    lineEnds: splicedSums(none, 0, 0, blocks, lineEndsOf),
    entries: splicedSums(none, 0, 0, blocks, entriesOf),
  };
}

function splicedSums(
  old: Int32Array,
  from: number,
  to: number,
  fresh: readonly Block[],
  size: (block: Block) => number,
): Int32Array {
  const sums = new Int32Array(old.length - (to - from) + fresh.length);
  sums.set(old.subarray(0, from + 1));
  for (let index = 0; index < fresh.length; index++) sums[from + index + 1] = sums[from + index]! + size(fresh[index]!);
  const moved = from + fresh.length - to;
  const grown = sums[from + fresh.length]! - old[to]!;
  for (let index = to + 1; index < old.length; index++) sums[index + moved] = old[index]! + grown;
  return sums;
}

function replaced<T>(items: readonly T[], from: number, to: number, fresh: readonly T[]): readonly T[] {
  return items.slice(0, from).concat(fresh, items.slice(to));
}

/** The entries that are checked, and the problem of those past the limit. */
export function withinLimit(list: BlockList): {
  readonly entries: readonly Entry[];
  readonly problems: readonly PlacedProblem[];
} {
  if (list.channels <= MOST_CHANNELS) return { entries: list.entries, problems: list.problems() };
  const channels = list.entries.filter(({ section }) => section === 'channels');
  const beyond = new Set(channels.slice(MOST_CHANNELS));
  return {
    entries: list.entries.filter((entry) => !beyond.has(entry)),
    problems: [...list.problems(), tooManyChannels(channels[MOST_CHANNELS]!)],
  };
}
