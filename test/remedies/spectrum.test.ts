import { describe, expect, it } from 'vitest';
import type { Remedy } from '../../server/src/remedies/remedy.ts';
import { afterwards, offered } from './offered.ts';

/** A channel at 2560 Hz: 1000 lines are 1 Hz apart. */
function rig(spectrum: string, sources = '', more = ''): string {
  return `rig: R
digitizers: { d: { bits: 24, full-scale: ±10 V } }
sources: {${sources}}
${more}channels:
  a:
    measures: voltage
    digitizer: d
    rate: 2560 Hz
    band: 10 Hz .. 1 kHz
    undeclared: -90 dBFS
    fold-limit: -80 dBFS
    ${spectrum}
`;
}

function remedy(text: string, check: string, name: string): Remedy {
  const found = offered(text, check).find((one) => one.name === name);
  expect(found, `${name} for ${check}`).toBeDefined();
  return found!;
}

const names = (text: string, check: string) => offered(text, check).map(({ name }) => name);

describe('a longer record', () => {
  it('is the least doubling that tells two tones apart, in the key that gives its length', () => {
    // A Hann window asks for two lines; 3 Hz need lines 1.5 Hz apart or less.
    for (const [before, after, title] of [
      ['lines: 250', 'lines: 1000', 'Use 1000 lines: 1 s long, lines 1 Hz apart (time x4)'],
      ['resolution: 4.0 Hz', 'resolution: 1.0 Hz', 'Use lines 1 Hz apart: 1 s long, lines 1 Hz apart (time x4)'],
      ['record: 250ms', 'record: 1000ms', 'Use records of 1 s: 1 s long, lines 1 Hz apart (time x4)'],
    ] as const) {
      const text = rig(`spectrum: { ${before}, separate: 3 Hz }   # as before`);
      const longer = remedy(text, 'lines-too-coarse', 'longer-record');
      expect(longer.title).toBe(title);
      expect([longer.kind, longer.preferred]).toEqual(['setting', true]);
      expect(afterwards(text, longer)).toBe(text.replace(before, after));
    }
  });

  it('is not offered where the run has no time for it', () => {
    const text = (duration: string) =>
      rig('spectrum: { lines: 250, separate: 3 Hz }', '', `run: { duration: ${duration} }\n`);
    expect(names(text('1 s'), 'lines-too-coarse')).toContain('longer-record');
    expect(names(text('0.9 s'), 'lines-too-coarse')).not.toContain('longer-record');
  });

  it('parts a fold from the line that it hides, and a tone from a multiple of half the rate', () => {
    // 2560 - 2056 = 504 Hz, 4 Hz from a wanted line.
    const tones = ' t: { frequency: 500 Hz, level: 1 V, wanted: true }, h: { frequency: 2056 Hz, level: 1 V } ';
    const hidden = rig('spectrum: { lines: 250 }', tones);
    expect(afterwards(hidden, remedy(hidden, 'fold-hides', 'longer-record'))).toContain('lines: 500 }');
    const near = rig('spectrum: { lines: 250 }', ' h: { frequency: 2563 Hz, level: 1 V } ').replace(
      '10 Hz ..',
      '0 Hz ..',
    );
    expect(afterwards(near, remedy(near, 'on-nyquist', 'longer-record'))).toContain('lines: 500 }');
    const exact = near.replace('2563 Hz', '2560 Hz');
    expect(names(exact, 'on-nyquist')).not.toContain('longer-record');
  });

  it('is written into a channel that inherits its spectrum, and offered at the origin for all', () => {
    const text = rig(
      'note: one',
      '',
      "defaults:\n  spectrum: { record: '250 ms', separate: 3 Hz, window: hann }\n",
    ).concat('  b: { measures: voltage, digitizer: d, rate: 2560 Hz, band: 10 Hz .. 1 kHz, undeclared: -90 dBFS }\n');
    const all = offered(text, 'lines-too-coarse').filter(({ name }) => name === 'longer-record');
    expect(afterwards(text, all[0]!)).toContain(
      '    note: one\n    spectrum: { record: 1000 ms, window: hann, separate: 3 Hz }\n',
    );
    expect(all[1]!.title).toMatch(/^Use records of 1 s for all 2 channels/);
    expect(afterwards(text, all[1]!)).toBe(text.replace('250 ms', '1000 ms'));
    expect(all.map(({ preferred }) => preferred)).toEqual([true, false, true, false]);
  });

  it('is written over one line of a map in block style', () => {
    const text = rig('spectrum:\n      # short\n      lines: 250   # too few\n      separate: 3 Hz');
    const longer = remedy(text, 'lines-too-coarse', 'longer-record');
    expect(afterwards(text, longer)).toBe(text.replace('lines: 250 ', 'lines: 1000 '));
  });
});

