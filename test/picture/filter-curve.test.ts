import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { logarithmicTicks } from '../../server/src/picture/axis.ts';
import { filterCurveCharacters } from '../../server/src/picture/filter-curve-characters.ts';
import { acrossAt, downAt, layOutCurve } from '../../server/src/picture/filter-curve-layout.ts';
import type { FilterCurve } from '../../server/src/picture/filter-curve-model.ts';
import { decibelsOff } from '../../server/src/picture/filter-curve-model.ts';
import { filterCurveSvg } from '../../server/src/picture/filter-curve-svg.ts';
import type { PictureTheme } from '../../server/src/picture/palette.ts';
import { foldHz } from '../../server/src/signal/folding.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import type { DrawnFilter } from './curves.ts';
import { CURVES, curvesOf } from './curves.ts';
import { drawnTexts, faultsOfTexts, viewBoxOf } from './svg-text.ts';
import { malformed } from './well-formed.ts';

const THEMES: readonly PictureTheme[] = ['light', 'dark', 'high-contrast', 'high-contrast-light', 'neutral'];
const NAMED = CURVES.map((drawn) => [drawn.name, drawn] as const);

function curveNamed(name: string): DrawnFilter {
  return CURVES.find((one) => one.name === name)!;
}

/** Attenuation of a Butterworth low-pass, dB: 10 log10(1 + (f / fc)^2n). Source: Oppenheim and Schafer, appendix B. */
function butterworthDb(hz: number, cutoffHz: number, order: number): number {
  return 10 * Math.log10(1 + (hz / cutoffHz) ** (2 * order));
}

/** The points of every path of a picture that has an attribute. */
function pathsWith(svg: string, attribute: string): readonly (readonly (readonly [x: number, y: number])[])[] {
  return [...svg.matchAll(/<path ([^>]*)\/>/g)]
    .filter(([, attributes]) => attributes!.includes(attribute))
    .flatMap(([, attributes]) => / ?d="([^"]*)"/.exec(attributes!)![1]!.split('M').slice(1))
    .map((line) =>
      line.split('L').map((point) => point.split(' ').map(Number) as unknown as readonly [number, number]),
    );
}

const LINE = 'stroke-width="1.7"';

