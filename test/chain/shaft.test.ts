import { describe, expect, it } from 'vitest';
import { found, only } from '../checks/judged.ts';
import { arrivalsOfText, chainOfText } from './rig.ts';

const RIG = (sources: string, step: string, more = ''): string => `rig: R
digitizers: { d: { bits: 24, full-scale: ±1 V } }
filters:
  card: { response: elliptic, order: 10, ripple: 0.1 dB, stopband: 110 dB, pass-edge: 4 kHz }
  tracking: { response: kaiser, pass: 0.2 fs, stop: 0.5 fs, stopband: 80 dB }
sources: { ${sources} }
channels:
  a:
    measures: voltage
    digitizer: d
    rate: 10.24 kHz
    filter: card
    band: 0 Hz .. 100 Hz
    then: [${step}]
    undeclared: -90 dBFS
${more}`;

const STEP = '{ per-turn: 64, speed: 600..3000 rpm }';

describe('a channel that is resampled to shaft angle', () => {
  // 64 a turn at 10 .. 50 turns a second are 640 .. 3,200 Hz. By hand.
  it('reaches as far as the lowest speed lets it, where nothing folds', () => {
    const chain = chainOfText(RIG('quiet: { frequency: 50 Hz, level: 10 mV }', STEP));
    expect(chain.stages.map(({ rateHz, kind }) => [kind, rateHz])).toEqual([
      ['converter', 10_240],
      ['per-turn', 640],
    ]);
    expect(chain.margin).toBeCloseTo(3.2, 12);
  });

  it('is told where a line that does not turn folds, at the speed at which it is worst', () => {
    // 700 Hz is recorded at 700 - 640 = 60 Hz at 600 rpm, inside the band, and nothing takes it off.
    const finding = only(RIG('whine: { frequency: 700 Hz, level: 0.1 V }', STEP), 'fold-in-band');
    expect(finding.stage).toBe(2);
    expect(finding.figures.levelDbfs).toBeCloseTo(-20, 1);
    expect(finding.message).toContain('where it is resampled to 64 samples a turn');
  });

  it('finds the speed between the ends at which a line gets into the band', () => {
    // At 600 rpm 1,600 Hz folds to 320 Hz, at 3,000 rpm it is native: in the band it is for 1,500 .. 1,700 Hz.
    const arrivals = arrivalsOfText(RIG('whine: { frequency: 1600 Hz, level: 0.1 V }', STEP));
    expect(arrivals).toMatchObject([{ folded: true, inBand: true, overLimit: true, foldsAtStage: 2 }]);
  });

  it('keeps the order of what turns with the shaft', () => {
    // Order 70 of 64 samples a turn is recorded as order 6, whatever the speed: 60 Hz at 600 rpm.
    const arrivals = arrivalsOfText(RIG('mesh: { order: 70, speed: 600..3000 rpm, level: 0.1 V }', STEP));
    expect(arrivals).toHaveLength(1);
    expect(arrivals[0]!.recordedLowHz).toBeCloseTo((6 * arrivals[0]!.trueLowHz) / 70, 9);
    expect(arrivals[0]!.overLimit).toBe(true);
  });

  it('is cleaned by a filter in orders, which follows the speed', () => {
    const text = RIG(
      'whine: { frequency: 700 Hz, level: 0.1 V }',
      '{ per-turn: 64, speed: 600..3000 rpm, filter: tracking }',
    );
    expect(found(text, 'fold-in-band')).toEqual([]);
  });

  it('is told when the band does not fit at the lowest speed', () => {
    const text = RIG('', '{ per-turn: 16, speed: 600..3000 rpm }');
    // 16 a turn at 10 turns a second are 160 Hz, half of it 80 Hz.
    expect(only(text, 'band-over-nyquist').message).toContain('half of 160 Hz');
  });

  it('needs the speed', () => {
    expect(found(RIG('', '{ per-turn: 16 }'), 'missing-key')).toHaveLength(1);
  });
});
