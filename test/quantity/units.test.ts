import { describe, expect, it } from 'vitest';
import type { Dimension } from '../../server/src/quantity/dimension.ts';
import { allUnits, findUnit, ownUnit, unitsOf } from '../../server/src/quantity/unit.ts';
import { otherSpelling, suggestUnit } from '../../server/src/quantity/unit-suggestion.ts';

/**
 * Base units in one of each unit. Prefixes, min, h, bar, degrees of arc: SI Brochure, 9th edition (2019), tables 4, 7
 * and 8. Standard gravity 9.80665 m/s2, exact: 3rd CGPM 1901. Decimal prefixes of bytes: IEC 80000-13. From memory.
 */
const FACTORS: Readonly<Record<string, readonly [Dimension, number]>> = {
  Hz: ['frequency', 1],
  kHz: ['frequency', 1000],
  MHz: ['frequency', 1_000_000],
  GHz: ['frequency', 1_000_000_000],
  'S/s': ['rate', 1],
  'kS/s': ['rate', 1000],
  'MS/s': ['rate', 1_000_000],
  'GS/s': ['rate', 1_000_000_000],
  rpm: ['rotation', 1 / 60],
  s: ['time', 1],
  ms: ['time', 0.001],
  us: ['time', 0.000_001],
  ns: ['time', 0.000_000_001],
  ps: ['time', 0.000_000_000_001],
  min: ['time', 60],
  h: ['time', 3600],
  V: ['voltage', 1],
  mV: ['voltage', 0.001],
  uV: ['voltage', 0.000_001],
  A: ['current', 1],
  mA: ['current', 0.001],
  ohm: ['resistance', 1],
  g: ['acceleration', 9.80665],
  'm/s2': ['acceleration', 1],
  mg: ['acceleration', 0.00980665],
  ug: ['acceleration', 0.00000980665],
  'm/s': ['velocity', 1],
  'mm/s': ['velocity', 0.001],
  m: ['displacement', 1],
  mm: ['displacement', 0.001],
  um: ['displacement', 0.000_001],
  Pa: ['pressure', 1],
  kPa: ['pressure', 1000],
  MPa: ['pressure', 1_000_000],
  bar: ['pressure', 100_000],
  N: ['force', 1],
  kN: ['force', 1000],
  'N.m': ['torque', 1],
  ue: ['strain', 0.000_001],
  K: ['temperature', 1],
  degC: ['temperature', 1],
  deg: ['angle', 1],
  rad: ['angle', 57.295_779_513_082_32],
  dBFS: ['dbfs', 1],
  dB: ['decibel', 1],
  'dB/oct': ['slope', 1],
  '%': ['ratio', 0.01],
  ppm: ['ratio', 0.000_001],
  bit: ['bits', 1],
  B: ['data', 1],
  kB: ['data', 1000],
  MB: ['data', 1_000_000],
  GB: ['data', 1_000_000_000],
  TB: ['data', 1_000_000_000_000],
  'B/s': ['data-rate', 1],
  'kB/s': ['data-rate', 1000],
  'MB/s': ['data-rate', 1_000_000],
  'GB/s': ['data-rate', 1_000_000_000],
  'TB/s': ['data-rate', 1_000_000_000_000],
  'bit/s': ['data-rate', 0.125],
  fs: ['of-rate', 1],
};

function expectNear(actual: number | undefined, expected: number): void {
  expect(Math.abs(actual! / expected - 1)).toBeLessThan(1e-15);
}

