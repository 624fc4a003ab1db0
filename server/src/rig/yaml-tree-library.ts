import type { CST, Document, ParsedNode, YAMLParseError } from 'yaml';
import { Composer, isAlias, isMap, isScalar, isSeq, Parser } from 'yaml';
import { MOST_DEPTH } from './limits.ts';
import type { Problem } from './problem.ts';
import type { EmptyNode, MapNode, ScalarNode, TreeNode, TreePair } from './tree.ts';
import type { YamlReading } from './yaml-reading.ts';
import { plainMessage, TABS_MESSAGE, UNCLOSED_QUOTE_MESSAGE, unclosedBracketMessage } from './yaml-tree-messages.ts';

/** A tab among the white space that a line starts with, ahead of something that is no comment. */
const TAB_INDENT = /^([ ]*)(\t[ \t]*)(?=[^\s#])/gm;

/** Reads one YAML document with the library: every form of YAML, and everything that is wrong with it. */
export function composeYaml(text: string): YamlReading {
  const reading = compose(text);
  if (reading.problems.length === 0 || !text.includes('\t')) return reading;
  const spaced = text.replace(TAB_INDENT, (_, before: string, tabs: string) => before + ' '.repeat(tabs.length));
  if (spaced === text) return reading;
  const { root, problems } = compose(spaced);
  const tabs = [...text.matchAll(TAB_INDENT)].map((match): Problem => {
    const start = match.index + match[1]!.length;
    return syntax(start, start + match[2]!.length, TABS_MESSAGE);
  });
  return { root, problems: inOrder([...tabs, ...problems]) };
}

function compose(text: string): YamlReading {
  const problems: Problem[] = [];
  try {
    const tokens = [...new Parser().parse(text)];
    for (const token of tokens) prune(token, 0, problems);
    const composer = new Composer({ schema: 'failsafe', uniqueKeys: false, prettyErrors: false, logLevel: 'silent' });
    const documents = [...composer.compose(tokens, true, text.length)];
    const document = documents[0] as Document.Parsed;
    const second = documents[1] as Document.Parsed | undefined;
    const root = document.contents
      ? new Conversion(text, document.errors, problems).node(document.contents)
      : emptyAt(document.range[0]);
    addErrors(text, document.errors, problems);
    if (second) {
      const start = second.range[0];
      problems.push(syntax(start, Math.max(start, second.range[1]), "A second document can't stand in a rig file."));
    }
    return { root, problems: inOrder(problems) };
  } catch {
    problems.push({ name: 'too-much', start: 0, end: text.length, message: 'This is too tangled to be read.' });
    return { root: emptyAt(0), problems };
  }
}

/** Cuts off what is nested deeper than the limit, so that nothing after this can run out of stack. */
function prune(token: CST.Token, depth: number, problems: Problem[]): void {
  if (token.type === 'document') {
    if (token.value) prune(token.value, depth, problems);
    return;
  }
  if (token.type !== 'block-map' && token.type !== 'block-seq' && token.type !== 'flow-collection') return;
  for (const item of token.items) {
    if (item.key && isCollection(item.key)) item.key = cut(item.key, depth, problems);
    if (item.value && isCollection(item.value)) item.value = cut(item.value, depth, problems);
  }
}

function cut(token: CST.Token, depth: number, problems: Problem[]): CST.Token {
  if (depth + 2 <= MOST_DEPTH) {
    prune(token, depth + 1, problems);
    return token;
  }
  const offset = token.offset;
  const message = `This is nested more than ${MOST_DEPTH} deep, and is not read.`;
  problems.push({ name: 'too-much', start: offset, end: offset + 1, message });
  return { type: 'scalar', offset, indent: 'indent' in token ? token.indent : 0, source: '' };
}

function isCollection(token: CST.Token): boolean {
  return token.type === 'block-map' || token.type === 'block-seq' || token.type === 'flow-collection';
}

/** From the library's nodes to ours, noting what the library does not say, or says elsewhere. */
class Conversion {
  readonly #text: string;
  readonly #problems: Problem[];
  readonly #quoteIsOpen: boolean;
  readonly #bracketIsOpen: boolean;

  constructor(text: string, errors: readonly YAMLParseError[], problems: Problem[]) {
    this.#text = text;
    this.#problems = problems;
    this.#quoteIsOpen = errors.some(isOpenQuote);
    this.#bracketIsOpen = errors.some(isOpenBracket);
  }

  node(node: ParsedNode): TreeNode {
    if (isScalar(node)) return this.#scalar(node);
    const [start, end] = node.range;
    if (isAlias(node)) return { kind: 'alias', start, end, name: node.source };
    const anchor = anchorOf(node);
    if (node.flow && this.#bracketIsOpen) this.#noteOpenBracket(start, end);
    if (isMap(node)) {
      const pairs: TreePair[] = [];
      for (const pair of node.items) {
        const made = this.#pair(pair.key, pair.value);
        if (made) pairs.push(made);
      }
      return node.flow ? { kind: 'map', start, end, ...anchor, pairs, flow: true } : blockMap(start, pairs, anchor);
    }
    if (isSeq(node)) {
      const items = node.items.map((item) => this.node(item as ParsedNode));
      const last = items.at(-1);
      return {
        kind: 'list',
        start,
        end: node.flow ? end : Math.max(start + 1, last?.end ?? 0),
        ...anchor,
        items,
        flow: node.flow === true,
      };
    }
    return emptyAt(start);
  }

  #pair(keyNode: ParsedNode, valueNode: ParsedNode | null): TreePair | undefined {
    const value = valueNode ? this.node(valueNode) : undefined;
    const key = keyNode ? this.node(keyNode) : emptyAt(value?.start ?? 0);
    if (key.kind === 'scalar') return { key, value: value ?? emptyAt(key.end) };
    if (key.kind === 'empty') {
      const { start, end } = key;
      return { key: { kind: 'scalar', start, end, text: '', style: 'plain' }, value: value ?? emptyAt(end) };
    }
    this.#problems.push(
      syntax(key.start, Math.max(key.end, key.start + 1), 'A key is plain text, not a map, a list or an alias.'),
    );
    return undefined;
  }

  #scalar(node: ParsedNode & { type?: unknown }): ScalarNode | EmptyNode {
    const [start, end] = node.range;
    const anchor = anchorOf(node);
    const text = String((node as { value: unknown }).value ?? '');
    switch (node.type) {
      case 'QUOTE_DOUBLE':
      case 'QUOTE_SINGLE':
        if (this.#quoteIsOpen) this.#noteOpenQuote(start, end);
        return {
          kind: 'scalar',
          start,
          end,
          ...anchor,
          text,
          style: node.type === 'QUOTE_DOUBLE' ? 'double-quoted' : 'single-quoted',
        };
      case 'BLOCK_FOLDED':
      case 'BLOCK_LITERAL':
        return { kind: 'scalar', start, end, ...anchor, text, style: 'block' };
      default:
        return start === end
          ? { kind: 'empty', start, end, ...anchor }
          : { kind: 'scalar', start, end, ...anchor, text, style: 'plain' };
    }
  }

  #noteOpenQuote(start: number, end: number): void {
    const quote = this.#text[start];
    if (end - start >= 2 && this.#text[end - 1] === quote) return;
    this.#problems.push(syntax(start, endOfLine(this.#text, start), UNCLOSED_QUOTE_MESSAGE));
  }

  #noteOpenBracket(start: number, end: number): void {
    const opened = this.#text[start];
    if (opened !== '{' && opened !== '[') return;
    if (end - start >= 2 && this.#text[end - 1] === (opened === '{' ? '}' : ']')) return;
    this.#problems.push(syntax(start, start + 1, unclosedBracketMessage(opened)));
  }
}

function anchorOf(node: { readonly anchor?: string }): { anchor: string } | undefined {
  return node.anchor === undefined || node.anchor === '' ? undefined : { anchor: node.anchor };
}

/** A block map ends where its last value does, not after the comments that follow it. */
function blockMap(start: number, pairs: readonly TreePair[], anchor: { anchor: string } | undefined): MapNode {
  const last = pairs.at(-1);
  return {
    kind: 'map',
    start: pairs[0]?.key.start ?? start,
    end: last ? Math.max(last.key.end, last.value.end) : start,
    ...anchor,
    pairs,
    flow: false,
  };
}

function emptyAt(offset: number): EmptyNode {
  return { kind: 'empty', start: offset, end: offset };
}

function syntax(start: number, end: number, message: string): Problem {
  return { name: 'syntax', start, end, message };
}

function isOpenQuote({ message }: YAMLParseError): boolean {
  return message.startsWith('Missing closing');
}

function isOpenBracket({ message }: YAMLParseError): boolean {
  return message.includes('end with a ');
}

function endOfLine(text: string, offset: number): number {
  for (let at = offset; at < text.length; at++) {
    if (text[at] === '\n' || text[at] === '\r') return at;
  }
  return text.length;
}

/** The library's errors in our words, but for those whose cause has already been found where it starts. */
function addErrors(text: string, errors: readonly YAMLParseError[], problems: Problem[]): void {
  const foundQuote = problems.some(({ message }) => message === UNCLOSED_QUOTE_MESSAGE);
  const foundBracket = problems.some(({ message }) => message.endsWith('opened here is never closed.')) && !foundQuote;
  for (const error of errors) {
    if (isOpenQuote(error) && foundQuote) continue;
    if (isOpenBracket(error) && (foundBracket || foundQuote)) continue;
    const start = Math.max(0, Math.min(error.pos[0], text.length));
    const end = Math.max(start, Math.min(error.pos[1], text.length));
    problems.push({
      name: error.code === 'RESOURCE_EXHAUSTION' ? 'too-much' : 'syntax',
      start,
      end,
      message: plainMessage(error),
    });
  }
}

/** By position, one problem at each place. */
function inOrder(problems: readonly Problem[]): readonly Problem[] {
  const sorted = [...problems].sort((a, b) => a.start - b.start);
  return sorted.filter(({ start }, index) => index === 0 || sorted[index - 1]!.start !== start);
}
