import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import { foldHz, foldsInto, foldThrough, zoneOf } from '../../server/src/signal/folding.ts';
import { kaiserBeta, kaiserLength } from '../../server/src/signal/kaiser.ts';
import { dbfsOfPeak, dbfsOfRms, fullScalePeakV, peakOfPeakToPeak, peakOfRms } from '../../server/src/signal/levels.ts';
import { sensorResponse } from '../../server/src/signal/sensor-response.ts';
import { lineAmplitudes, spectrumOf } from '../../server/src/signal/spectrum-fft.ts';

/** A CIC filter of many-fold decimation; frequencies in units of its output rate. */
function cic(order: number, delay: number) {
  const decimation = 4096;
  return digitalResponse({ response: 'cic', order, delay, decimation, tolerance: 0, passes: 1 }, decimation);
}

const ORDERS = [1, 2, 3, 4, 5, 6];

describe("Hogenauer's tables", () => {
  // Source: E. B. Hogenauer, An economical class of digital filters for decimation and interpolation, IEEE Trans.
  // ASSP 1981, table I, pass-band attenuation in dB for large rate changes; from memory.
  it.each([
    [1 / 128, [0.0, 0.0, 0.0, 0.0, 0.0, 0.01]],
    [1 / 64, [0.0, 0.01, 0.01, 0.01, 0.02, 0.02]],
    [1 / 32, [0.01, 0.03, 0.04, 0.06, 0.07, 0.08]],
    [1 / 16, [0.06, 0.11, 0.17, 0.22, 0.28, 0.34]],
    [1 / 8, [0.22, 0.45, 0.67, 0.9, 1.12, 1.35]],
    [1 / 4, [0.91, 1.82, 2.74, 3.65, 4.56, 5.47]],
  ])('table I: pass-band attenuation at %f of the output rate over the delay', (bandwidth, expected) => {
    for (const delay of [1, 2]) {
      const computed = ORDERS.map((order) => cic(order, delay).attenuationDb(bandwidth / delay));
      for (const [i, db] of computed.entries()) expect(Math.abs(db - expected[i]!)).toBeLessThanOrEqual(0.0051);
    }
  });

  // Source: the same, table II, least attenuation of what is aliased into the pass band; from memory.
  it.each([
    [1, 1 / 128, [42.1, 84.2, 126.2, 168.3, 210.4, 252.5]],
    [1, 1 / 64, [36.0, 72.0, 108.0, 144.0, 180.0, 215.9]],
    [1, 1 / 32, [29.8, 59.7, 89.5, 119.4, 149.2, 179.0]],
    [1, 1 / 16, [23.6, 47.2, 70.7, 94.3, 117.9, 141.5]],
    [1, 1 / 8, [17.1, 34.3, 51.4, 68.5, 85.6, 102.8]],
    [1, 1 / 4, [10.5, 20.9, 31.4, 41.8, 52.3, 62.7]],
    [2, 1 / 256, [48.1, 96.3, 144.4, 192.5, 240.7, 288.8]],
    [2, 1 / 128, [42.1, 84.2, 126.2, 168.3, 210.4, 252.5]],
    [2, 1 / 64, [36.0, 72.0, 108.0, 144.0, 180.0, 216.0]],
    [2, 1 / 32, [29.9, 59.8, 89.6, 119.5, 149.4, 179.3]],
    [2, 1 / 16, [23.7, 47.5, 71.2, 95.0, 118.7, 142.5]],
    [2, 1 / 8, [17.8, 35.6, 53.4, 71.3, 89.1, 106.9]],
  ])('table II: aliasing attenuation, delay %i, cutoff %f of the output rate', (delay, cutoff, expected) => {
    for (const [i, order] of ORDERS.entries()) {
      const response = cic(order, delay);
      const folded = foldsInto(0, cutoff, [1], 8).filter((piece) => piece.foldsAtStage !== null);
      const least = Math.min(...folded.map((piece) => response.leastDb(piece.trueLowHz, piece.trueHighHz)));
      expect(Math.abs(least - expected[i]!)).toBeLessThanOrEqual(0.06);
    }
  });
});

