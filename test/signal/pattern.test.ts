import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldHz } from '../../server/src/signal/folding.ts';
import { MOST_SLOTS, type PatternGains, patternImages, type SlotPattern } from '../../server/src/signal/pattern.ts';
import { imagesInBand, imagesOf, imagesOfRange } from '../../server/src/signal/pattern-folding.ts';
import { runs } from '../tools/runs.ts';
import { evenly } from './even-numbers.ts';

function gainsOf(pattern: SlotPattern): PatternGains {
  const result = patternImages(pattern);
  if (result.kind !== 'gains') throw new Error(`no pattern: ${result.kind}`);
  return result;
}

const pattern: fc.Arbitrary<SlotPattern> = fc.integer({ min: 1, max: 60 }).chain((slots) =>
  fc.record({
    slots: fc.constant(slots),
    taken: fc.uniqueArray(fc.nat({ max: slots - 1 }), { minLength: 1, maxLength: slots }),
  }),
);

const all = (slots: number) => Array.from({ length: slots }, (_, slot) => slot);

describe('the images of a pattern', () => {
  it('have the gains of its Fourier series, summed term by term', () => {
    fc.assert(
      fc.property(pattern, ({ slots, taken }) => {
        const { gains, strongest } = gainsOf({ slots, taken });
        expect(gains.length).toBe(slots);
        for (let k = 0; k < slots; k++) {
          const re = taken.reduce((sum, n) => sum + Math.cos((2 * Math.PI * k * n) / slots), 0);
          const im = taken.reduce((sum, n) => sum + Math.sin((2 * Math.PI * k * n) / slots), 0);
          expect(Math.abs(gains[k]! - Math.hypot(re, im) / taken.length)).toBeLessThan(1e-12);
        }
        const ranked = [...strongest].map((k) => gains[k]!);
        expect(strongest[0]).toBe(0);
        expect(ranked).toEqual([...ranked].sort((first, second) => second - first));
        expect(ranked.length).toBe(gains.filter((gain) => gain > 0).length);
      }),
      { seed: 41, numRuns: runs(500) },
    );
  });

  it('are none where all slots are taken', () => {
    for (const slots of [1, 2, 10, 97, 1000]) expect([...gainsOf({ slots, taken: all(slots) }).strongest]).toEqual([0]);
  });

  it('do not depend on the order of the taken slots, nor on where the pattern starts', () => {
    const { gains } = gainsOf({ slots: 12, taken: [0, 1, 2, 5] });
    const others = [gainsOf({ slots: 12, taken: [5, 1, 0, 2] }), gainsOf({ slots: 12, taken: [7, 8, 9, 0] })];
    for (const other of others) {
      for (const [k, gain] of gains.entries()) expect(other.gains[k]).toBeCloseTo(gain, 12);
    }
  });

  it.each([
    [
      { slots: 0, taken: [0] },
      { kind: 'slots-not-whole', slots: 0 },
    ],
    [
      { slots: 2.5, taken: [0] },
      { kind: 'slots-not-whole', slots: 2.5 },
    ],
    [
      { slots: Number.NaN, taken: [0] },
      { kind: 'slots-not-whole', slots: Number.NaN },
    ],
    [
      { slots: 1e9, taken: [0] },
      { kind: 'too-many-slots', slots: 1e9, most: MOST_SLOTS },
    ],
    [{ slots: 4, taken: [] }, { kind: 'none-taken' }],
    [
      { slots: 4, taken: [0, 4] },
      { kind: 'slot-outside', slot: 4 },
    ],
    [
      { slots: 4, taken: [-1] },
      { kind: 'slot-outside', slot: -1 },
    ],
    [
      { slots: 4, taken: [1.5] },
      { kind: 'slot-outside', slot: 1.5 },
    ],
    [
      { slots: 4, taken: [3, 1, 3] },
      { kind: 'slot-repeated', slot: 3 },
    ],
  ])('of %o are none: %o', (given, failure) => {
    expect(patternImages(given)).toEqual(failure);
  });

  it('of 100,000 slots are worked out at once, and rounding is no image', () => {
    const started = performance.now();
    const missing = gainsOf({ slots: MOST_SLOTS, taken: all(MOST_SLOTS).slice(1) });
    const pair = gainsOf({ slots: MOST_SLOTS, taken: [0, MOST_SLOTS / 2] });
    const single = gainsOf({ slots: MOST_SLOTS, taken: [17] });
    // A tenth of a second each; term by term, which is what must not happen, would take minutes.
    expect(performance.now() - started).toBeLessThan(10_000);
    expect(missing.gains[12_345]).toBeCloseTo(1 / (MOST_SLOTS - 1), 12);
    expect(missing.strongest.length).toBe(MOST_SLOTS);
    expect(pair.strongest.length).toBe(MOST_SLOTS / 2);
    expect(Math.min(...single.gains)).toBeGreaterThan(1 - 1e-11);
    const { images, omitted, omittedGain } = imagesOf(101, 1e6, missing, 50);
    expect(images.length).toBe(50);
    expect(omitted).toBe(MOST_SLOTS - 50);
    expect(omittedGain).toBeCloseTo(1 / (MOST_SLOTS - 1), 12);
  });
});

