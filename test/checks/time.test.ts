import { describe, expect, it } from 'vitest';
import { found, only, underlined } from './judged.ts';

/** Scanned, grouped and clocked channels of which nothing else is said. */
function rig(parts: {
  readonly digitizer?: string;
  readonly group?: string;
  readonly defaults?: string;
  readonly more?: string;
  readonly channels: string;
}): string {
  const { digitizer = 'bits: 16', group = 'within: 1 deg, up-to: 1 kHz', defaults = '', more = '', channels } = parts;
  return `rig: Test
digitizers: { d: { ${digitizer} } }
groups: { g: { ${group} } }
${more}defaults: { digitizer: d, rate: 10 kHz, band: 1 Hz .. 1 kHz, undeclared: -90 dBFS, group: g${defaults} }
channels:
${channels}`;
}

const THREE = '  a: {}\n  b: {}\n  c: {}\n';
const degrees = (radians: number): number => (radians * 180) / Math.PI;

describe('scan-skew', () => {
  it('is 360 f t: 10 us at 1 kHz are 3.6 degrees', () => {
    const finding = only(
      rig({ digitizer: 'sampling: scanned, scan-interval: 10 us', channels: '  a: {}\n  b: {}\n' }),
      'scan-skew',
    );
    expect(finding.channel).toBe('b');
    expect(finding.about).toBe('g');
    expect(finding.figures['delayS']).toBeCloseTo(10e-6, 12);
    expect(finding.figures['phaseDeg']).toBeCloseTo(3.6, 9);
    expect(finding.excess).toBeCloseTo(3.6, 9);
    expect(finding.message).toBe(
      'This channel will be sampled 10 us (3.6 deg at 1 kHz) later than `a`, by its turn in the scan: `g` allows 1 deg up to 1 kHz.',
    );
  });

  it('tells the one that differs most, and counts the others', () => {
    const finding = only(rig({ digitizer: 'sampling: scanned, scan-interval: 10 us', channels: THREE }), 'scan-skew');
    expect(finding.channel).toBe('c');
    expect(finding.figures['phaseDeg']).toBeCloseTo(7.2, 9);
    expect(finding.message).toContain('and 1 other of its channels is over that too.');
    expect(finding.related.map(underlined)).toContain('10 us');
    expect(finding.related.map(underlined)).toContain('1 deg');
    expect(finding.related.map(underlined)).toContain('a');
  });

  it('spreads a scan evenly over the sample period where nothing is said: 100 us / 4 channels', () => {
    const four = `${THREE}  elsewhere: { group: other }\n`;
    const text = rig({ digitizer: 'sampling: scanned', channels: four }).replace(
      'groups: {',
      'groups: { other: { within: 1 deg, up-to: 1 Hz },',
    );
    expect(only(text, 'scan-skew').figures['delayS']).toBeCloseTo(50e-6, 12);
  });

  it('takes the period of the fastest channel: half of 100 us / 3 channels where one has 20 kHz', () => {
    const channels = '  a: {}\n  b: {}\n  c: { rate: 20 kHz }\n';
    const { figures } = only(rig({ digitizer: 'sampling: scanned', channels }), 'scan-skew');
    expect(figures['delayS']).toBeCloseTo((2 * 50e-6) / 3, 12);
  });

  it('counts a channel that is in no group, or of which nothing else is known', () => {
    const channels = '  a: {}\n  x: { group: h, band: wide }\n  c: {}\n';
    const text = rig({ digitizer: 'sampling: scanned, scan-interval: 10 us', channels }).replace(
      'groups: {',
      'groups: { h: { within: 1 deg, up-to: 1 Hz },',
    );
    expect(only(text, 'scan-skew').figures['delayS']).toBeCloseTo(20e-6, 12);
  });

  it('compares with a time, too', () => {
    const scanned = (within: string) =>
      found(
        rig({
          digitizer: 'sampling: scanned, scan-interval: 10 us',
          group: `within: ${within}, up-to: 1 kHz`,
          channels: THREE,
        }),
        'scan-skew',
      );
    expect(scanned('20 us')).toEqual([]);
    expect(scanned('19.9 us').map(({ message }) => message)).toEqual([
      'This channel will be sampled 20 us later than `a`, by its turn in the scan: `g` allows 19.9 us up to 1 kHz.',
    ]);
  });

  it('compares a scanned channel with one that is sampled at once', () => {
    const text = rig({ channels: '  a: {}\n  b: { digitizer: s }\n  c: { digitizer: s }\n' }).replace(
      'digitizers: {',
      'digitizers: { s: { sampling: scanned, scan-interval: 10 us },',
    );
    expect(only(text, 'scan-skew')).toMatchObject({ channel: 'c' });
    const turned = text
      .replace('  a: {}', '  a: { digitizer: s }')
      .replace('b: { digitizer: s }', 'b: { digitizer: s }');
    expect(only(turned.replace('c: { digitizer: s }', 'c: {}'), 'scan-skew')).toMatchObject({ channel: 'b' });
  });

  it('is not said where all are sampled at once, of a group of one, or of a group that lacks a key', () => {
    expect(found(rig({ channels: THREE }), 'scan-skew')).toEqual([]);
    const scanned = 'sampling: scanned, scan-interval: 10 us';
    expect(found(rig({ digitizer: scanned, channels: '  a: {}\n' }), 'scan-skew')).toEqual([]);
    expect(found(rig({ digitizer: scanned, group: 'within: 1 deg', channels: THREE }), 'scan-skew')).toEqual([]);
  });

  it('stands on the name where the group is inherited, on the group where it is not', () => {
    const scanned = 'sampling: scanned, scan-interval: 10 us';
    expect(underlined(only(rig({ digitizer: scanned, channels: '  a: {}\n  b: {}\n' }), 'scan-skew'))).toBe('b');
    const own = rig({ digitizer: scanned, channels: '  a: {}\n  b: { group: g }\n' });
    expect(underlined(only(own, 'scan-skew'))).toBe('g');
  });
});

