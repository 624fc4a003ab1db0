import { describe, expect, it } from 'vitest';
import type { MarkupContent } from 'vscode-languageserver-types';
import { hoverAt } from '../../server/src/editor/hover.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { CHARACTERS } from './clients.ts';
import { marked, markedAt } from './marked.ts';

/** What is shown at the mark. */
function shownAt(fixture: string): string {
  const { text, position } = marked(fixture);
  return (hoverAt(evaluated(text), position, CHARACTERS)!.contents as MarkupContent).value;
}

const TOWER = `rig: Tower
digitizers:
  scanner: { sampling: scanned, scan-interval: 10 us }
filters:
  pole: { response: rc, order: 1, corner: 1 kHz }
  other: { response: rc, order: 1, corner: 1.1 kHz }
  mean: { response: moving-average, length: 5 }
  promise: { response: mask, pass: 1 kHz, stop: 4 kHz, stopband: 60 dB }
groups:
  tower: { within: 2 deg, up-to: 100 Hz }
  empty: { within: 2 deg, up-to: 100 Hz }
channels:
  base:
    rate: 10 kHz
    filter: pole
    band: 0 Hz .. 1 kHz
    group: tower
  top:
    digitizer: scanner
    rate: 10 kHz
    filter: other
    band: 0 Hz .. 1 kHz
    then: [{ filter: mean }]
    group: tower
  middle:
    digitizer: scanner
    rate: 10 kHz
    filter: pole
    band: 0 Hz .. 1 kHz
    group: tower
  dim:
    rate: 10 kHz
    filter: promise
    band: 0 Hz .. 1 kHz
    group: tower
`;
const tower = (piece: string, text = TOWER) => shownAt(markedAt(text, piece));

describe('a hover on a filter', () => {
  // A pole at fc is 1 / (2 pi fc) late far below it, and half of that at it.
  it('tells its group delay at both ends of the band', () => {
    expect(tower('  po▮le: {')).toContain(
      "Group delay: 159.2 us at low frequency (0 Hz), 79.58 us at the band's top (1 kHz).",
    );
    // The mean of 5 samples of 0.1 ms is two of them late.
    expect(tower('  me▮an: {')).toContain('Group delay: 200 us at low frequency (0 Hz), 200 us at');
    const compensated = TOWER.replace('scan-interval: 10 us', 'delay-compensated: true');
    expect(tower('  me▮an: {', compensated)).toContain('; the time stamps are put right by it.');
    expect(tower('  po▮le: {', compensated)).not.toContain('put right');
  });

  it('says so where its phase is not known', () => {
    expect(tower('  prom▮ise: {')).toContain('Its phase is not known, and so neither is its delay.');
  });
});

describe('a hover on a channel', () => {
  it('tells the group delay of its chain at mid band', () => {
    // 1 / (2 pi 1000) / (1 + 0.5^2) s
    expect(tower('  ba▮se:')).toContain('Group delay 127.3 us at mid band (500 Hz)');
    // 1 / (2 pi 1100) / (1 + (5 / 11)^2) s and 200 us
    expect(tower('  to▮p:')).toContain('Group delay 319.9 us at mid band (500 Hz)');
    const compensated = TOWER.replace('scan-interval: 10 us', 'delay-compensated: true');
    expect(tower('  to▮p:', compensated)).toContain('Group delay 119.9 us at mid band');
    expect(tower('  di▮m:')).toContain('Group delay 0 s at mid band (500 Hz), filters of unknown phase apart');
  });
});

describe('a hover on a group', () => {
  const shown = tower('  to▮wer: {');

  it('tells its members, how late each is, and its phase against the first, the furthest first', () => {
    expect(shown.split('\n')).toEqual([
      '**`tower`** · within 2 deg up to 100 Hz · 4 channels',
      '',
      '| channel | its turn | group delay at 100 Hz | phase at 100 Hz |',
      '|---|---|---|---|',
      '| `base` | at once | 157.6 us | compared with |',
      // atan 0.1 less atan (1 / 11) is 0.5162 degrees; 200 us are 7.2 degrees.
      '| `top` | at once | 343.5 us | -6.684 deg |',
      // 10 us at 100 Hz are 0.36 degrees, which what is sampled later is ahead.
      '| `middle` | 10 us later | 157.6 us | 0.36 deg |',
      '| `dim` | at once | not known | not known |',
    ]);
  });

  it('is the same where a channel names it', () => {
    const named = TOWER.replace('group: tower\n  top:', 'group: "tower"\n  top:');
    expect(tower('group: "to▮wer"', named)).toBe(shown);
  });

  it('says so where nobody is in it, or it says too little', () => {
    expect(tower('  em▮pty: {')).toBe('**`empty`** · within 2 deg up to 100 Hz\n\nNo channel is in it.');
    expect(tower('  to▮wer: {', TOWER.replace('within: 2 deg, up-to: 100 Hz', 'within: 2 deg'))).toBe(
      '**`tower`** · group',
    );
  });

  it('tells the turns of a brace range', () => {
    const text = `${TOWER}  "w-{1..3}": { digitizer: scanner, rate: 1 kHz, band: 1 Hz .. 100 Hz, group: empty }\n`;
    const found = tower('  em▮pty: {', text);
    expect(found).toContain('· 3 channels');
    expect(found).toContain('| `w-{1..3}` | 20 us .. 40 us later |');
  });

  it('counts those that there is no room for', () => {
    const many = Array.from({ length: 20 }, (_, n) => `  c${n}: { rate: 1 kHz, band: 1 Hz .. 100 Hz, group: empty }\n`);
    expect(tower('  em▮pty: {', TOWER + many.join(''))).toContain('4 more, all nearer to the first.');
  });
});