describe('the lines of a tone in a pattern', () => {
  it('stand at f + k rate / P, folded, once for every k', () => {
    fc.assert(
      fc.property(pattern, evenly(0, 5000), (given, hz) => {
        const gains = gainsOf(given);
        const { images, omitted } = imagesOf(hz, 1000, gains);
        expect(omitted).toBe(0);
        expect(images.flatMap(({ shifts }) => shifts).sort((a, b) => a - b)).toEqual(
          [...gains.strongest].sort((a, b) => a - b),
        );
        for (const { recordedHz, gain, shifts } of images) {
          for (const k of shifts) {
            expect(Math.abs(recordedHz - foldHz(hz + (k * 1000) / given.slots, 1000))).toBeLessThan(2e-6);
          }
          expect(gain).toBe(shifts.reduce((sum, k) => sum + gains.gains[k]!, 0));
        }
        const places = images.map(({ recordedHz }) => recordedHz);
        expect(places).toEqual([...places].sort((a, b) => a - b));
        for (let i = 1; i < places.length; i++) expect(places[i]! - places[i - 1]!).toBeGreaterThan(9e-7);
      }),
      { seed: 42, numRuns: runs(1000) },
    );
  });

  it('coincide at half spacings, where their amplitudes add', () => {
    // Two of four: gains 1, 1/sqrt 2, 0, 1/sqrt 2 at spacings of 250 Hz.
    const gains = gainsOf({ slots: 4, taken: [0, 1] });
    expect(imagesOf(100, 1000, gains).images.map(({ recordedHz }) => recordedHz)).toEqual([100, 150, 350]);
    const constant = imagesOf(0, 1000, gains).images;
    expect(constant.map(({ recordedHz, shifts }) => ({ recordedHz, shifts }))).toEqual([
      { recordedHz: 0, shifts: [0] },
      { recordedHz: 250, shifts: [1, 3] },
    ]);
    expect(constant[1]!.gain).toBeCloseTo(Math.SQRT2, 12);
    const half = imagesOf(125, 1000, gains).images;
    expect(half.map(({ recordedHz, shifts }) => ({ recordedHz, shifts }))).toEqual([
      { recordedHz: 125, shifts: [0, 3] },
      { recordedHz: 375, shifts: [1] },
    ]);
    expect(half[0]!.gain).toBeCloseTo(1 + Math.SQRT1_2, 12);
  });

  it('are bounded in number, the strongest kept and the rest bounded in height', () => {
    fc.assert(
      fc.property(pattern, fc.integer({ min: 0, max: 80 }), fc.integer({ min: 0, max: 10 }), (given, step, limit) => {
        const gains = gainsOf(given);
        const hz = (step * 1000) / (2 * given.slots);
        const whole = imagesOf(hz, 1000, gains).images;
        const { images, omitted, omittedGain } = imagesOf(hz, 1000, gains, limit);
        expect(images.length).toBe(Math.min(limit, whole.length));
        const told = new Set(images.flatMap(({ shifts }) => shifts));
        expect(omitted).toBe(gains.strongest.length - told.size);
        const left = whole.filter(({ shifts }) => !told.has(shifts[0]!));
        for (const { gain } of left) expect(gain).toBeLessThanOrEqual(omittedGain);
        expect(omittedGain > 0).toBe(left.length > 0);
      }),
      { seed: 43, numRuns: runs(500) },
    );
  });

  it('have values for every pair of numbers', () => {
    const gains = gainsOf({ slots: 5, taken: [0, 1, 3] });
    for (const hz of [0, -5, 1e300, Infinity, Number.NaN, 5e-324]) {
      for (const rate of [0, 5e-324, 1, 1e300, Infinity, Number.NaN]) {
        for (const { recordedHz } of imagesOf(hz, rate, gains).images) expect(recordedHz).not.toBeNaN();
        expect(imagesOfRange(0, hz, [rate], gains, 20).length).toBeLessThanOrEqual(20);
        expect(imagesOfRange(hz, hz, [rate], gains, 20).length).toBeLessThanOrEqual(20);
      }
    }
  });
});

