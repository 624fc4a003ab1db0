import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analoguePhase } from '../../server/src/signal/group-delay.ts';
import { type GapKind, greatestGap, phaseAxis, sampledPhase, sizeOf } from '../../server/src/signal/phase-gap.ts';
import { NO_PHASE, type PhaseResponse } from '../../server/src/signal/phase-response.ts';
import { sensorPhase } from '../../server/src/signal/sensor-phase.ts';
import { runs } from '../tools/runs.ts';

const TOP_HZ = 1000;
const axis = phaseAxis(TOP_HZ);
const sampled = (response: PhaseResponse) => ({ response, samples: sampledPhase(response, axis) });

function gapOf(one: PhaseResponse, other: PhaseResponse, kind: GapKind, lowHz = 1, highHz = TOP_HZ) {
  return greatestGap(sampled(one), sampled(other), axis, lowHz, highHz, kind);
}

function butterworth(order: number, hz: number): PhaseResponse {
  const edge = { at: 'cutoff', lowHz: hz, highHz: hz } as const;
  return analoguePhase({ response: 'butterworth', order, shape: 'low-pass', edge, tolerance: 0 })!;
}

describe('an axis of phases', () => {
  it('ascends to its top in 64 points, and begins where nothing is looked at', () => {
    expect(axis).toHaveLength(64);
    expect(axis[63]).toBe(TOP_HZ);
    expect(axis[0]).toBeCloseTo(TOP_HZ * 1e-4, 12);
    expect([...axis].every((hz, index) => index === 0 || hz >= axis[index - 1]!)).toBe(true);
  });
});

describe('the greatest difference of two phases', () => {
  it('of a response and itself is none', () => {
    expect(gapOf(NO_PHASE, NO_PHASE, 'angle').phaseRad).toBe(0);
  });

  it('of two corners is at their geometric mean, and their arc tangents apart', () => {
    const gap = gapOf(sensorPhase({ q: 1, cornerHz: 200 }), sensorPhase({ q: 1, cornerHz: 400 }), 'angle');
    expect(gap.atHz).toBeCloseTo(Math.sqrt(200 * 400), 2);
    expect(gap.phaseRad).toBeCloseTo(Math.atan(Math.SQRT1_2) - Math.atan(Math.SQRT2), 12);
  });

  it('keeps to the range that is asked for', () => {
    const [one, other] = [sensorPhase({ q: 1, cornerHz: 200 }), sensorPhase({ q: 1, cornerHz: 400 })];
    expect(gapOf(one, other, 'angle', 1, 100).atHz).toBe(100);
    expect(gapOf(one, other, 'angle', 500, 1000).atHz).toBe(500);
    expect(gapOf(one, other, 'angle', 50, 50).atHz).toBe(50);
  });

  it('in time is greatest where the angle is most for its frequency', () => {
    const gap = gapOf(sensorPhase({ q: 1, cornerHz: 200 }), NO_PHASE, 'time');
    expect(gap.atHz).toBe(1);
    expect(sizeOf(gap, 'time')).toBeCloseTo(Math.atan(1 / 200) / (2 * Math.PI), 12);
  });

  it('is no less than anywhere on a fine grid', () => {
    const filter = fc.record({ order: fc.integer({ min: 1, max: 8 }), hz: fc.integer({ min: 100, max: 5000 }) });
    fc.assert(
      fc.property(filter, filter, fc.constantFrom<GapKind>('angle', 'time'), (first, second, kind) => {
        const [one, other] = [butterworth(first.order, first.hz), butterworth(second.order, second.hz)];
        const found = sizeOf(gapOf(one, other, kind), kind);
        for (let hz = 1; hz <= TOP_HZ; hz += 0.5) {
          const size = sizeOf({ phaseRad: one.phaseRad(hz) - other.phaseRad(hz), atHz: hz }, kind);
          expect(size).toBeLessThanOrEqual(found * (1 + 1e-3) + 1e-12);
        }
      }),
      { seed: 7, numRuns: runs(200) },
    );
  });
});
