import { describe, expect, it } from 'vitest';
import { noiseBudgetOf } from '../../server/src/chain/noise.ts';
import { declaresNoise } from '../../server/src/chain/noise-inputs.ts';
import { arrivalsOfText, chainOfText } from '../chain/rig.ts';
import { found, only, underlined } from './judged.ts';

interface Parts {
  readonly channel?: string;
  readonly digitizer?: string;
  readonly sources?: string;
}

/** A channel of ±10 V at 25.6 kHz, used up to 10 kHz, that nothing else is to be said of. */
function rig({ channel = '', digitizer = '', sources = '' }: Parts): string {
  return `rig: Test
digitizers: { d: { full-scale: ±10 V${digitizer} } }
filters:
  rc: { response: rc, order: 1, corner: 8 kHz }
sources: { ${sources} }
channels:
  one:
    digitizer: d
    rate: 25.6 kHz
    band: 0 Hz .. 10 kHz
    undeclared: -150 dBFS
    flatness: 40 dB
    fold-limit: -80 dBFS
${channel.replace(/^(?=.)/gm, '    ')}
`;
}

/** 20 log10(sqrt 2 s / full scale), of 10 V: the design's own scale for noise of rms s. */
function dbfs(rmsV: number): number {
  return 20 * Math.log10((Math.SQRT2 * rmsV) / 10);
}

function budget(text: string) {
  const noise = noiseBudgetOf(chainOfText(text));
  if (!noise) throw new Error('a noise budget was due');
  return noise;
}

/** Native and folded, by what it comes from. */
function shares(text: string): Record<string, readonly [number, number | undefined]> {
  return Object.fromEntries(
    budget(text).contributions.map(({ origin, nativeDb, foldedDb }) => [
      origin.kind === 'source' ? origin.source.name : origin.kind,
      [nativeDb, foldedDb] as const,
    ]),
  );
}

