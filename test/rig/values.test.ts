import { describe, expect, it } from 'vitest';
import { channelRig, expectOneProblem, readRig, saidOf, textAt, thingRig } from './fixture.ts';

const CARD = 'filters:\n  card: { response: butterworth, order: 6, cutoff: 8 kHz }\n';

function channel(keys: string, rest = '') {
  const rig = readRig(channelRig(keys, rest));
  expect(saidOf(rig)).toEqual([]);
  return rig.readings[0]!.channel;
}

describe('a value', () => {
  it.each([
    ['rate: 25.6 kHz', 25_600],
    ['rate: 25.6kS/s', 25_600],
    ['rate: "25.6 kHz"', 25_600],
    ["rate: '8e3 Hz'", 8000],
  ])('is read in base units: %s', (keys, rateHz) => {
    const rig = readRig(`rig: R\nchannels:\n  a:\n    ${keys}\n    band: 1 Hz .. 100 Hz\n`);
    expect(saidOf(rig)).toEqual([]);
    const { rateHz: read } = rig.readings[0]!.channel;
    expect(read?.value).toBeCloseTo(rateHz, 9);
    expect(read?.written?.kind).toBe('scalar');
  });

  it('stands at its own text, without its quotes', () => {
    const { rateHz } = readRig('rig: R\nchannels:\n  a: { rate: "1 kHz", band: 1..2 Hz }\n').readings[0]!.channel;
    expect(rateHz?.place.entry.text.slice(rateHz.place.start, rateHz.place.end)).toBe('1 kHz');
  });

  it.each([
    ['a missing unit', 'gain: 2\nheadroom: ⟦3⟧', 'unit-missing', { kind: 'append', text: ' dB' }],
    ['a missing unit in quotes', 'headroom: "⟦3⟧"', 'unit-missing', { kind: 'append', text: ' dB' }],
    ['a unit in another case', 'headroom: 3 ⟦db⟧', 'unit-mismatch', { kind: 'replace', text: 'dB' }],
    ['a unit of another dimension', 'headroom: 3 ⟦Hz⟧', 'unit-mismatch', undefined],
    ['a unit where a number is due', 'gain: ⟦2 dB⟧', 'unit-mismatch', undefined],
    ['a sample rate where a frequency is due', 'corner: 5 ⟦kS/s⟧\nmeasures: force', 'unit-mismatch', undefined],
    ['a word where a quantity is due', 'headroom: ⟦plenty⟧', 'wrong-kind', undefined],
    ['a range where one value is due', 'flatness: ⟦1 .. 2 dB⟧', 'wrong-kind', undefined],
    ['a list where a value is due', 'flatness: ⟦[1 dB]⟧', 'wrong-kind', undefined],
    ['a map where a value is due', 'flatness: ⟦{ a: 1 dB }⟧', 'wrong-kind', undefined],
    ['nothing where a value is due', '⟦flatness⟧:', 'wrong-kind', undefined],
    ['a negative value', 'headroom: ⟦-3 dB⟧', 'out-of-range', undefined],
    ['a gain of nothing', 'gain: ⟦0⟧', 'out-of-range', undefined],
    ['a number too large', 'gain: ⟦1e400⟧', 'out-of-range', undefined],
    ['no number at all', 'headroom: ⟦NaN dB⟧', 'out-of-range', undefined],
    ['a full scale of one value', 'full-scale: ⟦10 V⟧', 'wrong-kind', undefined],
    ['a full scale without width', 'full-scale: ⟦2..2 V⟧', 'out-of-range', undefined],
    ['a word that is no choice', 'measures: ⟦acelleration⟧', 'wrong-kind', { kind: 'replace', text: 'acceleration' }],
    ['a key that does not exist', '⟦flatnes⟧: 1 dB', 'unknown-key', { kind: 'replace', text: 'flatness' }],
    ['a key like nothing', '⟦wibble-wobble⟧: 1 dB', 'unknown-key', undefined],
    ['a key called __proto__', '⟦__proto__⟧: 1 dB', 'unknown-key', undefined],
    ['a key called constructor', '⟦constructor⟧: 1 dB', 'unknown-key', undefined],
    ['an rms peak', 'sensitivity: 100 mV/g\npeak: ⟦40 g rms⟧', 'wrong-kind', undefined],
    ['a negative peak', 'sensitivity: 100 mV/g\npeak: ⟦-40 g⟧', 'out-of-range', undefined],
    ['a peak upside down', 'sensitivity: 100 mV/g\npeak: ⟦40 .. 10 g⟧', 'out-of-range', undefined],
    ['a limit of nothing', 'sensitivity: 100 mV/g\nfold-limit: ⟦0 g⟧', 'out-of-range', undefined],
    ['a limit in another quantity', 'sensitivity: 100 mV/g\nfold-limit: ⟦5 Pa⟧', 'unit-mismatch', undefined],
    ['a bare peak', 'sensitivity: 100 mV/g\npeak: ⟦40⟧', 'unit-missing', { kind: 'append', text: ' g' }],
    ['a bare peak of nothing known', 'peak: ⟦40⟧', 'unit-missing', undefined],
    ['a step that keeps nothing', 'then: [{ decimate: ⟦0⟧ }]', 'out-of-range', undefined],
    ['a broken decimation', 'then: [{ decimate: ⟦2.5⟧ }]', 'out-of-range', undefined],
    ['a step that does nothing', 'then: [⟦{⟧}]', 'missing-key', { kind: 'add-key', key: 'decimate' }],
    ['a step that is no map', 'then: [⟦5⟧]', 'wrong-kind', undefined],
    ['steps that are no list', 'then: ⟦{ decimate: 5 }⟧', 'wrong-kind', undefined],
    ['undeclared points going down', 'undeclared: ⟦[[2 kHz, -40 dBFS], [1 kHz, -50 dBFS]]⟧', 'out-of-range', undefined],
    ['an undeclared point without a level', 'undeclared: [⟦[2 kHz]⟧]', 'wrong-kind', undefined],
    ['a sensor described twice', 'sensor: { sensitivity: 1 V/g }\nresonance: ⟦5 kHz⟧', 'wrong-kind', undefined],
    ['hearing a map of nothing', 'hears: ⟦some⟧', 'wrong-kind', undefined],
    ['a name nobody has', 'hears: [⟦hum⟧]', 'unknown-name', undefined],
    ['a name in a map that nobody has', 'hears: { ⟦hum⟧: none }', 'unknown-name', undefined],
    [
      'a practice nobody knows',
      'follows: ⟦impact-clas-1000⟧',
      'unknown-name',
      { kind: 'replace', text: 'impact-class-1000' },
    ],
    ['a practice like none', 'follows: [⟦xyzzy⟧]', 'unknown-name', undefined],
    ['a practice written in place', 'follows: ⟦{ rate: 10 kHz }⟧', 'wrong-kind', undefined],
    ['a list among practices', 'follows: [⟦[shock-peaks]⟧]', 'wrong-kind', undefined],
    ['following nothing', '⟦follows⟧:', 'wrong-kind', undefined],
    ['an alias to nowhere', 'gain: ⟦*nowhere⟧', 'unknown-name', undefined],
  ] as const)('is told of %s', (_, keys, name, cure) => {
    expectOneProblem(channelRig(keys), name, cure);
  });

  it.each([
    ['a range upside down', 'band: ⟦10 kHz .. 5 Hz⟧', 'out-of-range'],
    ['a band of one value', 'band: ⟦10 kHz⟧', 'wrong-kind'],
    ['a band without width', 'band: ⟦5 Hz .. 5 Hz⟧', 'out-of-range'],
    ['a negative band', 'band: ⟦-5 Hz .. 5 Hz⟧', 'out-of-range'],
    ['half a band', 'band: ⟦5 Hz ..⟧', 'wrong-kind'],
  ])('is told of %s', (_, keys, name) => {
    expectOneProblem(`rig: R\nchannels:\n  a:\n    rate: 1 kHz\n    ${keys}\n`, name);
  });

  it.each([
    ['⟦-25.6 kHz⟧', 'out-of-range'],
    ['⟦0 Hz⟧', 'out-of-range'],
    ['⟦-0⟧ Hz', 'out-of-range'],
    ['⟦25600⟧', 'unit-missing'],
    ['25.6 ⟦KHZ⟧', 'unit-mismatch'],
    ['25.6 ⟦s⟧', 'unit-mismatch'],
    ['⟦0.5 fs⟧', 'unit-mismatch'],
    ['⟦1,000⟧ Hz', 'wrong-kind'],
  ])('can be a wrong rate: %s', (rate, name) => {
    const marked = rate === '⟦-0⟧ Hz' ? '⟦-0 Hz⟧' : rate.replace('⟦0.5 fs⟧', '0.5 ⟦fs⟧');
    expectOneProblem(`rig: R\nchannels:\n  a:\n    rate: ${marked}\n    band: 1 Hz .. 100 Hz\n`, name);
  });

  it('gets its unit within the quotes that JSON needs', () => {
    const rig = '{ "rig": "R", "channels": { "a": { "rate": ⟦25600⟧, "band": "1..2 Hz" } } }';
    expectOneProblem(rig, 'unit-missing', { kind: 'replace', text: '"25600 Hz"' });
  });

  it('in its bare form is read in the unit that is due', () => {
    const rig = readRig('rig: R\nchannels:\n  a: { rate: 1000, band: 1..100 }\n');
    const { rateHz, band } = rig.readings[0]!.channel;
    expect([rateHz?.value, band?.value]).toEqual([1000, { lowHz: 1, highHz: 100 }]);
    expect(saidOf(rig)).toEqual(['unit-missing: 1000', 'unit-missing: 1..100']);
  });

  it('out of range leaves the rest of its channel readable', () => {
    const rig = readRig(channelRig('gain: 0\nheadroom: 6 dB'));
    expect(rig.readings[0]!.channel).toMatchObject({ complete: true, gain: undefined, headroomDb: { value: 6 } });
  });
});

