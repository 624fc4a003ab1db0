import { describe, expect, it } from 'vitest';
import { channels, line, lines, OK } from './document-rig.ts';
import { found, only, underlined } from './judged.ts';

describe('missing keys', () => {
  it.each([
    ['a channel', channels('a: { gain: 2 }'), ['a: missing-key `a` band', 'a: missing-key `a` rate']],
    ['a channel without any', channels('a:'), ['a: missing-key `a` band', 'a: missing-key `a` rate']],
    ['a clock', 'clocks: { c: { divide: 2 } }\n', ['clocks/c: missing-key `c` frequency']],
    [
      'a filter',
      'filters: { f: { response: elliptic, order: 4 } }\n',
      ['filters/f: missing-key `f` cutoff', 'filters/f: missing-key `f` ripple', 'filters/f: missing-key `f` stopband'],
    ],
    ['a source', 'sources: { s: { order: 9 } }\n', ['sources/s: missing-key `s` speed']],
    ['a group', 'groups: { g: { up-to: 1 kHz } }\n', ['groups/g: missing-key `g` within']],
    ['an acceptance', 'accept: [{ finding: clips, on: a }]\n', ['accept: missing-key `{` accept[1].reason']],
    ['a step', channels(`a: { ${OK}, then: [{}] }`), ['a: missing-key `{` then[1].decimate']],
  ])('of %s are told at its name, each once', (_, text, expected) => {
    expect(found(`rig: R\n${text}`, 'missing-key').map((finding) => `${line(finding)} ${finding.about}`)).toEqual(
      expected,
    );
  });

  it('of the rig is its name', () => {
    expect(only(channels(`a: { ${OK} }`), 'missing-key')).toMatchObject({ about: 'rig', thing: 'channels' });
  });

  it('are told of each channel that merges too little', () => {
    const text = `x-base: &base { rate: 1 kHz }\n${channels('a: { <<: *base }', 'b: *base')}`;
    expect(lines(text)).toEqual(['a: missing-key `a`', 'b: missing-key `b`']);
  });
});

describe('keys that there are none of', () => {
  it.each([
    ['chanels', `${channels(`a: { ${OK} }`)}chanels: { b: { ${OK} } }\n`, 'channels'],
    ['tolernace', `clocks: { c: { frequency: 1 MHz, tolernace: 1 ppm } }\n`, 'tolerance'],
    ['fullscale', `digitizers: { d: { fullscale: ±1 V } }\n`, 'full-scale'],
    ['cut-off', 'filters: { f: { response: rc, order: 1, cut-off: 1 kHz, corner: 1 kHz } }\n', 'cutoff'],
    ['levle', 'mains: { frequency: 50 Hz, levle: 1 V }\n', 'level'],
    ['fold_limit', channels(`a: { ${OK}, fold_limit: -60 dBFS }`), 'fold-limit'],
    ['decimat', channels(`a: { ${OK}, then: [{ decimat: 5, decimate: 2 }] }`), 'decimate'],
    ['reson', 'accept: [{ finding: clips, on: a, reason: x, reson: y }]\n', 'reason'],
  ])('`%s` is told with the nearest that there is', (key, text, nearest) => {
    const finding = only(`rig: R\n${text}`, 'unknown-key');
    expect(underlined(finding)).toBe(key);
    expect(finding.message).toContain(`\`${nearest}\` is the nearest`);
    expect(finding.cure).toEqual({ kind: 'replace', text: nearest });
    expect(finding.severity).toBe('warning');
  });

  it('is told without one where none is near', () => {
    const finding = only(`rig: R\n${channels(`a: { ${OK}, photograph: 3 }`)}`, 'unknown-key');
    expect(finding.cure).toBeUndefined();
    expect(finding.message).toBe('`photograph` is not a key of a channel, so it is not read.');
  });
});

describe('values of a wrong kind', () => {
  it.each([
    ['a list as a rig', 'rig: [R]\n', 'rig'],
    ['a number as a section', 'clocks: 3\n', 'clocks'],
    ['a list as a section', 'filters: [card]\n', 'filters'],
    ['a number as a thing', 'filters: { f: 3 }\n', 'filters/f'],
    ['a list as a number', 'filters: { f: { response: rc, order: [1], corner: 1 kHz } }\n', 'filters/f'],
    ['a map as a quantity', 'filters: { f: { response: rc, order: 1, corner: { a: 1 } } }\n', 'filters/f'],
    ['a word as a choice', 'filters: { f: { response: brick-wall } }\n', 'filters/f'],
    ['a word as a quantity', 'clocks: { c: { frequency: fast } }\n', 'clocks/c'],
    ['a list as mains', 'mains: [50 Hz]\n', 'mains'],
    ['a number as a channel', channels('a: 4'), 'a'],
    ['a list as a rate', channels(`a: { band: 1..2 Hz, rate: [1 kHz] }`), 'a'],
    ['one frequency as a band', channels(`a: { rate: 1 kHz, band: 3 Hz }`), 'a'],
    ['a range as a rate', channels(`a: { rate: 1..2 kHz, band: 1..2 Hz }`), 'a'],
    ['a frequency where pairs are due', channels(`a: { ${OK.replace('-90 dBFS', '[1 kHz]')} }`), 'a'],
    ['a filter that exists only in numbers', channels(`a: { ${OK}, filter: { response: fir, taps: [1] } }`), 'a'],
    ['nothing', channels(`a: { ${OK}, gain: }`), 'a'],
    ['a value that is merged', channels(`a: { ${OK}, <<: 3 }`), 'a'],
  ])('%s: told once, of whom it concerns', (_, text, whom) => {
    const finding = only(text.startsWith('rig:') ? text : `rig: R\n${text}`, 'wrong-kind');
    expect(finding.channel ?? finding.thing).toBe(whom);
    expect(finding.severity).toBe('error');
  });

  it('never silence a channel that can be understood', () => {
    const text = `filters: 3\nclocks: []\nmains: { a: [] }\n${channels('a: 4', `b: { ${OK}, rati: 1 }`)}`;
    expect(found(`rig: R\n${text}`, 'unknown-key').map(line)).toContain('b: unknown-key `rati`');
  });
});

