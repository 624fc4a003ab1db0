import { type SplitState, type Stretch, splitBlocks, styleOf, TOP } from './blocks.ts';
import { BlockPool } from './blocks-pool.ts';
import { type Block, placeholder, readBlock } from './blocks-read.ts';
import { MOST_CHARACTERS } from './limits.ts';
import { BlockList } from './snapshot-list.ts';
import { applyTextEdits, type TextEdit } from './text-edit.ts';

/** The blocks of a document, and how it is written. */
export interface StyledBlocks {
  readonly style: 'block' | 'flow';
  readonly list: BlockList;
}

/** What is known of a document before an edit. */
interface EditedDocument extends StyledBlocks {
  text(): string;
}

/**
 * Reads a text from nothing.
 *
 * @param old blocks that are taken over where the text has them again
 */
export function readBlocks(text: string, old: readonly Block[]): StyledBlocks {
  const pool = new BlockPool(old);
  if (styleOf(text) === 'flow') {
    const isTooLong = text.length > MOST_CHARACTERS;
    return { style: 'flow', list: BlockList.of([isTooLong ? unreadBlock(text) : pool.read('whole', text, TOP)]) };
  }
  const blocks: Block[] = [];
  for (const { kind, start, end, before } of splitBlocks(text, TOP, true)) {
    if (end > MOST_CHARACTERS) {
      blocks.push(unreadBlock(text.slice(start)));
      break;
    }
    blocks.push(pool.read(kind, text.slice(start, end), before));
  }
  return { style: 'block', list: BlockList.of(blocks) };
}

/**
 * The blocks after edits. Only the stretch from the block ahead of the first edit to the first old block start after
 * the last one that is met again in the same state is split and read anew.
 *
 * @param edits in order, within the text, at least one
 */
export function editBlocks(old: EditedDocument, edits: readonly TextEdit[]): StyledBlocks {
  const { list } = old;
  const growth = edits.reduce((sum, { start, end, text }) => sum + text.length - (end - start), 0);
  const isTooLong = Math.max(list.length, list.length + growth) > MOST_CHARACTERS;
  const from = Math.max(0, list.indexAt(edits[0]!.start) - 1);
  const touched = list.indexAt(edits.at(-1)!.end) + 1;
  const readAll = (): StyledBlocks => readBlocks(applyTextEdits(old.text(), edits), list.blocks);
  if (old.style === 'flow' || isTooLong) return readAll();

  for (let more = 1; ; more *= 4) {
    const to = Math.min(list.blocks.length, touched + more);
    const stretch = editedStretch(list, from, to, edits, growth);
    if (from === 0 && styleOf(stretch.text) !== 'block') return readAll();
    const meeting = meetingPoint(list, from, stretch);
    if (!meeting && to < list.blocks.length) continue;
    const { splits, next } = meeting ?? { splits: stretch.splits, next: list.blocks.length };
    const pool = new BlockPool(list.blocks.slice(from, next));
    const fresh = splits.map(({ kind, start, end, before }) => pool.read(kind, stretch.text.slice(start, end), before));
    return { style: 'block', list: list.spliced(from, next, fresh) };
  }
}

interface EditedStretch {
  readonly text: string;
  readonly splits: readonly Stretch[];
  /** The offset, in this text, from which on it is as it was. */
  readonly unchangedFrom: number;
  /** What to add to an offset in this text to get the one in the old document. */
  readonly toOld: number;
}

function editedStretch(
  old: BlockList,
  from: number,
  to: number,
  edits: readonly TextEdit[],
  growth: number,
): EditedStretch {
  const offset = old.startOf(from);
  const before: SplitState = from === 0 ? TOP : old.blocks[from]!.before;
  const moved = edits.map(({ start, end, text }) => ({ start: start - offset, end: end - offset, text }));
  const was = old.blocks.slice(from, to).map(({ text }) => text);
  const text = applyTextEdits(was.join(''), moved);
  return {
    text,
    splits: splitBlocks(text, before, from === 0),
    unchangedFrom: edits.at(-1)!.end + growth - offset,
    toOld: offset - growth,
  };
}

/** The first block start behind the edits that the old document has too, met in the same state. */
function meetingPoint(
  old: BlockList,
  from: number,
  { splits, unchangedFrom, toOld }: EditedStretch,
): { readonly splits: readonly Stretch[]; readonly next: number } | undefined {
  for (let index = 1; index < splits.length; index++) {
    const { start, before } = splits[index]!;
    if (start < unchangedFrom) continue;
    const next = old.indexAt(start + toOld);
    if (next <= from || old.startOf(next) !== start + toOld) continue;
    const was = old.blocks[next]!.before;
    if (was.section === before.section && was.indent === before.indent) return { splits: splits.slice(0, index), next };
  }
  return undefined;
}

function unreadBlock(text: string): Block {
  const entry = placeholder(text);
  const most = MOST_CHARACTERS.toLocaleString('en');
  const message = `The file has more than ${most} characters: from here on it is not read.`;
  const end = Math.min(text.length, 1);
  return {
    ...readBlock('prelude', text, TOP),
    problems: [{ problem: { name: 'too-much', start: 0, end, message }, place: { entry, start: 0, end }, related: [] }],
  };
}
