import { describe, expect, it } from 'vitest';
import type { Filter, Source } from '../../server/src/rig/model.ts';
import { RESPONSES } from '../../server/src/rig/vocabulary-filters.ts';
import { channelRig, expectOneProblem, readRig, saidOf, thingRig } from './fixture.ts';

function filter(keys: string): Filter {
  const rig = readRig(thingRig('filters', keys));
  expect(saidOf(rig)).toEqual([]);
  return rig.environment.filters.get('x')!;
}

function source(keys: string): Source {
  const rig = readRig(thingRig('sources', keys));
  expect(saidOf(rig)).toEqual([]);
  return rig.environment.sources.get('x')!;
}

/** One complete filter of each response. */
const COMPLETE: Readonly<Record<string, string>> = {
  butterworth: 'order: 6\ncutoff: 8 kHz',
  bessel: 'order: 4\ncutoff: 8 kHz',
  chebyshev: 'order: 5\nripple: 0.5 dB\npass-edge: 8 kHz',
  'inverse-chebyshev': 'order: 5\nstopband: 60 dB\nstop-edge: 12 kHz',
  elliptic: 'order: 5\nripple: 0.1 dB\nstopband: 80 dB\ncutoff: 0.2 fs',
  rc: 'order: 2\ncorner: 1.6 kHz',
  mask: 'pass: 0.453 fs\nstop: 0.547 fs\nstopband: 100 dB',
  points: 'points: [[1 kHz, 0.1 dB], [10 kHz, 40 dB]]',
  aperture: 'time: 20 ms',
  fir: 'taps: [0.25, 0.5, 0.25]',
  kaiser: 'pass: 0.2 fs\nstop: 0.3 fs\nstopband: 90 dB',
  'half-band': 'pass: 0.2 fs\nstopband: 90 dB',
  'moving-average': 'length: 8',
  cic: 'order: 3',
};

