import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import { foldHz } from '../../server/src/signal/folding.ts';
import {
  type NoiseBand,
  type NoiseEntry,
  type NoisePath,
  noiseBandwidth,
} from '../../server/src/signal/noise-bandwidth.ts';
import type { Response } from '../../server/src/signal/response.ts';
import { sensorResponse } from '../../server/src/signal/sensor-response.ts';
import { runs } from '../tools/runs.ts';

const FLAT = sensorResponse({ q: 1 });
const WIRING: NoiseEntry = { at: 'wiring' };

/** 0.01 dB. */
const HUNDREDTH_DB = 10 ** 0.001 - 1;

function butterworth(order: number, cutoffHz: number): Response {
  const edge = { at: 'cutoff', lowHz: cutoffHz, highHz: cutoffHz } as const;
  return analogueResponse({ response: 'butterworth', order, shape: 'low-pass', edge, tolerance: 0 });
}

function singlePole(cornerHz: number): Response {
  const corner = { lowHz: cornerHz, highHz: cornerHz };
  return analogueResponse({ response: 'rc', order: 1, shape: 'low-pass', cornerHz: corner, tolerance: 0 });
}

function aperture(timeS: number): Response {
  return analogueResponse({ response: 'aperture', timeS, tolerance: 0 });
}

function kaiser(passHz: number, stopHz: number, stopbandDb: number, rateHz: number): Response {
  return digitalResponse({ response: 'kaiser', passHz, stopHz, stopbandDb, tolerance: 0, passes: 1 }, rateHz);
}

function baseband(lowHz: number, highHz: number): NoiseBand {
  return { lowHz, highHz, sampling: 'baseband' };
}

function boundedOf(path: NoisePath, band: NoiseBand, enters: NoiseEntry, spans?: { lowHz: number; highHz: number }) {
  const bandwidth = noiseBandwidth(path, band, enters, spans);
  if (bandwidth.kind === 'unbounded') throw new Error('bounded noise was due');
  return { ...bandwidth, totalHz: bandwidth.nativeHz + bandwidth.foldedHz };
}

function expectWithin(actual: number, expected: number, ratio = HUNDREDTH_DB): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(ratio);
}

/** Counts how often a response is asked. */
function counted(response: Response): { readonly response: Response; readonly asked: () => number } {
  let count = 0;
  const leastDb = (lowHz: number, highHz: number): number => {
    count++;
    return response.leastDb(lowHz, highHz);
  };
  return { response: { ...response, leastDb }, asked: () => count };
}

/** The same by the definition: narrow bands one after the other, each followed through every sampling. */
function summed(path: NoisePath, band: NoiseBand, spans: { lowHz: number; highHz: number }, count: number) {
  const stepHz = (spans.highHz - spans.lowHz) / count;
  let nativeHz = 0;
  let foldedHz = 0;
  for (let n = 0; n < count; n++) {
    const trueHz = spans.lowHz + (n + 0.5) * stepHz;
    let hz = trueHz;
    let takenDb = 0;
    path.responses.forEach((responses, stage) => {
      for (const response of responses) takenDb += response.attenuationDb(hz);
      const rateHz = path.ratesHz[stage];
      if (rateHz !== undefined) hz = foldHz(hz, rateHz);
    });
    if (hz < band.lowHz || hz > band.highHz) continue;
    const power = stepHz * 10 ** (-takenDb / 10);
    if (hz === trueHz) nativeHz += power;
    else foldedHz += power;
  }
  return { nativeHz, foldedHz };
}

