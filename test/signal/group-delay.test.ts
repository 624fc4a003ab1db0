import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import type { FilterEdge, PoleFilter } from '../../server/src/signal/filter-spec.ts';
import { analoguePhase, digitalPhase } from '../../server/src/signal/group-delay.ts';
import { NO_PHASE, type PhaseResponse, phaseOfAll } from '../../server/src/signal/phase-response.ts';
import { sensorPhase } from '../../server/src/signal/sensor-phase.ts';
import { runs } from '../tools/runs.ts';
import { analogueFilter, DIGITAL_RATE_HZ, digitalFilter, poleFilter } from './arbitraries.ts';

// Source of what has none of its own: group delay is -d phase / d omega (Oppenheim and Schafer).

const ONCE = { tolerance: 0, passes: 1 } as const;

/** How far a phase change is from what the delay along the way adds up to, jumps of pi aside. */
function mismatch({ phaseRad, groupDelayS }: PhaseResponse, lowHz: number, highHz: number): number {
  const width = highHz - lowHz;
  const parts = 16;
  let sum = 0;
  for (let n = 0; n < parts; n++) {
    const at = (part: number): number => groupDelayS(lowHz + ((n + part) / parts) * width);
    sum += (at(0) + 4 * at(0.5) + at(1)) / 6;
  }
  const turned = phaseRad(highHz) - phaseRad(lowHz) + (2 * Math.PI * width * sum) / parts;
  return Math.abs(turned / Math.PI - Math.round(turned / Math.PI)) * Math.PI;
}

describe('the delay of every filter is the fall of its phase', () => {
  const place = fc.double({ min: 1, max: 4900, noNaN: true });

  it('ahead of a converter', () => {
    fc.assert(
      fc.property(analogueFilter, place, (filter, hz) => {
        const phase = analoguePhase(filter);
        if (!phase) return;
        expect(mismatch(phase, hz, hz * 1.001)).toBeLessThan(1e-6);
      }),
      { seed: 11, numRuns: runs(1000) },
    );
  });

  it('after it', () => {
    fc.assert(
      fc.property(digitalFilter, place, (filter, hz) => {
        const phase = digitalPhase(filter, DIGITAL_RATE_HZ);
        if (!phase) return;
        // In a null of taps that do not mirror one another the phase turns at once.
        const { response } = filter;
        const isDeep = digitalResponse({ ...filter, tolerance: 0 }, DIGITAL_RATE_HZ).greatestDb(hz, hz * 1.001) > 40;
        if ((response === 'fir' || response === 'half-band') && isDeep) return;
        expect(mismatch(phase, hz, hz * 1.001)).toBeLessThan(1e-6);
      }),
      { seed: 12, numRuns: runs(1000) },
    );
  });

  it('and of a sensor', () => {
    const corner = fc.option(fc.double({ min: 1, max: 5000, noNaN: true }), { nil: undefined });
    fc.assert(
      fc.property(
        corner,
        corner,
        corner,
        fc.double({ min: 0.3, max: 100, noNaN: true }),
        place,
        (first, second, third, q, hz) => {
          const phase = sensorPhase({
            q,
            ...(first === undefined ? {} : { resonanceHz: first }),
            ...(second === undefined ? {} : { cornerHz: second }),
            ...(third === undefined ? {} : { lowCornerHz: third }),
          });
          expect(mismatch(phase, hz, hz * 1.001)).toBeLessThan(1e-6);
        },
      ),
      { seed: 13, numRuns: runs(500) },
    );
  });

  it('which stays a number at 0 Hz, at half the rate, far above, and at edges of nothing', () => {
    const edges = [0, 1e-9, 1, 4999, 5000, 1e12].map((lowHz): FilterEdge => ({ at: 'cutoff', lowHz, highHz: lowHz }));
    fc.assert(
      fc.property(poleFilter, fc.constantFrom(...edges), fc.boolean(), (given, edge, isEdgeReplaced) => {
        const filter = (isEdgeReplaced ? { ...given, edge, cornerHz: edge } : given) as PoleFilter;
        const phases = [
          analoguePhase({ ...filter, tolerance: 0 })!,
          digitalPhase({ ...filter, ...ONCE }, DIGITAL_RATE_HZ)!,
        ];
        for (const { phaseRad, groupDelayS } of phases) {
          for (const hz of [0, 1e-9, 100, DIGITAL_RATE_HZ / 2, 1e6, 1e15]) {
            expect(Number.isFinite(phaseRad(hz))).toBe(true);
            expect(groupDelayS(hz)).toBeGreaterThanOrEqual(0);
          }
        }
      }),
      { seed: 14, numRuns: runs(500) },
    );
  });
});

