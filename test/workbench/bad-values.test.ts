import { describe, expect, it } from 'vitest';
import { rig, rigWith, told } from './bad-input.ts';
import { findingLines } from './describe-findings.ts';

/** Numbers that no key takes. */
const NO_NUMBERS = ['1e400', '.nan', '.inf', '-.inf', 'NaN', '1e300', '-1e300'];

describe('rates and bands', () => {
  it.each([...NO_NUMBERS, '1e308 GHz', '1e-300 Hz', '1e300 Hz', '-0 Hz', '0 Hz', '-1 kHz', '1e-400 Hz'])(
    'a rate of %s',
    (value) => {
      expect(told(rig(`rate: ${value}, band: 1 Hz .. 10 Hz`))).toEqual([`out-of-range ${value}`]);
    },
  );

  it.each([
    ['1 furlong', 'unit-mismatch furlong'],
    ['1 V', 'unit-mismatch V'],
    ['2 kHz .. 1 kHz', 'wrong-kind 2 kHz .. 1 kHz'],
    ['', 'wrong-kind rate'],
  ])('a rate of %s', (value, expected) => {
    expect(told(rig(`rate: ${value}, band: 1 Hz .. 10 Hz`))).toEqual([expected]);
  });

  it.each([
    ['2 kHz .. 1 kHz', 'out-of-range 2 kHz .. 1 kHz'],
    ['5 Hz .. 5 Hz', 'out-of-range 5 Hz .. 5 Hz'],
    ['-1 Hz .. 5 Hz', 'out-of-range -1 Hz .. 5 Hz'],
    ['0 Hz .. 1e300 Hz', 'out-of-range 0 Hz .. 1e300 Hz'],
    ['5 V .. 3 Hz', 'unit-mismatch V'],
    ['1 Hz ..', 'wrong-kind 1 Hz ..'],
  ])('a band of %s', (value, expected) => {
    expect(told(rig(`rate: 1 kHz, band: ${value}`))).toEqual([expected]);
  });

  it.each([
    ['1 kHz', '5 kHz .. 5 kHz', 'out-of-range 5 kHz .. 5 kHz'],
    ['1e-40 Hz', '10 kHz .. 10.1 kHz', 'bandpass-straddles 1e-40 Hz'],
    ['1e40 Hz', '10 kHz .. 10.1 kHz', 'fold-in-band 1e40 Hz'],
    ['1 kHz', '0 Hz .. 100 Hz', 'fold-in-band 1 kHz'],
  ])('a band that is folded on purpose, at %s: %s', (rate, band, expected) => {
    const sections = 'sources: { s: { frequency: 1 kHz .. 1e45 Hz, level: 1 V, harmonics: 9 } }\n';
    expect(told(rig(`rate: ${rate}, band: ${band}, sampling: bandpass, full-scale: ±1 V`, sections))).toContain(
      expected,
    );
  });
});

describe('counts', () => {
  const clock = (divide: string): string =>
    rigWith(
      'digitizer: d',
      `clocks: { c: { frequency: 1 MHz, divide: ${divide} } }\ndigitizers: { d: { clock: c } }\n`,
    );
  const converter = (keys: string): string =>
    rigWith('digitizer: d', `digitizers: { d: { full-scale: ±1 V, ${keys} } }\n`);
  const step = (filter: string): string => rigWith(`then: [{ decimate: 2, filter: ${filter} }]`);

  const PLACES: readonly (readonly [string, (value: string) => string])[] = [
    ['order', (value) => rigWith(`filter: { response: butterworth, order: ${value}, cutoff: 100 Hz }`)],
    ['harmonics', (value) => rigWith('hears: none', `sources: { s: { frequency: 9 Hz, harmonics: ${value} } }\n`)],
    [
      'sidebands',
      (value) =>
        rigWith('', `sources: { s: { carrier: 9 Hz, modulation: 1 Hz, sidebands: ${value}, level: -99 dBFS } }\n`),
    ],
    ['divide', clock],
    ['converters', (value) => converter(`interleave: { converters: ${value}, gain-mismatch: 1 % }`)],
    ['bits', (value) => converter(`bits: ${value}`)],
    ['of', (value) => rigWith(`pattern: { of: ${value}, take: [0] }`)],
    ['take', (value) => rigWith(`pattern: { of: 10, take: [${value}] }`)],
    ['decimate', (value) => rigWith(`then: [{ decimate: ${value} }]`)],
    ['per-turn', (value) => rigWith(`then: [{ per-turn: ${value}, speed: 600..3000 rpm }]`)],
    ['passes', (value) => step(`{ response: fir, taps: [1, 1], passes: ${value} }`)],
    ['length', (value) => step(`{ response: moving-average, length: ${value} }`)],
    ['lines', (value) => rigWith(`spectrum: { lines: ${value} }`)],
    ['averages', (value) => rigWith(`spectrum: { lines: 10, averages: ${value} }`)],
    ['records', (value) => rigWith('', `run: { records: ${value}, record: 4 s }\n`)],
  ];

  it.each(
    PLACES.flatMap(([key, text]) => [...NO_NUMBERS, '-1', '1.5'].map((value) => [key, value, text(value)] as const)),
  )('%s: %s', (_, value, text) => {
    expect(told(text)).toContain(`out-of-range ${value}`);
  });

  it.each(
    PLACES.filter(([key]) => !['harmonics', 'sidebands', 'take'].includes(key)).map(([key, text]) => [key, text('0')]),
  )('%s: 0', (_, text) => {
    expect(told(text)).toContain('out-of-range 0');
  });

  it.each([
    ['order', 'out-of-range 1e9'],
    ['harmonics', 'too-much 1e9'],
    ['sidebands', 'too-much 1e9'],
    ['divide', 'rate-unreachable 1 kHz'],
    ['converters', 'out-of-range 1e9'],
    ['of', 'out-of-range 1e9'],
    ['take', 'out-of-range [1e9]'],
    ['decimate', 'out-of-range 1e9'],
    ['length', 'out-of-range 1e9'],
    ['passes', 'out-of-range 1e9'],
  ])('%s: 1e9', (key, expected) => {
    expect(told(PLACES.find(([name]) => name === key)![1]('1e9'))).toContain(expected);
  });

  it.each([
    ['pattern: { of: 10, take: [] }', 'out-of-range []'],
    ['then: [{ decimate: 2, filter: { response: fir, taps: [0, 0, 0] } }]', 'out-of-range [0, 0, 0]'],
    ['then: [{ decimate: 2, filter: { response: fir, taps: [] } }]', 'out-of-range []'],
    ['then: [{ decimate: 2, filter: { response: fir, taps: [1, -1], passes: 3 } }]', 'out-of-range 3'],
  ])('%s', (keys, expected) => {
    expect(told(rigWith(keys))).toContain(expected);
  });
});