const range = fc.tuple(evenly(0, 2000), evenly(1, 500)).map(([lowHz, width]) => ({ lowHz, highHz: lowHz + width }));

describe('the images of a range in a pattern', () => {
  it('hold every line of every tone of the range, mirrored where they fall', () => {
    const rates = fc.constantFrom<readonly [number, ...number[]]>([1000], [1000, 500], [1000, 500, 100]);
    fc.assert(
      fc.property(pattern, range, rates, evenly(0, 1), (given, band, ratesHz, part) => {
        const gains = gainsOf(given);
        const pieces = imagesOfRange(band.lowHz, band.highHz, ratesHz, gains, 100_000);
        for (const k of gains.strongest) {
          const ofShift = pieces.filter(({ shift }) => shift === k);
          expect(ofShift[0]!.trueLowHz).toBe(band.lowHz);
          expect(ofShift.at(-1)!.trueHighHz).toBe(band.highHz);
          for (const [i, piece] of ofShift.slice(1).entries()) expect(piece.trueLowHz).toBe(ofShift[i]!.trueHighHz);
          for (const piece of ofShift) {
            const hz = piece.trueLowHz + part * (piece.trueHighHz - piece.trueLowHz);
            const recorded = ratesHz.reduce(foldHz, hz + (k * 1000) / given.slots);
            const along = hz - piece.trueLowHz;
            const told = piece.mirrored ? piece.recordedHighHz - along : piece.recordedLowHz + along;
            expect(Math.abs(told - recorded)).toBeLessThan(1e-8);
            expect(piece.gain).toBe(gains.gains[k]);
            expect(piece.inputs[0]).toEqual({ lowHz: piece.trueLowHz, highHz: piece.trueHighHz, reversed: false });
            expect(piece.inputs.length).toBe(ratesHz.length);
            if (k !== 0) expect(piece.foldsAtStage).toBe(1);
          }
        }
      }),
      { seed: 44, numRuns: runs(500) },
    );
  });

  it('are as high as any tone within makes them where two coincide', () => {
    const SAME_LINE_HZ = 5e-7;
    fc.assert(
      fc.property(pattern, range, (given, { lowHz, highHz }) => {
        const gains = gainsOf(given);
        const spacing = 1000 / given.slots / 2;
        for (const piece of imagesOfRange(lowHz, highHz, [1000], gains, 100_000)) {
          let greatest = piece.gain;
          const last = Math.floor((piece.trueHighHz + SAME_LINE_HZ) / spacing);
          for (let q = Math.ceil((piece.trueLowHz - SAME_LINE_HZ) / spacing); q <= last; q++) {
            const image = imagesOf(q * spacing, 1000, gains).images.find(({ shifts }) => shifts.includes(piece.shift));
            greatest = Math.max(greatest, image!.gain);
          }
          expect(Math.abs(piece.coincidentGain - greatest)).toBeLessThan(1e-12);
        }
      }),
      { seed: 45, numRuns: runs(200) },
    );
  });

  it('add where a mains frequency within its tolerance meets half a spacing', () => {
    const gains = gainsOf({ slots: 10, taken: [0, 1, 2, 3] });
    const own = imagesOfRange(49.5, 50.5, [1000], gains).find(({ shift }) => shift === 0)!;
    expect(own).toMatchObject({
      recordedLowHz: 49.5,
      recordedHighHz: 50.5,
      mirrored: false,
      foldsAtStage: null,
      gain: 1,
    });
    // At 50 Hz the image of k = -1 is on the tone itself.
    expect(own.coincidentGain).toBeCloseTo(1 + gains.gains[9]!, 12);
  });

  it('end in a collapsed piece where there are too many', () => {
    const gains = gainsOf({ slots: 1000, taken: all(1000).slice(1) });
    const pieces = imagesOfRange(10, 20, [1000], gains, 100);
    expect(pieces.length).toBe(100);
    expect(pieces.filter(({ collapsed }) => collapsed).length).toBe(1);
    expect(pieces.at(-1)).toMatchObject({
      collapsed: true,
      trueLowHz: 10,
      trueHighHz: 20,
      recordedLowHz: 0,
      recordedHighHz: 500,
    });
    expect(pieces.at(-1)!.gain).toBeCloseTo(1 / 999, 12);
  });

  it('of a band that fall back into it are cut to where they do', () => {
    // Every second slot: all of 0 .. 1000 Hz is mirrored about 250 Hz at full level.
    const halves = gainsOf({ slots: 2, taken: [0] });
    expect(imagesInBand(0, 200, [1000], halves)).toEqual([]);
    const [image, ...others] = imagesInBand(100, 300, [1000], halves);
    expect(others).toEqual([]);
    expect(image).toMatchObject({
      trueLowHz: 200,
      trueHighHz: 300,
      recordedLowHz: 200,
      recordedHighHz: 300,
      mirrored: true,
      shift: 1,
      gain: 1,
    });
    // A band that is folded on purpose is met where it is recorded: 1100 .. 1300 at 100 .. 300.
    expect(imagesInBand(1100, 1300, [1000], halves)).toMatchObject([
      { trueLowHz: 1200, trueHighHz: 1300, recordedLowHz: 200, recordedHighHz: 300, mirrored: true },
    ]);
  });

  it('of a band that fall back into it are told whole where there are too many', () => {
    const gains = gainsOf({ slots: 1000, taken: all(1000).slice(1) });
    for (const limit of [0, 1, 2, 50]) {
      const pieces = imagesInBand(900, 1200, [1000], gains, limit);
      expect(pieces.at(-1)).toMatchObject({
        collapsed: true,
        trueLowHz: 900,
        trueHighHz: 1200,
        recordedLowHz: 0,
        recordedHighHz: 500,
      });
      // At most one more, of the image that is the first to find no room.
      expect(pieces.filter(({ collapsed }) => collapsed).length).toBeLessThanOrEqual(2);
    }
  });

  it('of a band that fall back into it are true to the formula at both ends', () => {
    fc.assert(
      fc.property(pattern, range, ({ slots, taken }, { lowHz, highHz }) => {
        for (const piece of imagesInBand(lowHz, highHz, [1000, 400], gainsOf({ slots, taken }), 10_000)) {
          expect(piece.shift).not.toBe(0);
          const ends = piece.mirrored
            ? [piece.recordedHighHz, piece.recordedLowHz]
            : [piece.recordedLowHz, piece.recordedHighHz];
          [piece.trueLowHz, piece.trueHighHz].forEach((hz, i) => {
            expect(Math.abs([1000, 400].reduce(foldHz, hz + (piece.shift * 1000) / slots) - ends[i]!)).toBeLessThan(
              1e-8,
            );
          });
          const second = piece.inputs[1]!;
          expect(Math.abs(second.highHz - second.lowHz - (piece.trueHighHz - piece.trueLowHz))).toBeLessThan(1e-8);
        }
      }),
      { seed: 46, numRuns: runs(500) },
    );
  });
});