describe('filters with poles', () => {
  const design = { rippleDb: 0.5, stopbandDb: 60, shape: 'low-pass' } as const;

  it.each(['chebyshev', 'inverse-chebyshev', 'elliptic'] as const)(
    '%s is the same filter by any of its edges',
    (response) => {
      const other = response === 'inverse-chebyshev' ? 'stop-edge' : 'pass-edge';
      const byEdge = (at: FilterEdge['at'], hz: number) =>
        ({ response, order: 5, ...design, edge: { at, lowHz: hz, highHz: hz }, tolerance: 0 }) as const;
      // The frequency 3.0103 dB down, found on the attenuation.
      const { attenuationDb } = analogueResponse(byEdge(other, 1));
      let low = 0.05;
      let high = 3;
      for (let step = 0; step < 60; step++) {
        const middle = (low + high) / 2;
        if (attenuationDb(middle) < 10 * Math.log10(2)) low = middle;
        else high = middle;
      }
      const first = analoguePhase(byEdge(other, 1))!;
      const second = analoguePhase(byEdge('cutoff', low))!;
      for (const hz of [0, 0.1, 0.5, 0.9, 1.3, 4]) {
        expect(second.groupDelayS(hz)).toBeCloseTo(first.groupDelayS(hz), 8);
        expect(second.phaseRad(hz)).toBeCloseTo(first.phaseRad(hz), 8);
      }
    },
  );

  it('jump up by pi at a null', () => {
    const edge = { at: 'stop-edge', lowHz: 1, highHz: 1 } as const;
    const filter = { response: 'inverse-chebyshev', order: 2, ...design, edge, tolerance: 0 } as const;
    const nullHz = Math.SQRT2;
    expect(analogueResponse(filter).attenuationDb(nullHz)).toBeGreaterThan(250);
    const { phaseRad } = analoguePhase(filter)!;
    expect(phaseRad(nullHz + 1e-6) - phaseRad(nullHz - 1e-6)).toBeCloseTo(Math.PI, 4);
    expect(phaseRad(1e9)).toBeCloseTo(0, 6);
  });

  it('single poles held at their cutoff turn there by as much digitally as they do ahead of the converter', () => {
    const order = 3;
    const corner = 1000 / Math.sqrt(2 ** (1 / order) - 1);
    const cornerHz = { lowHz: corner, highHz: corner };
    const filter = { response: 'rc', order, shape: 'low-pass', given: 'cutoff', cornerHz } as const;
    const expected = -order * Math.atan(Math.sqrt(2 ** (1 / order) - 1));
    expect(analoguePhase({ ...filter, tolerance: 0 })!.phaseRad(1000)).toBeCloseTo(expected, 9);
    expect(digitalPhase({ ...filter, ...ONCE }, 10_000)!.phaseRad(1000)).toBeCloseTo(expected, 9);
  });

  it('Bessel of order 50 is still flat, and turns by 50 quarter turns in all', () => {
    const edge = { at: 'cutoff', lowHz: 1, highHz: 1 } as const;
    const { phaseRad, groupDelayS } = analoguePhase({
      response: 'bessel',
      order: 50,
      shape: 'low-pass',
      edge,
      tolerance: 0,
    })!;
    expect(Math.abs(groupDelayS(1) / groupDelayS(0) - 1)).toBeLessThan(1e-9);
    expect(phaseRad(1)).toBeCloseTo(-2 * Math.PI * groupDelayS(0), 6);
    expect(phaseRad(1e12)).toBeCloseTo(-25 * Math.PI, 6);
  });
});

