import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FoldedPiece, foldHz, foldsInto, foldThrough, zoneOf } from '../../server/src/signal/folding.ts';
import { runs } from '../tools/runs.ts';

// Source of everything here without one of its own: recorded(f) = |f - rate round(f / rate)|, once for each stage.

/** Rates of one to three stages, each a whole fraction of the one before. */
const rates = fc
  .tuple(fc.integer({ min: 200, max: 2000 }), fc.integer({ min: 2, max: 5 }), fc.integer({ min: 2, max: 5 }))
  .chain(([first, second, third]) =>
    fc.constantFrom([first], [first, first / second], [first, first / second, first / second / third]),
  );

const frequency = fc.oneof(fc.double({ min: 0, max: 3000, noNaN: true }), fc.integer({ min: 0, max: 3000 }));

const range = fc
  .tuple(frequency, frequency)
  .filter(([first, second]) => first !== second)
  .map(([first, second]) => [Math.min(first, second), Math.max(first, second)] as const);

const foldAll = (hz: number, ratesHz: readonly number[]): number => ratesHz.reduce(foldHz, hz);

describe('folding a frequency', () => {
  it('lands in 0 .. Nyquist, folds no further, and agrees with the formula', () => {
    fc.assert(
      fc.property(frequency, fc.double({ min: 0.01, max: 1e6, noNaN: true }), (hz, rate) => {
        const recorded = foldHz(hz, rate);
        expect(recorded).toBeGreaterThanOrEqual(0);
        expect(recorded).toBeLessThanOrEqual(rate / 2);
        expect(foldHz(recorded, rate)).toBe(recorded);
        expect(Math.abs(recorded - Math.abs(hz - rate * Math.round(hz / rate)))).toBeLessThan(1e-9 * (1 + hz));
        expect(foldHz(-hz, rate)).toBe(recorded);
      }),
      { seed: 11, numRuns: runs(5000), endOnFailure: true },
    );
  });

  it('stays itself in the first zone and is mirrored in the second', () => {
    expect([foldHz(3, 10), foldHz(5, 10), foldHz(7, 10), foldHz(10, 10), foldHz(12, 10)]).toEqual([3, 5, 3, 0, 2]);
    expect([zoneOf(3, 10), zoneOf(7, 10), zoneOf(12, 10)]).toEqual([1, 2, 3]);
  });

  it('has a value for every pair of numbers', () => {
    for (const hz of [0, -0, 1e300, Infinity, Number.NaN, 5e-324]) {
      for (const rate of [0, 5e-324, 1, 1e300, Infinity, Number.NaN]) expect(foldHz(hz, rate)).not.toBeNaN();
    }
  });
});

/** The frequencies of one place of a piece, from stage to stage. */
function traced(piece: FoldedPiece, part: number): readonly number[] {
  const recorded = {
    lowHz: piece.recordedLowHz,
    highHz: piece.recordedHighHz,
    reversed: piece.mirrored,
  };
  return [...piece.inputs, recorded].map(({ lowHz, highHz, reversed }) =>
    reversed ? highHz - part * (highHz - lowHz) : lowHz + part * (highHz - lowHz),
  );
}

function expectToFollowTheFormula(piece: FoldedPiece, ratesHz: readonly number[]) {
  expect(piece.inputs.length).toBe(ratesHz.length);
  const misses = [0, 0.3, 1].flatMap((part) => {
    const places = traced(piece, part);
    return ratesHz.map((rate, stage) => Math.abs(foldHz(places[stage]!, rate) - places[stage + 1]!));
  });
  expect(Math.max(...misses)).toBeLessThan(1e-9 * (1 + piece.trueHighHz));
  const middle = traced(piece, 0.5);
  const moved = ratesHz.findIndex((_, stage) => Math.abs(middle[stage]! - middle[stage + 1]!) > 1e-9 * middle[0]!);
  if (piece.trueHighHz - piece.trueLowHz > 1e-6) expect(piece.foldsAtStage).toBe(moved < 0 ? null : moved + 1);
}

