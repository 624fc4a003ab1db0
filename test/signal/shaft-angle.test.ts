import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldHz } from '../../server/src/signal/folding.ts';
import {
  angularRates,
  fixedInOrders,
  foldOrder,
  lockedInOrders,
  type OrderPiece,
  orderOf,
  ordersInto,
  type ShaftResampling,
} from '../../server/src/signal/shaft-angle.ts';
import { runs } from '../tools/runs.ts';
import { evenly } from './even-numbers.ts';

const resampling: fc.Arbitrary<ShaftResampling> = fc
  .tuple(fc.integer({ min: 2, max: 200 }), evenly(60, 3000), evenly(1, 8))
  .map(([perTurn, lowRpm, ratio]) => ({ perTurn, speed: { lowRpm, highRpm: lowRpm * ratio } }));

const part = evenly(0, 1);

function between(low: number, high: number, at: number): number {
  return low + at * (high - low);
}

/** The pieces that hold what has an order at a speed, and record it where it folds to. */
function holding(pieces: readonly OrderPiece[], order: number, rpm: number, perTurn: number): readonly OrderPiece[] {
  const slack = 1e-9 * (1 + order);
  const recorded = foldOrder(order, perTurn);
  return pieces.filter(({ speed, lowOrder, highOrder, recordedLowOrder, recordedHighOrder, mirrored, collapsed }) => {
    const isHere = order >= lowOrder - slack && order <= highOrder + slack;
    const isNow = rpm >= speed.lowRpm * (1 - 1e-9) && rpm <= speed.highRpm * (1 + 1e-9);
    const told = mirrored ? recordedHighOrder - (order - lowOrder) : recordedLowOrder + (order - lowOrder);
    return isHere && isNow && (collapsed || Math.abs(told - recorded) <= 2 * slack);
  });
}

describe('fixed frequencies in orders', () => {
  it('are told at every speed, at the order f 60 / speed, folded', () => {
    fc.assert(
      fc.property(
        resampling,
        evenly(0, 5000),
        evenly(0, 100),
        fc.array(fc.tuple(part, part), { minLength: 20, maxLength: 20 }),
        ({ perTurn, speed }, lowHz, width, places) => {
          const pieces = fixedInOrders(lowHz, lowHz + width, { perTurn, speed });
          for (const [ofRange, ofSpeed] of places) {
            const hz = between(lowHz, lowHz + width, ofRange);
            const rpm = between(speed.lowRpm, speed.highRpm, ofSpeed);
            expect(holding(pieces, (hz * 60) / rpm, rpm, perTurn).length).toBeGreaterThan(0);
          }
          for (const piece of pieces) {
            expect(piece.recordedLowOrder).toBeGreaterThanOrEqual(0);
            expect(piece.recordedHighOrder).toBeLessThanOrEqual(perTurn / 2);
            expect(piece.speed.lowRpm).toBeLessThanOrEqual(piece.speed.highRpm);
            expect(piece.folded).toBe(piece.highOrder > perTurn / 2);
          }
        },
      ),
      { seed: 71, numRuns: runs(500) },
    );
  });

  it('of a range fold at some speeds only', () => {
    // 1 kHz is order 20 at 3000 rpm and 100 at 600 rpm; 64 a turn fold at 32, above 1875 rpm not at all.
    const pieces = fixedInOrders(1000, 1000, { perTurn: 64, speed: { lowRpm: 600, highRpm: 3000 } });
    expect(pieces).toMatchObject([
      { lowOrder: 20, highOrder: 32, mirrored: false, folded: false, speed: { lowRpm: 1875, highRpm: 3000 } },
      { lowOrder: 32, highOrder: 64, mirrored: true, folded: true, speed: { lowRpm: 937.5, highRpm: 1875 } },
      { lowOrder: 64, highOrder: 96, mirrored: false, folded: true, speed: { lowRpm: 625, highRpm: 937.5 } },
      { lowOrder: 96, highOrder: 100, recordedLowOrder: 28, recordedHighOrder: 32, mirrored: true },
    ]);
  });

  it('are anywhere in the record where the shaft may stand still, but for 0 Hz', () => {
    const fromRest = { perTurn: 64, speed: { lowRpm: 0, highRpm: 3000 } };
    const pieces = fixedInOrders(1000, 1000, fromRest);
    expect(pieces.at(-1)).toMatchObject({ collapsed: true, recordedLowOrder: 0, recordedHighOrder: 32 });
    expect(fixedInOrders(0, 0, fromRest)).toMatchObject([
      { lowOrder: 0, highOrder: 0, recordedHighOrder: 0, folded: false, speed: { lowRpm: 0, highRpm: 3000 } },
    ]);
  });
});

