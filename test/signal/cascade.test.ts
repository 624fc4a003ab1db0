import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import {
  type Along,
  alongPiece,
  cascade,
  greatestAlong,
  greatestPointAlong,
  leastAlong,
  leastPointAlong,
} from '../../server/src/signal/cascade.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import type { AnalogueFilter } from '../../server/src/signal/filter-spec.ts';
import { foldThrough } from '../../server/src/signal/folding.ts';
import type { Response } from '../../server/src/signal/response.ts';
import { sensorResponse } from '../../server/src/signal/sensor-response.ts';
import { runs } from '../tools/runs.ts';
import { across, analogueFilter, digitalFilter, interval } from './arbitraries.ts';

// Source of everything here without one of its own: the definition of an extreme, against dense sampling.

function butterworth(shape: 'low-pass' | 'high-pass', hz: number, order = 2): Response {
  const edge = { at: 'cutoff', lowHz: hz, highHz: hz } as const;
  return analogueResponse({
    response: 'butterworth',
    order,
    shape,
    edge,
    tolerance: 0,
  });
}

function sumAt(members: readonly Along[], t: number, figure: 'leastDb' | 'greatestDb'): number {
  return members.reduce((sum, { response, lowHz, highHz, reversed }) => {
    const part = reversed ? 1 - t : t;
    const hz = part === 1 ? highHz : lowHz + part * (highHz - lowHz);
    return sum + response[figure](hz, hz);
  }, 0);
}

const member: fc.Arbitrary<Along> = fc
  .tuple(
    fc.oneof(
      analogueFilter.map((filter: AnalogueFilter) => analogueResponse(filter)),
      digitalFilter.map((filter) => digitalResponse(filter, 10_000)),
    ),
    interval(4000),
    fc.boolean(),
  )
  .map(([response, [lowHz, highHz], reversed]) => ({
    response,
    lowHz,
    highHz,
    reversed,
  }));

describe('the extremes of a sum along a piece', () => {
  it('bound every point of it, and are close to the best of them', () => {
    fc.assert(
      fc.property(fc.array(member, { minLength: 1, maxLength: 4 }), (members) => {
        const least = leastPointAlong(members);
        const greatest = greatestPointAlong(members);
        for (const t of across([0, 1], 300)) {
          expect(sumAt(members, t, 'leastDb')).toBeGreaterThanOrEqual(least.attenuationDb - 1e-6);
          expect(sumAt(members, t, 'greatestDb')).toBeLessThanOrEqual(greatest.attenuationDb + 1e-6);
        }
        // A mask steps, and so need not come near its bound where it holds; what is claimed is still close by.
        const attained = sumAt(members, least.t, 'leastDb');
        if (attained < Infinity) expect(attained - least.attenuationDb).toBeLessThan(0.01);
        else expect(least.attenuationDb).toBe(Infinity);
        expect(leastAlong(members)).toBeCloseTo(least.attenuationDb, 2);
        expect(greatestAlong(members)).toBeGreaterThanOrEqual(least.attenuationDb - 1e-6);
      }),
      { seed: 21, numRuns: runs(400), endOnFailure: true },
    );
  });

  it('finds a least that is inside, not at the ends', () => {
    // Source: by symmetry, a low-pass and a high-pass of one order take least off at the geometric mean.
    const both = cascade([butterworth('low-pass', 1000), butterworth('high-pass', 100)]);
    const middle = Math.sqrt(1000 * 100);
    expect(both.leastDb(10, 10_000)).toBeCloseTo(both.attenuationDb(middle), 3);
    expect(both.greatestDb(10, 10_000)).toBeCloseTo(both.attenuationDb(10), 5);
  });

  it('follows a member that sees the piece upside down', () => {
    const members: readonly Along[] = [
      {
        response: butterworth('low-pass', 1000),
        lowHz: 1000,
        highHz: 2000,
        reversed: false,
      },
      {
        response: butterworth('low-pass', 500),
        lowHz: 0,
        highHz: 1000,
        reversed: true,
      },
    ];
    const { attenuationDb, t } = leastPointAlong(members);
    const brute = Math.min(...across([0, 1], 20_001).map((part) => sumAt(members, part, 'leastDb')));
    expect(attenuationDb).toBeLessThanOrEqual(brute + 1e-9);
    expect(brute - attenuationDb).toBeLessThan(1e-4);
    expect(sumAt(members, t, 'leastDb')).toBeCloseTo(brute, 5);
    expect(t).toBeGreaterThan(0);
    expect(t).toBeLessThan(1);
  });

  it('is a sum at a point, and nothing without members', () => {
    const response = butterworth('low-pass', 1000);
    const along = { response, lowHz: 700, highHz: 700, reversed: false };
    expect(leastPointAlong([along, along])).toEqual({
      attenuationDb: 2 * response.attenuationDb(700),
      t: 0,
    });
    expect(leastAlong([])).toBe(0);
    expect(greatestAlong([])).toBe(0);
    expect(cascade([]).attenuationDb(5)).toBe(0);
  });

  it('is without limit where a member is', () => {
    const aperture = analogueResponse({
      response: 'aperture',
      timeS: 0.02,
      tolerance: 0,
    });
    const both = cascade([aperture, butterworth('low-pass', 10)]);
    expect(both.greatestDb(40, 60)).toBe(Infinity);
    expect(both.leastDb(50, 50)).toBe(Infinity);
  });

  it('ends in time with many that pull both ways', () => {
    const wild = Array.from({ length: 12 }, (_, i) => ({
      response: analogueResponse({
        response: 'aperture',
        timeS: 0.01 * (i + 1),
        tolerance: 0.01 * i,
      }),
      lowHz: 10 * i,
      highHz: 5000,
      reversed: i % 2 === 0,
    }));
    const { attenuationDb } = leastPointAlong(wild);
    for (const t of across([0, 1], 500)) expect(sumAt(wild, t, 'leastDb')).toBeGreaterThanOrEqual(attenuationDb - 1e-6);
  });
});

