import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import type { AnalogueFilter, FilterEdge, PoleFilter } from '../../server/src/signal/filter-spec.ts';
import type { Response } from '../../server/src/signal/response.ts';
import { runs } from '../tools/runs.ts';
import { across, analogueFilter, DIGITAL_RATE_HZ, digitalFilter, interval } from './arbitraries.ts';

// Source of everything here without one of its own: the definition of an extreme, against dense sampling.

const SLACK_DB = 1e-7;

/** Nominal attenuation at every place the tolerance can bring the interval to. */
function sampled(response: Response, low: number, high: number, tolerance: number, mostHz: number): readonly number[] {
  const from = low / (1 + tolerance);
  const to = Math.min(high / (1 - tolerance), mostHz);
  return across([from, to], 400).map((hz) => response.attenuationDb(hz));
}

function expectSound(
  response: Response,
  filter: AnalogueFilter,
  [low, high]: readonly [number, number],
  mostHz: number,
) {
  const least = response.leastDb(low, high);
  const greatest = response.greatestDb(low, high);
  expect(Number.isNaN(least) || Number.isNaN(greatest)).toBe(false);
  expect(least).toBeLessThanOrEqual(greatest + 1e-12);
  // What a mask draws between its promises is none of them.
  if (filter.response === 'mask') return;
  for (const db of sampled(response, low, high, filter.tolerance, mostHz)) {
    if (db === Infinity) continue;
    expect(db).toBeGreaterThanOrEqual(least - SLACK_DB * Math.max(1, Math.abs(db)));
    // Rounding may make a few hundred dB of what is nothing at all, and the bottom of a null of any value.
    if (db < 250) expect(db).toBeLessThanOrEqual(greatest + SLACK_DB * Math.max(1, Math.abs(db)));
  }
}

/** Finer sampling comes ever closer to the extremes: they are not just bounds. */
function expectAttained(response: Response, filter: AnalogueFilter, range: readonly [number, number], mostHz: number) {
  if (filter.response === 'mask') return;
  const [low, high] = [range[0], Math.min(range[1], range[0] + 200)];
  const values = across([low / (1 + filter.tolerance), Math.min(high / (1 - filter.tolerance), mostHz)], 20_000).map(
    (hz) => response.attenuationDb(hz),
  );
  const least = values.reduce((a, b) => Math.min(a, b));
  if (least < Infinity) expect(least - response.leastDb(low, high)).toBeLessThan(0.2);
  const greatest = values.reduce((a, b) => Math.max(a, b));
  const bound = response.greatestDb(low, high);
  if (bound < 60) expect(bound - greatest).toBeLessThan(0.5);
}

describe('extremes of a response over an interval', () => {
  it('hold for every analogue filter', () => {
    fc.assert(
      fc.property(analogueFilter, interval(20_000), (filter, range) => {
        expectSound(analogueResponse(filter), filter, range, Infinity);
      }),
      { seed: 1, numRuns: runs(2000), endOnFailure: true },
    );
  });

  it('hold for every digital filter', () => {
    fc.assert(
      fc.property(digitalFilter, interval(DIGITAL_RATE_HZ / 2), (filter, range) => {
        const response = digitalResponse(filter, DIGITAL_RATE_HZ);
        expectSound(response, filter as AnalogueFilter, range, DIGITAL_RATE_HZ / 2);
      }),
      { seed: 2, numRuns: runs(2000), endOnFailure: true },
    );
  });

  it('are attained by analogue filters', () => {
    fc.assert(
      fc.property(analogueFilter, interval(5000), (filter, range) => {
        fc.pre(!(filter.response === 'points'));
        expectAttained(analogueResponse(filter), filter, range, Infinity);
      }),
      { seed: 3, numRuns: runs(300), endOnFailure: true },
    );
  });

  it('are attained by digital filters', () => {
    fc.assert(
      fc.property(digitalFilter, interval(DIGITAL_RATE_HZ / 2), (filter, range) => {
        fc.pre(!(filter.response === 'points'));
        const response = digitalResponse({ ...filter, passes: 1 }, DIGITAL_RATE_HZ);
        expectAttained(response, filter as AnalogueFilter, range, DIGITAL_RATE_HZ / 2);
      }),
      { seed: 4, numRuns: runs(300), endOnFailure: true },
    );
  });

  it('widen with the interval', () => {
    fc.assert(
      fc.property(digitalFilter, interval(5000), interval(5000), (filter, first, second) => {
        const response = digitalResponse(filter, DIGITAL_RATE_HZ);
        const low = Math.min(first[0], second[0]);
        const high = Math.max(first[1], second[1]);
        expect(response.leastDb(low, high)).toBeLessThanOrEqual(response.leastDb(...first) + SLACK_DB);
        expect(response.greatestDb(low, high)).toBeGreaterThanOrEqual(response.greatestDb(...first) - SLACK_DB);
      }),
      { seed: 5, numRuns: runs(1000), endOnFailure: true },
    );
  });
});

