import { describe, expect, it } from 'vitest';
import { jitterNoiseDb } from '../../server/src/signal/jitter.ts';
import {
  idealSignalToNoiseDb,
  processingGainDb,
  quantizerNoiseRms,
  quantizerNoiseRmsInBand,
  quantizerStep,
} from '../../server/src/signal/quantizer.ts';

describe('an ideal quantizer', () => {
  // Source: Bennett, Spectra of quantized signals, 1948; IEEE Std 1241, 6.02 N + 1.76 dB; from memory.
  it.each([
    [8, 49.93],
    [12, 74.01],
    [16, 98.09],
    [24, 146.26],
  ])('of %d bits has a signal to noise ratio of %f dB', (bits, decibels) => {
    expect(idealSignalToNoiseDb(bits)).toBeCloseTo(decibels, 1);
    expect(Math.abs(idealSignalToNoiseDb(bits) - decibels)).toBeLessThan(0.006);
  });

  it('has that ratio by its step as well: a full-scale sinusoid over step / sqrt 12', () => {
    for (const bits of [1, 8, 16, 24, 32]) {
      const noise = quantizerNoiseRms(quantizerStep(20, bits));
      expect(20 * Math.log10(10 / Math.SQRT2 / noise)).toBeCloseTo(idealSignalToNoiseDb(bits), 9);
    }
  });

  it('of 16 bits over 20 V has a step of 305.2 uV', () => {
    // Source: data sheets of converters, common practice.
    expect(quantizerStep(20, 16) * 1e6).toBeCloseTo(305.18, 2);
    expect(quantizerStep(-20, 16)).toBe(quantizerStep(20, 16));
  });
});

describe('processing gain', () => {
  // Source: converter handbooks, 3 dB for each halving of the band; 10 log10(rate / (2 bandwidth)); from memory.
  it.each([
    [100e6, 50e6, 0],
    [100e6, 25e6, 3.01],
    [76.8e6, 1.25e6, 14.87],
    [78e6, 30e3, 31.14],
  ])('of %d S/s in %d Hz is %f dB', (rateHz, bandwidthHz, decibels) => {
    expect(Math.abs(processingGainDb(rateHz, bandwidthHz) - decibels)).toBeLessThan(0.006);
  });

  it('is what takes the noise down in the band, and nothing for a band that holds all of it', () => {
    const whole = quantizerNoiseRms(1e-3);
    const part = quantizerNoiseRmsInBand(1e-3, 51_200, 800);
    expect(20 * Math.log10(whole / part)).toBeCloseTo(processingGainDb(51_200, 800), 9);
    expect(processingGainDb(1000, 700)).toBe(0);
    expect(quantizerNoiseRmsInBand(1e-3, 1000, 700)).toBe(whole);
    expect(processingGainDb(1000, 0)).toBe(Infinity);
    expect(quantizerNoiseRmsInBand(1e-3, 1000, 0)).toBe(0);
  });
});

describe('jitter', () => {
  // Source: converter handbooks, signal to noise ratio 20 log10(1 / (2 pi f sigma)): 64.0 dB of 1 ps at 100 MHz, and
  // 20 dB for each tenfold; IEEE Std 1241; from memory.
  it.each([
    [100e6, 1e-12, 64.04],
    [100e6, 1e-13, 84.04],
    [10e6, 1e-12, 84.04],
    [1e3, 1e-9, 104.04],
  ])('at %d Hz of %f s is %f dB under the sinusoid', (frequencyHz, jitterS, decibels) => {
    expect(Math.abs(jitterNoiseDb(frequencyHz, jitterS, 0) + decibels)).toBeLessThan(0.006);
  });

  it('falls by the processing gain, and is not there without an uncertainty', () => {
    const gainDb = processingGainDb(76.8e6, 1.25e6);
    expect(jitterNoiseDb(70e6, 1e-12, gainDb)).toBeCloseTo(jitterNoiseDb(70e6, 1e-12, 0) - 14.87, 2);
    expect(jitterNoiseDb(1e6, 0, 0)).toBe(-Infinity);
    expect(jitterNoiseDb(0, 1e-12, 0)).toBe(-Infinity);
  });
});