describe("a channel's noise", () => {
  // Power densities add as they fold: Oppenheim and Schafer, the chapters on sampling and on random signals.
  it('of a source is what its range leaves in the band, where it belongs and where it folds', () => {
    // 10 uV/rtHz over 2 .. 24 kHz: 8 kHz of it are in the band, and 15.6 .. 24 kHz fold to 1.6 .. 10 kHz.
    const { hiss } = shares(rig({ sources: 'hiss: { noise: 10 uV/rtHz, spans: 2 .. 24 kHz }' }));
    expect(hiss![0]).toBeCloseTo(dbfs(10e-6 * Math.sqrt(8000)), 2);
    expect(hiss![1]).toBeCloseTo(dbfs(10e-6 * Math.sqrt(8400)), 2);
  });

  it('of a source goes through the filters: a single pole leaves corner times the difference of arc tangents', () => {
    const text = rig({ channel: 'filter: rc', sources: 'hiss: { noise: 10 uV/rtHz, spans: 0 .. 24 kHz }' });
    const { hiss } = shares(text);
    const nativeHz = 8000 * Math.atan(10 / 8);
    const foldedHz = 8000 * (Math.atan(24 / 8) - Math.atan(15.6 / 8));
    expect(hiss![0]).toBeCloseTo(dbfs(10e-6 * Math.sqrt(nativeHz)), 2);
    expect(hiss![1]).toBeCloseTo(dbfs(10e-6 * Math.sqrt(foldedHz)), 2);
  });

  it('of a sensor has no end but by filters: behind a single pole it comes to corner x pi / 2 in all', () => {
    const channel = 'filter: rc\nsensitivity: 100 mV/g\nnoise: 50 ug/rtHz';
    const noise = budget(rig({ channel }).replace('0 Hz .. 10 kHz', '0 Hz .. 12.8 kHz'));
    expect(noise.totalDb).toBeCloseTo(dbfs(0.1 * 50e-6 * Math.sqrt((8000 * Math.PI) / 2)), 1);
    const [nativeDb] = shares(rig({ channel }))['sensor']!;
    expect(nativeDb).toBeCloseTo(dbfs(0.1 * 50e-6 * Math.sqrt(8000 * Math.atan(10 / 8))), 2);
  });

  it("of a sensor passes the sensor's own response in the measured unit, and not in volts", () => {
    const native = (noise: string): number =>
      shares(rig({ channel: `filter: rc\nsensitivity: 100 mV/g\ncorner: 8 kHz\nnoise: ${noise}` }))['sensor']![0];
    // Two poles at one corner: the integral of 1 / (1 + x^2)^2 is (x / (1 + x^2) + arctan x) / 2.
    const x = 10 / 8;
    const twice = (x / (1 + x * x) + Math.atan(x)) / 2;
    expect(native('100 ug/rtHz')).toBeCloseTo(dbfs(10e-6 * Math.sqrt(8000 * twice)), 2);
    expect(native('10 uV/rtHz')).toBeCloseTo(dbfs(10e-6 * Math.sqrt(8000 * Math.atan(x))), 2);
  });

  it('that nothing ends has no folded part, and the check leaves it out', () => {
    const text = rig({ channel: 'sensitivity: 100 mV/g\nnoise: 1 g/rtHz' });
    expect(shares(text)['sensor']![1]).toBeUndefined();
    expect(found(text, 'noise-folds')).toEqual([]);
  });

  it("of a digitizer's input is white up to half the rate", () => {
    const rms = shares(rig({ digitizer: ', noise: 100 uV' }));
    expect(rms['input']).toEqual([expect.closeTo(dbfs(100e-6 * Math.sqrt(10 / 12.8)), 2), -Infinity]);
    const density = shares(rig({ digitizer: ', noise: 1 uV/rtHz' }));
    expect(density['input']).toEqual([expect.closeTo(dbfs(1e-6 * Math.sqrt(10_000)), 2), -Infinity]);
  });

  it('keeps its variance when every 4th sample is kept: a quarter belongs there, three fold', () => {
    const text = rig({ digitizer: ', noise: 1 mV', channel: 'then: [{ decimate: 4 }]' });
    const noise = budget(text.replace('0 Hz .. 10 kHz', '0 Hz .. 3.2 kHz'));
    expect(noise.totalDb).toBeCloseTo(dbfs(1e-3), 2);
    expect(noise.nativeDb).toBeCloseTo(dbfs(0.5e-3), 2);
    expect(noise.foldedDb).toBeCloseTo(dbfs(1e-3 * Math.sqrt(0.75)), 2);
  });

  it('of steps is 6.02 dB a bit and 1.76 dB under full scale, less what lies outside the band', () => {
    // Bennett 1948; IEEE Std 1241: 98.09 dB at 16 bits, from memory.
    const { steps } = shares(rig({ digitizer: ', bits: 16, noise: 1 uV' }));
    expect(steps![0]).toBeCloseTo(-98.09 + 10 * Math.log10(10 / 12.8), 2);
  });

  it('is of the samples that a modulator hands out, but its jitter is of those that it takes', () => {
    const digitizer = ', bits: 16, noise: 100 uV, jitter: 1 ns, modulator: 64 fs, decimation-filter: sinc';
    const text = rig({ digitizer, channel: 'peak: 10 V\nheadroom: 0 dB' }).replace(
      'filters:\n',
      'filters:\n  sinc: { response: kaiser, pass: 0.45 fs, stop: 0.55 fs, stopband: 100 dB }\n',
    );
    const { input, steps, jitter } = shares(text);
    expect(input![0]).toBeCloseTo(dbfs(100e-6 * Math.sqrt(10 / 12.8)), 2);
    expect(steps![0]).toBeCloseTo(-98.09 + 10 * Math.log10(10 / 12.8), 2);
    // Of 819.2 kHz the band keeps 10 kHz.
    const wholeDb = 20 * Math.log10(2 * Math.PI * 10_000 * 1e-9);
    expect(jitter![0]).toBeCloseTo(wholeDb - 10 * Math.log10(819.2 / 10), 1);
  });

  it('of a band that is folded on purpose belongs there where its true frequency is in the band', () => {
    // 30 .. 40 kHz at 50 kS/s are recorded at 10 .. 20 kHz, where 10 .. 20 kHz fold from nowhere: they are in the way.
    const bandpass = (spans: string): string =>
      rig({ channel: 'sampling: bandpass', sources: `hiss: { noise: 10 uV/rtHz, spans: ${spans} }` })
        .replace('rate: 25.6 kHz', 'rate: 50 kHz')
        .replace('0 Hz .. 10 kHz', '30 kHz .. 40 kHz');
    const tenKilohertz = expect.closeTo(dbfs(10e-6 * Math.sqrt(10_000)), 2);
    expect(shares(bandpass('30 .. 40 kHz'))['hiss']).toEqual([tenKilohertz, -Infinity]);
    expect(shares(bandpass('10 .. 20 kHz'))['hiss']).toEqual([-Infinity, tenKilohertz]);
    expect(shares(bandpass('20 .. 30 kHz'))['hiss']).toEqual([-Infinity, -Infinity]);
  });

  it('on a scale of volts is compared without a full scale', () => {
    const text = rig({ sources: 'hiss: { noise: 10 uV/rtHz, spans: 15.6 .. 25.6 kHz }' })
      .replace('full-scale: ±10 V', 'bits: 16')
      .replace('-80 dBFS', '1 mV');
    // 10 uV times 100 is 1 mV rms, as much as a sinusoid of 1.414 mV has.
    const finding = only(text.replace('undeclared: -150 dBFS', 'undeclared: 1 nV'), 'noise-folds');
    expect(finding.excess).toBeCloseTo(20 * Math.log10(Math.SQRT2), 2);
    expect(finding.message).toContain('what is left of it there is 1 mV rms, 3.01 dB over the fold limit of 1 mV.');
  });

  it('is not worked out where nothing but bits is declared, nor for a pattern or a pulse train', () => {
    const bits = chainOfText(rig({ digitizer: ', bits: 24' }));
    expect(declaresNoise(bits.channel)).toBe(false);
    expect(noiseBudgetOf(bits)).toBeUndefined();
    const noisy = (channel: string) => noiseBudgetOf(chainOfText(rig({ digitizer: ', noise: 1 mV', channel })));
    expect(noisy('')).toBeDefined();
    expect(noisy('pattern: { of: 4, take: [0, 1] }')).toBeUndefined();
    expect(noisy('pulses: { per-turn: 60, speed: 600..3000 rpm }')).toBeUndefined();
  });

  it('leaves out what has no strength', () => {
    expect(Object.keys(shares(rig({ digitizer: ', noise: 0 V, jitter: 1 ns', channel: 'peak: 1 V' })))).toEqual([
      'jitter',
    ]);
  });

  it('has no lines', () => {
    const text = rig({ sources: 'hiss: { noise: 10 uV/rtHz, spans: 2 .. 24 kHz }, hum: { frequency: 50 Hz }' });
    expect(arrivalsOfText(text).map(({ source }) => source.name)).toEqual(['hum']);
  });
});

