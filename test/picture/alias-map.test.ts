import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { aliasMapCharacters } from '../../server/src/picture/alias-map-characters.ts';
import type { MapSize } from '../../server/src/picture/alias-map-layout.ts';
import { endsOf, layOut } from '../../server/src/picture/alias-map-layout.ts';
import type { AliasMap } from '../../server/src/picture/alias-map-model.ts';
import { aliasMapModel } from '../../server/src/picture/alias-map-model.ts';
import { aliasMapSvg } from '../../server/src/picture/alias-map-svg.ts';
import { frequencyTicks, placeOn, roundValues } from '../../server/src/picture/axis.ts';
import { overlap, placeLabels } from '../../server/src/picture/label-places.ts';
import type { PictureTheme } from '../../server/src/picture/palette.ts';
import { escaped } from '../../server/src/picture/svg.ts';
import { foldHz } from '../../server/src/signal/folding.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { MAPS, mapsOf } from './maps.ts';
import { drawnTexts, faultsOfTexts, viewBoxOf } from './svg-text.ts';
import { malformed } from './well-formed.ts';

const THEMES: readonly PictureTheme[] = ['light', 'dark', 'high-contrast', 'high-contrast-light', 'neutral'];

describe('the picture of an alias map', () => {
  it.each(MAPS.map(({ name, map }) => [name, map] as const))(
    '%s is well-formed and small in every theme',
    (_name, map) => {
      for (const theme of THEMES) {
        const svg = aliasMapSvg(map, { theme });
        expect(malformed(svg)).toBeUndefined();
        expect(svg).not.toMatch(/NaN|Infinity|undefined/);
        expect(svg.length).toBeLessThanOrEqual(30_000);
      }
    },
  );

  it('leaves marks out, the lightest first, to keep within a size', () => {
    const { map } = MAPS.find(({ map: one }) => one.marks.length > 30)!;
    const small = aliasMapSvg(map, { theme: 'light', maxBytes: 6_000 });
    expect(small.length).toBeLessThan(aliasMapSvg(map, { theme: 'light' }).length);
    expect(malformed(small)).toBeUndefined();
  });

  it('has a text alternative that tells what spoils the band', () => {
    const { map } = mapsOf(EXTRACT_FAN)[0]!;
    const svg = aliasMapSvg(map, { theme: 'light' });
    expect(svg).toContain('role="img"');
    expect(svg).toContain('<title>Alias map of bearing-drive-end</title>');
    expect(/<desc>(.*?)<\/desc>/.exec(svg)?.[1]).toMatch(
      /inverter carrier at 16 kHz folds into the band at 9\.6 kHz, -64\.1 dBFS, 15\.9 dB over the limit/,
    );
  });

  it('tells kinds by shape, so that it reads without colour', () => {
    const { map } = mapsOf(EXTRACT_FAN)[0]!;
    const svg = aliasMapSvg(map, { theme: 'light' });
    expect(svg).toContain('<circle');
    expect(svg).toMatch(/d="M[\d. ]+l5\.5 9\.5h-11z"/);
  });

  it('escapes names, whatever is in them', () => {
    const text = EXTRACT_FAN.replaceAll('inverter', '"<b>&\\"quote"').replace(
      'bearing-drive-end',
      "'a</title><x y=\"&z'",
    );
    const [drawn] = mapsOf(text);
    expect(malformed(aliasMapSvg(drawn!.map, { theme: 'dark' }))).toBeUndefined();
    expect(escaped('a\u0000b\ud800c')).toBe('a\ufffdb\ufffdc');
  });
});

describe.each(['large', 'compact'] as const)('the %s picture of an alias map', (size) => {
  it.each(MAPS.map(({ name, map }) => [name, map] as const))('%s has no text cut or on another', (_name, map) => {
    expect(faultsOfTexts(aliasMapSvg(map, { theme: 'light', size }))).toEqual([]);
  });

  it.each(MAPS.map(({ name, map }) => [name, map] as const))('%s names every source that it draws', (_name, map) => {
    const texts = drawnTexts(aliasMapSvg(map, { theme: 'light', size })).map(({ text }) => text);
    const unnamed = sourcesDrawn(map, size).filter((name) => !texts.some((text) => text.startsWith(name)));
    expect(unnamed).toEqual([]);
  });

  it('stays legible and within a hover with 1,000 sources', () => {
    const { map } = mapsOf(withTones(1_000))[0]!;
    expect(map.marks.length + map.leftOut).toBeGreaterThanOrEqual(1_000);
    const svg = aliasMapSvg(map, { theme: 'high-contrast', size });
    expect(faultsOfTexts(svg)).toEqual([]);
    expect(svg).toContain('marks left out');
    expect(drawnTexts(svg).some(({ text }) => text.startsWith('tone-0 15.6 kHz'))).toBe(true);
    expect(`data:image/svg+xml;base64,${Buffer.from(svg).toString('base64')}`.length).toBeLessThan(48_000);
  });

  it('cuts no text and lays none on another, however many sources there are and wherever they stand', () => {
    const tone = fc.record({
      hz: fc.integer({ min: 1, max: 200_000 }),
      millivolts: fc.integer({ min: 1, max: 9_000 }),
    });
    fc.assert(
      fc.property(fc.array(tone, { minLength: 1, maxLength: 24 }), (tones) => {
        const { map } = mapsOf(withSources(tones.map(({ hz, millivolts }) => [`${hz} Hz`, millivolts] as const)))[0]!;
        expect(faultsOfTexts(aliasMapSvg(map, { theme: 'light', size }))).toEqual([]);
      }),
      { numRuns: runs(300), seed: 13 },
    );
  });
});

