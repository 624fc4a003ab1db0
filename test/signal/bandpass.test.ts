import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type BandpassBand, rateAmongWindows, rateWindow, rateWindowCount } from '../../server/src/signal/bandpass.ts';
import { foldThrough } from '../../server/src/signal/folding.ts';
import { runs } from '../tools/runs.ts';

const band = fc
  .tuple(fc.integer({ min: 0, max: 500 }), fc.integer({ min: 1, max: 200 }), fc.constantFrom(0, 0, 1e-4, 1e-2))
  .map(([lowHz, width, rateTolerance]): BandpassBand => ({ lowHz, highHz: lowHz + width, rateTolerance }));

/** By folding: within one zone, and upside down or not. */
function foldsAsOne(lowHz: number, highHz: number, rateHz: number): { readonly upright: boolean } | undefined {
  const [piece, ...others] = foldThrough(lowHz, highHz, [rateHz]);
  return others.length === 0 && piece!.recordedHighHz - piece!.recordedLowHz > 0
    ? { upright: !piece!.mirrored }
    : undefined;
}

describe('the windows of bandpass sampling', () => {
  it('are the rates at which the band folds as one piece, by brute force', () => {
    let inside = 0;
    fc.assert(
      fc.property(band, fc.double({ min: 0.02, max: 3, noNaN: true }), (given, ratio) => {
        const { lowHz, highHz, rateTolerance } = given;
        const rateHz = ratio * highHz;
        const place = rateAmongWindows(given, rateHz);
        const worst = [rateHz * (1 - rateTolerance), rateHz, rateHz * (1 + rateTolerance)].map((hz) =>
          foldsAsOne(lowHz, highHz, hz),
        );
        // A clock that drifts across a whole zone would be in one at both ends of its tolerance.
        const isAllowed = worst.every((fold) => fold !== undefined && fold.upright === worst[0]!.upright);
        expect(place.kind).toBe(isAllowed ? 'inside' : 'outside');
        if (place.kind !== 'inside') return;
        inside++;
        expect(place.window.upright).toBe(worst[1]!.upright);
        expect(place.window.index).toBe(Math.ceil((2 * highHz) / rateHz));
      }),
      { seed: 61, numRuns: runs(5000) },
    );
    expect(inside).toBeGreaterThan(runs(5000) / 10);
  });

  it('hold at their ends, where the band touches a multiple of half the rate', () => {
    fc.assert(
      fc.property(band, fc.nat(), (given, choice) => {
        const index = 1 + (choice % rateWindowCount(given));
        const window = rateWindow(given, index)!;
        expect(window.index).toBe(index);
        expect(window.upright).toBe(index % 2 === 1);
        expect(window.highRateHz).toBeGreaterThanOrEqual(window.lowRateHz);
        for (const rateHz of [window.lowRateHz, window.highRateHz].filter(Number.isFinite)) {
          expect(rateAmongWindows(given, rateHz).kind).toBe('inside');
        }
        const next = rateWindow(given, index + 1);
        if (next) expect(next.highRateHz).toBeLessThanOrEqual(window.lowRateHz);
      }),
      { seed: 62, numRuns: runs(2000) },
    );
  });

  it('say how far a rate is from the nearest', () => {
    fc.assert(
      fc.property(band, fc.double({ min: 0.02, max: 3, noNaN: true }), (given, ratio) => {
        const rateHz = ratio * given.highHz;
        const place = rateAmongWindows(given, rateHz);
        if (place.kind !== 'outside') return;
        const misses = Array.from({ length: Math.min(rateWindowCount(given), 1000) }, (_, i) => {
          const { lowRateHz, highRateHz } = rateWindow(given, i + 1)!;
          return Math.max(lowRateHz - rateHz, rateHz - highRateHz);
        });
        expect(place.missesByHz).toBe(Math.min(...misses));
        expect(place.missesByHz).toBeGreaterThan(0);
        expect(place.above.lowRateHz).toBeGreaterThan(rateHz);
        if (place.below) expect(place.below.highRateHz).toBeLessThan(rateHz);
        else expect(rateWindowCount(given)).toBe(place.above.index);
      }),
      { seed: 63, numRuns: runs(2000) },
    );
  });

  it('are found at once where there are a thousand million of them', () => {
    const narrow = { lowHz: 1e9 - 1, highHz: 1e9, rateTolerance: 0 };
    expect(rateWindowCount(narrow)).toBe(1e9);
    expect(rateWindow(narrow, 1e9)!.lowRateHz).toBeCloseTo(2, 9);
    expect(rateWindow(narrow, 1e9 + 1)).toBeUndefined();
    expect(rateAmongWindows(narrow, 2)).toMatchObject({ kind: 'inside', window: { index: 1e9 } });
    expect(rateAmongWindows(narrow, 1)).toMatchObject({ kind: 'outside', above: { index: 1e9 }, below: undefined });
    // A clock of 25 ppm leaves the windows of the first 20,000 zones.
    expect(rateWindowCount({ ...narrow, rateTolerance: 25e-6 })).toBe(20_000);
  });

  it('are none for what is no band, no rate or no clock', () => {
    for (const given of [
      { lowHz: -1, highHz: 5, rateTolerance: 0 },
      { lowHz: 6, highHz: 5, rateTolerance: 0 },
      { lowHz: 0, highHz: 0, rateTolerance: 0 },
      { lowHz: 1, highHz: Infinity, rateTolerance: 0 },
      { lowHz: 1, highHz: Number.NaN, rateTolerance: 0 },
      { lowHz: 1, highHz: 2, rateTolerance: 1 },
      { lowHz: 1, highHz: 2, rateTolerance: Number.NaN },
    ]) {
      expect(rateWindowCount(given)).toBe(0);
      expect(rateWindow(given, 1)).toBeUndefined();
      expect(rateAmongWindows(given, 3)).toEqual({ kind: 'none' });
    }
    const usual = { lowHz: 1, highHz: 2, rateTolerance: 0 };
    for (const rateHz of [0, -1, Infinity, Number.NaN])
      expect(rateAmongWindows(usual, rateHz)).toEqual({ kind: 'none' });
    for (const index of [0, -1, 1.5, Number.NaN, Infinity]) expect(rateWindow(usual, index)).toBeUndefined();
  });

  it('leave a band of no width to any rate, and a base band to twice its top', () => {
    const tone = { lowHz: 50, highHz: 50, rateTolerance: 0 };
    expect(rateWindowCount(tone)).toBe(Infinity);
    for (const rateHz of [5e-324, 1e-12, 0.3, 7, 1e6]) expect(rateAmongWindows(tone, rateHz).kind).not.toBe('none');
    expect(rateAmongWindows({ lowHz: 0, highHz: 10, rateTolerance: 0.01 }, 20)).toMatchObject({
      kind: 'outside',
      above: { index: 1, highRateHz: Infinity },
      below: undefined,
    });
  });
});