describe('another window', () => {
  it('is the one of the lowest side lobes that still tells the tones apart', () => {
    // Lines 1 Hz apart. 6 dB bandwidths in lines, Harris 1978, table 1, from memory: rectangle 1.21, Hamming 1.81,
    // Hann 2.00; side lobes -13, -43 and -32 dB.
    const at = (hz: number) => {
      const text = rig(`spectrum: { lines: 1000, window: hann, separate: ${hz} Hz }`);
      return afterwards(text, remedy(text, 'lines-too-coarse', 'another-window'));
    };
    expect(at(1.9)).toContain('window: hamming');
    expect(at(1.5)).toContain('window: rectangle');
    expect(names(rig('spectrum: { lines: 1000, separate: 1.1 Hz }'), 'lines-too-coarse')).not.toContain(
      'another-window',
    );
  });

  it('is the narrowest that does not leak over the band, written where none was', () => {
    const tone = ' t: { frequency: 500 Hz, level: 5 V } ';
    const text = rig('spectrum: { lines: 400, window: rectangle }', tone);
    const other = remedy(text, 'window-leaks', 'another-window');
    expect(other.title).toMatch(/^Use the window `hann`: tones 5 Hz apart are told apart, side lobes are at -31 dB/);
    expect(afterwards(text, other)).toBe(text.replace('rectangle', 'hann'));
    const bare = rig('spectrum: { lines: 30 }', tone);
    const added = afterwards(bare, remedy(bare, 'window-leaks', 'another-window'));
    expect(added).toMatch(/spectrum: \{ lines: 30, window: [a-z0-9-]+ \}/);
  });
});

describe('fewer averages', () => {
  it('are the most that there is time for', () => {
    const text = rig('spectrum: { record: 1 s, averages: 16 }', '', 'run: { duration: 9.5 s }\n');
    const fewer = remedy(text, 'record-too-long', 'fewer-averages');
    // 1 / sqrt(9) and 1 / sqrt(16): Bendat and Piersol, Random Data.
    expect(fewer.title).toBe('Average 9 instead of 16: 9 s, random error 33.3 % instead of 25 %');
    expect(afterwards(text, fewer)).toBe(text.replace('averages: 16', 'averages: 9'));
    const shared = text.replace('averages: 16', 'averages: 30, overlap: 50 %');
    expect(afterwards(shared, remedy(shared, 'record-too-long', 'fewer-averages'))).toContain('averages: 18,');
  });

  it('count all triggered records', () => {
    const text = rig('spectrum: { record: 1 s, averages: 16 }', '', 'run: { records: 5, record: 2.5 s }\n');
    expect(afterwards(text, remedy(text, 'record-too-long', 'fewer-averages'))).toContain('averages: 10 }');
  });

  it('are none where not even one record fits', () => {
    const text = rig('spectrum: { record: 1 s, averages: 16 }', '', 'run: { duration: 0.5 s }\n');
    expect(offered(text, 'record-too-long').map(({ name }) => name)).toEqual(['accept']);
  });
});
