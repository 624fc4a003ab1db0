import { type Block, lineStartsOf, type PlacedEntry } from './blocks-read.ts';
import type { Entry } from './entry.ts';
import { MOST_CHANNELS } from './limits.ts';
import type { Place, Position, PositionRange } from './place.ts';
import type { PlacedProblem } from './problem.ts';
import type { Snapshot } from './snapshot.ts';
import { lastNotAbove, positionIn } from './text-lines.ts';

/** The blocks of a document, and how it is written. */
export interface StyledBlocks {
  readonly style: 'block' | 'flow';
  readonly blocks: readonly Block[];
}

/** A list of blocks that answers for the whole text; tables are made when they are first asked for. */
export class BlockSnapshot implements Snapshot {
  readonly style: 'block' | 'flow';
  readonly blocks: readonly Block[];
  readonly length: number;
  readonly lineCount: number;
  #text: string | undefined;
  /** Offset and line of each block's start. */
  readonly #starts: Float64Array;
  readonly #lines: Float64Array;
  #contents: Contents | undefined;
  #blockOf: ReadonlyMap<Entry, Home> | undefined;

  /** @param text the blocks' texts joined, where that is at hand */
  constructor({ style, blocks }: StyledBlocks, text: string | undefined) {
    this.style = style;
    this.blocks = blocks;
    this.#text = text;
    this.#starts = new Float64Array(blocks.length);
    this.#lines = new Float64Array(blocks.length);
    let length = 0;
    let line = 0;
    for (let index = 0; index < blocks.length; index++) {
      const block = blocks[index]!;
      this.#starts[index] = length;
      this.#lines[index] = line;
      length += block.text.length;
      line += block.lineEnds;
    }
    this.length = length;
    this.lineCount = line + 1;
  }

  get entries(): readonly Entry[] {
    return this.#allContents().entries;
  }

  get problems(): readonly PlacedProblem[] {
    return this.#allContents().problems;
  }

  text(): string {
    this.#text ??= this.blocks.map(({ text }) => text).join('');
    return this.#text;
  }

  sliceText(start: number, end: number): string {
    if (this.#text !== undefined) return this.#text.slice(Math.max(0, start), Math.max(0, end));
    let slice = '';
    for (let index = Math.max(0, this.indexAt(start)); index < this.blocks.length; index++) {
      const offset = this.#starts[index]!;
      if (offset >= end) break;
      slice += this.blocks[index]!.text.slice(Math.max(0, start - offset), Math.max(0, end - offset));
    }
    return slice;
  }

  offsetAt({ line, character }: Position): number {
    if (line < 0 || this.blocks.length === 0) return 0;
    if (line >= this.lineCount) return this.length;
    let index = lastNotAbove(this.#lines, line);
    while (index > 0 && this.#lines[index] === line && this.#lines[index - 1] === line) index--;
    const block = this.blocks[index]!;
    const starts = lineStartsOf(block);
    const within = line - this.#lines[index]!;
    const start = starts[within]!;
    const next = starts[within + 1];
    const end = next === undefined ? block.text.length : next - lineEndLength(block.text, next);
    return this.#starts[index]! + Math.max(start, Math.min(start + character, end));
  }

  positionAt(offset: number): Position {
    const index = this.indexAt(offset);
    if (index < 0) return { line: 0, character: 0 };
    const block = this.blocks[index]!;
    const within = Math.max(0, Math.min(offset - this.#starts[index]!, block.text.length));
    const { line, character } = positionIn(lineStartsOf(block), within);
    return { line: this.#lines[index]! + line, character };
  }

  startOf(entry: Entry): number | undefined {
    const home = this.#homeOf(entry);
    return home && this.#starts[home.block]! + home.start;
  }

  rangeOf({ entry, start, end }: Place): PositionRange {
    const offset = this.startOf(entry);
    if (offset === undefined) return { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } };
    return { start: this.positionAt(offset + start), end: this.positionAt(offset + end) };
  }

  entryAt(offset: number): Entry | undefined {
    const index = this.indexAt(offset);
    const block = this.blocks[index];
    if (!block) return undefined;
    const within = offset - this.#starts[index]!;
    let found: PlacedEntry | undefined;
    for (const placed of block.entries) {
      if (placed.start > within) break;
      if (within <= placed.start + placed.entry.text.length) found = placed;
    }
    return found?.entry;
  }

  /** The index of the block that holds an offset; the last block holds the end of the text. */
  indexAt(offset: number): number {
    return this.blocks.length === 0 ? -1 : Math.max(0, lastNotAbove(this.#starts, offset));
  }

  /** The offset of a block; of the end of the text for the index after the last. */
  startOfBlock(index: number): number {
    return this.#starts[index] ?? this.length;
  }

  #homeOf(entry: Entry): Home | undefined {
    this.#blockOf ??= homesOf(this.blocks);
    return this.#blockOf.get(entry);
  }

  #allContents(): Contents {
    this.#contents ??= contentsOf(this.blocks);
    return this.#contents;
  }
}

interface Home {
  readonly block: number;
  readonly start: number;
}

interface Contents {
  readonly entries: readonly Entry[];
  readonly problems: readonly PlacedProblem[];
}

function homesOf(blocks: readonly Block[]): ReadonlyMap<Entry, Home> {
  const homes = new Map<Entry, Home>();
  blocks.forEach((block, index) => {
    for (const { entry, start } of block.entries) homes.set(entry, { block: index, start });
    for (const { place } of block.problems) homes.set(place.entry, { block: index, start: 0 });
  });
  return homes;
}

function contentsOf(blocks: readonly Block[]): Contents {
  const entries: Entry[] = [];
  const problems: PlacedProblem[] = [];
  const last = blocks.length - 1;
  let channels = 0;
  blocks.forEach((block, index) => {
    const isEnd = block.kind === 'marker' && index === last && block.text.startsWith('...');
    if (!isEnd) problems.push(...block.problems);
    for (const { entry } of block.entries) {
      if (entry.section === 'channels') channels++;
      if (entry.section !== 'channels' || channels <= MOST_CHANNELS) entries.push(entry);
      else if (channels === MOST_CHANNELS + 1) problems.push(tooManyChannels(entry));
    }
  });
  return { entries, problems };
}

function tooManyChannels(entry: Entry): PlacedProblem {
  const start = entry.key?.start ?? 0;
  const end = entry.key?.end ?? 0;
  const message = `A file may have ${MOST_CHANNELS.toLocaleString('en')} channels: this one and those after it are not checked.`;
  return { problem: { name: 'too-much', start, end, message }, place: { entry, start, end }, related: [] };
}

/** The length of the line end that stands before an offset. */
function lineEndLength(text: string, offset: number): number {
  return text[offset - 1] === '\n' && text[offset - 2] === '\r' ? 2 : 1;
}