describe('spectra and runs', () => {
  const RUN = 'run: { duration: 1 h }\n';

  it.each([
    ['lines: 1e12', 'record-too-long 1e12'],
    ['resolution: 0 Hz', 'out-of-range 0 Hz'],
    ['resolution: 1e-40 Hz', 'record-too-long 1e-40 Hz'],
    ['record: 1e40 s', 'record-too-long 1e40 s'],
    ['lines: 800, record: 1 s', 'wrong-kind 1 s'],
    ['lines: 800, resolution: 1 Hz', 'wrong-kind 1 Hz'],
    ['lines: 10, separate: 1e-40 Hz', 'lines-too-coarse 10'],
    ['window: hann', 'wrong-kind {'],
  ])('%s', (keys, expected) => {
    expect(told(rigWith(`spectrum: { ${keys} }`, RUN)).some((line) => line.startsWith(expected))).toBe(true);
  });

  it.each([
    ['duration: -1 s', 'out-of-range -1 s'],
    ['duration: 1e300 h', 'out-of-range 1e300 h'],
    ['duration: 1 h, disk: -1 GB', 'out-of-range -1 GB'],
    ['duration: 1 h, link: 0 B/s', 'out-of-range 0 B/s'],
    ['duration: 1 h, disk: 1 B, sample-size: 1e40 bit', 'disk-short 1 B'],
    ['duration: 1 h, link: 1 B/s, sample-size: 1e40 bit', 'link-short 1 B/s'],
    ['records: 5', 'missing-key {'],
  ])('%s', (keys, expected) => {
    expect(told(rigWith('', `run: { ${keys} }\n`))).toContain(expected);
  });

  it.each(['100 %', '1000000 ppm'])('the end of a ratio is told in its own unit: %s', (limit) => {
    const text = rigWith(`spectrum: { lines: 10, overlap: ${limit} }`);
    expect(told(text)).toEqual([`out-of-range ${limit}`]);
    expect(findingLines(text)).toContainEqual(expect.stringContaining('spectrum.overlap'));
  });
});

describe('shafts', () => {
  const PER_TURN = (perTurn: number, speed: string): string =>
    rigWith(
      `full-scale: ±1 V, then: [{ per-turn: ${perTurn}, speed: ${speed} }]`,
      `sources: { s: { order: 9, speed: ${speed}, level: 1 V, harmonics: 1000 } }\n`,
    );

  it.each(['0..0 rpm', '0 rpm', '-5..5 rpm', '3000..600 rpm', '1e-300..1e300 rpm', '0..3000 rpm'])(
    'a speed of %s',
    (speed) => {
      for (const perTurn of [64, 1_000_000_000]) {
        expect(told(PER_TURN(perTurn, speed))).toEqual([`out-of-range ${speed}`, `out-of-range ${speed}`]);
      }
      expect(told(rigWith(`pulses: { per-turn: 60, speed: ${speed} }`))).toEqual([`out-of-range ${speed}`]);
    },
  );

  it.each(['1e-40..1e40 rpm', '1e-40 rpm'])('a speed of %s, which is only unlikely', (speed) => {
    expect(told(PER_TURN(64, speed))).toContain('band-over-nyquist 64');
    expect(told(PER_TURN(1_000_000_000, speed))).toContain('band-over-nyquist 1000000000');
  });

  it.each(['0 %', '100 %', '-5 %', '1e400 %'])('pulses with a duty of %s', (duty) => {
    expect(told(rigWith(`pulses: { per-turn: 60, speed: 600..3000 rpm, duty: ${duty} }`))).toContain(
      `out-of-range ${duty}`,
    );
  });
});

describe('amplitudes', () => {
  it.each([
    ['full-scale: 5 V .. -5 V', 'out-of-range 5 V .. -5 V'],
    ['full-scale: ±0 V', 'out-of-range ±0 V'],
    ['full-scale: ±1e300 V', 'out-of-range ±1e300 V'],
    ['full-scale: ±1e-45 V, peak: 1e45 V', 'clips 1e45 V'],
    ['full-scale: ±1e-45 V, gain: 1e45, peak: 1 V', 'clips 1 V'],
    ['rated: 1e45 mV/V, excitation: 1e45 V, range: 1e-45 N, peak: 1 N, full-scale: ±1 V', 'clips 1 N'],
    ['peak: 1 furlong', 'level-unplaced a'],
  ])('%s', (keys, expected) => {
    expect(told(rigWith(keys))).toContain(expected);
  });
});