describe('noise that is all recorded', () => {
  // Everything that a filter lets through lands somewhere in 0 .. rate / 2, so the sum is the filter's noise bandwidth.

  // Source: handbooks of noise, noise bandwidth of a Butterworth filter, (pi / 2n) / sin(pi / 2n) cutoffs; 1.571, 1.111,
  // 1.047 and 1.026 of orders 1 to 4; from memory.
  it.each([
    [1, 1.571],
    [2, 1.111],
    [3, 1.047],
    [4, 1.026],
    [8, Math.PI / 16 / Math.sin(Math.PI / 16)],
  ])('of order %d holds %f cutoffs of it, wherever the rate is', (order, cutoffs) => {
    for (const ratesHz of [[50], [1000], [25_600], [25_600, 6400], [1e6, 1e3, 10]]) {
      const nyquistHz = ratesHz[ratesHz.length - 1]! / 2;
      const responses = [[butterworth(order, 4000)], ...ratesHz.map(() => [])];
      const { totalHz } = boundedOf({ ratesHz, responses, sensor: FLAT }, baseband(0, nyquistHz), WIRING);
      const exact = 4000 * (Math.PI / (2 * order) / Math.sin(Math.PI / (2 * order)));
      expectWithin(totalHz, exact);
      expectWithin(totalHz, 4000 * cutoffs, 2e-3);
    }
  });

  // Source: handbooks of vibration, mean square of a resonance under white noise, pi / 2 resonance Q; from memory.
  it.each([
    [30, 27_000, 25_600],
    [1000, 27_000, 25_600],
    [1000, 270_000, 1000],
    [1e5, 4e6, 1000],
    [50, 3e7, 50],
  ])('of a resonance of Q %d at %d Hz holds pi / 2 Q of it at %d samples per second', (q, resonanceHz, rateHz) => {
    const path = { ratesHz: [rateHz], responses: [[], []], sensor: sensorResponse({ q, resonanceHz }) };
    const { totalHz } = boundedOf(path, baseband(0, rateHz / 2), { at: 'sensor' });
    expectWithin(totalHz, (Math.PI / 2) * resonanceHz * q);
  });

  // Source: the lobes of an average over one sample period, sum over all k of sinc(x + k)^2 = 1 (Oppenheim and Schafer,
  // Poisson's sum of a triangle): neighbouring averages of white noise have nothing in common, so they are white.
  it.each([25, 10, 0.5, 0.05])('of averages over a whole period is white: 0 .. %f Hz of 25 Hz', (highHz) => {
    const path = { ratesHz: [50], responses: [[aperture(0.02)], []], sensor: FLAT };
    const { nativeHz, foldedHz } = boundedOf(path, baseband(0, highHz), WIRING);
    const expected = highHz - nativeHz;
    expect(Math.abs(foldedHz - expected)).toBeLessThan(HUNDREDTH_DB * expected + 1e-6 * nativeHz);
  });

  it('of averages over a fifth of a period, too short to part neighbours, is white as well', () => {
    const path = { ratesHz: [50], responses: [[aperture(0.004)], []], sensor: FLAT };
    // The noise bandwidth of an average over T is 1 / (2 T): 125 Hz, spread evenly over 25 Hz.
    expectWithin(boundedOf(path, baseband(5, 10), WIRING).totalHz, 25);
  });
});

describe('keeping every M-th sample', () => {
  it('keeps the variance of white noise and raises its density M-fold', () => {
    const path = { ratesHz: [1000, 250], responses: [[], [], []], sensor: FLAT };
    // Of noise of rms 3, white up to half the rate.
    const density = 9 / 500;
    const enters: NoiseEntry = { at: 'record', stage: 1 };
    const whole = boundedOf(path, baseband(0, 125), enters);
    const part = boundedOf(path, baseband(20, 70), enters);
    expectWithin(density * whole.nativeHz, 9 / 4, 1e-9);
    expectWithin(density * whole.foldedHz, (9 * 3) / 4, 1e-9);
    expectWithin(part.nativeHz + part.foldedHz, 50 * 4, 1e-9);
  });

  it('does not touch noise that enters in the last record', () => {
    const path = { ratesHz: [1000, 250], responses: [[], [], [kaiser(20, 40, 80, 250)]], sensor: FLAT };
    const { nativeHz, foldedHz } = boundedOf(path, baseband(0, 20), { at: 'record', stage: 2 });
    expect(foldedHz).toBe(0);
    expectWithin(nativeHz, 20, 1e-3);
  });

  it('of a CIC record in narrow bands: what its nulls leave of every lobe', () => {
    const cic = digitalResponse(
      { response: 'cic', order: 3, delay: 1, decimation: 16, tolerance: 0, passes: 1 },
      16_000,
    );
    const path = { ratesHz: [16_000, 1000], responses: [[], [cic], []], sensor: FLAT };
    const { foldedHz } = boundedOf(path, baseband(0, 100), { at: 'record', stage: 1 });
    const expected = summed({ ...path, ratesHz: [1e9, 1000] }, baseband(0, 100), { lowHz: 0, highHz: 8000 }, 800_000);
    expectWithin(foldedHz, expected.foldedHz);
  });
});