describe('a filter', () => {
  it.each(RESPONSES.map(({ name }) => name))('of the response %s is read', (name) => {
    expect(filter(`response: ${name}\n${COMPLETE[name]}`).response?.response).toBe(name);
  });

  it.each(RESPONSES.map((row) => [row.name, row] as const))('of the response %s needs what it needs', (name, row) => {
    const rig = readRig(thingRig('filters', `response: ${name}`));
    const needed = row.needs.length;
    expect(rig.problems.filter(({ problem }) => problem.name === 'missing-key')).toHaveLength(needed);
    expect(rig.environment.filters.get('x')?.response).toBeUndefined();
  });

  it('has its numbers in base units', () => {
    expect(
      filter('response: elliptic\norder: 5\nripple: 0.1 dB\nstopband: 80 dB\npass-edge: 8 kHz\ntolerance: 5 %'),
    ).toMatchObject({
      response: { order: 5, rippleDb: 0.1, stopbandDb: 80, edge: { at: 'pass-edge', value: { low: { hz: 8000 } } } },
      order: { value: 5 },
      tolerance: 0.05,
      passes: 1,
    });
    expect(filter('response: mask\npass: 0.45 fs\nstop: 0.55 fs\nstopband: 100 dB')).toMatchObject({
      response: { pass: { value: { kind: 'of-rate', fraction: 0.45 } }, rippleDb: 0 },
    });
    expect(filter('response: butterworth\nshape: band-pass\norder: 2\ncutoff: 1 .. 4 kHz').response).toMatchObject({
      shape: 'band-pass',
      edge: { value: { low: { hz: 1000 }, high: { hz: 4000 } } },
    });
    expect(filter('response: half-band\ntaps: [-1, 0, 9, 16, 9, 0, -1]').response).toMatchObject({
      taps: { length: 7 },
    });
  });

  it.each([
    ['no response', 'filters:\n  ⟦x⟧: { order: 2 }\n', 'missing-key'],
    ['order 0', thingRig('filters', 'response: rc\ncorner: 1 Hz\norder: ⟦0⟧'), 'out-of-range'],
    ['order over 50', thingRig('filters', 'response: rc\ncorner: 1 Hz\norder: ⟦51⟧'), 'out-of-range'],
    ['order 10^9', thingRig('filters', 'response: rc\ncorner: 1 Hz\norder: ⟦1000000000⟧'), 'out-of-range'],
    ['half an order', thingRig('filters', 'response: rc\ncorner: 1 Hz\norder: ⟦2.5⟧'), 'out-of-range'],
    ['an unknown response', thingRig('filters', 'response: ⟦buterworth⟧\norder: 1\ncutoff: 1 Hz'), 'wrong-kind'],
    ['a negative cutoff', thingRig('filters', 'response: bessel\norder: 1\ncutoff: ⟦-1 Hz⟧'), 'out-of-range'],
    ['a range in a low-pass', thingRig('filters', 'response: bessel\norder: 1\ncutoff: ⟦1..2 Hz⟧'), 'wrong-kind'],
    [
      'one value in a band-pass',
      thingRig('filters', 'response: bessel\nshape: band-pass\norder: 1\ncutoff: ⟦1 Hz⟧'),
      'wrong-kind',
    ],
    [
      'a band-pass of both kinds',
      thingRig('filters', 'response: bessel\nshape: band-pass\norder: 1\ncutoff: ⟦0.1 fs .. 1 kHz⟧'),
      'unit-mismatch',
    ],
    [
      'two edges',
      thingRig('filters', 'response: chebyshev\norder: 1\nripple: 1 dB\ncutoff: 1 Hz\npass-edge: ⟦2 Hz⟧'),
      'wrong-kind',
    ],
    [
      'ripple past the cutoff',
      thingRig('filters', 'response: chebyshev\norder: 3\nripple: ⟦3.0103 dB⟧\ncutoff: 1 Hz'),
      'out-of-range',
    ],
    ['no ripple', thingRig('filters', 'response: chebyshev\norder: 3\nripple: ⟦0 dB⟧\ncutoff: 1 Hz'), 'out-of-range'],
    [
      'a stop band above the cutoff',
      thingRig('filters', 'response: inverse-chebyshev\norder: 3\nstopband: ⟦3 dB⟧\ncutoff: 1 Hz'),
      'out-of-range',
    ],
    [
      'a stop band above the ripple',
      thingRig('filters', 'response: elliptic\norder: 3\nripple: 6 dB\nstopband: ⟦5 dB⟧\npass-edge: 1 Hz'),
      'out-of-range',
    ],
    [
      'a mask upside down',
      thingRig('filters', 'response: mask\npass: 2 kHz\nstop: ⟦1 kHz⟧\nstopband: 60 dB'),
      'out-of-range',
    ],
    [
      'a half-band that passes half',
      thingRig('filters', 'response: half-band\npass: ⟦0.25 fs⟧\nstopband: 60 dB'),
      'out-of-range',
    ],
    [
      'points going down',
      thingRig('filters', 'response: points\npoints: [[2 kHz, 1 dB], ⟦[1 kHz, 3 dB]⟧]'),
      'out-of-range',
    ],
    [
      'points of both kinds',
      thingRig('filters', 'response: points\npoints: [[2 kHz, 1 dB], ⟦[0.4 fs, 3 dB]⟧]'),
      'unit-mismatch',
    ],
    ['a point of one value', thingRig('filters', 'response: points\npoints: [⟦[2 kHz]⟧]'), 'wrong-kind'],
    ['points that are none', thingRig('filters', 'response: points\npoints: ⟦[]⟧'), 'wrong-kind'],
    ['taps that are no list', thingRig('filters', 'response: fir\ntaps: ⟦5⟧'), 'wrong-kind'],
    ['taps that pass nothing', thingRig('filters', 'response: fir\ntaps: ⟦[0, 0]⟧'), 'out-of-range'],
    ['a tap that is no number', thingRig('filters', 'response: fir\ntaps: [1, ⟦x⟧]'), 'wrong-kind'],
    [
      'a key of another response',
      thingRig('filters', 'response: bessel\norder: 1\ncutoff: 1 Hz\nripple: ⟦1 dB⟧'),
      'unknown-key',
    ],
    ['three passes', thingRig('filters', 'response: fir\ntaps: [1]\npasses: ⟦3⟧'), 'out-of-range'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text.startsWith('rig') ? text : `rig: R\n${text}`, name);
  });

  const NAMED =
    'filters:\n  num: { response: fir, taps: [1, 1] }\n  twice: { response: rc, order: 1, corner: 1 Hz, passes: 2 }\n  sinc: { response: cic, order: 3 }\n';

  it.each([
    ['a digital filter ahead of the converter', 'filter: ⟦num⟧'],
    ['a filter run backward ahead of the converter', 'filter: [⟦twice⟧]'],
    ['a rate-changing filter without a change of rate', 'then: [{ filter: ⟦sinc⟧ }]'],
    ['a filter that is a list in a list', 'filter: [⟦[num]⟧]'],
  ])('in use: is told of %s', (_, keys) => {
    expectOneProblem(channelRig(keys, NAMED), 'wrong-kind');
  });

  it('in use where it fits is what it is', () => {
    const { readings, ...rig } = readRig(
      channelRig('then: [{ decimate: 4, filter: [sinc, num] }]\nfilter: none', NAMED),
    );
    expect(saidOf({ readings, ...rig })).toEqual([]);
    const [step] = readings[0]!.channel.steps;
    expect(step?.filters.map(({ filter: used }) => used)).toEqual([
      rig.environment.filters.get('sinc'),
      rig.environment.filters.get('num'),
    ]);
    expect(readings[0]!.channel.filterPlace).toBeDefined();
  });
});