describe('the table of units', () => {
  it.each(Object.entries(FACTORS))('%s', (symbol, [dimension, factor]) => {
    const unit = findUnit(symbol);
    expect(unit?.symbol).toBe(symbol);
    expect(unit?.dimension).toBe(dimension);
    expectNear(unit?.factor, factor);
  });

  it('holds these and no others', () => {
    expect(
      allUnits()
        .map(({ symbol }) => symbol)
        .sort(),
    ).toEqual(Object.keys(FACTORS).sort());
  });

  it('reads degC as a difference, and nothing else', () => {
    expect(allUnits().filter(({ difference }) => difference)).toEqual([findUnit('degC')]);
  });

  it('lists the units of a dimension, the usual one first', () => {
    expect(unitsOf('frequency').map(({ symbol }) => symbol)).toEqual(['Hz', 'kHz', 'MHz', 'GHz']);
    expect(unitsOf('acceleration')[0]?.symbol).toBe('g');
    expect(unitsOf('sensitivity')[0]?.symbol).toBe('mV/g');
    expect(unitsOf('density')[0]?.symbol).toBe('uV/rtHz');
    expect(unitsOf('number')).toEqual([]);
    expect(unitsOf('other')).toEqual([]);
  });

  it('finds every unit it lists', () => {
    for (const dimension of new Set(allUnits().map((unit) => unit.dimension)).add('density').add('sensitivity')) {
      for (const unit of unitsOf(dimension)) expect(findUnit(unit.symbol)).toEqual(unit);
    }
  });

  it('takes u, U+00B5 and U+03BC as the same prefix', () => {
    for (const symbol of ['us', 'uV', 'um', 'ue']) {
      expect(findUnit(`\u00B5${symbol.slice(1)}`)?.symbol).toBe(symbol);
      expect(findUnit(`\u03BC${symbol.slice(1)}`)?.symbol).toBe(symbol);
    }
  });

  it.each(['', 'khz', 'KHz', 'S', 'kg', 'lux', 'mHz', 'constructor', '__proto__', 'toString', 'x'.repeat(10_000)])(
    'does not find %j',
    (text) => expect(findUnit(text)).toBeUndefined(),
  );
});

describe('densities', () => {
  it.each([
    ['uV/rtHz', 'uV/rtHz', 1e-6, 'voltage'],
    ['\u00B5V/\u221AHz', 'uV/rtHz', 1e-6, 'voltage'],
    ['nV/rtHz', 'nV/rtHz', 1e-9, 'voltage'],
    ['pA/rtHz', 'pA/rtHz', 1e-12, 'current'],
    ['ug/rtHz', 'ug/rtHz', 9.80665e-6, 'acceleration'],
    ['mm/s/rtHz', 'mm/s/rtHz', 1e-3, 'velocity'],
    ['(mm/s)/rtHz', 'mm/s/rtHz', 1e-3, 'velocity'],
    ['uPa/rtHz', 'uPa/rtHz', 1e-6, 'pressure'],
    ['mPa/rtHz', 'mPa/rtHz', 1e-3, 'pressure'],
    ['ne/rtHz', 'ne/rtHz', 1e-9, 'strain'],
    ['lux/rtHz', 'lux/rtHz', 1, 'other'],
  ])('%s', (text, symbol, factor, of) => {
    const unit = findUnit(text);
    expect(unit?.symbol).toBe(symbol);
    expect(unit?.dimension).toBe('density');
    expect(unit?.of?.dimension).toBe(of);
    expectNear(unit?.factor, factor);
  });

  it.each(['dB/rtHz', 'dBFS/rtHz', '/rtHz', 'fs/rtHz', 'MB/s/rtHz', '()/rtHz'])('%s is none', (text) =>
    expect(findUnit(text)).toBeUndefined(),
  );
});