describe('an oversampling converter and a step behind it', () => {
  const average = digitalResponse({ response: 'moving-average', length: 64, tolerance: 0, passes: 1 }, 256_000);
  const tidy = kaiser(400, 600, 60, 4000);
  const path: NoisePath = {
    ratesHz: [256_000, 4000, 1000],
    responses: [[singlePole(50_000)], [average], [tidy], []],
    sensor: FLAT,
  };
  const band = baseband(50, 300);
  const spans = { lowHz: 0, highHz: 1_000_000 };

  it('leave what narrow bands followed one by one add up to', () => {
    const { nativeHz, foldedHz } = boundedOf(path, band, WIRING, spans);
    const expected = summed(path, band, spans, 400_000);
    expectWithin(nativeHz, expected.nativeHz, 1e-3);
    expectWithin(foldedHz, expected.foldedHz, 1e-3);
  });

  it('bring the same from every zone that is alike: a hundred times the zones take no more work', () => {
    const first = counted(average);
    const counting = { ...path, responses: [[], [first.response], [tidy], []] };
    const askedFor = (highHz: number): number => {
      const before = first.asked();
      boundedOf(counting, band, WIRING, { lowHz: 0, highHz });
      return first.asked() - before;
    };
    const few = askedFor(256_000);
    expect(few).toBeGreaterThan(100);
    expect(askedFor(25_600_000)).toBeLessThan(2 * few);
  });
});

describe('noise without end', () => {
  const path = (filters: readonly Response[]): NoisePath => ({
    ratesHz: [1000],
    responses: [filters, []],
    sensor: FLAT,
  });

  it('is told as unbounded where no filter ends it, with what is native', () => {
    expect(noiseBandwidth(path([]), baseband(0, 200), WIRING)).toEqual({
      kind: 'unbounded',
      nativeHz: 200,
      floorDb: 0,
    });
  });

  it('is so behind a filter with a floor, and says where the floor is', () => {
    const mask = analogueResponse({
      response: 'mask',
      passHz: 400,
      stopHz: 600,
      stopbandDb: 90,
      rippleDb: 0.1,
      tolerance: 0,
    });
    const edge = { at: 'pass-edge', lowHz: 400, highHz: 400 } as const;
    const shape = 'low-pass';
    const design = { rippleDb: 0.1, stopbandDb: 70, shape, edge, tolerance: 0 } as const;
    const even = analogueResponse({ response: 'elliptic', order: 6, ...design });
    const odd = analogueResponse({ response: 'elliptic', order: 5, ...design });
    expect(noiseBandwidth(path([mask]), baseband(0, 200), WIRING)).toMatchObject({ kind: 'unbounded', floorDb: 90 });
    const floor = noiseBandwidth(path([even]), baseband(0, 200), WIRING);
    expect(floor.kind === 'unbounded' && floor.floorDb).toBeCloseTo(70, 6);
    expect(noiseBandwidth(path([odd]), baseband(0, 200), WIRING).kind).toBe('bounded');
    expect(noiseBandwidth(path([mask, singlePole(1e6)]), baseband(0, 200), WIRING).kind).toBe('bounded');
  });

  it('has a bound where it is said how far it reaches', () => {
    const { nativeHz, foldedHz } = boundedOf(path([]), baseband(0, 200), WIRING, { lowHz: 50, highHz: 123_050 });
    expectWithin(nativeHz, 150, 1e-9);
    // 123 periods of the rate hold 400 Hz each; of the last 50 Hz all lands in the band, and the first 50 are missing.
    expectWithin(foldedHz, 123 * 400 + 50 - 200, 1e-9);
  });

  it('is the sensor that ends it where it enters there', () => {
    const sensor = sensorResponse({ q: 30, cornerHz: 5000 });
    const corner = { ...path([]), sensor };
    expect(noiseBandwidth(corner, baseband(0, 500), WIRING).kind).toBe('unbounded');
    expectWithin(boundedOf(corner, baseband(0, 500), { at: 'sensor' }).totalHz, (Math.PI / 2) * 5000);
  });
});

describe('a band that is folded on purpose', () => {
  const path: NoisePath = { ratesHz: [1000], responses: [[], []], sensor: FLAT };

  it('is native where it truly stands; what lands on its image is folded', () => {
    const band: NoiseBand = { lowHz: 2600, highHz: 2900, sampling: 'bandpass' };
    const spans = { lowHz: 0, highHz: 3000 };
    const wiring = boundedOf(path, band, WIRING, spans);
    expectWithin(wiring.nativeHz, 300, 1e-9);
    expectWithin(wiring.foldedHz, 5 * 300, 1e-9);
    const own = boundedOf(path, band, { at: 'record', stage: 1 });
    expect(own).toMatchObject({ nativeHz: 300, foldedHz: 0 });
  });

  it('is found among far zones', () => {
    const band: NoiseBand = { lowHz: 100_100, highHz: 100_400, sampling: 'bandpass' };
    const edge = { at: 'cutoff', lowHz: 100_000, highHz: 100_500 } as const;
    const narrow = analogueResponse({ response: 'butterworth', order: 6, shape: 'band-pass', edge, tolerance: 0 });
    const { nativeHz, foldedHz } = boundedOf({ ...path, responses: [[narrow], []] }, band, WIRING);
    const spans = { lowHz: 90_000, highHz: 110_000 };
    const recorded = summed({ ...path, responses: [[narrow], []] }, baseband(100, 400), spans, 400_000);
    expectWithin(nativeHz, 300, 1e-2);
    expectWithin(nativeHz + foldedHz, recorded.foldedHz);
  });
});