describe('folding a range', () => {
  it('covers it from end to end with pieces that each follow the formula', () => {
    fc.assert(
      fc.property(range, rates, ([low, high], ratesHz) => {
        const pieces = foldThrough(low, high, ratesHz, 100_000);
        expect(pieces[0]!.trueLowHz).toBe(low);
        expect(pieces[pieces.length - 1]!.trueHighHz).toBe(high);
        pieces.forEach((piece, i) => {
          expect(piece.collapsed).toBe(false);
          expect(piece.trueLowHz).toBeLessThanOrEqual(piece.trueHighHz);
          if (i > 0) expect(piece.trueLowHz).toBe(pieces[i - 1]!.trueHighHz);
          expect(piece.recordedLowHz).toBeGreaterThanOrEqual(0);
          expect(piece.recordedHighHz).toBeLessThanOrEqual(ratesHz[ratesHz.length - 1]! / 2);
          expectToFollowTheFormula(piece, ratesHz);
        });
      }),
      { seed: 12, numRuns: runs(2000), endOnFailure: true },
    );
  });

  it('takes a point as one piece, on a multiple of half the rate too', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          frequency,
          fc.integer({ min: 0, max: 20 }).map((n) => n * 500),
        ),
        rates,
        (hz, ratesHz) => {
          const pieces = foldThrough(hz, hz, ratesHz);
          expect(pieces.length).toBe(1);
          expect(pieces[0]!.recordedLowHz).toBe(pieces[0]!.recordedHighHz);
          expect(Math.abs(pieces[0]!.recordedLowHz - foldAll(hz, ratesHz))).toBeLessThan(1e-9 * (1 + hz));
        },
      ),
      { seed: 13, numRuns: runs(2000), endOnFailure: true },
    );
  });

  it('is not folded on the Nyquist frequency, and is on the rate', () => {
    expect(foldThrough(5, 5, [10])).toMatchObject([{ recordedLowHz: 5, foldsAtStage: null, mirrored: false }]);
    expect(foldThrough(10, 10, [10])).toMatchObject([{ recordedLowHz: 0, foldsAtStage: 1 }]);
    expect(foldThrough(2, 5, [10])).toMatchObject([{ recordedLowHz: 2, recordedHighHz: 5, foldsAtStage: null }]);
    expect(foldThrough(5, 6, [10])).toMatchObject([{ recordedLowHz: 4, recordedHighHz: 5, mirrored: true }]);
  });

  it('stops at its limit with one piece that claims the whole record', () => {
    const pieces = foldThrough(0, 1000, [1], 10);
    expect(pieces.length).toBe(10);
    expect(pieces[9]).toMatchObject({
      trueLowHz: 4.5,
      trueHighHz: 1000,
      recordedLowHz: 0,
      recordedHighHz: 0.5,
      collapsed: true,
      foldsAtStage: 1,
    });
    expect(foldThrough(0, 5, [1], 10).some((piece) => piece.collapsed)).toBe(false);
    for (const [low, high, rate] of [
      [0, 1e300, 1],
      [1e300, 1.1e300, 1e-9],
      [0, Infinity, 10],
      [0, 10, 0],
      [0, 10, 5e-324],
    ] as const) {
      const bounded = foldThrough(low, high, [rate, rate / 3]);
      expect(bounded.length).toBeLessThanOrEqual(4096);
      expect(bounded[bounded.length - 1]).toMatchObject({
        trueHighHz: high,
        collapsed: true,
      });
    }
  });

  it('has no stage to fold at without rates', () => {
    expect(foldThrough(1, 2, [])).toMatchObject([{ recordedLowHz: 1, recordedHighHz: 2, foldsAtStage: null }]);
  });
});

describe('what folds into a range', () => {
  it('are all the frequencies that the formula brings there, and no others', () => {
    fc.assert(
      fc.property(range, rates, fc.array(frequency, { minLength: 20, maxLength: 20 }), (band, ratesHz, probes) => {
        const nyquist = ratesHz[ratesHz.length - 1]! / 2;
        const [low, high] = [foldHz(band[0], 2 * nyquist), foldHz(band[1], 2 * nyquist)].sort((a, b) => a - b) as [
          number,
          number,
        ];
        const pieces = foldsInto(low, high, ratesHz, 2000, 100_000);
        pieces.forEach((piece, i) => {
          expectToFollowTheFormula(piece, ratesHz);
          expect(piece.recordedLowHz).toBeGreaterThanOrEqual(low - 1e-9);
          expect(piece.recordedHighHz).toBeLessThanOrEqual(high + 1e-9);
          expect(piece.trueHighHz).toBeLessThanOrEqual(2000);
          if (i > 0) expect(piece.trueLowHz).toBeGreaterThanOrEqual(pieces[i - 1]!.trueHighHz - 1e-9);
        });
        for (const hz of probes) {
          const recorded = foldAll(hz, ratesHz);
          if (hz > 2000 || Math.min(Math.abs(recorded - low), Math.abs(recorded - high)) < 1e-6) continue;
          const isListed = pieces.some((piece) => piece.trueLowHz <= hz && hz <= piece.trueHighHz);
          expect(isListed).toBe(recorded > low && recorded < high);
        }
      }),
      { seed: 14, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it('begin with the range itself', () => {
    expect(foldsInto(1, 2, [10], 12)).toMatchObject([
      { trueLowHz: 1, trueHighHz: 2, foldsAtStage: null, mirrored: false },
      { trueLowHz: 8, trueHighHz: 9, foldsAtStage: 1, mirrored: true },
      { trueLowHz: 11, trueHighHz: 12, foldsAtStage: 1, mirrored: false },
    ]);
  });

  it('name each point once', () => {
    const frequenciesOf = (hz: number) => foldsInto(hz, hz, [100, 20], 100).map((piece) => piece.trueLowHz);
    expect(frequenciesOf(0)).toEqual([0, 20, 40, 60, 80, 100]);
    expect(frequenciesOf(10)).toEqual([10, 30, 50, 70, 90]);
  });

  it('are cut where they pass what was asked for', () => {
    expect(foldsInto(1, 4, [10], 7)).toMatchObject([
      { trueHighHz: 4 },
      {
        trueLowHz: 6,
        trueHighHz: 7,
        recordedLowHz: 3,
        recordedHighHz: 4,
        inputs: [{ lowHz: 6, highHz: 7 }],
      },
    ]);
  });

  it('end in one piece for all the rest past the limit', () => {
    const pieces = foldsInto(0, 0.1, [1], 1e9, 5);
    expect(pieces.length).toBe(5);
    expect(pieces[4]).toMatchObject({ trueHighHz: 1e9, collapsed: true });
    expect(foldsInto(0, 0.01, [1e6, 0.1], 1e9).length).toBeLessThanOrEqual(4096);
    expect(foldsInto(0, 1, [0], 1e9)).toEqual([]);
    expect(foldsInto(2, 1, [10], 1e9)).toEqual([]);
  });
});