describe('a source', () => {
  it('is told by its keys', () => {
    expect(source('frequency: 100 .. 120 Hz')).toMatchObject({
      type: 'tone',
      frequency: { value: { lowHz: 100, highHz: 120 } },
      harmonics: 1,
      levels: [],
      enters: 'wiring',
      entersSaid: false,
    });
    expect(source('order: 9\nspeed: 600..3000 rpm\nlevel: 2 g')).toMatchObject({
      type: 'rotating',
      order: 9,
      speed: { value: { lowHz: 10, highHz: 50 } },
      enters: 'sensor',
    });
    expect(source('carrier: 16 kHz\nmodulation: 50 Hz\nlevel: 400 mV\nenters: sensor')).toMatchObject({
      type: 'modulated',
      sidebands: 1,
      levels: [{ value: { kind: 'volts', peakV: 0.4 } }],
      enters: 'sensor',
      entersSaid: true,
    });
  });

  it('has its level as a peak', () => {
    // A sinusoid's peak is sqrt 2 times its rms value, and half of its peak-to-peak value.
    const peak = (level: string) => source(`frequency: 1 Hz\nlevel: ${level}`).levels[0]?.value;
    expect(peak('1 V rms')).toMatchObject({ peakV: expect.closeTo(Math.SQRT2, 12) });
    expect(peak('4 V p-p')).toMatchObject({ peakV: 2 });
    expect(peak('-40 dBFS')).toEqual({ kind: 'dbfs', dbfs: -40 });
    expect(peak('5 lux')).toMatchObject({ kind: 'measured', measured: 'other', unit: 'lux', peak: 5 });
    expect(source('frequency: 1 Hz\nharmonics: 3\nlevel: [1 V, 0.5 V]').levels).toHaveLength(2);
  });

  it('called mains is the line frequency, a percent either way', () => {
    const mains = (text: string) => readRig(`rig: R\nmains: ${text}\n`).environment.sources.get('mains');
    expect(mains('50 Hz')).toMatchObject({ type: 'tone', tolerance: 0.01, frequency: { value: { lowHz: 50 } } });
    expect(mains('{ frequency: 60 Hz, tolerance: 2 %, harmonics: 7 }')).toMatchObject({
      tolerance: 0.02,
      harmonics: 7,
    });
    expect(mains('fifty')).toBeUndefined();
  });

  it.each([
    ['nothing to tell its kind by', 'rig: R\nsources:\n  ⟦x⟧: { harmonics: 2 }\n', 'missing-key'],
    ['half of what it needs', 'rig: R\nsources:\n  ⟦x⟧: { order: 2 }\n', 'missing-key'],
    ['keys of two kinds', thingRig('sources', 'order: 2\nspeed: 60 rpm\nfrequency: ⟦5 Hz⟧'), 'wrong-kind'],
    ['a negative frequency', thingRig('sources', 'frequency: ⟦-5 Hz⟧'), 'out-of-range'],
    ['no harmonic at all', thingRig('sources', 'frequency: 5 Hz\nharmonics: ⟦0⟧'), 'out-of-range'],
    ['too many harmonics', thingRig('sources', 'frequency: 5 Hz\nharmonics: ⟦1000000000⟧'), 'too-much'],
    ['too many sidebands', thingRig('sources', 'carrier: 5 Hz\nmodulation: 1 Hz\nsidebands: ⟦1001⟧'), 'too-much'],
    ['a level of nothing', thingRig('sources', 'frequency: 5 Hz\nlevel: ⟦0 V⟧'), 'out-of-range'],
    ['a level without a unit', thingRig('sources', 'frequency: 5 Hz\nlevel: ⟦2⟧'), 'unit-missing'],
    ['a level in per cent', thingRig('sources', 'frequency: 5 Hz\nlevel: 5 ⟦%⟧'), 'unit-mismatch'],
    ['a maybe', thingRig('sources', 'frequency: 5 Hz\nwanted: ⟦yes⟧'), 'wrong-kind'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  it('with too many harmonics has as many as can be computed', () => {
    const rig = readRig(thingRig('sources', 'frequency: 5 Hz\nharmonics: 1e9'));
    expect(rig.environment.sources.get('x')?.harmonics).toBe(1000);
  });
});

describe('what a channel hears', () => {
  const SOURCES = `mains: 50 Hz
sources:
  fan: { frequency: 90 Hz, level: 2 g }
  hum: { frequency: 100 Hz, level: 3 ue }
  drive: { frequency: 9 kHz, level: 20 mV }
  glow: { frequency: 7 Hz, level: 5 lux }
`;
  const G = 'sensitivity: 100 mV/g';

  function heard(keys: string) {
    const rig = readRig(channelRig(keys, SOURCES));
    expect(saidOf(rig)).toEqual([]);
    const { channel } = rig.readings[0]!;
    return {
      heard: channel.heard.map(({ source: { name }, level }) => [name, level?.value]),
      unheard: channel.unheard.map(({ name }) => name),
    };
  }
  const names = (keys: string) => heard(keys).heard.map(([name]) => name);

  it('is every source whose level it can place', () => {
    expect(names(G)).toEqual(['mains', 'fan', 'drive']);
    expect(heard(G).unheard).toEqual(['hum', 'glow']);
    expect(names(`${G}\nhears: all`)).toEqual(['mains', 'fan', 'drive']);
    expect(names('')).toEqual(['mains', 'drive']);
    expect(names('sensitivity: 2 mV/lux')).toEqual(['mains', 'drive', 'glow']);
    expect(names('measures: strain')).toEqual(['mains', 'hum', 'drive']);
  });

  it('is nothing where it says so', () => {
    expect(heard(`${G}\nhears: none`)).toEqual({ heard: [], unheard: [] });
  });

  it('is what a list names, in whatever quantity, in the order of the file', () => {
    expect(names(`${G}\nhears: [hum, fan, hum]`)).toEqual(['fan', 'hum']);
  });

  it('is changed by a map for those it names, and stays for the rest', () => {
    expect(heard(`${G}\nhears: { drive: 5 mV, fan: none, hum: }`)).toEqual({
      heard: [
        ['mains', undefined],
        ['hum', undefined],
        ['drive', { kind: 'volts', peakV: 0.005 }],
      ],
      unheard: ['glow'],
    });
  });

  it('is one and the same list for all who hear all and measure the same', () => {
    const rig = readRig(`${channelRig(G, SOURCES)}  b: { rate: 2 kHz, band: 1..2 Hz, measures: acceleration }\n`);
    expect(rig.readings[0]!.channel.heard).toBe(rig.readings[1]!.channel.heard);
  });
});
