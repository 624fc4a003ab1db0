import { describe, expect, it } from 'vitest';
import { mapJson } from '../../server/src/report/map-json.ts';
import { mapText } from '../../server/src/report/map-text.ts';
import { COLOURED, PLAIN } from '../../server/src/report/paint.ts';
import { arrivalsOfText, chainOfText } from '../chain/rig.ts';

/** A channel without a filter that hears what is put in. */
function rig(sources: string, digitizer = 'bits: 16, full-scale: ±10 V', channel = ''): string {
  return `rig: R
digitizers: { d: { ${digitizer} } }
sources: ${sources}
channels:
  c: { measures: voltage, digitizer: d, rate: 10 kHz, band: 10 Hz .. 4 kHz, fold-limit: -80 dBFS${channel} }
`;
}

function json(text: string) {
  return JSON.parse(mapJson('a', chainOfText(text), arrivalsOfText(text), [])) as {
    arrivals: Record<string, unknown>[];
  } & Record<string, unknown>;
}

function table(text: string, paint = PLAIN): readonly string[] {
  const printed = mapText(chainOfText(text), arrivalsOfText(text), { ascii: true, paint });
  return printed.slice(printed.lastIndexOf('\n\n') + 2).split('\n');
}

describe('the map in JSON', () => {
  it('names a level by its scale', () => {
    const source = '{ s: { frequency: 7 kHz, level: 1 V } }';
    const keys = (text: string): readonly string[] =>
      [...Object.keys(json(text)), ...Object.keys(json(text).arrivals[0]!)].filter((key) =>
        /^(level|foldLimit)/.test(key),
      );
    expect(keys(rig(source))).toEqual(['foldLimitDbfs', 'levelDbfs']);
    const volts = rig(source, 'bits: 16').replace('-80 dBFS', '1 mV');
    expect(keys(volts)).toEqual(['foldLimitDbVolt', 'levelDbVolt']);
    const measured = rig('{ s: { frequency: 7 kHz, level: 1 g } }', 'bits: 16')
      .replace('-80 dBFS', '1 mg')
      .replace('measures: voltage', 'measures: acceleration');
    expect(keys(measured)).toEqual(['foldLimitDbMeasured', 'levelDbMeasured']);
    const relative = rig('{ s: { frequency: 7 kHz, level: -20 dBFS } }', 'bits: 16');
    expect(keys(relative)).toEqual(['foldLimitDb', 'levelDb']);
  });

  it('has levels by hand: 1 V of ±10 V is -20 dBFS, 1 V is 0 dB of a volt', () => {
    const source = '{ s: { frequency: 7 kHz, level: 1 V } }';
    expect(json(rig(source)).arrivals[0]!.levelDbfs).toBeCloseTo(-20, 9);
    const volts = json(rig(source, 'bits: 16').replace('-80 dBFS', '1 mV'));
    expect(volts.arrivals[0]!.levelDbVolt).toBeCloseTo(0, 9);
    expect(volts.foldLimitDbVolt).toBeCloseTo(-60, 9);
  });

  it('has null for a level that is no number', () => {
    const text = rig('{ s: { frequency: 7 kHz, level: 1 V } }');
    const [arrival] = arrivalsOfText(text);
    const printed = mapJson('a', chainOfText(text), [{ ...arrival!, level: -Infinity }], []);
    expect((JSON.parse(printed) as { arrivals: object[] }).arrivals[0]).toHaveProperty('levelDbfs', null);
  });

  it('has every stage of a channel that is decimated, and the stage at which something folds', () => {
    const text = rig(
      '{ s: { frequency: 3 kHz, level: 1 V } }',
      'bits: 16, full-scale: ±10 V',
      ', then: [{ decimate: 2 }]',
    );
    const map = json(text.replace('4 kHz', '2.2 kHz'));
    expect(map.stages).toEqual([
      { rateHz: 10_000, nyquistHz: 5_000 },
      { rateHz: 5_000, nyquistHz: 2_500 },
    ]);
    // 5 kHz - 3 kHz = 2 kHz, at the decimation.
    expect(map.arrivals[0]).toMatchObject({ recordedHz: [2_000, 2_000], foldsAtStage: 2, mirrored: true });
  });
});

