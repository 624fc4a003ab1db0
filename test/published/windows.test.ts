import { describe, expect, it } from 'vitest';
import { effectiveAverages, planSpectrum } from '../../server/src/signal/spectrum-plan.ts';
import { overlapCorrelation, type WindowFigures, windowFigures } from '../../server/src/signal/window-figures.ts';
import { sideLobeEnvelopeDb } from '../../server/src/signal/window-leakage.ts';
import { WINDOW_NAMES, type WindowName, windowSamples } from '../../server/src/signal/windows.ts';
import { readTables } from './tables.ts';

interface WindowTables {
  readonly madeBy: { readonly scipy: string };
  readonly offsetsBins: readonly number[];
  readonly overlaps: readonly number[];
  readonly flatTopOfSciPy: readonly number[];
  readonly tables: readonly {
    readonly window: WindowName;
    readonly samples: readonly number[];
    readonly figures: Omit<WindowFigures, 'sideLobeFallDbPerOctave'>;
    readonly leakageDb: readonly number[];
    readonly overlapCorrelation: readonly number[];
  }[];
}

/** A figure that is not compared, for the reason said beside the table. */
const LEFT_OUT = Number.NaN;

describe("Harris's table 1", () => {
  // Source: F. J. Harris, On the use of windows for harmonic analysis with the discrete Fourier transform, Proc. IEEE
  // 1978, table 1; from memory. Columns: highest side lobe (dB), fall (dB an octave), coherent gain, noise bandwidth
  // (bins), 3 dB bandwidth, scalloping (dB), 6 dB bandwidth, overlap correlation at 75 % and 50 %.
  //
  // Left out, because the figures as remembered do not follow from the shapes (SciPy's windows, below, agree with
  // ours): both bandwidths of blackman (1.68, 2.35) and of three terms (1.66, 1.81), the 6 dB bandwidth of four terms
  // (2.72), the side lobe of three terms (-67), the exact Blackman and the Gaussians as a whole.
  it.each<readonly [WindowName, readonly number[]]>([
    ['rectangle', [-13, 6, 1.0, 1.0, 0.89, 3.92, 1.21, 75.0, 50.0]],
    ['triangle', [-27, 12, 0.5, 1.33, 1.28, 1.82, 1.78, 71.9, 25.0]],
    ['hann', [-32, 18, 0.5, 1.5, 1.44, 1.42, 2.0, 65.9, 16.7]],
    ['hamming', [-43, 6, 0.54, 1.36, 1.3, 1.78, 1.81, 70.7, 23.5]],
    ['tukey-0.25', [-14, 18, 0.88, 1.1, 1.01, 2.96, 1.38, 74.1, 44.4]],
    ['tukey-0.5', [-15, 18, 0.75, 1.22, 1.15, 2.24, 1.57, 72.7, 36.4]],
    ['tukey-0.75', [-19, 18, 0.63, 1.36, 1.31, 1.73, 1.8, 70.5, 25.1]],
    ['kaiser-bessel-2', [-46, 6, 0.49, 1.5, 1.43, 1.46, 1.99, 65.7, 16.9]],
    ['kaiser-bessel-2.5', [-57, 6, 0.44, 1.65, 1.57, 1.2, 2.2, 59.5, 11.2]],
    ['kaiser-bessel-3', [-69, 6, 0.4, 1.8, 1.71, 1.02, 2.39, 53.9, 7.4]],
    ['kaiser-bessel-3.5', [-82, 6, 0.37, 1.93, 1.83, 0.89, 2.57, 48.8, 4.8]],
    ['blackman', [-58, 18, 0.42, 1.73, LEFT_OUT, 1.1, LEFT_OUT, 56.7, 9.0]],
    ['blackman-harris-3', [LEFT_OUT, 6, 0.42, 1.71, LEFT_OUT, 1.13, LEFT_OUT, 57.2, 9.6]],
    ['blackman-harris', [-92, 6, 0.36, 2.0, 1.9, 0.83, LEFT_OUT, 46.0, 3.8]],
  ])('%s', (window, published) => {
    const figures = windowFigures(window);
    const computed = [
      figures.highestSideLobeDb,
      figures.sideLobeFallDbPerOctave,
      figures.coherentGain,
      figures.noiseBandwidthBins,
      figures.bandwidth3DbBins,
      figures.scallopingLossDb,
      figures.bandwidth6DbBins,
      100 * overlapCorrelation(window, 0.75),
      100 * overlapCorrelation(window, 0.5),
    ];
    const allowed = [0.95, 0.1, 0.01, 0.01, 0.01, 0.05, 0.01, 0.2, 0.2];
    expect(published.length).toBe(computed.length);
    for (const [i, figure] of published.entries()) {
      if (!Number.isNaN(figure)) expect(Math.abs(computed[i]! - figure)).toBeLessThanOrEqual(allowed[i]!);
    }
  });
});