describe('the compact picture of an alias map', () => {
  it('fits the 250 pixels at which editors cut a hover, its edges included', () => {
    const { width, height } = viewBoxOf(aliasMapSvg(MAPS[0]!.map, { theme: 'light', size: 'compact' }));
    expect(width).toBeLessThanOrEqual(520);
    expect(height).toBeLessThanOrEqual(230);
  });

  it('has the marks of the large one', () => {
    for (const { map } of MAPS) {
      const shapes = (size: MapSize): readonly boolean[] =>
        [/<circle/, /l4 4l-4 4l-4 -4z/, /l5\.5 9\.5h-11z/].map((shape) =>
          shape.test(aliasMapSvg(map, { theme: 'light', size })),
        );
      expect(shapes('compact')).toEqual(shapes('large'));
    }
  });
});

/** The sources that have a place on the map or in the spectrum. */
function sourcesDrawn(map: AliasMap, size: MapSize): readonly string[] {
  const layout = layOut(map, size);
  const drawn = map.marks.filter((mark) => mark.level >= map.levelLow || endsOf(mark, layout));
  return [...new Set(drawn.map(({ sourceName }) => sourceName))];
}

/** The worked example with more sources, each a frequency and a level in millivolts. */
function withSources(tones: readonly (readonly [frequency: string, millivolts: number])[]): string {
  const entries = tones.map(
    ([frequency, millivolts], index) => `  tone-${index}: { frequency: ${frequency}, level: ${millivolts} mV }\n`,
  );
  return EXTRACT_FAN.replace('sources:\n', `sources:\n${entries.join('')}`);
}

/** The worked example with tones that fold into its band. */
function withTones(count: number): string {
  return withSources(Array.from({ length: count }, (_, index) => [`${15_600 + index} Hz`, 400 - index / 10] as const));
}

describe('the model of an alias map', () => {
  it.each(MAPS.map((drawn) => [drawn.name, drawn] as const))(
    '%s has its marks where the arrivals say',
    (_name, { map, arrivals, chain }) => {
      expect(map.marks.length + map.leftOut).toBe(arrivals.filter(({ level }) => Number.isFinite(level)).length);
      for (const mark of map.marks) {
        const recorded = chain.ratesHz.reduce(foldHz, mark.from.trueHz);
        expect(mark.from.recordedHz).toBeCloseTo(recorded, 6);
        expect(mark.from.recordedHz).toBeGreaterThanOrEqual(0);
        expect(mark.from.recordedHz).toBeLessThanOrEqual(map.nyquistHz * (1 + 1e-9));
      }
      expect(map.marks.filter(({ kind }) => kind === 'spoils').length).toBe(
        arrivals.filter(({ overLimit }) => overLimit).length,
      );
    },
  );

  it.each(MAPS.map(({ name, map }) => [name, map] as const))(
    '%s shows every mark that spoils the band, within the picture',
    (_name, map) => {
      const layout = layOut(map, 'large');
      for (const mark of map.marks) {
        const ends = endsOf(mark, layout);
        if (!ends) continue;
        for (const x of [ends.x1, ends.x2]) expect(x).toBeGreaterThanOrEqual(0);
        for (const x of [ends.x1, ends.x2]) expect(x).toBeLessThanOrEqual(560);
        for (const y of [ends.y1, ends.y2]) expect(y).toBeLessThanOrEqual(430);
      }
      const loudest = map.marks.find(({ kind }) => kind === 'spoils');
      if (loudest) expect(endsOf(loudest, layout)).toBeDefined();
    },
  );

  it('breaks the axis where folds lie a hundred zones away, and never lets stretches overlap', () => {
    for (const { map } of MAPS) {
      for (let index = 1; index < map.stretches.length; index++) {
        expect(map.stretches[index]!.lowHz).toBeGreaterThan(map.stretches[index - 1]!.highHz);
      }
    }
    const roof = MAPS.find(({ name }) => name === 'roof')!;
    expect(roof.map.stretches.length).toBeGreaterThan(1);
    expect(roof.map.stretches.some(({ lowHz, highHz }) => lowHz < 50 && highHz > 50)).toBe(true);
  });

  it('has a fold line that is highest at the Nyquist frequency and fades with the filters', () => {
    const [drawn] = mapsOf(EXTRACT_FAN);
    const points = drawn!.map.stretches[0]!.line.flat();
    expect(Math.max(...points.map(({ recordedHz }) => recordedHz))).toBeCloseTo(12_800, 6);
    const attenuations = points.map(({ attenuationDb }) => attenuationDb);
    expect(attenuations).toEqual([...attenuations].sort((a, b) => a - b));
  });

  it('draws a channel that hears nothing', () => {
    const [drawn] = mapsOf(EXTRACT_FAN.replace('peak: 40 g', 'peak: 40 g\n    hears: none'));
    expect(drawn!.map.marks).toEqual([]);
    expect(malformed(aliasMapSvg(drawn!.map, { theme: 'light' }))).toBeUndefined();
    expect(aliasMapCharacters(drawn!.map, { ascii: true })).not.toMatch(/NaN/);
  });

  it('counts what it leaves out', () => {
    const { chain, arrivals } = mapsOf(EXTRACT_FAN)[0]!;
    const many = Array.from({ length: 30 }, () => arrivals).flat();
    expect(aliasMapModel(chain, many).leftOut).toBe(many.length - 160);
  });
});

