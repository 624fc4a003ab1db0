import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  attenuationOfLnPower,
  decibels,
  lnPowerOfAttenuation,
  powerDecibels,
  powerRatioOf,
  ratioOf,
} from '../../server/src/signal/decibel.ts';
import { halfBandTaps, kaiserBeta, kaiserLength, kaiserTaps, MOST_TAPS } from '../../server/src/signal/kaiser.ts';
import { peakOfDbfs } from '../../server/src/signal/levels.ts';
import { MinimumHeap } from '../../server/src/signal/minimum-heap.ts';
import { product, signChanges, valueAt } from '../../server/src/signal/polynomial.ts';
import { runs } from '../tools/runs.ts';

describe("Kaiser's taps", () => {
  it('mirror one another and sum to nearly 1', () => {
    const taps = kaiserTaps(80, 0.1, 0.2, 1);
    expect(taps.length).toBe(kaiserLength(80, 0.1, 0.2, 1));
    taps.forEach((tap, n) => {
      expect(tap).toBe(taps[taps.length - 1 - n]);
    });
    expect(Math.abs(taps.reduce((sum, tap) => sum + tap, 0) - 1)).toBeLessThan(1e-3);
  });

  it('stay within the limit however narrow the transition', () => {
    expect(kaiserLength(90, 0.2, 0.2, 1)).toBe(MOST_TAPS);
    expect(kaiserLength(Number.NaN, 0.2, 0.2, 1)).toBe(MOST_TAPS);
    expect(kaiserTaps(1e6, 0.1, 0.4, 1).every(Number.isFinite)).toBe(true);
    expect(kaiserTaps(0, 0.1, 0.4, 1).length).toBe(1);
  });

  it('take no window for ripples above 21 dB down', () => {
    expect(kaiserBeta(15)).toBe(0);
    expect(kaiserBeta(40)).toBeCloseTo(3.395, 3);
  });

  it('of a half-band filter are 0 at every second place', () => {
    const taps = halfBandTaps(70, 0.2, 1);
    const middle = (taps.length - 1) / 2;
    expect(taps.length % 4).toBe(3);
    expect(taps[middle]).toBe(0.5);
    expect(taps[0]).not.toBe(0);
    taps.forEach((tap, n) => {
      if (n !== middle && (n - middle) % 2 === 0) expect(tap).toBe(0);
    });
  });
});

describe('decibels', () => {
  it('turn ratios into figures and back', () => {
    expect(decibels(10)).toBe(20);
    expect(powerDecibels(10)).toBe(10);
    expect(ratioOf(-Infinity)).toBe(0);
    expect(powerRatioOf(30)).toBeCloseTo(1000, 9);
    expect(peakOfDbfs(-20, 10)).toBeCloseTo(1, 12);
    fc.assert(
      fc.property(fc.double({ min: 1e-9, max: 3000, noNaN: true }), (db) => {
        expect(Math.abs(attenuationOfLnPower(lnPowerOfAttenuation(db)) - db)).toBeLessThan(1e-12 * Math.max(1, db));
      }),
      { seed: 32, numRuns: runs(1000), endOnFailure: true },
    );
  });
});

describe('the tools beneath', () => {
  it('a polynomial changes sign at its roots', () => {
    const roots = [0.5, 2, 7, 40];
    const polynomial = roots.reduce<readonly number[]>((all, root) => product(all, [-root, 1]), [1]);
    const found = signChanges(polynomial, 1e-9, 1e6);
    expect(found.length).toBe(roots.length);
    found.forEach((root, i) => {
      expect(root).toBeCloseTo(roots[i]!, 9);
    });
    expect(signChanges([1, 0, 1], 0.1, 10)).toEqual([]);
    expect(signChanges([5], 0.1, 10)).toEqual([]);
    expect(valueAt([1, 2, 3], 2)).toBe(17);
  });

  it('a heap gives back the least first', () => {
    fc.assert(
      fc.property(fc.array(fc.integer()), (numbers) => {
        const heap = new MinimumHeap<number>((item) => item);
        for (const number of numbers) heap.add(number);
        const sorted: number[] = [];
        for (let item = heap.least(); item !== undefined; item = heap.least()) {
          sorted.push(item);
          heap.removeLeast();
        }
        heap.removeLeast();
        expect(sorted).toEqual([...numbers].sort((a, b) => a - b));
      }),
      { seed: 33, numRuns: runs(500), endOnFailure: true },
    );
  });
});
