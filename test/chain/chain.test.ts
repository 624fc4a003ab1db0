import { describe, expect, it } from 'vitest';
import { chainOf } from '../../server/src/chain/chain.ts';
import { chainOfText, channelsOf } from './rig.ts';

function channel(keys: string, things = ''): string {
  return `rig: Test\n${things}channels:\n  one:\n    band: 1 Hz .. 10 Hz\n${keys.replace(/^/gm, '    ')}\n`;
}

describe('stages', () => {
  it('are one for a converter without steps', () => {
    const chain = chainOfText(channel('rate: 100 Hz'));
    expect(chain.stages).toHaveLength(1);
    expect(chain.stages[0]).toMatchObject({ rateHz: 100, nyquistHz: 50, inputRateHz: undefined, kind: 'converter' });
    expect(chain.margin).toBe(5);
  });

  it('follow the steps that decimate; filters on the way stand before the next one', () => {
    const things =
      'filters:\n  a: { response: moving-average, length: 2 }\n  b: { response: moving-average, length: 3 }\n';
    const chain = chainOfText(
      channel(
        'rate: 1000 Hz\nthen: [{ filter: a }, { decimate: 5, filter: b }, { decimate: 2 }, { filter: a }]',
        things,
      ),
    );
    expect(chain.ratesHz).toEqual([1000, 200, 100]);
    expect(chain.stages.map(({ filters }) => filters.map(({ use }) => use?.filter?.name))).toEqual([
      [],
      ['a', 'b'],
      [],
    ]);
    expect(chain.after.map(({ use }) => use?.filter?.name)).toEqual(['a']);
    expect(chain.stages[2]).toMatchObject({ inputRateHz: 200, kind: 'decimate' });
    expect(chain.margin).toBe(5);
  });

  it('are two for a modulator: its own rate, and the decimation to the channel rate', () => {
    const things =
      'digitizers:\n  card: { modulator: 64 fs, decimation-filter: { response: kaiser, pass: 0.45 fs, stop: 0.55 fs, stopband: 90 dB } }\n';
    const chain = chainOfText(channel('rate: 1000 Hz\ndigitizer: card\nthen: [{ decimate: 4 }]', things));
    expect(chain.stages.map(({ kind, rateHz }) => [kind, rateHz])).toEqual([
      ['modulator', 64_000],
      ['modulator-decimation', 1000],
      ['decimate', 250],
    ]);
    expect(chain.rateHz).toBe(1000);
    const filter = chain.stages[1]!.filters[0]!;
    expect(filter.role).toBe('decimation');
    // `fs` is the channel's rate: stopped at 550 Hz of the modulator's 64 kHz.
    expect(filter.response.attenuationDb(450)).toBeLessThan(0.01);
    expect(filter.response.attenuationDb(551)).toBeGreaterThan(88);
  });

  it('have the channel filters first, then the digitizer: its coupling and its own', () => {
    const things =
      'digitizers:\n  card: { low-corner: 1 Hz, filter: { response: rc, order: 1, corner: 40 Hz } }\nfilters:\n  a: { response: butterworth, order: 2, cutoff: 0.3 fs }\n';
    const { stages } = chainOfText(channel('rate: 100 Hz\ndigitizer: card\nfilter: a', things));
    expect(stages[0]!.filters.map(({ role }) => role)).toEqual(['channel', 'low-corner', 'digitizer']);
    // 0.3 of 100 Hz, 1 Hz and 40 Hz: each 3.01 dB down at its corner.
    for (const [index, hz] of [30, 1, 40].entries()) {
      expect(stages[0]!.filters[index]!.response.attenuationDb(hz)).toBeCloseTo(10 * Math.log10(2), 9);
    }
  });

  it('say where a filter is not understood', () => {
    const text = channel(
      'rate: 100 Hz\nfilter: a',
      'filters:\n  a: { response: butterworth, order: 2, cutoff: 30 Hz }\n',
    );
    expect(chainOfText(text).understood).toBe(true);
    const [one] = channelsOf(text);
    const unknown = { ...one!, filters: one!.filters.map((use) => ({ ...use, filter: undefined })) };
    expect(chainOf(unknown)).toMatchObject({ understood: false });
    expect(chainOf(unknown)!.stages[0]!.filters).toEqual([]);
  });

  it('are none without a rate or a band', () => {
    const [one] = channelsOf(channel('rate: 100 Hz'));
    expect(chainOf({ ...one!, rateHz: undefined })).toBeUndefined();
    expect(chainOf({ ...one!, band: undefined })).toBeUndefined();
    expect(chainOf({ ...one!, complete: false })).toBeUndefined();
  });

  it('do the same for a filter written in place and for one that is named', () => {
    const filter = '{ response: chebyshev, order: 5, ripple: 0.5 dB, pass-edge: 30 Hz }';
    const named = chainOfText(channel('rate: 100 Hz\nfilter: a', `filters:\n  a: ${filter}\n`));
    const inPlace = chainOfText(channel(`rate: 100 Hz\nfilter: ${filter}`));
    for (const hz of [1, 29, 30, 31, 60, 95]) {
      expect(inPlace.stages[0]!.filters[0]!.response.attenuationDb(hz)).toBe(
        named.stages[0]!.filters[0]!.response.attenuationDb(hz),
      );
    }
  });
});

