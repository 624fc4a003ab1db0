import { describe, expect, it } from 'vitest';
import { rateAmongWindows, rateWindow, rateWindowCount } from '../../server/src/signal/bandpass.ts';
import { type Interleave, interleaveImages, mismatchRatio, offsetLines } from '../../server/src/signal/interleave.ts';
import { type PatternGains, patternImages } from '../../server/src/signal/pattern.ts';
import { imagesOf } from '../../server/src/signal/pattern-folding.ts';
import { leastPulseRateHz } from '../../server/src/signal/pulse-train.ts';
import { arrivalsOfText } from '../chain/rig.ts';

function gainsOf(slots: number, isTaken: (slot: number) => boolean): PatternGains {
  const taken = Array.from({ length: slots }, (_, slot) => slot).filter(isTaken);
  const result = patternImages({ slots, taken });
  if (result.kind !== 'gains') throw new Error(`no pattern: ${result.kind}`);
  return result;
}

describe('bandpass sampling', () => {
  // Source: R. G. Vaughan, N. L. Scott and D. R. White, The theory of bandpass sampling, IEEE Trans. Signal Processing
  // 1991: 2 fH / n <= rate <= 2 fL / (n - 1), worked by hand for their kind of example, a band of 20 .. 25 MHz.
  const band = { lowHz: 20e6, highHz: 25e6, rateTolerance: 0 };

  it.each([
    [1, 50e6, Infinity, true],
    [2, 25e6, 40e6, false],
    [3, 50e6 / 3, 20e6, true],
    [4, 12.5e6, 40e6 / 3, false],
    [5, 10e6, 10e6, true],
  ])('of 20 .. 25 MHz, n = %i: %d .. %d samples per second', (index, lowRateHz, highRateHz, upright) => {
    const window = rateWindow(band, index)!;
    expect(window.upright).toBe(upright);
    expect(window.lowRateHz / lowRateHz).toBeCloseTo(1, 12);
    if (index === 1) expect(window.highRateHz).toBe(highRateHz);
    else expect(window.highRateHz / highRateHz).toBeCloseTo(1, 12);
  });

  it('of 20 .. 25 MHz has five windows, the last of no width, which no clock of any tolerance can keep to', () => {
    expect(rateWindowCount(band)).toBe(5);
    expect(rateAmongWindows(band, 10e6)).toMatchObject({ kind: 'inside', window: { index: 5 } });
    expect(rateWindowCount({ ...band, rateTolerance: 1e-6 })).toBe(4);
    expect(rateAmongWindows({ ...band, rateTolerance: 1e-6 }, 10e6)).toMatchObject({
      kind: 'outside',
      above: { index: 4 },
      below: undefined,
    });
  });

  it('of 20 .. 25 MHz at 15 MHz misses the windows on either side', () => {
    const place = rateAmongWindows(band, 15e6);
    expect(place).toMatchObject({ kind: 'outside', above: { index: 3 }, below: { index: 4 } });
    expect(place.kind === 'outside' && place.missesByHz).toBeCloseTo(15e6 - 40e6 / 3, 3);
  });

  // Source: the formula of the same, with the clock's worst case put in by hand: 100 ppm at 25 .. 40 MHz.
  it('shrinks by the tolerance of the clock at both ends', () => {
    const window = rateWindow({ ...band, rateTolerance: 1e-4 }, 2)!;
    expect(window.lowRateHz * (1 - 1e-4)).toBeCloseTo(25e6, 3);
    expect(window.highRateHz * (1 + 1e-4)).toBeCloseTo(40e6, 3);
  });
});

