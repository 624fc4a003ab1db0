import { describe, expect, it } from 'vitest';
import type { MarkupContent } from 'vscode-languageserver-types';
import { hoverAt } from '../../server/src/editor/hover.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { CHARACTERS } from './clients.ts';
import { marked, markedAt } from './marked.ts';

const NOISY = `rig: Noisy
digitizers:
  d: { bits: 16, full-scale: ±10 V, noise: 100 uV }
filters:
  rc: { response: rc, order: 1, corner: 8 kHz }
sources:
  hiss: { noise: 10 uV/rtHz, spans: 2 kHz .. 24 kHz }
  far: { noise: 10 ug/rtHz, spans: 2 kHz .. 24 kHz }
channels:
  plain: { measures: voltage, digitizer: d, rate: 25.6 kHz, band: 0 Hz .. 10 kHz, fold-limit: -80 dBFS }
  filtered: { measures: voltage, digitizer: d, rate: 25.6 kHz, band: 0 Hz .. 10 kHz, filter: rc }
  open: { sensitivity: 100 mV/g, noise: 1 ug/rtHz, rate: 25.6 kHz, band: 0 Hz .. 10 kHz, digitizer: d, hears: none }
  quiet: { measures: voltage, rate: 25.6 kHz, band: 0 Hz .. 10 kHz, hears: none }
`;

function shown(piece: string): string {
  const { text, position } = marked(markedAt(NOISY, piece));
  const answer = hoverAt(evaluated(text), position, CHARACTERS);
  return (answer!.contents as MarkupContent).value;
}

describe('a hover on a channel with noise', () => {
  it('has what is native and what folds, by what it comes from, under what arrives', () => {
    // 10 uV/rtHz over 8 kHz is 0.894 mV, -77.96 dBFS, over 8.4 kHz -77.75 dBFS; 100 uV less 1.07 dB is -98.06 dBFS; 16 bits -98.09 less 1.07 dB.
    const table = [
      '| noise in the band | native, dBFS rms | folded, dBFS rms |',
      '|---|---|---|',
      '| `hiss` | -78.0 | -77.7 |',
      "| the noise of the digitizer's input | -98.1 | - |",
      "| the noise of the converter's steps | -99.2 | - |",
      '| **all of it** | -77.9 | **-77.7, 2.3 dB over the limit** |',
    ].join('\n');
    for (const piece of ['pl▮ain:', 'rate: 25▮.6 kHz, band: 0 Hz .. 10 kHz, fold-limit']) {
      expect(shown(piece).endsWith(`\n\nNothing but noise is declared that this channel hears.\n\n${table}`)).toBe(
        true,
      );
    }
  });

  it('says where nothing ends it', () => {
    // 1 ug/rtHz is 0.1 uV/rtHz, over 10 kHz 10 uV: 20 log10(sqrt 2 x 10 uV / 10 V).
    expect(shown('op▮en:')).toContain("| the sensor's own noise | -117.0 | no bound: no filter ends it |");
    expect(shown('op▮en:')).toContain('| **all of it** | -95.5 | no bound');
  });

  it('has none where none is declared', () => {
    expect(shown('qui▮et:')).not.toContain('noise');
  });
});

describe('a hover on a broadband source', () => {
  it('tells what it leaves in each channel, the worst first', () => {
    // Behind the single pole: 8 kHz (atan 10/8 - atan 2/8) = 5209 Hz, and 8 kHz (atan 24/8 - atan 15.6/8) = 1218 Hz.
    expect(shown('his▮s:')).toBe(
      [
        '**`hiss`** · noise 2 kHz .. 24 kHz · enters at the wiring',
        '',
        '| channel | native, rms | folded, rms | limit |',
        '|---|---|---|---|',
        '| `plain` | -78.0 | -77.7 | -80.0 dBFS |',
        '| `filtered` | -79.8 | -86.1 | -60.0 dBFS |',
      ].join('\n'),
    );
    expect(shown('fa▮r:')).toContain('No channel hears it.');
  });
});
