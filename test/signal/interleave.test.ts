import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldHz } from '../../server/src/signal/folding.ts';
import { type Interleave, interleaveImages, mismatchRatio, offsetLines } from '../../server/src/signal/interleave.ts';
import { runs } from '../tools/runs.ts';
import { evenly } from './even-numbers.ts';

const FOUR: Interleave = { converters: 4, gainMismatch: 0.001, timingMismatchS: 2e-12, offsetMismatch: 0.0005 };

// Source of everything here without one of its own: power g^2 + (2 pi f s)^2 at k rate / M + f, k = 1 .. M - 1.

describe('the images of interleaved converters', () => {
  it('stand at k rate / M + f, folded, each judged at the whole', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 32 }),
        evenly(0, 5000),
        evenly(1, 400),
        evenly(0, 1),
        (converters, lowHz, width, part) => {
          const interleave = { ...FOUR, converters, timingMismatchS: 1e-7 };
          const pieces = interleaveImages(lowHz, lowHz + width, [1000, 500], interleave, 10_000);
          expect([...new Set(pieces.map(({ shift }) => shift))]).toEqual(
            Array.from({ length: converters - 1 }, (_, i) => i + 1),
          );
          for (const piece of pieces) {
            const along = part * (piece.trueHighHz - piece.trueLowHz);
            const expected = foldHz(foldHz(piece.trueLowHz + along + (piece.shift * 1000) / converters, 1000), 500);
            const told = piece.mirrored ? piece.recordedHighHz - along : piece.recordedLowHz + along;
            expect(Math.abs(told - expected)).toBeLessThan(1e-8);
            const power = 0.001 ** 2 + (2 * Math.PI * piece.trueHighHz * 1e-7) ** 2;
            expect(piece.imageDb).toBeCloseTo(10 * Math.log10(power), 9);
          }
        },
      ),
      { seed: 51, numRuns: runs(500) },
    );
  });

  it('of a tone are one for lines that coincide, none on the tone itself', () => {
    const places = (hz: number) => interleaveImages(hz, hz, [1000], FOUR).map(({ recordedLowHz }) => recordedLowHz);
    expect(places(100)).toEqual([350, 400, 150]);
    // At 125 Hz, k = 3 is on the tone and k = 1 and 2 coincide; at 0 Hz k = 1 and 3 do.
    expect(places(125)).toEqual([375]);
    expect(places(0)).toEqual([250, 500]);
    expect(places(1500)).toEqual([250, 0]);
  });

  it('are none where there are fewer than two converters, or all are alike', () => {
    for (const converters of [0, 1, -4, 2.5, Number.NaN]) {
      expect(interleaveImages(1, 2, [1000], { ...FOUR, converters })).toEqual([]);
      expect(offsetLines(1000, { ...FOUR, converters })).toBeUndefined();
    }
    const alike = { converters: 4, gainMismatch: 0, timingMismatchS: 0, offsetMismatch: 0 };
    expect(interleaveImages(1, Infinity, [1000], alike)).toEqual([]);
    expect(offsetLines(1000, alike)).toBeUndefined();
  });

  it('are bounded, whatever is asked', () => {
    const many = { ...FOUR, converters: 1e9 };
    const pieces = interleaveImages(100, 200, [1000], many, 50);
    expect(pieces.length).toBe(50);
    expect(pieces.filter(({ collapsed }) => collapsed).length).toBe(1);
    expect(pieces.at(-1)).toMatchObject({ collapsed: true, shift: 50, recordedLowHz: 0, recordedHighHz: 500 });
    const lines = offsetLines(1000, many, 50)!;
    expect(lines.recordedHz.length).toBe(50);
    expect(lines.omitted).toBe(5e8 - 50);
    for (const hz of [0, 1e300, Infinity, Number.NaN]) {
      expect(interleaveImages(0, hz, [1000], FOUR, 20).length).toBeLessThanOrEqual(20);
    }
    expect(mismatchRatio(Infinity, { ...FOUR, timingMismatchS: 0 })).toBe(0.001);
  });
});

describe('the lines of unlike offsets', () => {
  it('stand at k rate / M up to half the rate, k and M - k as one', () => {
    expect(offsetLines(1000, FOUR)!.recordedHz).toEqual([250, 500]);
    expect(offsetLines(1000, { ...FOUR, converters: 5 })!.recordedHz).toEqual([200, 400]);
    expect(offsetLines(1000, { ...FOUR, converters: 2 })!.recordedHz).toEqual([500]);
  });
});
