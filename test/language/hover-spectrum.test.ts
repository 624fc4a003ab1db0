import { describe, expect, it } from 'vitest';
import type { MarkupContent } from 'vscode-languageserver-types';
import { hoverAt } from '../../server/src/editor/hover.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { CHARACTERS } from './clients.ts';
import { marked } from './marked.ts';

function shown(fixture: string): string | undefined {
  const { text, position } = marked(fixture);
  return (hoverAt(evaluated(text), position, CHARACTERS)?.contents as MarkupContent | undefined)?.value;
}

const rig = (spectrum: string, name = 'a') =>
  `rig: R\nchannels:\n  ${name}:\n    rate: 25.6 kHz\n    band: 10 Hz .. 10 kHz\n    ${spectrum}\n`;

describe('a hover on a spectrum', () => {
  it('tells its record, its lines, its time, how far it can be trusted, and the figures of its window', () => {
    // By hand: 2.56 x 800 = 2048 samples of 25.6 kHz are 80 ms, and 16 of them that share half take 680 ms.
    // Hann, Harris 1978, table 1: 1.50 bins of noise bandwidth, 2.00 at 6 dB, 1.42 dB, -32 dB, 18 dB an octave; from
    // memory. A sixth of each half shared, c(0.5) = 1/6: 16 / (1 + 2 (15/16) / 36) = 15.2 averages, 25.6 %.
    const text = shown(rig('spec▮trum: { lines: 800, window: hann, overlap: 50 %, averages: 16 }'))!;
    expect(text.split('\n').slice(0, 12)).toEqual([
      '**spectrum** · `a` · `hann`',
      '',
      '| what | how much |  |',
      '|---|---|---|',
      '| record | 80 ms | 2048 samples |',
      '| resolution | 12.5 Hz | 800 lines |',
      '| time | 680 ms | 16 averages, overlap 50 % |',
      '| random error | 25.6 % | of a power spectrum; 15.2 independent averages |',
      '| told apart from | 25 Hz | 2.00 lines, 6 dB bandwidth |',
      '| noise bandwidth | 18.75 Hz | 1.50 lines |',
      '| scalloping | 1.42 dB | lost half-way between two lines |',
      '| highest side lobe | -31.5 dB | falling 18 dB an octave |',
    ]);
    expect(text).toContain('How the record will be turned into a spectrum');
  });

  it('is the same on any of its keys and values, with what they mean', () => {
    for (const [spectrum, meaning] of [
      ['spectrum: { li▮nes: 800 }', 'The number of lines'],
      ['spectrum: { lines: 8▮00 }', ''],
      ['spectrum: { lines: 800, window: ha▮nn }', 'the usual choice'],
      ['spectrum:\n      lines: 800\n      over▮lap: 0 %', 'How far one record reaches'],
    ] as const) {
      const text = shown(rig(spectrum))!;
      expect(text).toContain('| resolution | 12.5 Hz | 800 lines |');
      expect(text).toContain('| time | 80 ms | 1 record |');
      expect(text).toContain(meaning);
    }
  });

  it('tells no more than the key where the spectrum is not known, or stands in the defaults', () => {
    expect(shown(rig('spectrum: { win▮dow: hann }'))).toMatch(/^\*\*window\*\*/);
    expect(shown(rig('spectrum: { lines: 800, window: ▮han }'))).toBeUndefined();
    expect(shown('rig: R\ndefaults:\n  spectrum: { li▮nes: 800 }\n')).toMatch(/^\*\*lines\*\*/);
    expect(shown('rig: R\nchannels:\n  a: { rate: 1 kHz, spectrum: { li▮nes: 800 } }\n')).toMatch(/^\*\*lines\*\*/);
  });

  it('is none on a channel that is called spectrum', () => {
    expect(shown(rig('spectrum: { lines: 800 }\n    flat▮ness: 1 dB', 'spectrum'))).toMatch(/^\*\*flatness\*\*/);
  });
});