describe('the picture of a filter', () => {
  it.each(NAMED)('%s is well-formed, and small enough for a hover, in every theme', (_name, { curve }) => {
    for (const theme of THEMES) {
      const svg = filterCurveSvg(curve, theme);
      expect(malformed(svg)).toBeUndefined();
      expect(svg).not.toMatch(/NaN|Infinity|undefined/);
      expect(svg.length).toBeLessThanOrEqual(20_000);
      const { width, height } = viewBoxOf(svg);
      expect(width).toBeLessThanOrEqual(520);
      expect(height).toBeLessThanOrEqual(230);
    }
  });

  it.each(NAMED)('%s has no text cut or on another', (_name, { curve }) => {
    expect(faultsOfTexts(filterCurveSvg(curve, 'light'))).toEqual([]);
  });

  it.each(NAMED)('%s labels every mark that it draws, and counts the others', (_name, { curve }) => {
    const svg = filterCurveSvg(curve, 'light');
    const texts = drawnTexts(svg).map(({ text }) => text);
    const labelled = curve.marks.filter(({ name }) => texts.some((text) => text.startsWith(name))).length;
    const counted = /(\d+) more not marked/.exec(svg)?.[1];
    expect(labelled + Number(counted ?? 0)).toBe(curve.marks.length + curve.leftOut);
    expect(texts.some((text) => text.startsWith('first fold'))).toBe(curve.folds.length > 0);
  });

  it('shows where the worked example begins to fold, what is taken off there, and what spoils the band', () => {
    const { curve } = curvesOf(EXTRACT_FAN)[0]!;
    const texts = drawnTexts(filterCurveSvg(curve, 'light')).map(({ text }) => text);
    // 25.6 kHz - 10 kHz, and a carrier at 16 kHz, through a sixth-order Butterworth at 8 kHz.
    expect(texts).toContain(`Nyquist 12.8 kHz: ${butterworthDb(12_800, 8_000, 6).toFixed(1)} dB`);
    expect(texts).toContain(`first fold into the band 15.6 kHz: ${butterworthDb(15_600, 8_000, 6).toFixed(1)} dB`);
    expect(texts).toContain(`inverter 16 kHz: ${butterworthDb(16_000, 8_000, 6).toFixed(1)} dB`);
    expect(texts).toContain('band 10 Hz .. 10 kHz');
    expect(texts).toContain('folds into the band');
  });

  it('draws the line where the formula has it, to half a pixel', () => {
    const { curve } = curvesOf(EXTRACT_FAN)[0]!;
    const layout = layOutCurve(curve);
    const [line] = pathsWith(filterCurveSvg(curve, 'light'), LINE);
    expect(line!.length).toBeGreaterThan(10);
    for (const [x, y] of line!) {
      const { from, to, low, high } = layout.frequencyAxis;
      const hz = 10 ** (low + ((x - from) / (to - from)) * (high - low));
      // Half a pixel down, and what a tenth of a pixel across is worth on a steep line.
      expect(y).toBeGreaterThan(downAt(layout, butterworthDb(hz / 1.001, 8_000, 6)) - 0.5);
      expect(y).toBeLessThan(downAt(layout, butterworthDb(hz * 1.001, 8_000, 6)) + 0.5);
    }
  });

  it('ends the line at the end of the scale instead of running along it', () => {
    for (const { curve } of CURVES) {
      const { to: bottom } = layOutCurve(curve).attenuationAxis;
      for (const line of pathsWith(filterCurveSvg(curve, 'light'), LINE)) {
        const level = line.filter(
          ([x, y], index) => index > 0 && y >= bottom && line[index - 1]![1] >= bottom && x - line[index - 1]![0] > 3,
        );
        expect(level).toEqual([]);
      }
    }
  });

  it('is dashed between the pass and the stop of a mask, with its tolerance, and nowhere else', () => {
    const { curve } = curveNamed('promised in a');
    const layout = layOutCurve(curve);
    const svg = filterCurveSvg(curve, 'light');
    const dashed = pathsWith(svg, 'stroke-dasharray="5 4"');
    expect(dashed).toHaveLength(1);
    expect(dashed[0]![0]![0]).toBeCloseTo(acrossAt(layout, 10_000 * 0.97), 0);
    expect(dashed[0]!.at(-1)![0]).toBeCloseTo(acrossAt(layout, 15_000 * 1.03), 0);
    const solid = pathsWith(svg, LINE).flat();
    expect(solid.filter(([x]) => x > acrossAt(layout, 9_750) && x < acrossAt(layout, 15_400))).toEqual([]);
    for (const { name, curve: other } of CURVES) {
      if (name === 'promised in a') continue;
      expect(pathsWith(filterCurveSvg(other, 'light'), 'stroke-dasharray="5 4"')).toEqual([]);
    }
  });

  it('has the worst that a tolerance allows as thin lines on either side, and none without a tolerance', () => {
    for (const { curve, place } of CURVES) {
      const tolerance = place.filter.use?.filter?.tolerance ?? 0;
      const isMask = curve.unpromised !== undefined;
      expect(curve.worst.length > 0).toBe(tolerance > 0 && !isMask);
      for (const { hz, leastDb, greatestDb } of curve.worst) {
        const nominal = place.filter.response.attenuationDb(hz);
        expect(leastDb).toBeLessThanOrEqual(nominal + 1e-9);
        expect(greatestDb).toBeGreaterThanOrEqual(nominal - 1e-9);
      }
    }
    const { curve } = curveNamed('one-pole in e');
    // A single pole is 10 log10(1 + (f / fc)^2) down, and its corner may be 20 % off either way.
    for (const { hz, leastDb, greatestDb } of curve.worst) {
      expect(leastDb).toBeCloseTo(butterworthDb(hz, 12_000 * 1.2, 1), 6);
      expect(greatestDb).toBeCloseTo(butterworthDb(hz, 12_000 * 0.8, 1), 6);
    }
    expect(filterCurveSvg(curve, 'light').split('stroke-width="0.8"').length - 1).toBe(3);
  });

  it('never shows more taken off than there is, however narrow the lobes', () => {
    for (const name of ['long in f', 'comb in g', 'boxcar in g']) {
      const { curve, place } = curveNamed(name);
      for (const [index, { hz, attenuationDb }] of curve.line.entries()) {
        const next = curve.line[index + 1];
        if (!next) continue;
        for (let part = 0; part <= 1; part += 1 / 16) {
          const actual = place.filter.response.attenuationDb(hz * (next.hz / hz) ** part);
          expect(actual).toBeGreaterThan(Math.min(attenuationDb, next.attenuationDb) - 1.01);
        }
      }
    }
    expect(curveNamed('long in f').curve.line.some(({ attenuationDb, downToDb }) => downToDb > attenuationDb)).toBe(
      true,
    );
  });

  it('has a text alternative', () => {
    const { curve } = curvesOf(EXTRACT_FAN)[0]!;
    const svg = filterCurveSvg(curve, 'light');
    expect(svg).toContain('role="img"');
    expect(svg).toContain('<title>card in bearing-drive-end</title>');
    const told = /<desc>(.*?)<\/desc>/.exec(svg)?.[1];
    expect(told).toContain('The filter takes at most 11.9 dB off the band, 10 Hz to 10 kHz.');
    expect(told).toContain('15.6 kHz, the nearest to the band that folds into it: 34.8 dB.');
    expect(told).toContain('inverter at 16 kHz, folded, spoils the band: 36.1 dB.');
    const promise = curveNamed('promised in a').curve.description;
    expect(promise).toContain('promises nothing for part of the band');
    expect(promise).toContain('Between 9.7 kHz and 15.45 kHz nothing is promised.');
    expect(promise).toContain('good to 3 %');
    expect(curveNamed('boxcar in g').curve.description).toContain('takes everything off part of the band');
  });

  it('tells what is what by shape, so that it reads without colour', () => {
    const svg = filterCurveSvg(curvesOf(EXTRACT_FAN)[0]!.curve, 'light');
    expect(svg).toMatch(/d="M[\d. ]+l5\.5 9\.5h-11z"/);
    expect(svg).toContain('stroke-dasharray="3 2"');
    expect(svg).toContain('stroke-dasharray="2 3"');
  });

  it('escapes names, whatever is in them', () => {
    const text = EXTRACT_FAN.replaceAll('card', '"<i>&\\"k"').replaceAll('inverter', '"<b>&\\"quote"');
    const [drawn] = curvesOf(text);
    const svg = filterCurveSvg(drawn!.curve, 'dark');
    expect(malformed(svg)).toBeUndefined();
    expect(svg).toContain('&lt;i&gt;');
  });

  it('stays legible and within a hover with 1,000 sources', () => {
    const tones = Array.from(
      { length: 1_000 },
      (_, index) => `  tone-${index}: { frequency: ${15_600 + index} Hz, level: ${400 - index / 10} mV }\n`,
    );
    const { curve } = curvesOf(EXTRACT_FAN.replace('sources:\n', `sources:\n${tones.join('')}`))[0]!;
    const svg = filterCurveSvg(curve, 'high-contrast');
    expect(faultsOfTexts(svg)).toEqual([]);
    expect(svg).toMatch(/99\d more not marked/);
    expect(Buffer.from(svg).toString('base64').length).toBeLessThan(48_000);
  });
});