describe('the drawing in characters', () => {
  it.each(MAPS.map(({ name, map }) => [name, map] as const))(
    '%s fits a terminal and has the marks of the picture',
    (_name, map) => {
      for (const ascii of [true, false]) {
        const drawing = aliasMapCharacters(map, { ascii });
        const lines = drawing.split('\n').slice(1);
        for (const line of lines) expect(line.length).toBeLessThanOrEqual(78);
        if (ascii) expect(lines.join('')).toMatch(/^[\x20-\x7e]*$/);
        if (map.marks.some(({ kind }) => kind === 'spoils')) expect(drawing).toContain('spoils the band');
      }
    },
  );
});

describe('axes and labels', () => {
  it('ticks are round, ascending and few', () => {
    expect(roundValues(0, 25_600, 6)).toEqual([0, 5_000, 10_000, 15_000, 20_000, 25_000]);
    expect(frequencyTicks(0, 12_800, 5).map(({ label }) => label)).toEqual(['0', '5 kHz', '10 kHz']);
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e9, noNaN: true }),
        fc.integer({ min: 1, max: 12 }),
        (low, span, most) => {
          const values = roundValues(low, low + span, most);
          expect(values.length).toBeLessThanOrEqual(most + 1);
          expect(values).toEqual([...values].sort((a, b) => a - b));
        },
      ),
      { numRuns: runs(1_000), seed: 11 },
    );
    expect(roundValues(5, 5, 4)).toEqual([5]);
    expect(placeOn({ low: 1, high: 1, from: 10, to: 20 }, 7)).toBe(10);
  });

  it('labels never overlap one another, what is taken, or the edge', () => {
    const wish = fc.record({
      names: fc.string(),
      texts: fc.array(fc.string({ minLength: 1, maxLength: 18 }), { minLength: 1, maxLength: 2 }),
      x: fc.integer({ min: 0, max: 500 }),
      y: fc.integer({ min: 0, max: 300 }),
    });
    fc.assert(
      fc.property(fc.array(wish, { maxLength: 30 }), (wishes) => {
        const area = { left: 0, right: 500, top: 0, bottom: 300 };
        const taken = wishes.map(({ x, y }) => ({ left: x - 6, right: x + 6, top: y - 6, bottom: y + 6 }));
        const lines = [{ x1: 0, y1: 300, x2: 500, y2: 0 }];
        const placed = placeLabels(wishes, { size: 11, area, taken, lines });
        expect(new Set(placed.map((label) => label.wish.names)).size).toBe(placed.length);
        const boxes = placed.map(({ box }) => box);
        for (const [index, box] of boxes.entries()) {
          expect(box.left >= 0 && box.right <= 500 && box.top >= 0 && box.bottom <= 300).toBe(true);
          expect([...boxes.slice(index + 1), ...taken].some((other) => overlap(box, other))).toBe(false);
        }
      }),
      { numRuns: runs(500), seed: 12 },
    );
  });
});
