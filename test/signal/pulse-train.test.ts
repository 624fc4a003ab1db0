import { describe, expect, it } from 'vitest';
import { LEAST_PULSE_SAMPLES, leastPulseRateHz, shorterPulseS } from '../../server/src/signal/pulse-train.ts';

describe('a pulse train', () => {
  it('of 60 a turn at 3000 rpm, half high, is high for a sixth of a millisecond', () => {
    // 60 x 50 turns per second are 3000 pulses per second.
    const train = { perTurn: 60, topSpeedRpm: 3000, duty: 0.5 };
    expect(shorterPulseS(train)).toBeCloseTo(1 / 6000, 12);
    expect(leastPulseRateHz(train)).toBeCloseTo(12_000, 8);
  });

  it('is judged by the shorter of high and low', () => {
    for (const duty of [0.1, 0.9]) {
      expect(shorterPulseS({ perTurn: 1, topSpeedRpm: 60, duty })).toBeCloseTo(0.1, 12);
      expect(leastPulseRateHz({ perTurn: 1, topSpeedRpm: 60, duty })).toBeCloseTo(LEAST_PULSE_SAMPLES / 0.1, 9);
    }
  });

  it('sampled at its least rate is never missed and often is below it', () => {
    const train = { perTurn: 7, topSpeedRpm: 1234, duty: 0.3 };
    const periodS = 60 / (7 * 1234);
    const fewest = (rateHz: number) => {
      let least = Infinity;
      for (let start = 0; start < 200; start++) {
        const startS = start / 200 / rateHz;
        const until = Math.ceil((startS + 0.3 * periodS) * rateHz);
        least = Math.min(least, until - Math.ceil(startS * rateHz));
      }
      return least;
    };
    const rateHz = leastPulseRateHz(train);
    expect(fewest(rateHz * 1.000001)).toBeGreaterThanOrEqual(LEAST_PULSE_SAMPLES);
    expect(fewest(rateHz * 0.99)).toBeLessThan(LEAST_PULSE_SAMPLES);
  });

  it('that is never high, never low or no train at all asks for a rate that does not exist', () => {
    for (const duty of [0, 1, -0.2, 1.5, Number.NaN]) {
      expect(shorterPulseS({ perTurn: 60, topSpeedRpm: 3000, duty })).toBe(0);
      expect(leastPulseRateHz({ perTurn: 60, topSpeedRpm: 3000, duty })).toBe(Infinity);
    }
    expect(shorterPulseS({ perTurn: Number.NaN, topSpeedRpm: 3000, duty: 0.5 })).toBe(0);
    expect(shorterPulseS({ perTurn: Infinity, topSpeedRpm: 0, duty: 0.5 })).toBe(0);
  });

  it('lasts for ever where nothing turns', () => {
    expect(shorterPulseS({ perTurn: 60, topSpeedRpm: 0, duty: 0.5 })).toBe(Infinity);
    expect(leastPulseRateHz({ perTurn: 60, topSpeedRpm: 0, duty: 0.5 })).toBe(0);
  });
});