describe('noise-folds', () => {
  it('adds up all that folds by its power, and names the largest', () => {
    const two = rig({
      sources:
        'hiss: { noise: 10 uV/rtHz, spans: 20 .. 24 kHz }, hum: { noise: 20 uV/rtHz, spans: 45 .. 47 kHz }, low: { noise: 1 V/rtHz, spans: 1 .. 2 kHz }',
    });
    // 100 x 4000 and 400 x 2000 (51.2 - 45 = 6.2 kHz .. 4.2 kHz): 1200000 square microvolts.
    const finding = only(two, 'noise-folds');
    const level = dbfs(Math.sqrt(1.2) * 1e-3);
    expect(finding.figures).toEqual({ levelDbfs: expect.closeTo(level, 2), limitDbfs: -80 });
    expect(finding.excess).toBeCloseTo(level + 80, 2);
    expect(finding.message).toBe(
      'Noise will fold into the band: what is left of it there is -76.2 dBFS, 3.8 dB over the fold limit of -80 dBFS. Most of it is `hum` with -77.96 dBFS.',
    );
    expect(underlined(finding)).toBe('25.6 kHz');
    expect(finding.related.map(underlined)).toEqual(['hum']);
  });

  it('is silent at the limit, and of noise that belongs where it is', () => {
    const hiss = (limit: string, spans: string): string =>
      rig({ sources: `hiss: { noise: 10 uV/rtHz, spans: ${spans} }` }).replace('-80 dBFS', limit);
    // 10 uV/rtHz over 4 kHz is 0.632 mV rms, -80.97 dBFS.
    expect(found(hiss('-80.96 dBFS', '20 .. 24 kHz'), 'noise-folds')).toEqual([]);
    expect(found(hiss('-81 dBFS', '20 .. 24 kHz'), 'noise-folds')).toHaveLength(1);
    expect(found(hiss('-81 dBFS', '2 .. 6 kHz'), 'noise-folds')).toEqual([]);
    expect(found(hiss('-81 dBFS', '10.1 .. 15.5 kHz'), 'noise-folds')).toEqual([]);
  });

  it('stands at the step where what a converter adds folds', () => {
    const text = rig({ digitizer: ', noise: 1 mV', channel: 'then: [{ decimate: 4 }]' });
    const finding = only(text.replace('0 Hz .. 10 kHz', '0 Hz .. 3 kHz'), 'noise-folds');
    expect(underlined(finding)).toBe('4');
    expect(finding.message).toContain("Most of it is the noise of the digitizer's input");
  });

  it('is not said where a filter is not understood', () => {
    const text = rig({ channel: 'filter: none', sources: 'hiss: { noise: 1 mV/rtHz, spans: 20 .. 24 kHz }' });
    expect(found(text, 'noise-folds')).toHaveLength(1);
    expect(found(text.replace('filter: none', 'filter: { response: rc }'), 'noise-folds')).toEqual([]);
  });
});

