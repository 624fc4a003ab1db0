import { describe, expect, it } from 'vitest';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import { type NoiseBand, noiseBandwidth } from '../../server/src/signal/noise-bandwidth.ts';
import type { Response } from '../../server/src/signal/response.ts';
import { sensorResponse } from '../../server/src/signal/sensor-response.ts';
import { spectrumOf } from '../../server/src/signal/spectrum-fft.ts';
import {
  butterworthDesign,
  chebyshevDesign,
  kaiserDesign,
  keepEvery,
  type RunnableFilter,
  repeatedMean,
  run,
  runningMean,
} from './run-filters.ts';

/** A million samples and a few more, which are dropped with what the filters start with. */
const SAMPLES = 2 ** 20;
const SETTLING = 4096;

const RATE_HZ = 51_200;

/** White noise of rms 1: a generator by Marsaglia (xorshift, 32 bits), 12 uniform numbers to a normal one. */
function whiteNoise(seed: number, length: number): Float64Array {
  let state = seed;
  const uniform = (): number => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
  return Float64Array.from({ length }, () => {
    let sum = -6;
    for (let n = 0; n < 12; n++) sum += uniform();
    return sum;
  });
}

/** Mean square of what a record holds between two frequencies. */
function powerWithin(record: Float64Array, rateHz: number, { lowHz, highHz }: NoiseBand): number {
  const { size, re, im } = spectrumOf(record);
  let power = 0;
  for (let bin = 1; bin < size / 2; bin++) {
    const hz = (bin * rateHz) / size;
    if (hz >= lowHz && hz <= highHz) power += (2 * (re[bin]! ** 2 + im[bin]! ** 2)) / size ** 2;
  }
  return power;
}

interface Step {
  /** The filter that is run, and what the program under test says of it. */
  readonly filter: { readonly runs: RunnableFilter; readonly response: Response } | undefined;
  readonly factor: number;
}

function step(factor: number, runs?: RunnableFilter, response?: Response): Step {
  return { factor, filter: runs && response ? { runs, response } : undefined };
}

const once = { tolerance: 0, passes: 1 } as const;

function lowPass(order: number, cutoff: number, rateHz: number): readonly [RunnableFilter, Response] {
  const edge = { at: 'cutoff', lowHz: cutoff * rateHz, highHz: cutoff * rateHz } as const;
  return [
    butterworthDesign(order, cutoff),
    digitalResponse({ response: 'butterworth', order, shape: 'low-pass', edge, ...once }, rateHz),
  ];
}

function rippled(order: number, edgePart: number, rateHz: number): readonly [RunnableFilter, Response] {
  const edge = { at: 'pass-edge', lowHz: edgePart * rateHz, highHz: edgePart * rateHz } as const;
  return [
    chebyshevDesign(order, 0.5, edgePart),
    digitalResponse({ response: 'chebyshev', order, rippleDb: 0.5, shape: 'low-pass', edge, ...once }, rateHz),
  ];
}

function windowed(pass: number, stop: number, rateHz: number): readonly [RunnableFilter, Response] {
  return [
    kaiserDesign(pass, stop, 60),
    digitalResponse(
      { response: 'kaiser', passHz: pass * rateHz, stopHz: stop * rateHz, stopbandDb: 60, ...once },
      rateHz,
    ),
  ];
}

function combs(order: number, decimation: number, rateHz: number): readonly [RunnableFilter, Response] {
  return [
    repeatedMean(decimation, order),
    digitalResponse({ response: 'cic', order, delay: 1, decimation, ...once }, rateHz),
  ];
}

function mean(length: number, rateHz: number): readonly [RunnableFilter, Response] {
  return [runningMean(length), digitalResponse({ response: 'moving-average', length, ...once }, rateHz)];
}

const CHAINS: readonly (readonly [string, readonly Step[], number, number])[] = [
  ['every 4th sample, no filter', [step(4)], 500, 3000],
  ['a filter of order 4 that lets much fold', [step(4, ...lowPass(4, 0.2, RATE_HZ))], 2000, 6000],
  ['a filter of order 8, little folded', [step(4, ...lowPass(8, 0.1, RATE_HZ))], 0, 5000],
  ['a windowed sinc', [step(2, ...windowed(0.2, 0.3, RATE_HZ))], 8000, 12_800],
  ['integrators and combs', [step(8, ...combs(2, 8, RATE_HZ))], 1000, 3200],
  ['a running mean and every 5th', [step(5, ...mean(5, RATE_HZ))], 2000, 5120],
  [
    'two steps, each with its own filter',
    [step(2, ...rippled(3, 0.22, RATE_HZ)), step(3, ...lowPass(2, 0.15, RATE_HZ / 2))],
    1000,
    4000,
  ],
  ['a filter, then one behind the last step', [step(4), step(1, ...lowPass(3, 0.15, RATE_HZ / 4))], 0, 3000],
];

describe('noise, rehearsed', () => {
  it.each(CHAINS)('%s: the variance in the band is what the budget says, within 0.3 dB', (_, steps, lowHz, highHz) => {
    let record: Float64Array = whiteNoise(20_250_611, SAMPLES + SETTLING);
    const power = record.reduce((sum, value) => sum + value * value, 0) / record.length;
    expect(Math.abs(power - 1)).toBeLessThan(0.01);
    const ratesHz = [RATE_HZ];
    const responses: Response[][] = [[], []];
    let rateHz = RATE_HZ;
    for (const { filter, factor } of steps) {
      record = keepEvery(factor, filter ? run(filter.runs, record) : record);
      rateHz /= factor;
      if (filter) responses[responses.length - 1]!.push(filter.response);
      if (factor === 1) continue;
      ratesHz.push(rateHz);
      responses.push([]);
    }
    const band: NoiseBand = { lowHz, highHz, sampling: 'baseband' };
    const path = { ratesHz, responses, sensor: sensorResponse({ q: 1 }) };
    const share = noiseBandwidth(path, band, { at: 'record', stage: 1 });
    // Of noise of rms 1, white up to half the rate.
    const density = 1 / (RATE_HZ / 2);
    if (share.kind === 'unbounded') throw new Error('bounded noise was due');
    // The last power of two of the record, so that the transform has no padding.
    const length = 2 ** Math.floor(Math.log2(record.length));
    const found = powerWithin(record.slice(-length), rateHz, band);
    expect(Math.abs(10 * Math.log10(found / (density * (share.nativeHz + share.foldedHz))))).toBeLessThan(0.3);
  });
});