describe('windows against SciPy', () => {
  // Source: SciPy 1.17 (scipy.signal.windows), through make-window-tables.py beside this file.
  const { madeBy, offsetsBins, overlaps, flatTopOfSciPy, tables } = readTables<WindowTables>('./windows.json');

  it('reads a table of SciPy 1.17 for every window', () => {
    expect(madeBy.scipy).toMatch(/^1\.17\./);
    expect(tables.map(({ window }) => window)).toEqual(WINDOW_NAMES);
  });

  it.each(tables)('$window', ({ window, samples, figures, leakageDb, overlapCorrelation: correlations }) => {
    const own = windowSamples(window, samples.length);
    for (const [n, weight] of samples.entries()) expect(Math.abs(own[n]! - weight)).toBeLessThan(1e-10);
    const computed = windowFigures(window);
    for (const name of ['coherentGain', 'noiseBandwidthBins', 'bandwidth3DbBins', 'bandwidth6DbBins'] as const) {
      expect(Math.abs(computed[name] - figures[name]), name).toBeLessThan(1e-6);
    }
    expect(Math.abs(computed.scallopingLossDb - figures.scallopingLossDb)).toBeLessThan(1e-5);
    expect(Math.abs(computed.highestSideLobeDb - figures.highestSideLobeDb)).toBeLessThan(0.005);
    for (const [i, overlap] of overlaps.entries()) {
      expect(Math.abs(overlapCorrelation(window, overlap) - correlations[i]!)).toBeLessThan(5e-4);
    }
    for (const [i, offset] of offsetsBins.entries()) {
      const spareDb = sideLobeEnvelopeDb(window, offset) - leakageDb[i]!;
      expect(spareDb, `${offset} bins`).toBeGreaterThan(-1e-6);
    }
  });

  it("the flat top is SciPy's but for the digits that the standard gives", () => {
    const own = windowSamples('flat-top', flatTopOfSciPy.length);
    for (const [n, weight] of flatTopOfSciPy.entries()) expect(Math.abs(own[n]! - weight)).toBeLessThan(5e-4);
  });
});

describe('averages', () => {
  it('triangles that overlap by half are correlated by a quarter', () => {
    // Source: Welch, The use of fast Fourier transform for the estimation of power spectra, IEEE Trans. 1967, where
    // the square, 1/16, stands in the variance; from memory.
    expect(overlapCorrelation('triangle', 0.5)).toBeCloseTo(1 / 4, 4);
    expect(effectiveAverages('triangle', 0.5, 1e6) / 1e6).toBeCloseTo(1 / (1 + 2 / 16), 4);
  });

  it.each(['hann', 'hamming', 'blackman-harris', 'kaiser-bessel-2.5'] as const)(
    "Harris's variance of averages under 50 and 75 %% overlap: %s",
    (window) => {
      // Source: Harris 1978, the equations after that of c(r), where c(0.25) is left out as small; from memory.
      const [half, most] = [overlapCorrelation(window, 0.5) ** 2, overlapCorrelation(window, 0.75) ** 2];
      for (const count of [2, 4, 10, 100]) {
        const atHalf = (1 + 2 * half) / count - (2 * half) / count ** 2;
        const atMost = (1 + 2 * most + 2 * half) / count - (2 * (most + 2 * half)) / count ** 2;
        expect(effectiveAverages(window, 0.5, count) * atHalf).toBeCloseTo(1, 6);
        // With two averages there is no second neighbour, which the equation counts all the same.
        if (count > 2) expect(Math.abs(effectiveAverages(window, 0.75, count) * atMost - 1)).toBeLessThan(2e-3);
      }
    },
  );

  it('a hundred independent averages leave 10 %', () => {
    // Source: Bendat and Piersol, Random Data, normalised random error of an auto-spectrum, 1 / sqrt(n_d); from memory.
    const settings = { length: { by: 'lines', lines: 400 }, window: 'hann', overlap: 0, averages: 100 } as const;
    expect(planSpectrum(settings, 2560)?.randomError).toBe(0.1);
  });
});
