import {
  BACKSLASH,
  CARRIAGE_RETURN,
  CLOSE_BRACE,
  CLOSE_BRACKET,
  COLON,
  COMMA,
  DASH,
  DOUBLE_QUOTE,
  HASH,
  LINE_FEED,
  OPEN_BRACE,
  OPEN_BRACKET,
  SINGLE_QUOTE,
  SPACE,
  TAB,
} from './characters.ts';
import type { AliasNode, ScalarNode } from './tree.ts';

/*
 * Scalars and aliases on one line, in their usual forms. Every function takes the offset of the first character, and
 * gives `undefined` for whatever is unusual or wrong: the YAML library then reads the text instead.
 */

/** Characters that a plain scalar does not start with, or not without a closer look: `-` is looked at. */
const NO_PLAIN_START = new Set([...'?:,[]{}#&*!|>\'"%@`'].map((character) => character.charCodeAt(0)));
const SIMPLE_ESCAPES: ReadonlyMap<string, string> = new Map([
  ['"', '"'],
  ['\\', '\\'],
  ['/', '/'],
  ['n', '\n'],
  ['t', '\t'],
  ['b', '\b'],
  ['f', '\f'],
  ['r', '\r'],
]);
const SIMPLE_ESCAPE = /\\(?:u([0-9a-fA-F]{4})|(["\\/bfnrt]))/g;
const OTHER_ESCAPE = /\\(?!u[0-9a-fA-F]{4}|["\\/bfnrt])/;

export function isFlowIndicator(code: number): boolean {
  return (
    code === COMMA || code === OPEN_BRACE || code === CLOSE_BRACE || code === OPEN_BRACKET || code === CLOSE_BRACKET
  );
}

/** White space, a line end, or the end of the text. */
export function isBlank(code: number): boolean {
  return code === SPACE || code === LINE_FEED || code === CARRIAGE_RETURN || code === TAB || Number.isNaN(code);
}

/** The offset of the first character at or after `at` that is no space. */
export function skipSpaces(text: string, at: number): number {
  let next = at;
  while (text.charCodeAt(next) === SPACE) next++;
  return next;
}

/**
 * A plain scalar, up to the colon, comment, line end or (in flow style) bracket or comma that ends it.
 *
 * Whether it goes on in the next line is for the caller to see.
 */
export function plainScalar(text: string, start: number, inFlow: boolean): ScalarNode | undefined {
  const first = text.charCodeAt(start);
  if (NO_PLAIN_START.has(first)) return undefined;
  if (first === DASH) {
    const second = text.charCodeAt(start + 1);
    if (isBlank(second) || second === DASH || isFlowIndicator(second)) return undefined;
  }
  let end = start;
  for (let at = start; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === SPACE) continue;
    if (code < SPACE) {
      if (code === LINE_FEED || (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) === LINE_FEED)) break;
      return undefined;
    }
    if (code === COLON) {
      const next = text.charCodeAt(at + 1);
      if (isBlank(next) || (inFlow && isFlowIndicator(next))) break;
    } else if (code === HASH) {
      if (at > end) break;
    } else if (inFlow && isFlowIndicator(code)) {
      break;
    }
    end = at + 1;
  }
  return end === start ? undefined : { kind: 'scalar', start, end, text: text.slice(start, end), style: 'plain' };
}

/** A quoted scalar that ends on its line. */
export function quotedScalar(text: string, start: number): ScalarNode | undefined {
  return text.charCodeAt(start) === DOUBLE_QUOTE ? doubleQuoted(text, start) : singleQuoted(text, start);
}

function singleQuoted(text: string, start: number): ScalarNode | undefined {
  let hasQuote = false;
  for (let at = start + 1; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code < SPACE) return undefined;
    if (code !== SINGLE_QUOTE) continue;
    if (text.charCodeAt(at + 1) === SINGLE_QUOTE) {
      hasQuote = true;
      at++;
      continue;
    }
    const inner = text.slice(start + 1, at);
    const value = hasQuote ? inner.replaceAll("''", "'") : inner;
    return { kind: 'scalar', start, end: at + 1, text: value, style: 'single-quoted' };
  }
  return undefined;
}

function doubleQuoted(text: string, start: number): ScalarNode | undefined {
  let hasEscape = false;
  for (let at = start + 1; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code < SPACE) return undefined;
    if (code === BACKSLASH) {
      hasEscape = true;
      at++;
    } else if (code === DOUBLE_QUOTE) {
      const inner = text.slice(start + 1, at);
      const value = hasEscape ? unescaped(inner) : inner;
      return value === undefined
        ? undefined
        : { kind: 'scalar', start, end: at + 1, text: value, style: 'double-quoted' };
    }
  }
  return undefined;
}

function unescaped(inner: string): string | undefined {
  if (OTHER_ESCAPE.test(inner.replaceAll('\\\\', ''))) return undefined;
  return inner.replace(SIMPLE_ESCAPE, (_, hex: string | undefined, letter: string) =>
    hex === undefined ? SIMPLE_ESCAPES.get(letter)! : String.fromCharCode(Number.parseInt(hex, 16)),
  );
}

/** An alias whose name is made of letters, digits, `-` and `_`. */
export function alias(text: string, start: number): AliasNode | undefined {
  const end = nameEnd(text, start + 1);
  return end === undefined ? undefined : { kind: 'alias', start, end, name: text.slice(start + 1, end) };
}

/** The end of an anchor's or alias's name that starts at `at`. */
export function nameEnd(text: string, at: number): number | undefined {
  let end = at;
  for (; end < text.length; end++) {
    const code = text.charCodeAt(end);
    const isName =
      (code >= 97 && code <= 122) ||
      (code >= 65 && code <= 90) ||
      (code >= 48 && code <= 57) ||
      code === DASH ||
      code === 95;
    if (!isName) break;
  }
  const after = text.charCodeAt(end);
  return end > at && (isBlank(after) || isFlowIndicator(after)) ? end : undefined;
}
