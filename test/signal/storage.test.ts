import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bytesOfDuration,
  bytesOfRecords,
  bytesPerSecond,
  defaultSampleBits,
  streamBytesPerSecond,
} from '../../server/src/signal/storage.ts';
import { runs } from '../tools/runs.ts';

const stream = fc.record({
  keptRateHz: fc.double({ min: 0.1, max: 1e9, noNaN: true }),
  sampleBits: fc.constantFrom(1, 8, 12, 16, 24, 32),
});
const streams = fc.array(stream, { minLength: 1, maxLength: 20 });

const close = (actual: number, expected: number): void => {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-9 * Math.abs(expected));
};

describe('the room that samples take', () => {
  it('for one sample is its bits rounded up to whole bytes', () => {
    // Common practice.
    expect([1, 8, 10, 12, 16, 18, 24, 25, 32, 40].map(defaultSampleBits)).toEqual([
      8, 8, 16, 16, 16, 24, 24, 32, 32, 40,
    ]);
    expect([0, -3, Number.NaN].map(defaultSampleBits)).toEqual([8, 8, 8]);
  });

  it('for a rig, by hand', () => {
    const rig = [...Array<{ keptRateHz: number; sampleBits: number }>(32)].map(() => ({
      keptRateHz: 25_600,
      sampleBits: 32,
    }));
    // 32 channels x 25,600 x 4 bytes; eight hours of it; 200 records of 4 s.
    expect(bytesPerSecond(rig)).toBe(3_276_800);
    expect(bytesOfDuration(rig, 8 * 3600)).toBe(94_371_840_000);
    expect(bytesOfRecords(rig, 200, 4)).toBe(2_621_440_000);
    expect(bytesOfDuration(rig, 1000)).toBe(3_276_800_000);
    // Packed: two samples of 12 bits in three bytes.
    expect(streamBytesPerSecond({ keptRateHz: 1000, sampleBits: 12 })).toBe(1500);
  });

  it('holds the whole samples of a record only', () => {
    const one = [{ keptRateHz: 10, sampleBits: 16 }];
    expect(bytesOfRecords(one, 3, 0.55)).toBe(3 * 5 * 2);
    // 0.3 x 10 is three samples, though the product of doubles may fall short.
    expect(bytesOfRecords([{ keptRateHz: 0.1, sampleBits: 8 }], 1, 30)).toBe(3);
    expect(bytesOfRecords([{ keptRateHz: 1000, sampleBits: 8 }], 1, 4.35)).toBe(4350);
    expect(bytesOfRecords(one, 3, 0.01)).toBe(0);
  });

  it('adds up over channels and over time', () => {
    const duration = fc.double({ min: 0.001, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(streams, streams, duration, duration, (some, others, first, second) => {
        close(bytesPerSecond([...some, ...others]), bytesPerSecond(some) + bytesPerSecond(others));
        close(bytesOfDuration(some, first + second), bytesOfDuration(some, first) + bytesOfDuration(some, second));
        close(bytesOfDuration(some, first) / bytesPerSecond(some), first);
      }),
      { seed: 67, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it('of records is never more than as long a run, and less by under one sample a record', () => {
    const count = fc.integer({ min: 1, max: 1000 });
    fc.assert(
      fc.property(streams, count, fc.double({ min: 0.001, max: 1000, noNaN: true }), (some, records, recordS) => {
        const whole = bytesOfDuration(some, records * recordS);
        const held = bytesOfRecords(some, records, recordS);
        const oneSampleEach = some.reduce((sum, { sampleBits }) => sum + (records * sampleBits) / 8, 0);
        expect(held).toBeLessThanOrEqual(whole * (1 + 1e-9));
        expect(held).toBeGreaterThanOrEqual(whole * (1 - 1e-9) - oneSampleEach);
      }),
      { seed: 68, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it('is nothing where nothing is kept', () => {
    expect(bytesPerSecond([])).toBe(0);
    expect(bytesOfDuration([], 100)).toBe(0);
    expect(bytesOfRecords([], 5, 5)).toBe(0);
  });
});