const edgeAt = (at: FilterEdge['at'], hz: number): FilterEdge => ({
  at,
  lowHz: hz,
  highHz: 1.5 * hz,
});

function everyPoleFilter(order: number): readonly PoleFilter[] {
  return (['low-pass', 'high-pass', 'band-pass'] as const).flatMap((shape): readonly PoleFilter[] => [
    { response: 'butterworth', order, shape, edge: edgeAt('cutoff', 1000) },
    { response: 'bessel', order, shape, edge: edgeAt('cutoff', 1000) },
    {
      response: 'chebyshev',
      order,
      rippleDb: 0.1,
      shape,
      edge: edgeAt('cutoff', 1000),
    },
    {
      response: 'inverse-chebyshev',
      order,
      stopbandDb: 80,
      shape,
      edge: edgeAt('cutoff', 1000),
    },
    {
      response: 'elliptic',
      order,
      rippleDb: 0.1,
      stopbandDb: 80,
      shape,
      edge: edgeAt('cutoff', 1000),
    },
    {
      response: 'elliptic',
      order,
      rippleDb: 3,
      stopbandDb: 3.1,
      shape,
      edge: edgeAt('pass-edge', 1000),
    },
    {
      response: 'elliptic',
      order,
      rippleDb: 0.001,
      stopbandDb: 500,
      shape,
      edge: edgeAt('stop-edge', 1000),
    },
    { response: 'rc', order, shape, cornerHz: { lowHz: 1000, highHz: 1500 } },
  ]);
}

const EXTREME_FREQUENCIES = [
  0,
  5e-324,
  1e-300,
  1e-9,
  1,
  999.999_999,
  1000,
  1225,
  4999,
  5000,
  1e9,
  1e150,
  1e300,
  Infinity,
];