describe('phase-mismatch', () => {
  const FILTERS = `filters:
  one: { response: rc, order: 1, corner: 1 kHz }
  other: { response: rc, order: 1, corner: 1.1 kHz }
  mask: { response: mask, pass: 1 kHz, stop: 3 kHz, stopband: 60 dB }
  slow: { response: fir, taps: [1, 1, 1, 1, 1] }
`;
  const filtered = (group: string, channels: string, defaults = '', digitizer?: string) =>
    found(rig({ group, channels, defaults, more: FILTERS, ...(digitizer ? { digitizer } : {}) }), 'phase-mismatch');
  const UP_TO_100 = 'within: 0.5 deg, up-to: 100 Hz';

  it('of two single poles is the difference of their arc tangents', () => {
    const [finding] = filtered(UP_TO_100, '  a: { filter: one }\n  b: { filter: other }\n');
    expect(finding!.figures['phaseDeg']).toBeCloseTo(degrees(Math.atan(0.1) - Math.atan(100 / 1100)), 9);
    expect(finding!.figures['phaseDeg']).toBeCloseTo(0.5162, 4);
    expect(finding!.figures['atHz']).toBeCloseTo(100, 6);
    expect(finding!.message).toBe(
      'At 100 Hz this channel will be 0.516 deg ahead of `a`, by its analogue filters: `g` allows 0.5 deg up to 100 Hz.',
    );
  });

  it('is found where it is greatest, inside the range too', () => {
    // atan(f / 1000) - atan(f / 1100) is greatest at the geometric mean of the corners.
    const [finding] = filtered('within: 1 deg, up-to: 5 kHz', '  a: { filter: one }\n  b: { filter: other }\n');
    const meanHz = Math.sqrt(1000 * 1100);
    expect(finding!.figures['atHz']).toBeCloseTo(meanHz, 1);
    expect(finding!.figures['phaseDeg']).toBeCloseTo(degrees(Math.atan(meanHz / 1000) - Math.atan(meanHz / 1100)), 9);
  });

  it('in time is the angle over 360 f, greatest at low frequencies here', () => {
    // 1 / (2 pi 1000) less 1 / (2 pi 1100) s are 14.5 us.
    const [finding] = filtered('within: 10 us, up-to: 1 kHz', '  a: { filter: one }\n  b: { filter: other }\n');
    expect(finding!.excess * 10e-6).toBeCloseTo(1 / (2 * Math.PI * 1000) - 1 / (2 * Math.PI * 1100), 8);
    expect(finding!.message).toMatch(/^At 1 Hz this channel will be 14\.47 us ahead of `a`/);
  });

  it('looks at sensors: 0.5 Hz and 0.1 Hz of AC coupling, from where the bands begin', () => {
    const channels =
      '  a: { measures: force, low-corner: 0.1 Hz }\n  b: { measures: force, low-corner: 0.5 Hz, band: 2 Hz .. 1 kHz }\n';
    const [finding] = filtered('within: 2 deg, up-to: 1 kHz', channels);
    expect(finding!.figures['phaseDeg']).toBeCloseTo(degrees(Math.atan(0.5 / 2) - Math.atan(0.1 / 2)), 9);
    expect(finding!.figures['atHz']).toBeCloseTo(2, 9);
    expect(finding!.message).toContain('ahead of `a`, by its sensor:');
  });

  it('looks at the AC coupling of the digitizer', () => {
    const text = rig({
      group: 'within: 2 deg, up-to: 1 kHz',
      channels: '  a: {}\n  b: { digitizer: e }\n',
    }).replace('digitizers: {', 'digitizers: { e: { low-corner: 0.5 Hz },');
    expect(only(text, 'phase-mismatch').figures['phaseDeg']).toBeCloseTo(degrees(Math.atan(0.5)), 9);
  });

  it('looks at digital steps: the mean of 5 samples of 10 kHz is 0.2 ms late, 72 degrees at 1 kHz', () => {
    const channels = '  a: {}\n  b: { then: [{ filter: slow }] }\n';
    const [finding] = filtered('within: 1 deg, up-to: 1 kHz', channels);
    expect(finding!.figures['phaseDeg']).toBeCloseTo(-72, 9);
    expect(finding!.message).toContain('72 deg behind `a`, by its digital filters:');
    expect(filtered('within: 1 deg, up-to: 1 kHz', channels, '', 'delay-compensated: true')).toEqual([]);
    const both = '  a: { then: [{ filter: slow }] }\n  b: { then: [{ filter: slow }] }\n';
    expect(filtered('within: 0.001 deg, up-to: 1 kHz', both)).toEqual([]);
  });

  it('says what makes most of it', () => {
    const channels = '  a: { filter: one }\n  b: { filter: other, then: [{ filter: slow }] }\n';
    const [finding] = filtered('within: 1 deg, up-to: 1 kHz', channels);
    expect(finding!.message).toContain('most of it by its digital filters');
  });

  it('says nothing of a mask that only one of them has, but lets the same mask be', () => {
    expect(filtered(UP_TO_100, '  a: { filter: one }\n  b: { filter: [other, mask] }\n')).toEqual([]);
    expect(filtered(UP_TO_100, '  a: { filter: [one, mask] }\n  b: { filter: [other, mask] }\n')).toHaveLength(1);
  });

  it('says nothing of a channel that is not understood, and compares the others with the first that is complete', () => {
    const channels = '  x: { band: wide }\n  a: { filter: one }\n  y: { filter: nobody }\n  b: { filter: other }\n';
    const findings = filtered(UP_TO_100, channels);
    expect(findings.map(({ channel }) => channel)).toEqual(['b']);
    expect(findings[0]!.message).toContain('`a`');
  });

  it('goes no higher than both are recorded, and says nothing where one band begins above it', () => {
    const [finding] = filtered(
      'within: 0.5 deg, up-to: 1 kHz',
      '  a: { filter: one, rate: 400 Hz, band: 1 Hz .. 100 Hz }\n  b: { filter: other }\n',
    );
    expect(finding!.figures['atHz']).toBeCloseTo(200, 6);
    expect(filtered(UP_TO_100, '  a: { filter: one, band: 200 Hz .. 1 kHz }\n  b: { filter: other }\n')).toEqual([]);
  });
});