describe('an rc filter', () => {
  it.each([
    ['low-pass', '40 Hz', 40],
    ['high-pass', '40 Hz', 40],
    ['band-pass', '20 .. 40 Hz', 40],
    ['band-pass', '20 .. 40 Hz', 20],
  ])('given by its cutoff is 3.01 dB down there, %s of 3 poles (%s, at %d Hz)', (shape, cutoff, hz) => {
    const filter = `{ response: rc, order: 3, shape: ${shape}, cutoff: ${cutoff} }`;
    const chain = chainOfText(channel(`rate: 100 Hz\nfilter: ${filter}`));
    expect(chain.stages[0]!.filters[0]!.response.attenuationDb(hz)).toBeCloseTo(10 * Math.log10(2), 9);
  });
});

describe('the exact rate', () => {
  const clock = 'clocks:\n  c: { frequency: 13.1072 MHz, divide: 1..8192 }\ndigitizers:\n  d: { clock: c }\n';

  it('is what a rate written by hand stands for', () => {
    const chain = chainOfText(channel('rate: 3413.33 Hz\ndigitizer: d', clock));
    expect(chain.rateHz).toBe(13_107_200 / 3840);
    expect(chain.rateReachable).toBe(true);
  });

  it('is the written one where the digitizer can not make it', () => {
    const chain = chainOfText(channel('rate: 3413.1 Hz\ndigitizer: d', clock));
    expect(chain.rateHz).toBe(3413.1);
    expect(chain.rateReachable).toBe(false);
  });
});

describe('the scale of levels', () => {
  const card = 'digitizers:\n  d: { full-scale: 0..5 V, gain: 2 }\n';
  const accelerometer = 'measures: acceleration\nsensitivity: 100 mV/(m/s2)\n';

  it('is dBFS where there is a full scale: half the span over the gain', () => {
    const { scale, foldLimit, levelUnit } = chainOfText(channel('rate: 100 Hz\ndigitizer: d', card));
    expect(levelUnit).toBe('dbfs');
    expect(scale.fullScaleV).toBe(1.25);
    expect(foldLimit).toBe(-60);
  });

  it.each([
    ['-72 dBFS', -72],
    ['1 %', -40],
    ['12.5 mV', -40],
    ['0.125 m/s2', -40],
  ])('places a fold limit of %s', (limit, dbfs) => {
    const chain = chainOfText(channel(`rate: 100 Hz\ndigitizer: d\n${accelerometer}fold-limit: ${limit}`, card));
    expect(chain.foldLimit).toBeCloseTo(dbfs, 9);
  });

  it.each([
    ['', 'relative', -60],
    ['fold-limit: 1 %', 'relative', -40],
    ['fold-limit: 10 mV', 'db-volt', -40],
    [`${accelerometer}fold-limit: 0.1 m/s2`, 'db-volt', -40],
    ['measures: acceleration\nfold-limit: 0.1 m/s2', 'db-measured', -20],
  ])('without a full scale is that of the fold limit (%s)', (keys, unit, limit) => {
    const chain = chainOfText(channel(`rate: 100 Hz\n${keys}`));
    expect(chain.levelUnit).toBe(unit);
    expect(chain.foldLimit).toBeCloseTo(limit, 9);
  });

  it('takes the default limit where the one given has no place on it', () => {
    const chain = chainOfText(
      channel('rate: 100 Hz\ndigitizer: d\nmeasures: acceleration\nfold-limit: 0.1 m/s2', card),
    );
    expect(chain.foldLimit).toBe(-60);
    expect(chain.scale.foldLimitAssumed).toBe(true);
  });
});