describe('a channel', () => {
  it('has everything it says', () => {
    const read = channel(
      'sensitivity: 100 mV/g\nfilter: [card, { response: rc, order: 1, corner: 1 kHz }]\nfold-limit: 0.01 %\nundeclared: [[1 kHz, -40 dBFS], [2 kHz, 1 g]]\npeak: -10 .. 40 g\nthen: [{ decimate: 5, filter: card }, { filter: card }]\nfull-scale: 0..5 V',
      CARD,
    );
    expect(read.filters.map(({ filter }) => filter?.name)).toEqual(['card', '']);
    expect(read.foldLimit?.value).toEqual({ kind: 'ratio', ratio: 1e-4 });
    expect(read.undeclared?.value).toMatchObject({
      kind: 'points',
      points: [
        { frequencyHz: 1000, level: { kind: 'dbfs', dbfs: -40 } },
        { frequencyHz: 2000, level: { kind: 'measured', measured: 'acceleration', unit: 'g' } },
      ],
    });
    expect(read.peak?.value).toMatchObject({ single: false, low: { unit: 'g' } });
    expect(read.steps.map(({ kind }) => kind)).toEqual(['decimate', 'filter']);
    expect(read.fullScale?.value).toEqual({ lowV: 0, highV: 5 });
  });

  it('takes volts as the measured unit of a sensor of voltage, and as volts anywhere else', () => {
    const voltage = channel('measures: voltage\npeak: 5 V');
    expect(voltage.sensor?.sensitivity?.value).toBe(1);
    expect(voltage.peak?.value.high).toEqual({ kind: 'measured', peak: 5, measured: 'voltage', unit: 'V' });
    expect(channel('sensitivity: 100 mV/g\npeak: 5 V').peak?.value.high).toEqual({ kind: 'volts', peakV: 5 });
  });

  it('tells what it measures from the unit of its sensitivity', () => {
    expect(channel('sensitivity: 41 uV/K').sensor?.measures?.value).toBe('temperature');
    expect(channel('sensitivity: 2 mV/lux\npeak: 50 lux').sensor).toMatchObject({
      measures: { value: 'other' },
      unit: 'lux',
    });
  });

  it('works out the sensitivity of a bridge: rated times excitation over range', () => {
    // 2 mV/V at 10 V is 20 mV over 500 N.
    expect(channel('rated: 2 mV/V\nexcitation: 10 V\nrange: 500 N').sensor?.sensitivity?.value).toBeCloseTo(4e-5, 12);
  });

  it.each([
    ['rate', 'rig: R\nchannels:\n  ⟦a⟧: { band: 1..2 Hz }\n'],
    ['band', 'rig: R\nchannels:\n  ⟦a⟧: { rate: 1 Hz }\n'],
  ])('is told at its name that its %s is missing', (key, text) => {
    const { problem } = expectOneProblem(text, 'missing-key', { kind: 'add-key', key });
    expect(problem.about).toBe(key);
  });

  it('is not complete without rate and band, but a pulse train needs none', () => {
    const complete = (text: string) => readRig(text).readings[0]!.channel.complete;
    expect(complete(channelRig(''))).toBe(true);
    expect(complete('rig: R\nchannels:\n  a: { rate: 1 kHz }\n')).toBe(false);
    expect(complete('rig: R\nchannels:\n  a: { rate: x, band: 1..2 Hz }\n')).toBe(false);
    expect(complete(channelRig('sampling: bandpass'))).toBe(true);
    expect(complete('rig: R\nchannels:\n  a: { rate: 1 kHz, pulses: { per-turn: 60, speed: 600 rpm } }\n')).toBe(true);
  });

  it('that stands for several is one entry with their count', () => {
    const rig = readRig('rig: R\nchannels:\n  "strain-{01..64}": { rate: 1 kHz, band: 1..2 Hz }\n');
    expect(saidOf(rig)).toEqual([]);
    expect(rig.readings.map(({ channel }) => channel.count)).toEqual([64]);
  });

  it('tells two slips of one kind apart', () => {
    const rig = readRig(channelRig('hears: [a, b]\nfilter: [x, x]'));
    const abouts = rig.problems.map(({ problem }) => problem.about);
    expect(abouts).toEqual(['a', 'b', 'x', 'x 2']);
  });
});

