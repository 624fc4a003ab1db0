import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { transformOf } from '../../server/src/signal/any-length-fft.ts';
import { type PatternGains, patternImages, type SlotPattern } from '../../server/src/signal/pattern.ts';
import { imagesOf } from '../../server/src/signal/pattern-folding.ts';
import { runs } from '../tools/runs.ts';

/** Periods of the pattern in a record; even, so that half a spacing of images is on a bin. */
const PERIODS = 22;

const RATE_HZ = 1000;

/** Lines below this are noise of the arithmetic. */
const FLOOR = 1e-9;

function gainsOf(pattern: SlotPattern): PatternGains {
  const result = patternImages(pattern);
  if (result.kind !== 'gains') throw new Error(`no pattern: ${result.kind}`);
  return result;
}

/** Peak of the line on each bin of a record of a cosine, sampled one by one, the slots that are not taken left at 0. */
function rehearsed({ slots, taken }: SlotPattern, bin: number, phase: number): Float64Array {
  const length = slots * PERIODS;
  const kept = new Set(taken);
  const samples = Float64Array.from({ length }, (_, n) =>
    kept.has(n % slots) ? (Math.cos((2 * Math.PI * ((bin * n) % length)) / length + phase) * slots) / taken.length : 0,
  );
  const { re, im } = transformOf(samples);
  return Float64Array.from({ length: Math.floor(length / 2) + 1 }, (_, k) => {
    const isAlone = k === 0 || 2 * k === length;
    return (Math.hypot(re[k]!, im[k]!) * (isAlone ? 1 : 2)) / length;
  });
}

/** What is predicted, by bin. */
function predicted(gains: PatternGains, bin: number): ReadonlyMap<number, number> {
  const length = gains.slots * PERIODS;
  return new Map(
    imagesOf((bin * RATE_HZ) / length, RATE_HZ, gains).images.map(({ recordedHz, gain }) => {
      const place = (recordedHz * length) / RATE_HZ;
      expect(place).toBeCloseTo(Math.round(place), 6);
      return [Math.round(place), gain];
    }),
  );
}

const dB = (ratio: number) => 20 * Math.log10(ratio);

const pattern: fc.Arbitrary<SlotPattern> = fc.integer({ min: 2, max: 97 }).chain((slots) =>
  fc.record({
    slots: fc.constant(slots),
    taken: fc.uniqueArray(fc.nat({ max: slots - 1 }), { minLength: 1, maxLength: slots }),
  }),
);

const tones = fc.record({ turn: fc.nat({ max: 1_000_000 }), phase: fc.integer({ min: 0, max: 360 }) });

/** A bin, up to three times the rate, and whether its images coincide there. */
function placed(slots: number, turn: number): { readonly bin: number; readonly coincides: boolean } {
  const bin = turn % (3 * slots * PERIODS);
  return { bin, coincides: (2 * bin) % PERIODS === 0 };
}

describe('a pattern, rehearsed', () => {
  it('of 2 to 97 slots leaves every line where and as high as predicted, within 0.1 dB, and no other', () => {
    let compared = 0;
    const lengths = new Set<number>();
    fc.assert(
      fc.property(pattern, tones, (given, { turn, phase }) => {
        const { bin, coincides } = placed(given.slots, turn);
        fc.pre(!coincides);
        const expected = predicted(gainsOf(given), bin);
        for (const [k, amplitude] of rehearsed(given, bin, (phase * Math.PI) / 180).entries()) {
          const gain = expected.get(k) ?? 0;
          if (gain < FLOOR) expect(amplitude).toBeLessThan(2 * FLOOR);
          else {
            expect(Math.abs(dB(amplitude / gain))).toBeLessThan(0.1);
            compared++;
          }
        }
        lengths.add(given.slots);
      }),
      { seed: 81, numRuns: runs(500) },
    );
    expect(compared).toBeGreaterThan(10 * runs(500));
    expect(lengths.size).toBeGreaterThan(20);
  });

  it('of every length from 2 to 97 does so', () => {
    for (let slots = 2; slots <= 97; slots++) {
      const taken = Array.from({ length: slots }, (_, slot) => slot).filter((slot) => (slot * slot) % 7 < 3);
      // Never a multiple of half a spacing, which is 11 bins.
      const bin = 11 * slots + 1;
      const expected = predicted(gainsOf({ slots, taken }), bin);
      for (const [k, amplitude] of rehearsed({ slots, taken }, bin, 1).entries()) {
        const gain = expected.get(k) ?? 0;
        if (gain < FLOOR) expect(amplitude).toBeLessThan(2 * FLOOR);
        else expect(Math.abs(dB(amplitude / gain))).toBeLessThan(0.1);
      }
    }
  });

  it('where images coincide is never higher than predicted, and as high at some phase', () => {
    let added = 0;
    fc.assert(
      fc.property(pattern, fc.nat({ max: 1_000_000 }), (given, half) => {
        const length = given.slots * PERIODS;
        const bin = (half * (PERIODS / 2)) % (2 * length);
        const expected = predicted(gainsOf(given), bin);
        const greatest = new Float64Array(Math.floor(length / 2) + 1);
        for (let degrees = 0; degrees < 180; degrees += 4) {
          for (const [k, amplitude] of rehearsed(given, bin, (degrees * Math.PI) / 180).entries()) {
            greatest[k] = Math.max(greatest[k]!, amplitude);
          }
        }
        for (const [k, amplitude] of greatest.entries()) {
          const gain = expected.get(k) ?? 0;
          expect(amplitude).toBeLessThan(gain * 1.000001 + 2 * FLOOR);
          if (gain > FLOOR) {
            expect(amplitude).toBeGreaterThan(gain * 10 ** (-0.1 / 20));
            added++;
          }
        }
      }),
      { seed: 82, numRuns: runs(100) },
    );
    expect(added).toBeGreaterThan(runs(100));
  });
});