describe('clock-drift', () => {
  const clocked = (run: string, clocks: string, group = 'within: 1 ms, up-to: 10 Hz') =>
    found(
      rig({
        group,
        digitizer: 'clock: near',
        more: `${clocks}${run}`,
        channels: '  a: {}\n  b: { digitizer: e }\n  c: { digitizer: f }\n',
      }).replace('digitizers: {', 'digitizers: { e: { clock: far }, f: { full-scale: ±1 V },'),
      'clock-drift',
    );
  const FREE =
    'clocks:\n  near: { frequency: 10 MHz, tolerance: 25 ppm }\n  far: { frequency: 10 MHz, tolerance: 50 ppm }\n';
  const RUN = 'run: { duration: 8 h }\n';

  it('is the sum of both tolerances times the duration: 75 ppm of 8 h are 2.16 s', () => {
    const [finding, ...others] = clocked(RUN, FREE);
    expect(others).toEqual([]);
    expect(finding).toMatchObject({ channel: 'b', about: 'g' });
    expect(finding!.figures['driftS']).toBeCloseTo(2.16, 9);
    expect(finding!.message).toBe(
      'In 8 h this channel may drift 2.16 s from `a`: `far` is not locked to `near`, and they may differ by 75 ppm. `g` allows 1 ms up to 10 Hz.',
    );
    expect(finding!.related.map(underlined)).toContain('8 h');
  });

  it('is told as an angle where the group asks for one: 2.16 s at 10 Hz are 21.6 turns', () => {
    const [finding] = clocked(RUN, FREE, 'within: 5 deg, up-to: 10 Hz');
    expect(finding!.message).toContain('may drift 2.16 s (21.6 turns at 10 Hz) from `a`');
    expect(finding!.excess).toBeCloseTo((360 * 21.6) / 5, 6);
  });

  it('is not said of clocks that are locked: to each other, to a third, or in a circle', () => {
    const lock = (near: string, far: string) =>
      `clocks:\n  near: { frequency: 10 MHz, tolerance: 25 ppm${near} }\n  far: { frequency: 10 MHz, tolerance: 50 ppm${far} }\n  house: { frequency: 10 MHz }\n`;
    expect(clocked(RUN, lock('', ', locked-to: near'))).toEqual([]);
    expect(clocked(RUN, lock(', locked-to: house', ', locked-to: house'))).toEqual([]);
    expect(clocked(RUN, lock(', locked-to: far', ', locked-to: near'))).toEqual([]);
  });

  it('of a clock that is locked elsewhere is that of the one it is locked to', () => {
    const clocks = `${FREE.replace('50 ppm }', '50 ppm, locked-to: house }')}  house: { frequency: 10 MHz, tolerance: 1 ppm }\n`;
    expect(clocked(RUN, clocks)[0]!.figures['driftS']).toBeCloseTo(26e-6 * 8 * 3600, 9);
  });

  it('is not said without a duration, without tolerances, or on one clock', () => {
    expect(clocked('', FREE)).toEqual([]);
    expect(clocked('run: { disk: 1 GB }\n', FREE)).toEqual([]);
    expect(clocked(RUN, FREE.replaceAll(/, tolerance: \d+ ppm/g, ''))).toEqual([]);
    expect(clocked(RUN, FREE, 'within: 3 s, up-to: 10 Hz')).toEqual([]);
  });
});

