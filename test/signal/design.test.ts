import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import {
  attenuationOfLnPower,
  decibels,
  lnPowerOfAttenuation,
  powerDecibels,
  powerRatioOf,
  ratioOf,
} from '../../server/src/signal/decibel.ts';
import { fittingCutoffs, type LowPassFamily, leastOrder } from '../../server/src/signal/design.ts';
import { halfBandTaps, kaiserBeta, kaiserLength, kaiserTaps, MOST_TAPS } from '../../server/src/signal/kaiser.ts';
import { peakOfDbfs } from '../../server/src/signal/levels.ts';
import { MinimumHeap } from '../../server/src/signal/minimum-heap.ts';
import { product, signChanges, valueAt } from '../../server/src/signal/polynomial.ts';
import { runs } from '../tools/runs.ts';

const family =
  (response: 'butterworth' | 'bessel', tolerance = 0): LowPassFamily =>
  (order, cutoffHz) =>
    analogueResponse({
      response,
      order,
      shape: 'low-pass',
      edge: { at: 'cutoff', lowHz: cutoffHz, highHz: cutoffHz },
      tolerance,
    });

describe('the least order that does', () => {
  it('is that of the formula for Butterworth', () => {
    // Source: Butterworth's own, N = log((10^(A/10) - 1) / (10^(d/10) - 1)) / (2 log(f1 / f0)).
    const need = { passHz: 1000, mostDb: 1, stopHz: 3000, leastDb: 60 };
    const exact = Math.log((10 ** 6 - 1) / (10 ** 0.1 - 1)) / (2 * Math.log(3));
    expect(leastOrder(family('butterworth'), need)?.order).toBe(Math.ceil(exact));
  });

  it('comes with cutoffs of which both ends do, and nothing outside does', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1.5, max: 20, noNaN: true }),
        fc.double({ min: 0.1, max: 6, noNaN: true }),
        fc.double({ min: 10, max: 110, noNaN: true }),
        fc.constantFrom(0, 0.05),
        (ratio, mostDb, leastDb, tolerance) => {
          const need = { passHz: 50, mostDb, stopHz: 50 * ratio, leastDb };
          const build = family('butterworth', tolerance);
          const fit = leastOrder(build, need);
          if (fit === undefined) return;
          const does = (cutoffHz: number): boolean => {
            const response = build(fit.order, cutoffHz);
            return response.greatestDb(0, need.passHz) <= mostDb && response.leastDb(need.stopHz, 1e9) >= leastDb;
          };
          expect(does(fit.lowestCutoffHz)).toBe(true);
          expect(does(fit.highestCutoffHz)).toBe(true);
          expect(does(fit.lowestCutoffHz * 0.999)).toBe(false);
          expect(does(fit.highestCutoffHz * 1.001)).toBe(false);
          expect(fit.order === 1 || leastOrder(build, need, fit.order - 1) === undefined).toBe(true);
        },
      ),
      { seed: 31, numRuns: runs(300), endOnFailure: true },
    );
  });

  it('is none where nothing does, or the need makes no sense', () => {
    const impossible = {
      passHz: 1000,
      mostDb: 0.1,
      stopHz: 1001,
      leastDb: 100,
    };
    expect(leastOrder(family('bessel'), impossible)).toBeUndefined();
    expect(
      fittingCutoffs((hz) => family('bessel')(2, hz), {
        ...impossible,
        passHz: 0,
      }),
    ).toBeUndefined();
    expect(leastOrder(family('bessel'), { ...impossible, stopHz: Number.NaN })).toBeUndefined();
  });
});

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
