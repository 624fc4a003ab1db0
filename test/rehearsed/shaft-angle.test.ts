import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arrivalsOf } from '../../server/src/chain/arrivals.ts';
import { chainOf } from '../../server/src/chain/chain.ts';
import { transformOf } from '../../server/src/signal/any-length-fft.ts';
import { channelsOf } from '../chain/rig.ts';
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

/** Where the chain of a channel that is resampled to shaft angle says that a tone arrives, in orders. */
function predictedOrder(source: string, rpm: number, perTurn: number): number {
  const [channel] = channelsOf(`rig: R
sources: { tone: { ${source}, level: 1 V } }
channels:
  a: { measures: voltage, rate: 1 GHz, band: 0 Hz .. 1 Hz, then: [{ per-turn: ${perTurn}, speed: ${rpm} rpm }] }
`);
  const [arrival] = arrivalsOf(chainOf(channel!)!);
  return (arrival!.recordedLowHz * 60) / rpm;
}

const rig = fc.record({
  perTurn: fc.integer({ min: 4, max: 90 }),
  rpm: fc.integer({ min: 300, max: 6000 }),
  tenths: fc.integer({ min: 1, max: 2000 }),
});

describe('resampling to shaft angle, rehearsed', () => {
  it('records an order of the shaft where it folds to, at any speed', () => {
    fc.assert(
      fc.property(rig, ({ perTurn, rpm, tenths }) => {
        const order = tenths / 10;
        const found = rehearsedOrder((order * rpm) / 60, rpm, perTurn);
        expect(predictedOrder(`order: ${order}, speed: ${rpm} rpm`, rpm, perTurn)).toBeCloseTo(found, 6);
      }),
      { seed: 91, numRuns: runs(500) },
    );
  });

  it('records a fixed frequency at the order that it folds to at that speed', () => {
    fc.assert(
      fc.property(rig, ({ perTurn, rpm, tenths }) => {
        // A frequency that is on a line at this speed.
        const frequencyHz = ((tenths / 10) * rpm) / 60;
        const found = rehearsedOrder(frequencyHz, rpm, perTurn);
        expect(predictedOrder(`frequency: ${frequencyHz} Hz`, rpm, perTurn)).toBeCloseTo(found, 6);
      }),
      { seed: 92, numRuns: runs(500) },
    );
  });
});
