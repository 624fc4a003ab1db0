import { lineStartsOf, type PlacedEntry } from './blocks-read.ts';
import type { Entry } from './entry.ts';
import type { Place, Position, PositionRange } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { type BlockList, withinLimit } from './snapshot-list.ts';
import { positionIn } from './text-lines.ts';

const START: PositionRange = { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } };

/** A list of blocks that answers for the whole text. */
export class BlockSnapshot {
  readonly style: 'block' | 'flow';
  readonly list: BlockList;
  readonly entries: readonly Entry[];
  readonly problems: readonly PlacedProblem[];
  readonly length: number;
  readonly lineCount: number;
  #text: string | undefined;

  /** @param text the blocks' texts joined, where that is at hand */
  constructor(style: 'block' | 'flow', list: BlockList, text: string | undefined) {
    const { entries, problems } = withinLimit(list);
    this.style = style;
    this.list = list;
    this.entries = entries;
    this.problems = problems;
    this.length = list.length;
    this.lineCount = list.lineEnds + 1;
    this.#text = text;
  }

  text(): string {
    this.#text ??= this.list.blocks.map(({ text }) => text).join('');
    return this.#text;
  }

  sliceText(start: number, end: number): string {
    const from = Math.max(0, start);
    if (this.#text !== undefined) return this.#text.slice(from, Math.max(from, end));
    const pieces: string[] = [];
    const { blocks } = this.list;
    for (let index = Math.max(0, this.list.indexAt(from)); index < blocks.length; index++) {
      const offset = this.list.startOf(index);
      if (offset >= end) break;
      pieces.push(blocks[index]!.text.slice(Math.max(0, from - offset), end - offset));
    }
    return pieces.join('');
  }

  offsetAt({ line, character }: Position): number {
    if (line < 0) return 0;
    if (line >= this.lineCount) return this.length;
    const index = this.list.indexAtLine(line);
    const block = this.list.blocks[index];
    if (!block) return 0;
    const starts = lineStartsOf(block);
    const within = line - this.list.lineOf(index);
    const start = starts[within]!;
    const next = starts[within + 1];
    const end = next === undefined ? block.text.length : next - lineEndLength(block.text, next);
    return this.list.startOf(index) + Math.max(start, Math.min(start + character, end));
  }

  positionAt(offset: number): Position {
    const index = this.list.indexAt(offset);
    const block = this.list.blocks[index];
    if (!block) return START.start;
    const within = Math.max(0, Math.min(offset - this.list.startOf(index), block.text.length));
    const { line, character } = positionIn(lineStartsOf(block), within);
    return { line: this.list.lineOf(index) + line, character };
  }

  startOf(entry: Entry): number | undefined {
    return this.list.startOfEntry(entry);
  }

  rangeOf({ entry, start, end }: Place): PositionRange {
    const offset = this.startOf(entry);
    if (offset === undefined) return START;
    return { start: this.positionAt(offset + start), end: this.positionAt(offset + end) };
  }

  entryAt(offset: number): Entry | undefined {
    const index = this.list.indexAt(offset);
    const block = this.list.blocks[index];
    return block && innermost(block.entries, offset - this.list.startOf(index));
  }
}

/** Of entries in the order of their starts, the last one that holds an offset: the head of a section holds its entries. */
function innermost(entries: readonly PlacedEntry[], offset: number): Entry | undefined {
  let low = 0;
  let high = entries.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (entries[middle]!.start <= offset) low = middle + 1;
    else high = middle;
  }
  for (let index = low - 1; index >= 0; index--) {
    const { entry, start } = entries[index]!;
    if (offset <= start + entry.text.length) return entry;
  }
  return undefined;
}

/** The length of the line end that stands before an offset. */
function lineEndLength(text: string, offset: number): number {
  return text[offset - 1] === '\n' && text[offset - 2] === '\r' ? 2 : 1;
}