describe('filters without poles', () => {
  it('an average is late by half of what it spans, and turns over at its nulls', () => {
    const { phaseRad, groupDelayS } = analoguePhase({ response: 'aperture', timeS: 0.02, tolerance: 0 })!;
    expect(groupDelayS(7)).toBeCloseTo(0.01, 12);
    expect(phaseRad(25)).toBeCloseTo(-Math.PI / 2, 12);
    expect(phaseRad(75)).toBeCloseTo(-Math.PI / 2, 12);
    const mean = digitalPhase({ response: 'moving-average', length: 5, ...ONCE }, 1000)!;
    expect(mean.groupDelayS(100)).toBeCloseTo(2e-3, 12);
    const combs = digitalPhase({ response: 'cic', order: 3, delay: 2, decimation: 8, ...ONCE }, 1000)!;
    expect(combs.groupDelayS(10)).toBeCloseTo((3 * 15) / 2 / 1000, 12);
  });

  it('a half-band filter is late by half of its taps less one', () => {
    const taps = [-0.1, 0, 0.35, 0.5, 0.35, 0, -0.1];
    const given = digitalPhase({ response: 'half-band', taps, ...ONCE }, 1000)!;
    expect(given.groupDelayS(100)).toBeCloseTo(3e-3, 12);
    expect(given.phaseRad(100)).toBeCloseTo(-2 * Math.PI * 100 * 3e-3, 12);
    const designed = digitalPhase({ response: 'half-band', passHz: 100, stopbandDb: 60, ...ONCE }, 1000)!;
    expect((designed.groupDelayS(50) * 1000) % 2).toBeCloseTo(1, 9);
  });

  it('no taps, and taps that are all 0, are late by nothing that is no number', () => {
    for (const taps of [[], [0], [0, 0, 0], [Number.NaN, 1], [1, -1, 1, -1, 0.5]]) {
      const { phaseRad, groupDelayS } = digitalPhase({ response: 'fir', taps, ...ONCE }, 1000)!;
      for (const hz of [0, 250, 500, 700]) {
        expect(Number.isFinite(phaseRad(hz)) && Number.isFinite(groupDelayS(hz))).toBe(true);
      }
    }
    expect(digitalPhase({ response: 'fir', taps: [], ...ONCE }, 1000)!.groupDelayS(10)).toBe(0);
  });

  it('a mask and points say nothing of phase', () => {
    const mask = { response: 'mask', passHz: 1, stopHz: 2, stopbandDb: 60, rippleDb: 0 } as const;
    const points = { response: 'points', points: [[1, 0]] } as const;
    for (const filter of [mask, points]) {
      expect(analoguePhase({ ...filter, tolerance: 0 })).toBeUndefined();
      expect(digitalPhase({ ...filter, ...ONCE }, 10)).toBeUndefined();
    }
  });

  it('what runs forward and backward has neither phase nor delay', () => {
    fc.assert(
      fc.property(digitalFilter, (filter) => {
        expect(digitalPhase({ ...filter, passes: 2 }, DIGITAL_RATE_HZ)).toBe(NO_PHASE);
      }),
      { seed: 15, numRuns: runs(50) },
    );
    expect([NO_PHASE.phaseRad(100), NO_PHASE.groupDelayS(100)]).toEqual([0, 0]);
  });
});

describe('a sensor', () => {
  // Source: handbooks of vibration, second-order systems: a quarter turn at resonance, delay there 2 Q / omega, and
  // 1 / (Q omega) far below.
  it('turns by a quarter at its resonance', () => {
    const { phaseRad, groupDelayS } = sensorPhase({ q: 30, resonanceHz: 27_000 });
    expect(phaseRad(27_000)).toBeCloseTo(-Math.PI / 2, 12);
    expect(phaseRad(1e9)).toBeCloseTo(-Math.PI, 4);
    expect(groupDelayS(27_000)).toBeCloseTo((2 * 30) / (2 * Math.PI * 27_000), 12);
    expect(groupDelayS(0)).toBeCloseTo(1 / (30 * 2 * Math.PI * 27_000), 12);
  });

  it('is early below its low corner and late above its corner', () => {
    expect(sensorPhase({ q: 1, lowCornerHz: 2 }).phaseRad(2)).toBeCloseTo(Math.PI / 4, 12);
    expect(sensorPhase({ q: 1, cornerHz: 2 }).phaseRad(2)).toBeCloseTo(-Math.PI / 4, 12);
    expect(sensorPhase({ q: 1, lowCornerHz: 2 }).groupDelayS(2)).toBeCloseTo(1 / (2 * Math.PI * 4), 12);
    expect(sensorPhase({ q: 1 }).phaseRad(5)).toBe(0);
  });

  it('adds up with what follows', () => {
    const parts = [sensorPhase({ q: 1, cornerHz: 100 }), sensorPhase({ q: 1, cornerHz: 300 })];
    const all = phaseOfAll(parts);
    expect(all.phaseRad(100)).toBeCloseTo(-Math.PI / 4 - Math.atan(1 / 3), 12);
    expect(all.groupDelayS(0)).toBeCloseTo((1 / 100 + 1 / 300) / (2 * Math.PI), 12);
    expect(phaseOfAll([]).groupDelayS(1)).toBe(0);
  });
});