describe('step-too-coarse', () => {
  const coarse = (resolve: string, digitizer: string, channel = '') =>
    found(rig({ digitizer, channel: `sensitivity: 100 mV/g\nresolve: ${resolve}\n${channel}` }), 'step-too-coarse');

  it.each([
    // 20 V / 4096 = 4.8828 mV, 48.828 mg.
    ['48.8 mg', ', bits: 12', '', 1],
    ['48.9 mg', ', bits: 12', '', 0],
    ['4.88 mV', ', bits: 12', '', 1],
    ['4.89 mV', ', bits: 12', '', 0],
    // A step over full scale: 20 log10(2 / 4096) = -66.23 dBFS.
    ['-66.3 dBFS', ', bits: 12', '', 1],
    ['-66.2 dBFS', ', bits: 12', '', 0],
    ['4.89 mg', ', bits: 12', 'gain: 10', 0],
    ['4.88 mg', ', bits: 12', 'gain: 10', 1],
    // 5 V / 4096 = 1.2207 mV.
    ['1.22 mV', ', bits: 12', 'full-scale: 0..5 V', 1],
    ['1.23 mV', ', bits: 12', 'full-scale: 0..5 V', 0],
    ['1 ug', '', '', 0],
  ])('of %s with %s %s', (resolve, digitizer, channel, count) => {
    expect(coarse(resolve, digitizer, channel)).toHaveLength(count);
  });

  it('says which it is: the step', () => {
    const [finding] = coarse('10 mg', ', bits: 12');
    expect(finding!.message).toBe(
      "A change of 10 mg will not be seen: one step of the converter's 12 bits is 48.8 mg, 13.8 dB more than `resolve`.",
    );
    expect(underlined(finding!)).toBe('10 mg');
    expect(finding!.related.map(underlined)).toEqual(['12']);
  });

  it('or the noise in the band, by its rms, native and folded', () => {
    // 1 mV rms: 0.781 of its power in the band is 0.884 mV, as much as a sinusoid of 1.25 mV has, 12.5 mg.
    const digitizer = ', bits: 24, noise: 1 mV';
    expect(coarse('12.6 mg', digitizer)).toEqual([]);
    const [finding] = coarse('10 mg', digitizer);
    expect(finding!.message).toBe(
      "A change of 10 mg will not be seen: the noise in the band has the rms of a sinusoid of 12.5 mg (most of it is the noise of the digitizer's input), 1.94 dB more than `resolve`.",
    );
    expect(finding!.related.map(underlined)).toEqual(['1 mV']);
  });

  it('the larger of both', () => {
    expect(coarse('1 mg', ', bits: 12, noise: 1 mV')[0]!.message).toContain('one step');
    expect(coarse('1 mg', ', bits: 16, noise: 1 mV')[0]!.message).toContain('the noise in the band');
  });
});

