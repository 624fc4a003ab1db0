import { describe, expect, it } from 'vitest';
import type { DocumentSymbol } from 'vscode-languageserver-types';
import { SymbolKind } from 'vscode-languageserver-types';
import { outlineOf } from '../../server/src/editor/outline.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';

const outline = (text: string): readonly DocumentSymbol[] => outlineOf(evaluated(text));

/** An outline a line each: indented, with the detail behind the name. */
function lines(symbols: readonly DocumentSymbol[], indent = ''): readonly string[] {
  return symbols.flatMap(({ name, detail, children = [] }) => [
    `${indent}${name}${detail === undefined ? '' : ` · ${detail}`}`,
    ...lines(children, `${indent}  `),
  ]);
}

function slice(text: string, { start, end }: DocumentSymbol['range']): string {
  return text.slice(TextDocument.offset(text, start), TextDocument.offset(text, end));
}

describe('the outline', () => {
  it('has the top-level keys, the named things below their sections, and each channel with its rate', () => {
    expect(lines(outline(EXTRACT_FAN))).toEqual([
      'rig',
      'mains',
      'clocks',
      '  chassis',
      'digitizers',
      '  front-end',
      'filters',
      '  card',
      '  tidy',
      'sensors',
      '  stud-mounted',
      'sources',
      '  blade-pass',
      '  inverter',
      'channels',
      '  bearing-drive-end · 25.6 kHz',
    ]);
  });

  it('is the same in JSON, and of one section in braces', () => {
    expect(lines(outline('{ "rig": "x", "channels": { "a": { "rate": "2 kHz" }, "b": {} }, "run": { } }'))).toEqual([
      'rig',
      'channels',
      '  a · 2 kHz',
      '  b',
      'run',
    ]);
    expect(lines(outline('rig: x\nchannels: { a: { rate: 2 kHz } }\n'))).toEqual(['rig', 'channels', '  a · 2 kHz']);
  });

  it('gives each kind of thing a sign of its own', () => {
    const text = `${EXTRACT_FAN}groups:\n  tower: { within: 2 deg, up-to: 1 kHz }\nrun: { duration: 8 h }\n`;
    const kinds = outline(text).map(({ name, kind, children }) => [name, kind, children?.[0]?.kind]);
    expect(kinds).toEqual([
      ['rig', SymbolKind.String, undefined],
      ['mains', SymbolKind.String, undefined],
      ['clocks', SymbolKind.Namespace, SymbolKind.Constant],
      ['digitizers', SymbolKind.Namespace, SymbolKind.Interface],
      ['filters', SymbolKind.Namespace, SymbolKind.Function],
      ['sensors', SymbolKind.Namespace, SymbolKind.Struct],
      ['sources', SymbolKind.Namespace, SymbolKind.Event],
      ['channels', SymbolKind.Namespace, SymbolKind.Field],
      ['groups', SymbolKind.Namespace, SymbolKind.Array],
      ['run', SymbolKind.Namespace, undefined],
    ]);
  });

  it('shows a rate that comes from the defaults, and none where none is known', () => {
    const text = 'defaults: { rate: 5 kHz }\nchannels:\n  a: {}\n  b: { rate: 1 kHz }\n  "c-{1..3}": {}\n';
    expect(lines(outline(text)).slice(1)).toEqual([
      'channels',
      '  a · 5 kHz',
      '  b · 1 kHz',
      '  c-{1..3} · 5 kHz · 3 channels',
    ]);
    expect(lines(outline('channels:\n  a: {}\n'))).toEqual(['channels', '  a']);
  });

  it('names what has no name, and leaves out what has no key', () => {
    expect(lines(outline('"": x\nchannels:\n  a\n  "": {}\n'))).toEqual(['(no name)', 'channels', '  (no name)']);
    expect(outline('- a\n- b\n')).toEqual([]);
    expect(outline('')).toEqual([]);
  });

  it('holds each word in the range of its entry, and each entry in that of its section', () => {
    const texts = [EXTRACT_FAN, ...SAMPLES.map(({ text }) => text), EXTRACT_FAN.replaceAll('\n', '\r\n')];
    const check = (text: string, { name, range, selectionRange, children = [] }: DocumentSymbol): void => {
      expect(slice(text, selectionRange).replaceAll(/["']/g, '')).toBe(name);
      expect(slice(text, range)).toContain(slice(text, selectionRange));
      for (const child of children) {
        expect(TextDocument.offset(text, child.range.start)).toBeGreaterThan(TextDocument.offset(text, range.start));
        expect(TextDocument.offset(text, child.range.end)).toBeLessThanOrEqual(TextDocument.offset(text, range.end));
        check(text, child);
      }
    };
    for (const text of texts) for (const symbol of outline(text)) check(text, symbol);
  });

  it('counts places as the protocol does behind signs of two units', () => {
    const text = 'channels: { "🛠🛠": { rate: 1 kHz }, b: { rate: 2 kHz } }\n';
    expect(outline(text)[0]!.children!.map(({ selectionRange }) => slice(text, selectionRange))).toEqual(['"🛠🛠"', 'b']);
  });
});
