import {
  BYTE_ORDER_MARK,
  CARRIAGE_RETURN,
  CLOSE_BRACE,
  CLOSE_BRACKET,
  DASH,
  HASH,
  LINE_FEED,
  OPEN_BRACE,
  OPEN_BRACKET,
  SPACE,
  TAB,
} from './characters.ts';
import { NAMED_SECTIONS, type NamedSection } from './entry.ts';

/**
 * What one block of a rig file is:
 * - `prelude`: what stands before the first key: comments, directives, the first `---`;
 * - `marker`: a later `---` or `...`;
 * - `head`: the line of a section whose entries follow below it, each in a block of its own;
 * - `entry`: one entry of a section;
 * - `whole`: a top-level key with all of its value.
 */
export type BlockKind = 'prelude' | 'marker' | 'head' | 'entry' | 'whole';

/** What has to be known of the lines above to split the lines below. */
export interface SplitState {
  /** The section whose entries are being read. */
  readonly section: NamedSection | undefined;
  /** The indentation of its entries; 0 while none has been seen. */
  readonly indent: number;
}

/** A stretch of the text, told apart by its lines' indentation alone. */
export interface Stretch {
  readonly kind: BlockKind;
  readonly start: number;
  readonly end: number;
  /** The state in which its first line was met; {@link TOP} where that line is not indented. */
  readonly before: SplitState;
}

export const TOP: SplitState = { section: undefined, indent: 0 };