describe('any path', () => {
  const rate = fc.constantFrom(500, 1000, 4000);
  const analogue = fc.oneof(
    fc
      .record({ order: fc.integer({ min: 1, max: 8 }), cutoff: fc.integer({ min: 50, max: 8000 }) })
      .map(({ order, cutoff }) => butterworth(order, cutoff)),
    fc.double({ min: 1e-4, max: 5e-3, noNaN: true }).map(aperture),
    fc
      .record({ q: fc.double({ min: 1, max: 30, noNaN: true }), resonanceHz: fc.integer({ min: 100, max: 20_000 }) })
      .map(sensorResponse),
  );
  const path = fc
    .record({
      rate,
      factor: fc.integer({ min: 1, max: 12 }),
      filters: fc.array(analogue, { maxLength: 2 }),
      stopbandDb: fc.constantFrom(0, 30, 60),
    })
    .map(({ rate: rateHz, factor, filters, stopbandDb }): NoisePath => {
      const lastHz = rateHz / factor;
      const step = stopbandDb > 0 ? [kaiser(0.4 * lastHz, 0.6 * lastHz, stopbandDb, rateHz)] : [];
      return { ratesHz: [rateHz, lastHz], responses: [filters, step, []], sensor: FLAT };
    });
  /** In two-hundredths of the last Nyquist frequency, so that no narrow band lies across an edge. */
  const bandEnds = fc.tuple(fc.nat(180), fc.integer({ min: 5, max: 200 }));
  const spanEnds = fc.tuple(fc.nat(2000), fc.integer({ min: 50, max: 20_000 }));
  const PARTS = 8;

  it('holds what narrow bands followed one by one add up to', () => {
    let folded = 0;
    fc.assert(
      fc.property(path, bandEnds, spanEnds, (given, [bandLow, bandWidth], [spanLow, spanWidth]) => {
        const unitHz = given.ratesHz[1]! / 400;
        const band = baseband(bandLow * unitHz, Math.min(bandLow + bandWidth, 200) * unitHz);
        const spans = { lowHz: spanLow * unitHz, highHz: (spanLow + spanWidth) * unitHz };
        const { nativeHz, foldedHz } = boundedOf(given, band, WIRING, spans);
        const expected = summed(given, band, spans, spanWidth * PARTS);
        const slackHz = 1e-6 * (expected.nativeHz + expected.foldedHz);
        expect(Math.abs(nativeHz - expected.nativeHz)).toBeLessThanOrEqual(HUNDREDTH_DB * expected.nativeHz + slackHz);
        expect(Math.abs(foldedHz - expected.foldedHz)).toBeLessThanOrEqual(HUNDREDTH_DB * expected.foldedHz + slackHz);
        if (foldedHz > 1e-3 * nativeHz) folded++;
      }),
      { seed: 4, numRuns: runs(200) },
    );
    // Little would be tested if hardly anything folded.
    expect(folded).toBeGreaterThan(runs(200) / 2);
  });

  it('is worked out in a few thousand steps', () => {
    const first = counted(butterworth(8, 10_000));
    const second = counted(kaiser(2000, 3200, 90, 25_600));
    const ratesHz = [25_600, 6400];
    const counting = { ratesHz, responses: [[first.response], [second.response], []], sensor: FLAT };
    noiseBandwidth(counting, baseband(10, 2500), WIRING);
    const once = [first.asked(), second.asked()];
    expect(Math.max(...once)).toBeGreaterThan(15);
    expect(Math.max(...once)).toBeLessThan(4000);
  });

  it.each([
    ['a rate of 0', [0], baseband(0, 10)],
    ['a rate that is no number', [Number.NaN], baseband(0, 10)],
    ['a rate without end', [Infinity], baseband(0, 10)],
    ['a band without width', [100], baseband(10, 10)],
    ['a band upside down', [100], baseband(20, 10)],
    ['a band above the Nyquist frequency', [100], baseband(60, 80)],
  ])('leaves nothing of %s, and no error', (_, ratesHz, band) => {
    const path = { ratesHz, responses: [[singlePole(1000)], []], sensor: FLAT };
    expect(noiseBandwidth(path, band, WIRING)).toEqual({ kind: 'bounded', nativeHz: 0, foldedHz: 0 });
  });
});
