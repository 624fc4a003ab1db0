import { describe, expect, it } from 'vitest';
import { findingsOf, found, only, underlined } from './judged.ts';

const RIG = (channel: string, digitizer = ''): string => `rig: R
digitizers: { d: { bits: 16, full-scale: ±1 V${digitizer} } }
filters: { card: { response: elliptic, order: 10, ripple: 0.1 dB, stopband: 100 dB, pass-edge: 45 Hz } }
sources: { hum: { frequency: 7 Hz, level: 0.5 V } }
channels:
  a: { digitizer: d, rate: 100 Hz, filter: card, ${channel} }
`;

describe('pattern-image', () => {
  // Slots 0..3 of 10 at 100 Hz: images every 10 Hz; |G[1] / G[0]| = |sin(0.4 pi) / (4 sin(0.1 pi))| = 0.7694, by hand.
  it('tells where the images of a source are, and how high', () => {
    const text = RIG('band: 12 Hz .. 18 Hz, pattern: { of: 10, take: [0, 1, 2, 3] }, peak: 1 mV');
    const finding = only(text, 'pattern-image');
    expect(underlined(finding)).toBe('{ of: 10, take: [0, 1, 2, 3] }');
    // 7 + 10 Hz is at 17 Hz; -6.02 dBFS of hum, less 2.28 dB. 3 + 10 = 13 Hz is that of order 2, lower.
    expect(finding.about).toBe('hum');
    expect(finding.figures.levelDbfs).toBeCloseTo(-6.0206 + 20 * Math.log10(0.7694), 1);
    expect(finding.message).toContain('recorded at 17 Hz, inside the band');
  });

  it('tells of the band itself, by its peak or by full scale', () => {
    const channel = 'band: 5 Hz .. 40 Hz, hears: none, pattern: { of: 10, take: [0, 1, 2, 3] }';
    expect(only(RIG(channel), 'pattern-image').figures.levelDbfs).toBeCloseTo(20 * Math.log10(0.7694), 2);
    expect(found(RIG(`${channel}, peak: 1 mV`), 'pattern-image')).toEqual([]);
  });

  it('says nothing where all is kept', () => {
    const text = RIG('band: 5 Hz .. 40 Hz, pattern: { of: 4, take: [0, 1, 2, 3] }');
    expect(found(text, 'pattern-image')).toEqual([]);
  });

  it('is about a pattern that can be', () => {
    const slot = only(RIG('band: 5 Hz .. 40 Hz, pattern: { of: 4, take: [4] }'), 'out-of-range');
    expect(slot.message).toBe('`take` has slot 4, but slots count from 0 to 3.');
    expect(only(RIG('band: 5 Hz .. 40 Hz, pattern: { of: 4, take: [] }'), 'out-of-range').message).toMatch(/no slot/);
    expect(found(RIG('band: 5 Hz .. 40 Hz, pattern: { take: [0] }'), 'missing-key')).toHaveLength(1);
  });
});

describe('interleave-image', () => {
  const INTERLEAVE = ', interleave: { converters: 4, gain-mismatch: 0.2 %, offset-mismatch: 0.1 % }';

  // 4 converters at 100 Hz: images at 25, 50, 75 Hz ± 7 Hz; 0.2 % of 0.5 V is -60 dBFS. Offsets at 25 Hz: -56.99 dBFS.
  it('tells where the images of a source and the offset lines are', () => {
    const text = RIG('band: 17 Hz .. 33 Hz, fold-limit: -70 dBFS, peak: 1 mV', INTERLEAVE);
    const said = found(text, 'interleave-image');
    expect(said.map(({ about }) => about).sort()).toEqual(['hum', 'offset']);
    expect(said.find(({ about }) => about === 'hum')!.figures.levelDbfs).toBeCloseTo(-60, 1);
    expect(said.find(({ about }) => about === 'offset')!.figures.levelDbfs).toBeCloseTo(-56.99, 2);
  });

  it('stands on the channel and relates the converters', () => {
    const text = RIG('band: 20 Hz .. 30 Hz, fold-limit: -58 dBFS, peak: 1 mV, hears: none', INTERLEAVE);
    const finding = only(text, 'interleave-image');
    expect(underlined(finding)).toBe('a');
    expect(finding.related[0]!.message).toBe('The value comes from here.');
  });
});

describe('pulse-missed', () => {
  // 60 pulses a turn at 3,000 rpm are 3 kHz; 20 % of a period is 66.7 us, two samples at 30 kHz. By hand.
  it('asks two samples of the shorter of high and low, at the highest speed', () => {
    const rig = (rate: string): string =>
      `rig: R\nchannels:\n  a: { rate: ${rate}, pulses: { per-turn: 60, speed: 600..3000 rpm, duty: 80 % } }\n`;
    const finding = only(rig('20 kHz'), 'pulse-missed');
    expect(finding.figures.leastRateHz).toBeCloseTo(30_000, 6);
    expect(finding.figures.samples).toBeCloseTo(4 / 3, 9);
    expect(found(rig('30 kHz'), 'pulse-missed')).toEqual([]);
  });

  it('says nothing of folding or filters there', () => {
    const text = RIG('band: 5 Hz .. 60 Hz, pulses: { per-turn: 1, speed: 60 rpm }');
    expect(findingsOf(text).filter(({ severity }) => severity !== 'hint')).toEqual([]);
  });
});