describe('settling-short', () => {
  const settling = (digitizer: string, channels = '  a: {}\n  b: {}\n') =>
    found(rig({ digitizer: `sampling: scanned, full-scale: ±10 V, ${digitizer}`, channels }), 'settling-short');

  it('is exp(-t / time constant): 5 constants leave 0.674 %, -43.43 dBFS', () => {
    const [finding] = settling('scan-interval: 10 us, settling: 2 us, bits: 16');
    expect(finding!.figures['left']).toBeCloseTo(Math.exp(-5), 12);
    expect(finding!.figures['level']).toBeCloseTo(20 * Math.log10(Math.exp(-5)), 9);
    expect(finding!.figures['level']).toBeCloseTo(-43.43, 2);
    expect(finding!.figures['limit']).toBe(-60);
    expect(finding!.channel).toBe('b');
    expect(finding!.message).toContain('0.674 % of the channel that is scanned before it will be left in this one');
    expect(finding!.message).toContain('-43.43 dBFS, and the limit is -60 dBFS (`fold-limit`).');
  });

  it('allows half a step where that is more than the fold limit: 8 bits are -48.16 dBFS', () => {
    const [finding] = settling('scan-interval: 10 us, settling: 2 us, bits: 8');
    expect(finding!.figures['limit']).toBeCloseTo(-48.16, 2);
    expect(finding!.message).toContain('(half a step of the converter)');
    // 8 ln 2 = 5.545 time constants.
    expect(settling('scan-interval: 11.1 us, settling: 2 us, bits: 8')).toEqual([]);
    expect(settling('scan-interval: 11.08 us, settling: 2 us, bits: 8')).toHaveLength(1);
  });

  it('takes the sample period over the number of channels where no interval is given', () => {
    const [finding] = settling('settling: 10 us, bits: 16');
    expect(finding!.figures['settlesS']).toBeCloseTo(50e-6, 12);
  });

  it('gives the first of a scan what is left of the sample period', () => {
    // 100 us less 10 us are 45 time constants: only the second has none.
    const strict = '  a: { fold-limit: -80 dBFS }\n  b: {}\n';
    const findings = settling('scan-interval: 10 us, settling: 2 us, bits: 16', strict);
    expect(findings.map(({ channel, message }) => [channel, message.includes('others')])).toEqual([['b', false]]);
  });

  it('is told once, at the channel that it is worst in', () => {
    const channels = '  a: {}\n  b: {}\n  c: { fold-limit: -80 dBFS }\n  e: {}\n';
    const [finding, ...more] = settling('scan-interval: 10 us, settling: 2 us, bits: 16', channels);
    expect(more).toEqual([]);
    expect(finding!.channel).toBe('c');
    expect(finding!.message).toContain('It is so in 2 others of its channels too.');
  });

  it('is not said of one channel, without a time constant, or of channels that are sampled at once', () => {
    expect(settling('scan-interval: 10 us, settling: 2 us', '  a: {}\n')).toEqual([]);
    expect(settling('scan-interval: 10 us')).toEqual([]);
    expect(found(rig({ digitizer: 'settling: 2 us', channels: THREE }), 'settling-short')).toEqual([]);
  });

  it('is compared in the unit of the limit where there is no full scale', () => {
    const text = rig({
      digitizer: 'sampling: scanned, scan-interval: 10 us, settling: 2 us',
      defaults: ', fold-limit: 1 mV',
      channels: THREE,
    });
    // Full scale is taken to be 60 dB above the limit, as elsewhere: 1 V, of which exp(-5) are 6.74 mV.
    expect(only(text, 'settling-short').message).toContain('6.74 mV, and the limit is 1 mV');
  });
});