describe('units', () => {
  it.each([
    ['rate', 'a: { rate: 1000, band: 1..2 Hz }', '1000', ' Hz'],
    ['band', 'a: { rate: 1 kHz, band: 1..2 }', '1..2', ' Hz'],
    ['flatness', `a: { ${OK}, flatness: 2 }`, '2', ' dB'],
    ['peak', `a: { ${OK}, sensitivity: 100 mV/g, peak: 4 }`, '4', ' g'],
    ['fold-limit', `a: { ${OK}, sensitivity: 1 V/Pa, fold-limit: 4 }`, '4', ' Pa'],
  ])('that are missing are told, with the unit that is read: %s', (about, channel, at, unit) => {
    const finding = only(`rig: R\n${channels(channel)}`, 'unit-missing');
    expect(finding).toMatchObject({ about, severity: 'warning', cure: { kind: 'append', text: unit } });
    expect(underlined(finding)).toBe(at);
  });

  it.each([
    ['rate', 'a: { rate: 1 ms, band: 1..2 Hz }', 'ms'],
    ['band', 'a: { rate: 1 kHz, band: 1 Hz .. 2 V }', 'V'],
    ['flatness', `a: { ${OK}, flatness: 2 % }`, '%'],
    ['resolve', `a: { ${OK}, resolve: 1 kS/s }`, 'kS/s'],
    ['peak', `a: { ${OK}, sensitivity: 100 mV/g, peak: 4 Pa }`, '4 Pa'],
  ])('of another dimension are told: %s', (about, channel, at) => {
    const finding = only(`rig: R\n${channels(channel)}`, 'unit-mismatch');
    expect(finding).toMatchObject({ about, severity: 'error' });
    expect(underlined(finding)).toBe(at);
  });

  it('of what has none are not asked for', () => {
    const steps = 'then: [{ decimate: 2, filter: { response: fir, taps: [1, 1] } }]';
    const text = `clocks: { c: { frequency: 1 MHz, divide: 1..8 } }\n${channels(`a: { ${OK}, gain: 2, ${steps} }`)}`;
    expect(found(`rig: R\n${text}`, 'unit-missing')).toEqual([]);
  });
});

describe('numbers that are out of range', () => {
  it.each([
    ['a negative rate', channels('a: { rate: -1 kHz, band: 1..2 Hz }'), '-1 kHz'],
    ['no rate at all', channels('a: { rate: 0 Hz, band: 1..2 Hz }'), '0 Hz'],
    ['a band upside down', channels('a: { rate: 1 kHz, band: 20 Hz .. 10 Hz }'), '20 Hz .. 10 Hz'],
    ['a band without width', channels('a: { rate: 1 kHz, band: 10 Hz .. 10 Hz }'), '10 Hz .. 10 Hz'],
    ['order 0', 'filters: { f: { response: rc, order: 0, corner: 1 Hz } }\n', '0'],
    ['order 51', 'filters: { f: { response: butterworth, order: 51, cutoff: 1 Hz } }\n', '51'],
    ['half an order', 'filters: { f: { response: rc, order: 1.5, corner: 1 Hz } }\n', '1.5'],
    ['a step of factor 0', channels(`a: { ${OK}, then: [{ decimate: 0 }] }`), '0'],
    ['a gain of 0', channels(`a: { ${OK}, gain: 0 }`), '0'],
    [
      'a digital filter beyond half the rate',
      channels(`a: { ${OK}, then: [{ filter: { response: butterworth, order: 2, cutoff: 600 Hz } }] }`),
      '{ response: butterworth, order: 2, cutoff: 600 Hz }',
    ],
  ])('%s', (_, text, at) => {
    const finding = only(`rig: R\n${text}`, 'out-of-range');
    expect(underlined(finding)).toBe(at);
    expect(finding.severity).toBe('error');
  });

  it('are not the largest and the smallest that may be', () => {
    const filters =
      'filters: { f: { response: butterworth, order: 50, cutoff: 1 kHz }, g: { response: rc, order: 1, corner: 1 kHz } }\n';
    expect(found(`rig: R\n${filters}${channels(`a: { ${OK}, filter: [f, g] }`)}`, 'out-of-range')).toEqual([]);
  });
});