describe("Kaiser's design", () => {
  // Source: Oppenheim and Schafer, Discrete-Time Signal Processing, the Kaiser window design of a low-pass with
  // ripples of 0.001 (60 dB) between 0.4 pi and 0.6 pi: beta 5.653, order 37, 38 taps (39 when odd); from memory.
  it('of 60 dB between 0.2 and 0.3 of the rate has beta 5.653 and 38 taps, 39 when odd', () => {
    expect(kaiserBeta(60)).toBeCloseTo(5.653, 3);
    expect(kaiserLength(60, 0.2, 0.3, 1)).toBe(39);
  });

  // Source: Kaiser 1974, N = (A - 7.95) / (14.36 df / rate), worked by hand.
  it.each([
    [80, 0.1, 0.2, 53],
    [40, 0.2, 0.25, 47],
    [8, 0.1, 0.2, 3],
    [5, 0.1, 0.2, 1],
  ])('of %d dB from %f to %f of the rate has %d taps', (stopband, pass, stop, taps) => {
    expect(kaiserLength(stopband, pass, stop, 1)).toBe(taps);
  });

  it.each([40, 60, 90, 120])('achieves its %d dB but for a decibel', (stopbandDb) => {
    // Source: common practice; the length is an estimate, what is achieved is what counts.
    const response = digitalResponse(
      { response: 'kaiser', passHz: 0.15, stopHz: 0.22, stopbandDb, tolerance: 0, passes: 1 },
      1,
    );
    expect(response.leastDb(0.22, 0.5)).toBeGreaterThan(stopbandDb - 1);
  });
});

describe('sampling', () => {
  // Source: common practice, the spectrum of a stream of which every 5th (10th) sample is kept.
  it.each([
    [1, [1, 19, 21, 39, 41, 59, 61, 79, 81, 99], 5],
    [0, [0, 20, 40, 60, 80], 5],
    [0, [0, 10, 20, 30, 40, 50, 60, 70, 80, 90], 10],
  ])('a tone at %d Hz, 100 samples a second, stands at its images after keeping some', (toneHz, images, keep) => {
    // A second of samples, zeros in place of those left out, seen on the old axis.
    const kept = Array.from({ length: 100 }, (_, n) =>
      n % keep === 0 ? Math.cos((2 * Math.PI * toneHz * n) / 100) : 0,
    );
    const whole = Array.from({ length: 100 }, (_, n) => Math.cos((2 * Math.PI * toneHz * n) / 100));
    const magnitudeAt = (samples: readonly number[], hz: number): number =>
      Math.hypot(
        samples.reduce((sum, x, n) => sum + x * Math.cos((2 * Math.PI * hz * n) / 100), 0),
        samples.reduce((sum, x, n) => sum + x * Math.sin((2 * Math.PI * hz * n) / 100), 0),
      );
    const lines = Array.from({ length: 100 }, (_, hz) => hz).filter((hz) => magnitudeAt(kept, hz) > 1e-9);
    expect(lines).toEqual(images);
    for (const hz of lines) expect(magnitudeAt(kept, hz)).toBeCloseTo(magnitudeAt(whole, toneHz) / keep, 9);
    // And each of them is what the folding says ends at the tone's frequency.
    for (const hz of lines) expect(foldHz(hz, 100 / keep)).toBe(toneHz);
    const computed = foldsInto(toneHz, toneHz, [100 / keep], 99.5).map((piece) => piece.trueLowHz);
    expect(computed).toEqual(images);
  });

  it('a chain of 100 samples a second, every 5th kept, ends at a Nyquist frequency of 10 Hz', () => {
    // Source: common practice.
    expect(foldThrough(9, 9, [100, 20])[0]).toMatchObject({ recordedLowHz: 9, foldsAtStage: null, mirrored: false });
    expect(foldThrough(11, 11, [100, 20])[0]).toMatchObject({ recordedLowHz: 9, foldsAtStage: 2, mirrored: true });
    expect(foldThrough(101, 101, [100, 20])[0]).toMatchObject({ recordedLowHz: 1, foldsAtStage: 1, mirrored: false });
  });

  it('records mains at 50.2 Hz, sampled 10 times a second, at 0.2 Hz', () => {
    // Source: common practice; 50.2 - 5 x 10.
    expect(foldHz(50.2, 10)).toBeCloseTo(0.2, 12);
    expect(zoneOf(50.2, 10)).toBe(11);
  });

  it('folds 16 kHz at 25.6 kS/s to 9.6 kHz, in the second zone, mirrored', () => {
    // Source: common practice; 25.6 - 16.
    expect(foldHz(16_000, 25_600)).toBe(9600);
    expect(zoneOf(16_000, 25_600)).toBe(2);
    expect(foldThrough(15_900, 16_100, [25_600])).toMatchObject([
      { recordedLowHz: 9500, recordedHighHz: 9700, mirrored: true },
    ]);
  });
});