describe('cascades', () => {
  it('take cascades among their members apart', () => {
    const inner = cascade([butterworth('low-pass', 1000), butterworth('high-pass', 10)]);
    const outer = cascade([inner, butterworth('low-pass', 300)]);
    expect(outer.members.length).toBe(3);
    expect(outer.attenuationDb(500)).toBeCloseTo(
      inner.attenuationDb(500) + butterworth('low-pass', 300).attenuationDb(500),
      12,
    );
  });

  it('see one folded piece stage by stage', () => {
    const analogue = butterworth('low-pass', 40, 4);
    const step = butterworth('low-pass', 8, 6);
    const after = butterworth('high-pass', 1, 1);
    for (const piece of foldThrough(85, 95, [100, 20])) {
      const members = alongPiece(piece, [[analogue], [step], [after]]);
      const brute = Math.min(
        ...across([piece.trueLowHz, piece.trueHighHz], 4001).map((hz) => {
          const stored = 100 - hz;
          const recorded = stored > 10 ? 20 - stored : stored;
          return analogue.attenuationDb(hz) + step.attenuationDb(stored) + after.attenuationDb(recorded);
        }),
      );
      expect(leastAlong(members)).toBeCloseTo(brute, 3);
    }
  });

  it('bound a collapsed piece by the least of each stage', () => {
    const [piece] = foldThrough(30, 1000, [10], 1);
    const response = butterworth('low-pass', 20);
    const step = butterworth('high-pass', 2);
    expect(piece!.collapsed).toBe(true);
    expect(leastAlong(alongPiece(piece!, [[response], [step]]))).toBeCloseTo(
      response.attenuationDb(30) + step.attenuationDb(5),
      9,
    );
    expect(greatestAlong(alongPiece(piece!, [[response], [step]]))).toBe(Infinity);
  });
});

/** The least of some thousand places, looked at more closely twice where it is. */
function nearLeast(at: (hz: number) => number, low: number, high: number): number {
  let range: readonly [number, number] = [low, high];
  let least = Infinity;
  for (let round = 0; round < 3; round++) {
    // A low corner may have its whole pass band below the second of evenly spaced places.
    const logarithmic = across([Math.log(Math.max(range[0], 1e-4)), Math.log(Math.max(range[1], 1e-4))], 2000);
    const places = [...across(range, 2000), ...logarithmic.map(Math.exp).filter((hz) => hz >= low && hz <= high)];
    const best = places.reduce((so, hz) => (at(hz) < at(so) ? hz : so));
    const spacing = (range[1] - range[0]) / 1999;
    least = Math.min(least, at(best));
    range = [Math.max(best - spacing, low), Math.min(best + spacing, high)];
  }
  return least;
}

describe('sensors', () => {
  const some = fc.record(
    {
      resonanceHz: fc.double({ min: 100, max: 50_000, noNaN: true }),
      q: fc.double({ min: 0.3, max: 100, noNaN: true }),
      cornerHz: fc.double({ min: 10, max: 50_000, noNaN: true }),
      lowCornerHz: fc.double({ min: 0.01, max: 100, noNaN: true }),
    },
    { requiredKeys: ['q'] },
  );

  it('have exact extremes, with a resonance that lifts', () => {
    fc.assert(
      fc.property(some, interval(60_000), (sensor, [low, high]) => {
        const response = sensorResponse(sensor);
        const least = nearLeast((hz) => response.attenuationDb(hz), low, high);
        const greatest = -nearLeast((hz) => -response.attenuationDb(hz), low, high);
        expect(response.leastDb(low, high)).toBeLessThanOrEqual(least + 1e-12);
        expect(response.greatestDb(low, high)).toBeGreaterThanOrEqual(greatest - 1e-12);
        if (least < Infinity) expect(least - response.leastDb(low, high)).toBeLessThan(0.01);
        if (greatest < Infinity) expect(response.greatestDb(low, high) - greatest).toBeLessThan(0.01);
      }),
      { seed: 22, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it('peak where the second order says', () => {
    // Source: the second-order response: u^2 = 1 - 1 / (2 Q^2), and 1 / sqrt(1/Q^2 - 1/(4 Q^4)) there.
    const q = 2;
    const response = sensorResponse({ resonanceHz: 1000, q });
    const peak = 1000 * Math.sqrt(1 - 1 / (2 * q * q));
    const lift = 20 * Math.log10(1 / Math.sqrt(1 / q ** 2 - 1 / (4 * q ** 4)));
    expect(response.leastDb(0, 5000)).toBeCloseTo(-lift, 9);
    expect(response.attenuationDb(peak)).toBeCloseTo(-lift, 9);
  });

  it('pass everything where nothing is said, and stay finite without damping', () => {
    const flat = sensorResponse({ q: 30 });
    expect([flat.leastDb(0, 1e300), flat.greatestDb(0, 1e300)]).toEqual([0, 0]);
    const undamped = sensorResponse({
      resonanceHz: 1000,
      q: Infinity,
      cornerHz: 1e5,
      lowCornerHz: 1,
    });
    expect(Number.isFinite(undamped.leastDb(10, 5000))).toBe(true);
    for (const hz of [0, 1000, 1e300, Infinity]) expect(undamped.attenuationDb(hz)).not.toBeNaN();
    expect(sensorResponse({ q: 30, lowCornerHz: 0 }).attenuationDb(0)).toBe(0);
  });
});