describe('samples in a pattern', () => {
  // Source: common practice; keeping every N-th sample repeats the spectrum at multiples of rate / N.
  it('of every 5th of 100 per second leave a cosine of 1 Hz at 1, 19, 21, 39 and 41 Hz, alike', () => {
    const gains = gainsOf(5, (slot) => slot === 0);
    const { images } = imagesOf(1, 100, gains);
    const places = images.map(({ recordedHz }) => recordedHz);
    expect(places.length).toBe(5);
    for (const [i, hz] of [1, 19, 21, 39, 41].entries()) expect(places[i]).toBeCloseTo(hz, 9);
    for (const { gain } of images) expect(gain).toBeCloseTo(1, 12);
  });

  // Source: the same. A line at 20 Hz is the sum of those at 20 and 80 Hz of the unfolded axis.
  it.each([
    [5, [0, 20, 40]],
    [10, [0, 10, 20, 30, 40, 50]],
  ])('of every %ith of 100 per second leave a constant at %o Hz', (slots, expected) => {
    const { images } = imagesOf(
      0,
      100,
      gainsOf(slots, (slot) => slot === 0),
    );
    expect(images.length).toBe(expected.length);
    for (const [i, { recordedHz, gain }] of images.entries()) {
      expect(recordedHz).toBeCloseTo(expected[i]!, 9);
      expect(gain).toBeCloseTo(expected[i] === 0 || expected[i] === 50 ? 1 : 2, 12);
    }
  });

  // Source: the Fourier series of a constant less a comb, 1 / (P - 1) for every k but 0; worked by hand.
  it.each([2, 10, 97, 1000])('of which one of %i is missing have images of 1 / (P - 1), all alike', (slots) => {
    const { gains } = gainsOf(slots, (slot) => slot !== Math.floor(slots / 2));
    for (const gain of gains.slice(1)) expect(gain).toBeCloseTo(1 / (slots - 1), 12);
  });

  it.each([2, 10, 96])('of which every second of %i is taken have one image, k = P / 2, at full level', (slots) => {
    const { gains, strongest } = gainsOf(slots, (slot) => slot % 2 === 1);
    expect([...strongest]).toEqual([0, slots / 2]);
    expect(gains[slots / 2]).toBeCloseTo(1, 12);
  });

  // Source: the Dirichlet kernel, |sin(pi k L / P) / (L sin(pi k / P))| for L slots in a row; Harris, Proc. IEEE 1978.
  it.each([
    [10, 4],
    [64, 48],
    [1000, 7],
  ])('of which, out of %i, the first %i are taken have images that follow the Dirichlet kernel', (slots, taken) => {
    const { gains } = gainsOf(slots, (slot) => slot < taken);
    for (let k = 1; k < slots; k++) {
      const kernel = Math.sin((Math.PI * k * taken) / slots) / (taken * Math.sin((Math.PI * k) / slots));
      expect(Math.abs(gains[k]! - Math.abs(kernel))).toBeLessThan(1e-12);
    }
  });
});

describe('interleaved converters', () => {
  const none: Interleave = { converters: 2, gainMismatch: 0, timingMismatchS: 0, offsetMismatch: 0 };
  const ratioDb = (hz: number, interleave: Interleave) => 20 * Math.log10(mismatchRatio(hz, interleave));

  // Source: W. C. Black and D. A. Hodges, Time interleaved converter arrays, IEEE JSSC 1980, and the converter
  // handbooks: two converters of gains 1 + a/2 and 1 - a/2 leave an image of a/2; 1 % between them is 46.0 dB down.
  it('two, 1 % apart in gain, leave an image 46.0 dB down at rate / 2 - f', () => {
    const [image, ...others] = interleaveImages(100, 100, [1000], { ...none, gainMismatch: 0.005 });
    expect(others).toEqual([]);
    expect(image).toMatchObject({ recordedLowHz: 400, recordedHighHz: 400 });
    expect(image!.imageDb).toBeCloseTo(-46.02, 2);
  });

  // Source: C. Vogel, The impact of combined channel mismatch effects in time-interleaved ADCs, IEEE Trans.
  // Instrumentation and Measurement 2005: gain and timing add as powers, g^2 + (2 pi f s)^2; worked by hand.
  it.each([
    [{ ...none, gainMismatch: 0.01 }, 1e8, -40.0],
    [{ ...none, timingMismatchS: 1e-12 }, 1e8, -64.04],
    [{ ...none, timingMismatchS: 2e-12 }, 1e8, -58.02],
    [{ ...none, gainMismatch: 0.001, timingMismatchS: 2e-12 }, 1e8, -55.89],
  ])('%o at %d Hz: images of %d dB together', (interleave, hz, expectedDb) => {
    expect(Math.abs(ratioDb(hz, interleave) - expectedDb)).toBeLessThan(0.01);
  });

  // Source: the same. Rms o of full scale is a sinusoid of peak sqrt 2 o: 20 log10 o + 3.01 dBFS.
  it('four, with offsets of 0.05 % of full scale, leave lines at rate / 4 and rate / 2, -63.01 dBFS together', () => {
    const { recordedHz, togetherDbfs } = offsetLines(1e9, { ...none, converters: 4, offsetMismatch: 0.0005 })!;
    expect(recordedHz).toEqual([250e6, 500e6]);
    expect(togetherDbfs).toBeCloseTo(-63.01, 2);
  });
});

describe('shaft angle and pulses', () => {
  // Source: common practice of order tracking: N samples a turn hold orders up to N / 2.
  it('64 samples a turn hold 32 orders; the 33rd is recorded as the 31st', () => {
    const [arrival] = arrivalsOfText(`rig: R
sources: { mesh: { order: 33, speed: 600 rpm, level: 1 V } }
channels:
  a: { measures: voltage, rate: 100 kHz, band: 0 Hz .. 1 Hz, then: [{ per-turn: 64, speed: 600 rpm }] }
`);
    // 600 rpm are ten turns a second.
    expect(arrival!.recordedLowHz / 10).toBeCloseTo(31, 9);
  });

  // Source: common practice, two samples in each state; 60 teeth at 3000 rpm are 3 kHz, worked by hand.
  it('60 pulses a turn at 3000 rpm, half high, want 12 kS/s', () => {
    expect(leastPulseRateHz({ perTurn: 60, topSpeedRpm: 3000, duty: 0.5 })).toBeCloseTo(12_000, 8);
  });
});