describe('the model of a filter curve', () => {
  it.each(NAMED)('%s has its marks where the filter meets them, within the axis', (_name, { curve, place, chain }) => {
    expect(curve.lowHz).toBeGreaterThan(0);
    expect(curve.highHz).toBeGreaterThan(curve.lowHz);
    for (const { hz, attenuationDb } of curve.marks) {
      expect(hz).toBeGreaterThanOrEqual(curve.lowHz);
      expect(hz).toBeLessThanOrEqual(curve.highHz);
      expect(attenuationDb).toBe(place.filter.response.attenuationDb(hz));
      if (place.stage > 0) expect(hz).toBeLessThanOrEqual((chain.ratesHz[place.stage - 1]! / 2) * (1 + 1e-9));
    }
  });

  it.each(NAMED)(
    '%s counts as folding only what ends in the band, by the fold formula',
    (_name, { curve, place, chain }) => {
      const after = chain.ratesHz.slice(place.stage);
      const recorded = (hz: number): number => after.reduce(foldHz, hz);
      const ends = [chain.bandLowHz, chain.bandHighHz].map((hz) => chain.ratesHz.reduce(foldHz, hz));
      // A band that straddles a multiple of half the rate is folded on itself, and has no two ends.
      if (curve.band.length !== 1) return;
      // Past 512 ranges one that is wider than the band stands for all beyond.
      const widest = (chain.bandHighHz - chain.bandLowHz) * (1 + 1e-9);
      for (const { lowHz, highHz } of curve.folds.filter((fold) => fold.highHz - fold.lowHz <= widest)) {
        for (const part of [0.001, 0.5, 0.999]) {
          const hz = recorded(lowHz + (highHz - lowHz) * part);
          expect(hz).toBeGreaterThanOrEqual(Math.min(...ends) * (1 - 1e-9) - 1e-6);
          expect(hz).toBeLessThanOrEqual(Math.max(...ends) * (1 + 1e-9) + 1e-6);
        }
      }
      // Behind the last sampling nothing folds any more.
      if (after.length === 0) expect(curve.folds).toEqual([]);
    },
  );

  it('shows a filter behind a sampling over the samples own axis, up to half their rate', () => {
    expect(curveNamed('long in f').curve.highHz).toBe(25_600);
    expect(curveNamed('boxcar in g').curve.highHz).toBe(1_600);
  });

  it('finds the band and what folds into it where the band itself is folded on purpose', () => {
    const { curve } = curveNamed('narrow in h');
    expect(curve.band).toEqual([{ lowHz: 70_500, highHz: 72_500 }]);
    // At 20 kHz the band is recorded at 7.5 .. 9.5 kHz, as are 67.5 .. 69.5 kHz, its mirror about 70 kHz.
    expect(curve.folds.some(({ lowHz, highHz }) => lowHz === 67_500 && highHz === 69_500)).toBe(true);
    expect(curve.folds.some(({ lowHz, highHz }) => lowHz < 72_500 && highHz > 70_500)).toBe(false);
  });

  it('says what is taken off in a decimal, and everything where nothing is left', () => {
    expect(decibelsOff(34.8049)).toBe('34.8 dB');
    expect(decibelsOff(-0.01)).toBe('0.0 dB');
    expect(decibelsOff(Infinity)).toBe('everything');
  });
});