describe('a whole file', () => {
  it.each([
    ['no name', '⟦mains⟧: 50 Hz\n', 'missing-key'],
    ['a key that does not exist', 'rig: R\n⟦chanels⟧:\n  a: { rate: 1 kHz }\n', 'unknown-key'],
    ['a key that is there twice', 'rig: R\n⟦rig⟧: S\n', 'duplicate-name'],
    [
      'a name that is there twice',
      'rig: R\nclocks:\n  a: { frequency: 1 Hz }\n  ⟦a⟧: { frequency: 2 Hz }\n',
      'duplicate-name',
    ],
    ['a channel that is there twice', `${channelRig('')}  ⟦a⟧: { rate: 2 kHz }\n`, 'duplicate-name'],
    [
      'mains that is there twice',
      'rig: R\nmains: 50 Hz\nsources:\n  ⟦mains⟧: { frequency: 60 Hz }\n',
      'duplicate-name',
    ],
    ['a list of channels', 'rig: R\n⟦channels⟧:\n  - a\n', 'wrong-kind'],
    ['a name without keys', 'rig: R\nclocks:\n  a: ⟦1 MHz⟧\n', 'wrong-kind'],
    ['an empty name', 'rig: R\nclocks:\n  ⟦a⟧:\n', 'missing-key'],
    ['an unknown check', 'rig: R\nchecks:\n  ⟦thin-margn⟧: off\n', 'unknown-name'],
    ['an unknown severity', 'rig: R\nchecks:\n  thin-margin: ⟦eror⟧\n', 'wrong-kind'],
    ['checks that are a list', 'rig: R\nchecks: ⟦[thin-margin]⟧\n', 'wrong-kind'],
    ['a rig without a name behind it', '⟦rig⟧:\n', 'wrong-kind'],
    ['a merge of no map', 'rig: R\nclocks:\n  a: { <<: ⟦5⟧, frequency: 1 Hz }\n', 'wrong-kind'],
    ['mains as a list', 'rig: R\nmains: ⟦[50 Hz]⟧\n', 'wrong-kind'],
    ['a bare mains', 'rig: R\nmains: ⟦50⟧\n', 'unit-missing'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  it('that is empty lacks a name', () => {
    expect(readRig('').problems.map(({ problem }) => problem.name)).toEqual(['missing-key']);
  });

  it('has severities for known checks', () => {
    const { severities } = readRig('rig: R\nchecks: { thin-margin: error, fold-in-band: off }\n').environment;
    expect([...severities]).toEqual([
      ['thin-margin', 'error'],
      ['fold-in-band', 'off'],
    ]);
  });

  it('says nothing of unknown names while others may know them', () => {
    const rig = readRig(`rig: R\nuses: [other.rig.yaml]\n${channelRig('sensor: stud').slice(7)}`);
    expect(saidOf(rig)).toEqual([]);
  });

  it('tells which names nobody names', () => {
    const unused = (text: string) =>
      readRig(text)
        .problems.filter(({ problem }) => problem.name === 'unused-name')
        .map(({ place }) => textAt(place));
    expect(unused(channelRig('', CARD))).toEqual(['card']);
    expect(unused(channelRig('filter: card', CARD))).toEqual([]);
    expect(unused(`rig: R\n${CARD}`)).toEqual([]);
    expect(unused(`rig: R\n${CARD}x-base:\n  f: &f { filter: card }\nchannels:\n  a: { <<: *f }\n`)).toEqual([]);
  });
});

describe('a clock', () => {
  it.each([
    ['no frequency', 'rig: R\nclocks:\n  ⟦x⟧: { step: 2 }\n', 'missing-key'],
    ['a division by nothing', thingRig('clocks', 'frequency: 1 MHz\ndivide: ⟦0..8⟧'), 'out-of-range'],
    ['dividing by nothing', thingRig('clocks', 'frequency: 1 MHz\ndivide: ⟦0⟧'), 'out-of-range'],
    ['dividers upside down', thingRig('clocks', 'frequency: 1 MHz\ndivide: ⟦8..1⟧'), 'out-of-range'],
    ['broken dividers', thingRig('clocks', 'frequency: 1 MHz\ndivide: ⟦1.5..8⟧'), 'out-of-range'],
    ['dividers with a unit', thingRig('clocks', 'frequency: 1 MHz\ndivide: ⟦1..8 Hz⟧'), 'unit-mismatch'],
    ['a divider in a list that is none', thingRig('clocks', 'frequency: 1 MHz\ndivide: [1, ⟦-2⟧]'), 'out-of-range'],
    ['an unknown master', thingRig('clocks', 'frequency: 1 MHz\nlocked-to: ⟦y⟧'), 'unknown-name'],
    ['a tolerance of all', thingRig('clocks', 'frequency: 1 MHz\ntolerance: ⟦100 %⟧'), 'out-of-range'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  it('has dividers as a range or a list', () => {
    const divide = (keys: string) => readRig(thingRig('clocks', keys)).environment.clocks.get('x')?.divide;
    expect(divide('frequency: 1 MHz\ndivide: 2..128\nstep: 2')).toEqual({ kind: 'range', low: 2, high: 128, step: 2 });
    expect(divide('frequency: 1 MHz\ndivide: [8, 2, 8]')).toEqual({ kind: 'list', values: [2, 8] });
    expect(divide('frequency: 1 MHz\ndivide: 4')).toEqual({ kind: 'list', values: [4] });
    expect(divide('frequency: 1 MHz')).toBeUndefined();
  });
});

describe('a digitizer', () => {
  it('has everything it says', () => {
    const rig = readRig(
      thingRig(
        'digitizers',
        'clock: c\nprescale: 256\nrates: [2 kHz, 1 kHz]\nranges: [±10 V, 0..5 V]\ngains: [1, 10]\nmodulator: 64 fs\ndecimation-filter: { response: moving-average, length: 64 }\ntogether: same\nsampling: scanned\nscan-interval: 2.5 us\nsettling: 400 ns\ndelay-compensated: true',
        'clocks:\n  c: { frequency: 1 MHz }\n',
      ),
    );
    expect(saidOf(rig)).toEqual([]);
    expect(rig.environment.digitizers.get('x')).toMatchObject({
      clock: { value: 'c', thing: { name: 'c' } },
      prescale: 256,
      rates: { value: { kind: 'list', ratesHz: [1000, 2000] } },
      ranges: { value: [{ lowV: -10 }, { lowV: 0, highV: 5 }] },
      gains: { value: [1, 10] },
      modulatorMultiple: { value: 64 },
      decimationFilter: { filter: { response: { response: 'moving-average', length: 64 } } },
      together: { value: 'same' },
      sampling: { value: 'scanned' },
      scanIntervalS: { value: expect.closeTo(2.5e-6, 15) },
      settlingS: { value: expect.closeTo(400e-9, 15) },
      delayCompensated: true,
    });
  });

  it.each([
    ['rates: 1..10 kHz', { kind: 'range', lowHz: 1000, highHz: 10_000 }],
    ['rates: 5 kHz', { kind: 'list', ratesHz: [5000] }],
  ])('has its rates: %s', (keys, rates) => {
    expect(readRig(thingRig('digitizers', keys)).environment.digitizers.get('x')?.rates?.value).toEqual(rates);
  });

  it.each([
    ['ranges that are no list', 'ranges: ⟦±10 V⟧', 'wrong-kind'],
    ['gains that are no list', 'gains: ⟦10⟧', 'wrong-kind'],
    ['bits that nobody has', 'bits: ⟦65⟧', 'out-of-range'],
    ['an unknown clock', 'clock: ⟦c⟧', 'unknown-name'],
    ['a way of sampling that does not exist', 'sampling: ⟦scaned⟧', 'wrong-kind'],
    ['a scan interval of nothing', 'scan-interval: ⟦0 us⟧', 'out-of-range'],
    ['a scan interval that is a frequency', 'scan-interval: 400 ⟦kHz⟧', 'unit-mismatch'],
    ['a settling time without a unit', 'settling: ⟦4e-7⟧', 'unit-missing'],
    ['a compensated delay that is no truth', 'delay-compensated: ⟦yes⟧', 'wrong-kind'],
    ['a modulator without a unit', 'modulator: ⟦64⟧', 'unit-missing'],
    ['a digital filter at its input', 'filter: ⟦{ response: moving-average, length: 4 }⟧', 'wrong-kind'],
  ])('is told of %s', (_, keys, name) => {
    expectOneProblem(thingRig('digitizers', keys), name);
  });
});

describe('a group', () => {
  const group = (keys: string) => readRig(thingRig('groups', keys)).environment.groups.get('x');

  it('allows an angle or a time, up to a frequency', () => {
    expect(group('within: 2 deg\nup-to: 2 kHz')).toMatchObject({
      within: { value: { kind: 'angle', degrees: 2 } },
      upToHz: { value: 2000 },
    });
    expect(group('within: 0.1 rad\nup-to: 2 kHz')?.within?.value).toEqual({
      kind: 'angle',
      degrees: expect.closeTo(18 / Math.PI, 12),
    });
    expect(group('within: 10 us\nup-to: 2 kHz')?.within?.value).toEqual({
      kind: 'time',
      seconds: expect.closeTo(10e-6, 15),
    });
  });

  it.each([
    ['nothing that it allows', 'rig: R\ngroups:\n  ⟦x⟧: { up-to: 1 kHz }\n', 'missing-key'],
    ['no frequency', 'rig: R\ngroups:\n  ⟦x⟧: { within: 1 deg }\n', 'missing-key'],
    ['an angle without a unit', thingRig('groups', 'within: ⟦2⟧\nup-to: 1 kHz'), 'unit-missing'],
    ['a limit that is a level', thingRig('groups', 'within: 2 ⟦dB⟧\nup-to: 1 kHz'), 'unit-mismatch'],
    ['a limit of nothing', thingRig('groups', 'within: ⟦0 deg⟧\nup-to: 1 kHz'), 'out-of-range'],
    ['a range of frequencies', thingRig('groups', 'within: 2 deg\nup-to: ⟦1 .. 2 kHz⟧'), 'wrong-kind'],
    ['a key of another thing', thingRig('groups', 'within: 2 deg\nup-to: 1 kHz\n⟦rate⟧: 1 kHz'), 'unknown-key'],
    ['an unknown group', channelRig('group: ⟦tower⟧'), 'unknown-name'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  it('is named by channels, which do not depend on what it allows', () => {
    const rig = readRig(channelRig('group: x', 'groups:\n  x: { within: 2 deg, up-to: 1 kHz }\n'));
    expect(saidOf(rig)).toEqual([]);
    expect(rig.readings[0]!.channel.group).toMatchObject({ value: 'x' });
    expect(rig.problems).toEqual([]);
    expect(textAt(rig.readings[0]!.channel.group!.place)).toBe('x');
  });
});

describe('a sensor', () => {
  it.each([
    ['a sensitivity to something else', 'measures: force\nsensitivity: ⟦100 mV/g⟧', 'unit-mismatch'],
    ['a range of something else', 'measures: force\nrange: ⟦50 g⟧', 'unit-mismatch'],
    ['a range of nothing', 'range: ⟦0 g⟧', 'out-of-range'],
    ['a sensitivity that is none', 'sensitivity: 100 ⟦mV⟧', 'unit-mismatch'],
  ])('is told of %s', (_, keys, name) => {
    expectOneProblem(thingRig('sensors', keys), name);
  });

  it('of a bridge needs excitation and range', () => {
    const said = saidOf(readRig(thingRig('sensors', 'rated: 2 mV/V')));
    expect(said).toEqual(['missing-key: x', 'missing-key: x']);
  });

  it('counts its range both ways', () => {
    expect(readRig(thingRig('sensors', 'range: -30 .. 20 N')).environment.sensors.get('x')?.range?.value).toBe(30);
    expect(readRig(thingRig('sensors', 'range: ±20 N')).environment.sensors.get('x')?.range?.value).toBe(20);
  });

  it('of speed may measure turning or moving', () => {
    expect(saidOf(readRig(thingRig('sensors', 'measures: speed\nsensitivity: 10 mV/rpm')))).toEqual([]);
    expect(saidOf(readRig(thingRig('sensors', 'measures: speed\nsensitivity: 10 mV/(m/s)')))).toEqual([]);
  });
});