describe('orders of the shaft', () => {
  it('fold once, exactly, at half the samples a turn, whatever the speed', () => {
    const steps = { perTurn: 64, speed: { lowRpm: 600, highRpm: 3000 } };
    expect([foldOrder(9, 64), foldOrder(32, 64), foldOrder(36, 64), foldOrder(70.5, 64)]).toEqual([9, 32, 28, 6.5]);
    // 36 orders at 3000 rpm are 1800 Hz, well within half of 25.6 kHz.
    expect(lockedInOrders(36, [25_600], steps)).toEqual([
      {
        speed: { lowRpm: 600, highRpm: 3000 },
        lowOrder: 36,
        highOrder: 36,
        recordedLowOrder: 28,
        recordedHighOrder: 28,
        mirrored: true,
        folded: true,
        collapsed: false,
      },
    ]);
  });

  it('sampled too slowly in time before are told at every speed where they are recorded', () => {
    let swept = 0;
    fc.assert(
      fc.property(
        resampling,
        evenly(0, 60),
        fc.constantFrom([20_000], [2000], [1000, 500], [3000, 1000, 250]),
        fc.array(part, { minLength: 20, maxLength: 20 }),
        ({ perTurn, speed }, order, ratesHz, places) => {
          const pieces = lockedInOrders(order, ratesHz, { perTurn, speed }, 100_000);
          for (const place of places) {
            const rpm = between(speed.lowRpm, speed.highRpm, place);
            const recordedHz = ratesHz.reduce(foldHz, (order * rpm) / 60);
            const seen = (recordedHz * 60) / rpm;
            if (Math.abs(seen - order) > 0.01) swept++;
            expect(holding(pieces, seen, rpm, perTurn).length).toBeGreaterThan(0);
          }
        },
      ),
      { seed: 72, numRuns: runs(500) },
    );
    expect(swept).toBeGreaterThan(100);
  });

  it('end in one collapsed piece where there are too many', () => {
    const steps = { perTurn: 4, speed: { lowRpm: 60, highRpm: 60_000 } };
    for (const limit of [1, 5, 30]) {
      const pieces = lockedInOrders(50, [100], steps, limit);
      expect(pieces.length).toBeLessThanOrEqual(limit);
      expect(pieces.at(-1)).toMatchObject({ collapsed: true, recordedLowOrder: 0, recordedHighOrder: 2 });
      expect(pieces.at(-1)!.speed.highRpm).toBe(60_000);
      for (let rpm = 60; rpm <= 60_000; rpm *= 1.07) {
        const seen = (foldHz((50 * rpm) / 60, 100) * 60) / rpm;
        expect(holding(pieces, seen, rpm, 4).length).toBeGreaterThan(0);
      }
    }
  });

  it('that come into a band are those around every multiple of the samples a turn', () => {
    const steps = { perTurn: 64, speed: { lowRpm: 600, highRpm: 3000 } };
    const pieces = ordersInto(1, 10, steps, 130);
    expect(pieces.map(({ lowOrder, highOrder, mirrored, folded }) => [lowOrder, highOrder, mirrored, folded])).toEqual([
      [1, 10, false, false],
      [54, 63, true, true],
      [65, 74, false, true],
      [118, 127, true, true],
      [129, 130, false, true],
    ]);
  });
});

describe('a resampling to shaft angle', () => {
  it('has the rate of perTurn x speed / 60', () => {
    expect(angularRates({ perTurn: 64, speed: { lowRpm: 600, highRpm: 3000 } })).toEqual({ lowHz: 640, highHz: 3200 });
    expect(orderOf(50, 1500)).toBe(2);
    expect(orderOf(0, 0)).toBe(0);
    expect(orderOf(1, 0)).toBe(Infinity);
  });

  it('with speeds or samples that are none has nothing to tell', () => {
    for (const steps of [
      { perTurn: 0, speed: { lowRpm: 1, highRpm: 2 } },
      { perTurn: Number.NaN, speed: { lowRpm: 1, highRpm: 2 } },
      { perTurn: Infinity, speed: { lowRpm: 1, highRpm: 2 } },
      { perTurn: 4, speed: { lowRpm: 3, highRpm: 2 } },
      { perTurn: 4, speed: { lowRpm: -1, highRpm: 2 } },
      { perTurn: 4, speed: { lowRpm: 0, highRpm: 0 } },
      { perTurn: 4, speed: { lowRpm: 1, highRpm: Infinity } },
    ]) {
      expect(fixedInOrders(1, 2, steps)).toEqual([]);
      expect(lockedInOrders(1, [100], steps)).toEqual([]);
      expect(ordersInto(1, 2, steps, 10)).toEqual([]);
    }
    const usual = { perTurn: 4, speed: { lowRpm: 1, highRpm: 2 } };
    for (const value of [-1, Number.NaN]) {
      expect(fixedInOrders(value, 1, usual)).toEqual([]);
      expect(lockedInOrders(value, [100], usual)).toEqual([]);
    }
    expect(fixedInOrders(1, Infinity, usual, 10).length).toBeLessThanOrEqual(10);
  });
});