describe('sensitivities', () => {
  it.each([
    ['mV/g', 'mV/g', 0.001 / 9.80665, 'g', 'acceleration'],
    ['V/V', 'V/V', 1, 'V', 'voltage'],
    ['mV/V', 'mV/V', 0.001, 'V', 'voltage'],
    ['uV/K', 'uV/K', 1e-6, 'K', 'temperature'],
    ['\u00B5V/degC', 'uV/degC', 1e-6, 'degC', 'temperature'],
    ['mV/mm/s', 'mV/(mm/s)', 1, 'mm/s', 'velocity'],
    ['mV/(m/s2)', 'mV/(m/s2)', 0.001, 'm/s2', 'acceleration'],
    ['mV/um', 'mV/um', 1000, 'um', 'displacement'],
    ['mV/\u00B5m', 'mV/um', 1000, 'um', 'displacement'],
    ['mV/N.m', 'mV/N.m', 0.001, 'N.m', 'torque'],
    ['mV/rpm', 'mV/rpm', 0.06, 'rpm', 'rotation'],
    ['uV/ue', 'uV/ue', 1, 'ue', 'strain'],
    ['mV/lux', 'mV/lux', 0.001, 'lux', 'other'],
    ['mV/%RH', 'mV/%RH', 0.001, '%RH', 'other'],
  ])('%s', (text, symbol, factor, per, dimension) => {
    const unit = findUnit(text);
    expect(unit?.symbol).toBe(symbol);
    expect(unit?.dimension).toBe('sensitivity');
    expect(unit?.per?.symbol).toBe(per);
    expect(unit?.per?.dimension).toBe(dimension);
    expectNear(unit?.factor, factor);
  });

  it('needs volts to begin with', () => {
    for (const text of ['pC/g', 'mA/bar', 'g/V', 'mV/', '/g', 'mV/a b']) expect(findUnit(text)).toBeUndefined();
  });
});

it('keeps the numbers of a unit that is not in the table', () => {
  expect(ownUnit('lux')).toMatchObject({
    symbol: 'lux',
    dimension: 'other',
    factor: 1,
  });
});

describe('other spellings', () => {
  it.each([
    ['khz', 'kHz'],
    ['KHZ', 'kHz'],
    ['KHz', 'kHz'],
    ['hz', 'Hz'],
    ['sps', 'S/s'],
    ['kSPS', 'kS/s'],
    ['Ks/s', 'kS/s'],
    ['RPM', 'rpm'],
    ['\u00B0C', 'degC'],
    ['\u03A9', 'ohm'],
    ['Ohm', 'ohm'],
    ['m/s^2', 'm/s2'],
    ['m/s\u00B2', 'm/s2'],
    ['Nm', 'N.m'],
    ['\u00B5\u03B5', 'ue'],
    ['dbfs', 'dBFS'],
    ['Vrms', 'V rms'],
    ['uV/\u00B0C', 'uV/degC'],
    ['mV/m/s^2', 'mV/(m/s2)'],
    ['uV/rthz', 'uV/rtHz'],
    ['uV/sqrt(Hz)', 'uV/rtHz'],
    ['uV/sqrtHz', 'uV/rtHz'],
    ['\u00B0C/rtHz', 'degC/rtHz'],
  ])('%s is %s', (word, unit) => expect(otherSpelling(word)).toBe(unit));

  it('leaves alone every unit, and what may be somebody’s own', () => {
    for (const { symbol } of allUnits()) expect(otherSpelling(symbol)).toBeUndefined();
    for (const word of ['lux', 'mV/lux', '\u00B5V/\u221AHz', 'mV/(mm/s)', 'S', 'mT', 'pC/g', 'mHz', 'mPa', ''])
      expect(otherSpelling(word)).toBeUndefined();
  });

  it('never takes milli for mega', () => {
    expect(suggestUnit('mHz')).toBeUndefined();
    expect(suggestUnit('mhz')).toBe('MHz');
  });

  it('suggests by case, by a slip, and in the parts of a sensitivity', () => {
    expect(suggestUnit('mv')).toBe('mV');
    expect(suggestUnit('mv', ['voltage'])).toBe('mV');
    expect(suggestUnit('mv', ['time'])).toBeUndefined();
    expect(suggestUnit('dgeC')).toBe('degC');
    expect(suggestUnit('kHzz')).toBe('kHz');
    expect(suggestUnit('mv/g')).toBe('mV/g');
    expect(suggestUnit('lux')).toBeUndefined();
    expect(suggestUnit('mV/'.repeat(3000))).toBeUndefined();
  });
});
