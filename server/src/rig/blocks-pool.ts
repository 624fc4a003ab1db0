import type { BlockKind, SplitState } from './blocks.ts';
import { type Block, type PlacedEntry, readBlock } from './blocks-read.ts';
import type { Entry } from './entry.ts';
import type { Problem } from './problem.ts';
import { isSameTree } from './tree-comparison.ts';

/** Blocks that have been read before: a text that is met again is not read again, and keeps its entries. */
export class BlockPool {
  readonly #blocks = new Map<string, Block[]>();
  readonly #entries = new Map<string, Entry[]>();
  /** An entry stands in one place: what has been taken alone can't be taken again with its block, nor the other way. */
  readonly #taken = new Set<Entry>();

  /** @param blocks in document order: of equal ones the first is taken first */
  constructor(blocks: readonly Block[]) {
    for (let index = blocks.length - 1; index >= 0; index--) {
      const block = blocks[index]!;
      push(this.#blocks, block.text, block);
      if (block.entries.length < 2) continue;
      for (let at = block.entries.length - 1; at >= 0; at--) {
        const { entry } = block.entries[at]!;
        push(this.#entries, entryKey(entry), entry);
      }
    }
  }

  /** The block of a text, taken from the pool or read. */
  read(kind: BlockKind, text: string, before: SplitState): Block {
    const known = this.#blocks.get(text);
    const last = known?.at(-1);
    if (known && last && last.kind === kind && last.before.section === before.section && this.#take(last.entries)) {
      known.pop();
      return last.before.indent === before.indent ? last : { ...last, before };
    }
    const block = readBlock(kind, text, before);
    if (block.entries.length < 2 || this.#entries.size === 0) return block;
    return { ...block, entries: block.entries.map((placed) => this.#known(placed)) };
  }

  #known(placed: PlacedEntry): PlacedEntry {
    const known = this.#entries.get(entryKey(placed.entry));
    const last = known?.at(-1);
    if (!known || !last || !isAlike(last, placed.entry)) return placed;
    known.pop();
    const taken = { entry: last, start: placed.start };
    return this.#take([taken]) ? taken : placed;
  }

  #take(placed: readonly PlacedEntry[]): boolean {
    if (placed.some(({ entry }) => this.#taken.has(entry))) return false;
    for (const { entry } of placed) this.#taken.add(entry);
    return true;
  }
}

function push<T>(lists: Map<string, T[]>, key: string, value: T): void {
  const list = lists.get(key);
  if (list) list.push(value);
  else lists.set(key, [value]);
}

function entryKey({ section, text }: Entry): string {
  return `${section ?? ''}\n${text}`;
}

/** Of one text two entries can differ only where a broken text around them is read differently. */
function isAlike(a: Entry, b: Entry): boolean {
  return (
    isSameTree(a.key, b.key) &&
    isSameTree(a.value, b.value) &&
    a.problems.length === b.problems.length &&
    a.problems.every((problem, index) => isSameProblem(problem, b.problems[index]!))
  );
}

function isSameProblem(a: Problem, b: Problem): boolean {
  return a.name === b.name && a.start === b.start && a.end === b.end && a.message === b.message;
}