describe('jitter-limited', () => {
  const limited = (limit: string, peak = '7 V', digitizer = ', jitter: 5 ns') =>
    found(
      rig({ digitizer, channel: `headroom: 0 dB\n${peak === '' ? '' : `peak: ${peak}`}` }).replace('-80 dBFS', limit),
      'jitter-limited',
    );
  // IEEE Std 1241: 20 log10(2 pi f sigma) = 20 log10(2 pi 10 kHz 5 ns) = -70.06 dB; the band keeps 10 of 12.8 kHz.
  const underSignalDb = -70.057 + 10 * Math.log10(10 / 12.8);

  it("is the formula at the band's top and the level of the peak", () => {
    const [finding] = limited('-80 dBFS');
    expect(finding!.excess).toBeCloseTo(underSignalDb + 20 * Math.log10(0.7) + 80, 2);
    expect(finding!.figures).toMatchObject({ atHz: 10_000, jitterS: expect.closeTo(5e-9, 15), limitDbfs: -80 });
    expect(finding!.message).toBe(
      'Jitter will put noise into the band: of a signal as high as `peak` at 10 kHz, 5 ns rms leave -74.23 dBFS, 5.77 dB over the fold limit of -80 dBFS.',
    );
    expect(finding!.related.map(underlined)).toEqual(['5 ns', '7 V']);
  });

  it.each([
    ['-74.2 dBFS', '7 V', 0],
    ['-74.3 dBFS', '7 V', 1],
    ['-80 dBFS', '', 0],
    ['-80 dBFS', '3.7 V', 1],
    ['-80 dBFS', '3.5 V', 0],
    // Half of what a range spans.
    ['-80 dBFS', '-3.7 .. 3.7 V', 1],
    ['-80 dBFS', '2.8 .. 9.8 V', 0],
    ['-80 dBFS', '2.4 .. 9.8 V', 1],
    ['-80 dBFS', '-8.8 dBFS', 1],
    ['-80 dBFS', '-8.9 dBFS', 0],
  ])('against %s, of a peak of %s', (limit, peak, count) => {
    expect(limited(limit, peak)).toHaveLength(count);
  });

  it('counts a peak on a one-sided full scale as half of it either way', () => {
    const text = (peak: string): string =>
      rig({ digitizer: ', jitter: 5 ns', channel: `headroom: 0 dB\nfull-scale: 0..20 V\npeak: ${peak}` });
    expect(found(text('7.4 V'), 'jitter-limited')).toHaveLength(1);
    expect(found(text('7 V'), 'jitter-limited')).toEqual([]);
  });
});

describe('level-unplaced', () => {
  const abouts = (text: string) => found(text, 'level-unplaced').map(({ about, message }) => [about, message]);

  it('is said of noise and of `resolve` that can have no volts or no full scale', () => {
    const sensor = rig({ channel: 'measures: acceleration\nnoise: 5 ug/rtHz\nresolve: 1 mg' });
    expect(abouts(sensor)).toEqual([
      [
        'sensitivity',
        "How many volts `resolve` and the `noise` of the sensor will make can't be said, because the sensor has no `sensitivity`.",
      ],
    ]);
    const input = rig({ digitizer: ', noise: 5 uV' }).replace('full-scale: ±10 V', 'bits: 16');
    expect(abouts(input)).toEqual([
      [
        'full-scale',
        "How high the `noise` of the digitizer will stand against full scale can't be said, because `d` has no `full-scale`.",
      ],
    ]);
  });

  it('is said of a source that a channel names and does not measure', () => {
    const text = rig({
      channel: 'sensitivity: 1 V/Pa\nhears: [hiss]',
      sources: 'hiss: { noise: 1 ug/rtHz, spans: 1 .. 2 kHz }',
    });
    expect(abouts(text)).toEqual([['hiss', expect.stringContaining('its level is in ug')]]);
  });
});