describe('rate-over-converter of a scanned digitizer', () => {
  const scanned = (maxRate: string, channels: string, sampling = 'scanned') =>
    found(rig({ digitizer: `sampling: ${sampling}, max-rate: ${maxRate}`, channels }), 'rate-over-converter');

  it('is about the sum over all its channels, at the fastest', () => {
    const [finding, ...more] = scanned('39 kHz', '  a: {}\n  b: { rate: 20 kHz }\n  c: {}\n');
    expect(more).toEqual([]);
    expect(finding).toMatchObject({ channel: 'b', about: 'd', figures: { rateHz: 40_000, maxRateHz: 39_000 } });
    expect(underlined(finding!)).toBe('20 kHz');
    expect(finding!.message).toBe(
      '`d` will not sample its 3 channels in turn at 40 kHz altogether: its greatest rate is 39 kHz.',
    );
    expect(scanned('40 kHz', '  a: {}\n  b: { rate: 20 kHz }\n  c: {}\n')).toEqual([]);
  });

  it('is said once of one channel that is too fast by itself', () => {
    expect(scanned('9 kHz', '  a: {}\n')).toHaveLength(1);
    expect(scanned('9 kHz', '  a: {}\n', 'simultaneous')).toHaveLength(1);
    expect(scanned('39 kHz', THREE, 'simultaneous')).toEqual([]);
  });
});

describe('a brace range', () => {
  const scanned = (digitizer: string, channels: string) =>
    rig({ digitizer: `sampling: scanned, ${digitizer}`, channels });

  it('has as many turns in a scan as it stands for, and its last one is the latest', () => {
    const finding = only(scanned('scan-interval: 10 us', '  "a-{1..4}": {}\n  b: {}\n'), 'scan-skew');
    expect(finding.channel).toBe('b');
    expect(finding.figures['delayS']).toBeCloseTo(40e-6, 12);
    // Three of the four are over 2.8 us, the first is what they are compared with.
    expect(finding.message).toContain('later than the first of `a-{1..4}`');
    expect(finding.message).toContain('and 3 others of its channels are over that too');
  });

  it('is a group by itself', () => {
    const finding = only(scanned('scan-interval: 10 us', '  "a-{1..4}": {}\n'), 'scan-skew');
    expect(finding.figures['delayS']).toBeCloseTo(30e-6, 12);
    expect(finding.message).toMatch(
      /^The last of these channels will be sampled 30 us \(10\.8 deg at 1 kHz\) later than the first of them/,
    );
  });

  it('counts in what a scan samples, and in the time that it leaves', () => {
    const sum = only(scanned('max-rate: 39 kHz', '  "a-{1..4}": {}\n'), 'rate-over-converter');
    expect(sum.figures).toEqual({ rateHz: 40_000, maxRateHz: 39_000, channels: 4 });
    const settling = only(scanned('settling: 10 us, full-scale: ±10 V', '  "a-{1..4}": {}\n'), 'settling-short');
    expect(settling.figures['settlesS']).toBeCloseTo(25e-6, 12);
  });
});
