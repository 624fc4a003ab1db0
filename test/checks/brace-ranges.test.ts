import { describe, expect, it } from 'vitest';
import { countChannels } from '../../server/src/workbench/findings.ts';
import { runTotals } from '../../server/src/workbench/run-totals.ts';
import { channelNamed } from '../../server/src/workbench/workbench.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { findingsOf, found, names, only } from './judged.ts';

const FOLDS = `rig: Test
digitizers: { d: { full-scale: ±1 V } }
sources: { s: { frequency: 950 Hz, level: 1 V } }
channels:
  strain-{01..64}: { digitizer: d, rate: 1000 Hz, band: 10 Hz .. 100 Hz }
  torque: { digitizer: d, rate: 1000 Hz, band: 10 Hz .. 100 Hz }
`;

describe('a channel that stands for 64', () => {
  it('is said once what it is found to have, with the count', () => {
    expect(names(findingsOf(FOLDS))).toEqual(['fold-in-band s', 'fold-in-band s']);
    const [many, one] = found(FOLDS, 'fold-in-band');
    expect(many!.channel).toBe('strain-{01..64}');
    expect(many!.message.match(/\(64 channels\)/g)).toHaveLength(1);
    expect(many!.message).toMatch(/ \(64 channels\)\.$/);
    expect(many!.message.replace(' (64 channels)', '')).toBe(one!.message);
  });

  it('counts as 64 in every sum', () => {
    expect(countChannels(evaluated(FOLDS))).toBe(65);
    const unheard = FOLDS.replace('level: 1 V', 'level: 1 g').replaceAll(
      'digitizer: d,',
      'digitizer: d, measures: strain, sensitivity: 1 V/ue,',
    );
    expect(only(unheard, 'level-unplaced').figures.channels).toBe(65);
  });

  it('is stored 64 times', () => {
    // By hand: 65 channels x 1000 S/s x 16 bit = 130 kB/s, 468 MB in an hour.
    const run = `${FOLDS.replace('d: {', 'd: { bits: 16,')}run: { duration: 1 h, disk: 400 MB, link: 100 kB/s }\n`;
    expect(runTotals(evaluated(run))).toEqual({
      bytesPerSecond: 130_000,
      bytes: 468_000_000,
      channels: 65,
      channelsLeftOut: 0,
    });
    expect(only(run, 'disk-short').figures.bytes).toBe(468_000_000);
    expect(only(run, 'link-short').figures.bytesPerSecond).toBe(130_000);
    const without = runTotals(evaluated(run.replace('rate: 1000 Hz, band', 'band')));
    expect(without).toMatchObject({ channels: 1, channelsLeftOut: 64 });
  });

  it('outweighs others where the rate that most have is asked for', () => {
    const rig = (first: string): string => `rig: Test
digitizers: { d: { together: same } }
defaults: { digitizer: d, undeclared: -90 dBFS, band: 1 Hz .. 10 Hz }
channels:
  a: { rate: 1000 Hz }
  b: { rate: 1000 Hz }
  ${first}: { rate: 2000 Hz }
`;
    expect(found(rig('c'), 'rates-conflict').map(({ channel }) => channel)).toEqual(['c']);
    expect(found(rig('c-{1..3}'), 'rates-conflict').map(({ channel }) => channel)).toEqual(['a', 'b']);
    const [said] = found(rig('c-{1..2}').replace('b: { rate: 1000', 'b: { rate: 2000'), 'rates-conflict');
    expect(said!.message).not.toContain('channels)');
    const minority = rig('c-{1..2}').replace('b: {', 'b-{1..8}: {');
    expect(only(minority, 'rates-conflict').message).toMatch(/ \(2 channels\)\.$/);
  });

  it('has a turn of the scan for each', () => {
    const rig = (scanner: string, channels: string): string => `rig: Test
digitizers: { d: { sampling: scanned, ${scanner} } }
groups: { g: { within: 1 deg, up-to: 1 kHz } }
defaults: { digitizer: d, undeclared: -90 dBFS, band: 1 Hz .. 1 kHz, rate: 10 kHz, group: g }
channels:
${channels}`;
    // By hand: 4 x 10 kHz and 1 x 10 kHz are 50 kHz.
    const sum = only(rig('max-rate: 49 kHz', '  a: {}\n  s-{1..4}: {}\n'), 'rate-over-converter');
    expect(sum.figures).toMatchObject({ rateHz: 50_000, channels: 5 });
    expect(found(rig('max-rate: 50 kHz', '  a: {}\n  s-{1..4}: {}\n'), 'rate-over-converter')).toEqual([]);
    // By hand: the last of them is four turns of 10 us behind the first: 360 deg x 1 kHz x 40 us = 14.4 deg.
    const skew = only(rig('scan-interval: 10 us', '  a: {}\n  s-{1..4}: {}\n'), 'scan-skew');
    expect(skew.figures.delayS).toBeCloseTo(40e-6, 12);
    expect(skew.figures.phaseDeg).toBeCloseTo(14.4, 9);
    expect(skew.message).toMatch(/^The last of these channels will be sampled .* later than `a`/);
    // Alone they are compared with one another: three turns.
    const alone = only(rig('scan-interval: 10 us', '  s-{1..4}: {}\n'), 'scan-skew');
    expect(alone.figures.delayS).toBeCloseTo(30e-6, 12);
    expect(alone.message).toContain('later than the first of them,');
    const behind = only(rig('scan-interval: 10 us', '  s-{1..4}: {}\n  z: {}\n'), 'scan-skew');
    expect(behind.figures.delayS).toBeCloseTo(40e-6, 12);
    expect(behind.message).toMatch(/^This channel will be sampled .* later than the first of `s-\{1..4\}`/);
  });

  it('is found by its own name and by each that it stands for', () => {
    const evaluation = evaluated(FOLDS);
    for (const name of ['strain-{01..64}', 'strain-01', 'strain-64'])
      expect(channelNamed(evaluation, name)?.result.channel.name).toBe('strain-{01..64}');
    for (const name of ['strain-1', 'strain-65', 'strain-'])
      expect(channelNamed(evaluation, name), name).toBeUndefined();
  });
});