describe('the filter curve in characters', () => {
  it.each(NAMED)('%s fits a terminal and explains every letter', (_name, { curve }) => {
    for (const ascii of [true, false]) {
      const drawing = filterCurveCharacters(curve, { ascii });
      for (const line of drawing.split('\n')) expect([...line].length).toBeLessThanOrEqual(78);
      expect(drawing).not.toMatch(/NaN|Infinity|undefined/);
      if (ascii) expect(drawing).toMatch(/^[\x20-\x7e\n]*$/);
      const rows = drawing
        .split('\n')
        .filter((line) => /^ *[-\d]* [│|]/.test(line))
        .map((line) => line.slice(11));
      for (const [index, { longName }] of curve.marks.entries()) {
        const letter = 'abcdefghijklmnopqrstuvw'[index]!;
        expect(rows.join('')).toContain(letter);
        expect(drawing).toContain(`${letter} ${ascii ? longName.replaceAll('×', 'x') : longName}`);
      }
    }
  });

  it('tells apart what is promised, what folds and what a tolerance allows', () => {
    const promised = filterCurveCharacters(curveNamed('promised in a').curve, { ascii: true });
    expect(promised).toContain(': nothing is promised');
    expect(promised).toContain('x folds into the band');
    expect(filterCurveCharacters(curveNamed('steep in b').curve, { ascii: false })).toContain(
      '· worst of its tolerance',
    );
  });
});

