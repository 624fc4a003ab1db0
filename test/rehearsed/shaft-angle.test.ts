import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { transformOf } from '../../server/src/signal/any-length-fft.ts';
import { fixedInOrders, foldOrder, lockedInOrders } from '../../server/src/signal/shaft-angle.ts';
import { runs } from '../tools/runs.ts';

/** Turns in a record, so that lines are a tenth of an order apart. */
const TURNS = 10;

/** The order of the highest line of a tone that is sampled at even angles while the shaft turns steadily. */
function rehearsedOrder(frequencyHz: number, rpm: number, perTurn: number): number {
  const samples = Float64Array.from({ length: perTurn * TURNS }, (_, n) =>
    Math.cos(2 * Math.PI * frequencyHz * ((n / perTurn) * (60 / rpm)) + 0.4),
  );
  const { re, im } = transformOf(samples);
  let highest = 0;
  for (let k = 0; k <= samples.length / 2; k++) {
    if (Math.hypot(re[k]!, im[k]!) > Math.hypot(re[highest]!, im[highest]!)) highest = k;
  }
  return highest / TURNS;
}

const rig = fc.record({
  perTurn: fc.integer({ min: 4, max: 90 }),
  lowRpm: fc.integer({ min: 300, max: 1500 }),
  highRpm: fc.integer({ min: 1500, max: 6000 }),
  tenths: fc.integer({ min: 0, max: 2000 }),
  part: fc.integer({ min: 0, max: 100 }),
});

describe('resampling to shaft angle, rehearsed', () => {
  it('records an order of the shaft where it folds to, at any speed', () => {
    fc.assert(
      fc.property(rig, ({ perTurn, lowRpm, highRpm, tenths, part }) => {
        const order = tenths / 10;
        const rpm = lowRpm + ((highRpm - lowRpm) * part) / 100;
        const found = rehearsedOrder((order * rpm) / 60, rpm, perTurn);
        expect(found).toBeCloseTo(foldOrder(order, perTurn), 9);
        const [piece, ...others] = lockedInOrders(order, [1e9], { perTurn, speed: { lowRpm, highRpm } });
        expect(others).toEqual([]);
        expect(found).toBeCloseTo(piece!.recordedLowOrder, 9);
      }),
      { seed: 91, numRuns: runs(500) },
    );
  });

  it('records a fixed frequency within a piece of that speed', () => {
    fc.assert(
      fc.property(rig, ({ perTurn, lowRpm, highRpm, tenths, part }) => {
        const rpm = lowRpm + ((highRpm - lowRpm) * part) / 100;
        // A frequency that is on a line at this speed.
        const frequencyHz = ((tenths / 10) * rpm) / 60;
        const found = rehearsedOrder(frequencyHz, rpm, perTurn);
        const pieces = fixedInOrders(frequencyHz, frequencyHz, { perTurn, speed: { lowRpm, highRpm } });
        const holding = pieces.filter(
          ({ speed, recordedLowOrder, recordedHighOrder }) =>
            rpm >= speed.lowRpm * (1 - 1e-9) &&
            rpm <= speed.highRpm * (1 + 1e-9) &&
            found >= recordedLowOrder - 1e-9 &&
            found <= recordedHighOrder + 1e-9,
        );
        expect(holding.length).toBeGreaterThan(0);
      }),
      { seed: 92, numRuns: runs(500) },
    );
  });
});