describe('the map in characters', () => {
  it('says so where there is nothing to hear', () => {
    expect(table(rig('{}'))).toEqual(['Nothing is declared that this channel hears.', '']);
  });

  it('lists what spoils the band first, then what is in it, then the rest, each by level', () => {
    const lines = table(
      rig(`{ quiet: { frequency: 1 kHz, level: 1 mV }, loud: { frequency: 2 kHz, level: 1 V },
  beside: { frequency: 4.5 kHz, level: 5 V }, folds: { frequency: 9 kHz, level: 10 mV },
  by: { frequency: 5.5 kHz, level: 1 V }, faint: { frequency: 8 kHz, level: 1 uV } }`),
    );
    expect(lines.map((line) => line.replace(/ {2,}/g, '|'))).toEqual([
      'source|component|true|recorded|dBFS',
      'folds|fundamental|9 kHz|1 kHz|-60.0|folds at stage 1, over the limit',
      'loud|fundamental|2 kHz|2 kHz|-20.0|in the band',
      'quiet|fundamental|1 kHz|1 kHz|-80.0|in the band',
      'faint|fundamental|8 kHz|2 kHz|-140.0|folds at stage 1, in the band',
      'beside|fundamental|4.5 kHz|4.5 kHz|-6.0|outside the band',
      'by|fundamental|5.5 kHz|4.5 kHz|-20.0|folds at stage 1, outside the band',
      '',
    ]);
  });

  it('shows ranges as ranges, and a level that is assumed with a note', () => {
    const lines = table(rig('{ s: { frequency: 1 kHz .. 2 kHz } }'));
    expect(lines[1]).toMatch(/ 1 kHz \.\. 2 kHz {2}1 kHz \.\. 2 kHz {2}0\.0\? {2}in the band$/);
    expect(lines[2]).toBe('? no level is declared: full scale is assumed.');
  });

  it('says dB where there is no full scale', () => {
    expect(table(rig('{ s: { frequency: 7 kHz, level: 1 V } }', 'bits: 16').replace('-80 dBFS', '1 mV'))[0]).toMatch(
      / dB$/,
    );
  });

  it('writes no minus before what rounds to nothing', () => {
    const text = rig('{ s: { frequency: 1 kHz, level: 1 V } }');
    const [arrival] = arrivalsOfText(text);
    for (const [level, shown] of [
      [-1e-12, '0.0'],
      [-0.04, '0.0'],
      [-0.06, '-0.1'],
      [-10, '-10.0'],
    ] as const) {
      const printed = mapText(chainOfText(text), [{ ...arrival!, level }], { ascii: true, paint: PLAIN });
      expect(printed).toContain(` ${shown}  in the band\n`);
    }
  });

  it('ends after forty rows, and says how to have the rest', () => {
    const lines = table(rig('{ s: { frequency: 10 Hz, harmonics: 45, level: 1 V } }'));
    expect(lines).toHaveLength(1 + 40 + 1 + 1);
    expect(lines.at(-2)).toBe('5 more; --format json lists every one.');
    expect(table(rig('{ s: { frequency: 10 Hz, harmonics: 40, level: 1 V } }'))).toHaveLength(1 + 40 + 1);
  });

  it('colours what spoils the band, and takes the colour from what is outside it', () => {
    const lines = table(
      rig('{ a: { frequency: 9 kHz, level: 1 V }, b: { frequency: 4.5 kHz, level: 1 V } }'),
      COLOURED,
    );
    // ECMA-48, 8.3.117: 2 is faint and 22 not, 31 is red and 39 the default colour.
    const inks = lines.slice(0, 3).map((line) => line.replaceAll('\u001b', '<').replace(/m[^<]*</, ' '));
    expect(inks).toEqual(['<[2 [22m', '<[31 [39m', '<[2 [22m']);
  });
});