describe('unlikely filters and frequencies', () => {
  it.each([1, 2, 7, 24, 49, 50])('order %i has a value everywhere, never under 0 dB', (order) => {
    for (const filter of everyPoleFilter(order)) {
      const analogue = analogueResponse({ ...filter, tolerance: 0.02 });
      const digital = digitalResponse({ ...filter, tolerance: 0.02, passes: 2 }, DIGITAL_RATE_HZ);
      for (const hz of EXTREME_FREQUENCIES) {
        for (const response of [analogue, digital]) {
          expect(response.attenuationDb(hz)).toBeGreaterThanOrEqual(0);
          expect(response.leastDb(hz, hz)).toBeGreaterThanOrEqual(0);
          expect(response.greatestDb(hz, Infinity)).toBeGreaterThanOrEqual(response.leastDb(0, hz));
        }
      }
    }
  });

  it('an order of 50 passes its band and stops the rest', () => {
    for (const filter of everyPoleFilter(50)) {
      if (filter.shape !== 'low-pass' || filter.response === 'bessel' || filter.response === 'rc') continue;
      if (filter.edge.at === 'stop-edge') continue;
      const response = analogueResponse({ ...filter, tolerance: 0 });
      expect(response.greatestDb(0, 900)).toBeLessThan(3.0001);
      expect(response.leastDb(1200, Infinity)).toBeGreaterThan(3.0999);
    }
  });

  it('curves and steps have a value at every frequency', () => {
    const steps = [
      { response: 'fir', taps: [] },
      { response: 'fir', taps: [0, 0, 0] },
      { response: 'fir', taps: [1] },
      { response: 'fir', taps: [1e300, -1e300, 1e300] },
      { response: 'fir', taps: [Number.NaN, 1, Infinity] },
      { response: 'kaiser', passHz: 1000, stopHz: 1000, stopbandDb: 90 },
      { response: 'kaiser', passHz: 1000, stopHz: 2000, stopbandDb: 1e9 },
      { response: 'half-band', passHz: 2499.999, stopbandDb: 60 },
      { response: 'moving-average', length: 1 },
      { response: 'moving-average', length: 1_000_000 },
      { response: 'cic', order: 50, delay: 1000, decimation: 1_000_000 },
      { response: 'aperture', timeS: 0 },
      { response: 'aperture', timeS: 1e300 },
      { response: 'points', points: [] },
      {
        response: 'points',
        points: [
          [0, 0],
          [0, 10],
          [100, 20],
          [100, 40],
        ],
      },
      { response: 'mask', passHz: 0, stopHz: 0, stopbandDb: 60, rippleDb: 0 },
    ] as const;
    for (const step of steps) {
      const response = digitalResponse({ ...step, tolerance: 1, passes: 1 }, DIGITAL_RATE_HZ);
      for (const hz of EXTREME_FREQUENCIES) {
        expect(response.attenuationDb(hz)).not.toBeNaN();
        expect(response.leastDb(0, hz)).not.toBeNaN();
        expect(response.greatestDb(hz, hz)).not.toBeNaN();
      }
    }
  });

  it('a tolerance of the whole frequency allows anything above', () => {
    const [butterworth] = everyPoleFilter(4);
    const response = analogueResponse({ ...butterworth!, tolerance: 1 });
    expect(response.greatestDb(1, 1)).toBe(Infinity);
    expect(response.leastDb(1000, 1000)).toBeCloseTo(10 * Math.log10(1 + 0.5 ** 8), 9);
    expect(response.greatestDb(0, 0)).toBe(0);
  });
});

describe('what is given stays where it is given', () => {
  const given = everyPoleFilter(5).filter((filter) => filter.response !== 'rc' && filter.edge.at === 'cutoff');

  it.each(given)('$response, $shape: 3.0103 dB at the cutoff, ahead of the converter and after it', (filter) => {
    if (filter.response === 'rc') return;
    const analogue = analogueResponse({ ...filter, tolerance: 0 });
    const digital = digitalResponse({ ...filter, tolerance: 0, passes: 1 }, DIGITAL_RATE_HZ);
    for (const hz of filter.shape === 'band-pass' ? [1000, 1500] : [1000]) {
      expect(analogue.attenuationDb(hz)).toBeCloseTo(10 * Math.log10(2), 8);
      expect(digital.attenuationDb(hz)).toBeCloseTo(10 * Math.log10(2), 8);
    }
  });

  it.each(['low-pass', 'high-pass'] as const)(
    'rc, %s: the cutoff of all poles, where it is what was given',
    (shape) => {
      const cutoff = Math.sqrt(2 ** (1 / 3) - 1);
      const corner = shape === 'low-pass' ? 1000 / cutoff : 1000 * cutoff;
      const filter = {
        response: 'rc',
        order: 3,
        shape,
        cornerHz: { lowHz: corner, highHz: corner },
      } as const;
      const halfPower = 10 * Math.log10(2);
      const rate = DIGITAL_RATE_HZ;
      expect(analogueResponse({ ...filter, tolerance: 0 }).attenuationDb(1000)).toBeCloseTo(halfPower, 9);
      const cutoffKept = digitalResponse({ ...filter, given: 'cutoff', tolerance: 0, passes: 1 }, rate);
      expect(cutoffKept.attenuationDb(1000)).toBeCloseTo(halfPower, 9);
      const cornersKept = digitalResponse({ ...filter, given: 'corner', tolerance: 0, passes: 1 }, rate);
      expect(cornersKept.attenuationDb(corner)).toBeCloseTo(3 * halfPower, 9);
    },
  );

  it('inverse Chebyshev first reaches its stop band at the stop edge', () => {
    const edge = { at: 'stop-edge', lowHz: 1000, highHz: 1000 } as const;
    const filter = {
      response: 'inverse-chebyshev',
      order: 6,
      stopbandDb: 70,
      shape: 'low-pass',
      edge,
    } as const;
    const response = analogueResponse({ ...filter, tolerance: 0 });
    expect(response.attenuationDb(1000)).toBeCloseTo(70, 8);
    expect(response.leastDb(1000, 1e6)).toBeCloseTo(70, 8);
    expect(response.attenuationDb(999)).toBeLessThan(70);
  });
});