describe('responses worked by hand', () => {
  it('an aperture of 20 ms takes 39.9 dB off 49.5 Hz and everything off 50 Hz', () => {
    // Source: the integral of a sinusoid, sin(x) / x at x = 0.99 pi.
    const aperture = analogueResponse({ response: 'aperture', timeS: 0.02, tolerance: 0 });
    expect(aperture.attenuationDb(49.5)).toBeCloseTo(39.9, 1);
    expect(aperture.attenuationDb(50)).toBe(Infinity);
  });

  it('an order 6 Butterworth at 8 kHz takes 36.12 dB off 16 kHz and 11.9 dB off 10 kHz', () => {
    // Source: Butterworth 1930, 10 log10(1 + 2^12) = 36.125.
    const edge = { at: 'cutoff', lowHz: 8000, highHz: 8000 } as const;
    const card = analogueResponse({ response: 'butterworth', order: 6, shape: 'low-pass', edge, tolerance: 0 });
    expect(card.attenuationDb(16_000)).toBeCloseTo(36.125, 3);
    expect(card.attenuationDb(10_000)).toBeCloseTo(11.9, 1);
  });

  it('a mounted resonance at 27 kHz lifts 10 kHz by 1.28 dB', () => {
    // Source: common practice, the second-order response of a mounted accelerometer, Q 30.
    const stud = sensorResponse({ resonanceHz: 27_000, q: 30 });
    expect(stud.attenuationDb(10_000)).toBeCloseTo(-1.28, 2);
    expect(stud.leastDb(0, 50_000)).toBeCloseTo(-20 * Math.log10(30), 2);
  });

  it('an even-order Chebyshev filter starts at its ripple', () => {
    // Source: Chebyshev polynomials, |T(0)| = 1 at even order.
    const edge = { at: 'cutoff', lowHz: 1, highHz: 1 } as const;
    const build = (order: number) =>
      analogueResponse({ response: 'chebyshev', order, rippleDb: 0.5, shape: 'low-pass', edge, tolerance: 0 });
    expect(build(4).attenuationDb(0)).toBeCloseTo(0.5, 12);
    expect(build(5).attenuationDb(0)).toBeCloseTo(0, 12);
  });

  it('Bessel of order 2 follows its polynomial, s^2 + 3 s + 3', () => {
    // Source: Thomson 1949; |H|^2 = 9 / (w^4 + 3 w^2 + 9), half at w^2 = (sqrt 45 - 3) / 2.
    const edge = { at: 'cutoff', lowHz: 1, highHz: 1 } as const;
    const bessel = analogueResponse({ response: 'bessel', order: 2, shape: 'low-pass', edge, tolerance: 0 });
    const cutoffSquare = (Math.sqrt(45) - 3) / 2;
    for (const hz of [0.3, 1, 2, 20]) {
      const y = hz * hz * cutoffSquare;
      expect(bessel.attenuationDb(hz)).toBeCloseTo(10 * Math.log10((y * y + 3 * y + 9) / 9), 10);
    }
  });
});

describe('levels', () => {
  it('reads full scale as half the span over the gain', () => {
    // Source: common practice, as for converters specified in IEEE Std 1241.
    expect(fullScalePeakV(-10, 10, 1)).toBe(10);
    expect(fullScalePeakV(0, 5, 1)).toBe(2.5);
    expect(fullScalePeakV(-10, 10, 10)).toBe(1);
  });

  it('places 400 mV peak 27.96 dB below ±10 V, and a full-scale sinusoid at 0 dBFS however it is stated', () => {
    // Source: 20 log10(0.4 / 10).
    expect(dbfsOfPeak(0.4, 10)).toBeCloseTo(-27.9588, 4);
    expect(dbfsOfPeak(10, 10)).toBe(0);
    expect(dbfsOfRms(10 / Math.SQRT2, 10)).toBeCloseTo(0, 12);
    expect(dbfsOfPeak(peakOfPeakToPeak(20), 10)).toBe(0);
    expect(peakOfRms(1)).toBe(Math.SQRT2);
  });

  it('finds the peak of a sinusoid, and a constant, in the transform of a record', () => {
    // Source: the discrete Fourier transform of a tone on a bin.
    const samples = Array.from({ length: 64 }, (_, n) => 0.25 + 3 * Math.cos((2 * Math.PI * 5 * n) / 64 + 1));
    const lines = lineAmplitudes(samples);
    expect(lines[0]).toBeCloseTo(0.25, 12);
    expect(lines[5]).toBeCloseTo(3, 12);
    expect(lines[6]).toBeCloseTo(0, 12);
    expect(spectrumOf([1, 2, 3]).size).toBe(4);
  });
});