const HEAD = /^(?:"([a-z]+)"|'([a-z]+)'|([a-z]+))[ \t]*:(?:[ \t]+[&!]\S*)*(?:[ \t]+#.*)?[ \t]*\r?$/;
const SECTIONS: ReadonlySet<string> = new Set(NAMED_SECTIONS);

/** The characters that open a section's value without a key: it is then read as a whole. */
const NO_KEY = new Set([OPEN_BRACE, OPEN_BRACKET]);
const CLOSERS = new Set([CLOSE_BRACE, CLOSE_BRACKET]);

/** How the document is written, by the first character that says anything; `undefined` where none does. */
export function styleOf(text: string): 'block' | 'flow' | undefined {
  let sawDocumentStart = false;
  for (let at = 0; at < text.length; at = lineEnd(text, at)) {
    const end = lineEnd(text, at);
    const first = firstOfLine(text, at, end, at === 0);
    if (isBlankOrComment(text, first, end)) continue;
    if (isPreludeLine(text, at, first, end, sawDocumentStart)) {
      sawDocumentStart ||= text.charCodeAt(first) === DASH;
      continue;
    }
    const isMarked = !sawDocumentStart && isMarker(text, first, '---');
    const code = isMarked
      ? text
          .slice(first + 3, end)
          .trimStart()
          .charCodeAt(0)
      : text.charCodeAt(first);
    return NO_KEY.has(code) ? 'flow' : 'block';
  }
  return undefined;
}

/**
 * Splits a text, or the middle of one, into stretches that follow one another without a gap.
 *
 * A line that is not indented starts a new one, and so does one that is indented no deeper than the entries of its
 * section, even where a quote or a bracket above it is still open: a slip costs the entry that it stands in, not the
 * ones below. Only what can't start a key belongs to the lines above: a blank line, a comment, a list item, a closing
 * bracket.
 *
 * @param before the state at the start of the text
 * @param isStart whether the text starts where the document does
 */
export function splitBlocks(text: string, before: SplitState, isStart: boolean): readonly Stretch[] {
  return new Splitter(text, before, isStart).split();
}

class Splitter {
  readonly #text: string;
  readonly #isStart: boolean;
  readonly #stretches: Stretch[] = [];
  #kind: BlockKind | undefined;
  #start = 0;
  #before: SplitState;
  #section: NamedSection | undefined;
  #indent: number;

  constructor(text: string, before: SplitState, isStart: boolean) {
    this.#text = text;
    this.#isStart = isStart;
    this.#before = before;
    this.#section = before.section;
    this.#indent = before.indent;
  }

  split(): readonly Stretch[] {
    const text = this.#text;
    if (this.#isStart && text !== '') this.#kind = 'prelude';
    let sawDocumentStart = false;
    for (let at = 0; at < text.length; ) {
      const end = lineEnd(text, at);
      const first = firstOfLine(text, at, end, this.#isStart && at === 0);
      if (!isBlankOrComment(text, first, end)) {
        if (this.#kind === 'prelude' && isPreludeLine(text, at, first, end, sawDocumentStart)) {
          sawDocumentStart ||= text.charCodeAt(first) === DASH;
        } else {
          const indent = first - at - (this.#isStart && at === 0 && text.charCodeAt(0) === BYTE_ORDER_MARK ? 1 : 0);
          this.#take(at, first, end, indent);
        }
      }
      at = end;
    }
    this.#close(text.length);
    return this.#stretches;
  }

  /** One line that says something. */
  #take(at: number, first: number, end: number, indent: number): void {
    if (indent === 0) this.#takeTopLevel(at, first, end);
    else this.#takeIndented(at, first, end, indent);
  }

  #takeTopLevel(at: number, first: number, end: number): void {
    const text = this.#text;
    if (isMarker(text, first, '---') || isMarker(text, first, '...')) {
      this.#open('marker', at, TOP);
      return;
    }
    const canContinue = this.#kind === 'whole' || this.#kind === 'head' || this.#kind === 'entry';
    if (canContinue && (isListItem(text, first, end) || CLOSERS.has(text.charCodeAt(first)))) {
      if (this.#kind === 'head') this.#kind = 'whole';
      return;
    }
    const section = sectionOf(
      text.slice(first, end - 1 >= first && text.charCodeAt(end - 1) === LINE_FEED ? end - 1 : end),
    );
    this.#open(section ? 'head' : 'whole', at, TOP);
    this.#section = section;
  }

  #takeIndented(at: number, first: number, end: number, indent: number): void {
    const text = this.#text;
    const isItem = isListItem(text, first, end);
    const code = text.charCodeAt(first);
    if (this.#kind === undefined) {
      this.#takeFirst(at, indent);
      return;
    }
    switch (this.#kind) {
      case 'prelude':
      case 'marker':
        this.#open('whole', at, TOP);
        return;
      case 'whole':
        return;
      case 'head':
        if (isItem || NO_KEY.has(code)) {
          this.#kind = 'whole';
          return;
        }
        this.#openEntry(at, { section: this.#section, indent: 0 });
        this.#indent = indent;
        return;
      case 'entry':
        if (indent > this.#indent || isItem || CLOSERS.has(code)) return;
        this.#openEntry(at, { section: this.#section, indent: this.#indent });
    }
  }

  /** The first line of a text from the middle of a document, of which the state says what it is. */
  #takeFirst(at: number, indent: number): void {
    if (this.#section === undefined) {
      this.#open('whole', at, TOP);
      return;
    }
    this.#openEntry(at, this.#before);
    if (this.#indent === 0) this.#indent = indent;
  }

  #openEntry(at: number, before: SplitState): void {
    const section = this.#section;
    this.#open('entry', at, before);
    this.#section = section;
    this.#indent = before.indent;
  }

  #open(kind: BlockKind, at: number, before: SplitState): void {
    this.#close(at);
    this.#kind = kind;
    this.#start = at;
    this.#before = before;
    this.#section = undefined;
    this.#indent = 0;
  }

  #close(end: number): void {
    if (this.#kind === undefined || end === this.#start) return;
    this.#stretches.push({ kind: this.#kind, start: this.#start, end, before: this.#before });
  }
}

/** The offset after the line end, or the end of the text. */
function lineEnd(text: string, at: number): number {
  const feed = text.indexOf('\n', at);
  return feed < 0 ? text.length : feed + 1;
}

/** The offset of the first character of a line that is neither space nor tab; a byte-order mark is no character. */
function firstOfLine(text: string, at: number, end: number, isFirstLine: boolean): number {
  let first = at;
  if (isFirstLine && text.charCodeAt(0) === BYTE_ORDER_MARK) first++;
  for (; first < end; first++) {
    const code = text.charCodeAt(first);
    if (code !== SPACE && code !== TAB) return first;
  }
  return end;
}

function isBlankOrComment(text: string, first: number, end: number): boolean {
  if (first >= end) return true;
  const code = text.charCodeAt(first);
  return code === HASH || code === LINE_FEED || (code === CARRIAGE_RETURN && first + 2 >= end);
}

function isMarker(text: string, first: number, marker: '---' | '...'): boolean {
  if (!text.startsWith(marker, first)) return false;
  return first + 3 >= text.length || isWhite(text.charCodeAt(first + 3));
}

function isListItem(text: string, first: number, end: number): boolean {
  return text.charCodeAt(first) === DASH && (first + 1 >= end || isWhite(text.charCodeAt(first + 1)));
}

function isWhite(code: number): boolean {
  return code === SPACE || code === TAB || code === LINE_FEED || code === CARRIAGE_RETURN;
}

/** A directive, or the first `---` with nothing but a comment behind it. */
function isPreludeLine(text: string, at: number, first: number, end: number, sawDocumentStart: boolean): boolean {
  if (first - at > (at === 0 && text.charCodeAt(0) === BYTE_ORDER_MARK ? 1 : 0) || sawDocumentStart) return false;
  if (text.startsWith('%YAML ', first) || text.startsWith('%TAG ', first)) return true;
  if (!isMarker(text, first, '---')) return false;
  const rest = text.slice(first + 3, end).trim();
  return rest === '' || rest.startsWith('#');
}

function sectionOf(line: string): NamedSection | undefined {
  const match = HEAD.exec(line);
  const name = match?.[1] ?? match?.[2] ?? match?.[3];
  return name !== undefined && SECTIONS.has(name) ? (name as NamedSection) : undefined;
}