describe('filters that promise by question', () => {
  const mask = {
    response: 'mask',
    passHz: 400,
    stopHz: 600,
    stopbandDb: 80,
    rippleDb: 0.1,
  } as const;

  it('a mask takes nothing off below its stop, and may take anything off above its pass', () => {
    const response = analogueResponse({ ...mask, tolerance: 0 });
    expect(response.leastDb(599, 2000)).toBe(0);
    expect(response.leastDb(600, 2000)).toBe(80);
    expect(response.greatestDb(0, 400)).toBe(0.1);
    expect(response.greatestDb(0, 401)).toBe(Infinity);
    expect(response.attenuationDb(200)).toBe(0.1);
    expect(response.attenuationDb(Math.sqrt(400 * 600))).toBeCloseTo(40.05, 9);
    expect(response.attenuationDb(700)).toBe(80);
  });

  it('a tolerance moves both promises the wrong way', () => {
    const response = analogueResponse({ ...mask, tolerance: 0.1 });
    expect(response.leastDb(659, 659)).toBe(0);
    expect(response.leastDb(661, 661)).toBe(80);
    expect(response.greatestDb(0, 359)).toBe(0.1);
    expect(response.greatestDb(0, 361)).toBe(Infinity);
  });

  it('points hold their first and last values, straight in dB over log frequency between', () => {
    const points = [
      [100, 1],
      [1000, 21],
      [2000, 11],
    ] as const;
    const response = analogueResponse({
      response: 'points',
      points,
      tolerance: 0,
    });
    expect(response.attenuationDb(1)).toBe(1);
    expect(response.attenuationDb(Math.sqrt(1e5))).toBeCloseTo(11, 9);
    expect(response.attenuationDb(1e6)).toBe(11);
    expect(response.greatestDb(200, 5000)).toBe(21);
    expect(response.leastDb(1500, 5000)).toBe(11);
  });
});

describe('filters without feedback', () => {
  it('half-band taps by design are zero at every second place and half the way down at a quarter of the rate', () => {
    const response = digitalResponse(
      {
        response: 'half-band',
        passHz: 2000,
        stopbandDb: 80,
        tolerance: 0,
        passes: 1,
      },
      DIGITAL_RATE_HZ,
    );
    // 1/2 at a quarter of the rate, relative to a sum that is 1 within the ripple.
    expect(response.attenuationDb(2500)).toBeCloseTo(20 * Math.log10(2), 2);
    expect(response.leastDb(3000, 5000)).toBeGreaterThan(78);
    expect(response.greatestDb(0, 2000)).toBeLessThan(0.01);
  });

  it('taps of hardly any sum are measured from their greatest', () => {
    const response = digitalResponse({ response: 'fir', taps: [1, 0, -1], tolerance: 0, passes: 1 }, 4);
    expect(response.attenuationDb(1)).toBeCloseTo(0, 12);
    expect(response.attenuationDb(0)).toBe(Infinity);
    expect(response.greatestDb(0.5, 1.5)).toBeCloseTo(10 * Math.log10(2), 9);
  });

  it('a moving average has the response of its taps', () => {
    const average = digitalResponse({ response: 'moving-average', length: 9, tolerance: 0, passes: 1 }, 1000);
    const taps = digitalResponse(
      {
        response: 'fir',
        taps: new Array<number>(9).fill(1),
        tolerance: 0,
        passes: 1,
      },
      1000,
    );
    fc.assert(
      fc.property(interval(500), ([low, high]) => {
        expect(average.leastDb(low, high)).toBeCloseTo(taps.leastDb(low, high), 6);
        const greatest = average.greatestDb(low, high);
        if (greatest < 100) expect(greatest).toBeCloseTo(taps.greatestDb(low, high), 6);
      }),
      { seed: 6, numRuns: runs(1000), endOnFailure: true },
    );
  });
});