describe('any filter', () => {
  const kind = fc.constantFrom(
    'butterworth, order: 4, cutoff:',
    'bessel, order: 8, cutoff:',
    'chebyshev, order: 3, ripple: 0.5 dB, cutoff:',
    'rc, order: 2, tolerance: 30 %, corner:',
    'butterworth, order: 1, shape: high-pass, cutoff:',
    'mask, ripple: 0.1 dB, stopband: 200 dB, stop: 900 MHz, pass:',
  );
  const hz = (most: number) => fc.double({ min: -3, max: Math.log10(most), noNaN: true }).map((power) => 10 ** power);

  it('has a picture without faults, whatever its edge, the rate, the band and the source', () => {
    fc.assert(
      fc.property(
        kind,
        hz(1e8),
        hz(1e7),
        fc.double({ min: 0.001, max: 2, noNaN: true }),
        hz(1e9),
        (response, edge, rate, part, tone) => {
          const rig = `rig: Any
filters: { any: { response: ${response} ${edge.toPrecision(5)} Hz } }
sources: { tone: { frequency: ${tone.toPrecision(5)} Hz } }
channels: { one: { rate: ${rate.toPrecision(5)} Hz, filter: any, band: 0 Hz .. ${(rate * part).toPrecision(5)} Hz } }
`;
          const curves = curvesOf(rig);
          expect(curves).toHaveLength(1);
          for (const { curve } of curves) faultless(curve);
        },
      ),
      { numRuns: runs(500), seed: 14 },
    );
  });

  function faultless(curve: FilterCurve): void {
    const svg = filterCurveSvg(curve, 'neutral');
    expect(malformed(svg)).toBeUndefined();
    expect(svg).not.toMatch(/NaN|Infinity|undefined/);
    expect(faultsOfTexts(svg)).toEqual([]);
    expect(svg.length).toBeLessThan(30_000);
    for (const line of filterCurveCharacters(curve, { ascii: true }).split('\n'))
      expect(line.length).toBeLessThanOrEqual(78);
  }
});

describe('a logarithmic axis', () => {
  it('has ticks at 1, 2 and 5, or at powers of ten where those are too many', () => {
    expect(logarithmicTicks(400, 12_000, 9).map(({ label }) => label)).toEqual([
      '500 Hz',
      '1 kHz',
      '2 kHz',
      '5 kHz',
      '10 kHz',
    ]);
    expect(logarithmicTicks(0.5, 2e6, 8).map(({ label }) => label)).toEqual([
      '1 Hz',
      '10 Hz',
      '100 Hz',
      '1 kHz',
      '10 kHz',
      '100 kHz',
      '1 MHz',
    ]);
    expect(logarithmicTicks(1_010, 1_900, 5).length).toBeGreaterThan(1);
  });

  it('never has many more ticks than it is asked for, all of them on the axis', () => {
    const power = fc.double({ min: -6, max: 12, noNaN: true });
    fc.assert(
      fc.property(
        power,
        fc.double({ min: 0.01, max: 8, noNaN: true }),
        fc.integer({ min: 2, max: 12 }),
        (low, span, most) => {
          const [lowHz, highHz] = [10 ** low, 10 ** (low + span)];
          const values = logarithmicTicks(lowHz, highHz, most).map(({ value }) => value);
          expect(values.length).toBeLessThanOrEqual(most + 1);
          for (const value of values) {
            expect(value).toBeGreaterThanOrEqual(lowHz * (1 - 1e-6));
            expect(value).toBeLessThanOrEqual(highHz * (1 + 1e-6));
          }
        },
      ),
      { numRuns: runs(1_000), seed: 15 },
    );
  });
});
