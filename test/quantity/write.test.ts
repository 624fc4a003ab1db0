import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Quantity, readQuantity } from '../../server/src/quantity/quantity.ts';
import { allUnits, findUnit, unitsOf } from '../../server/src/quantity/unit.ts';
import { formatHz, formatQuantity, writeLike, writeRangeLike } from '../../server/src/quantity/write.ts';
import { runs } from '../tools/runs.ts';

const HZ = findUnit('Hz')!;
const KHZ = findUnit('kHz')!;

function like(text: string): Quantity {
  const { quantity, problem } = readQuantity(text);
  if (!quantity) throw new Error(`${text}: ${problem.kind}`);
  return quantity;
}

describe('a value written like another', () => {
  it.each([
    [25_600, '12.8 kHz', '25.6 kHz'],
    [25_600, '12.8kHz', '25.6kHz'],
    [25_600, '12800 Hz', '25600 Hz'],
    [25_600.000000000004, '12.8 kHz', '25.6 kHz'],
    [64, '12.8 kHz', '0.064 kHz'],
    [51_200, '12.80 kHz', '51.20 kHz'],
    [51_234, '12.80 kHz', '51.234 kHz'],
    [51_200, '1 kHz', '51.2 kHz'],
    [13_107_200 / 3840, '3413.3 Hz', '3413.333333 Hz'],
    [50, '600 rpm', '3000 rpm'],
    [20e-6, '12 µs', '20 µs'],
    [2 * 9.80665, '1 g peak', '2 g peak'],
    [2, '1.4 V rms', '2 V rms'],
    [0.001, '0.5%', '0.1%'],
    [-60, '-80 dBFS', '-60 dBFS'],
    [2e6, '1.5e6 Hz', '2e6 Hz'],
    [2.5e6, '1.50E6 Hz', '2.50E6 Hz'],
    [5, '±10 V', '±5 V'],
    [-5, '+/- 10V', '+/- 5V'],
    [0, '5 V', '0 V'],
    [25_600, '12.8', '25600 Hz'],
    [20_000, '5 Hz .. 10 kHz', '20 kHz'],
    [3, '12 lux', '3 lux'],
    [1e-12, '5 Hz', '1e-12 Hz'],
    [1e20, '5 Hz', '1e20 Hz'],
  ])('%d like %s is %s', (value, model, text) => expect(writeLike(value, like(model), HZ)).toBe(text));

  it('uses the unit at hand where there is nothing to imitate', () => {
    expect(writeLike(25_600, undefined, KHZ)).toBe('25.6 kHz');
    expect(writeLike(4, like('2'), undefined)).toBe('4');
    expect(writeLike(4, undefined, undefined)).toBe('4');
  });

  it('writes what is not finite so that reading refuses it', () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
      expect(readQuantity(writeLike(value, like('1.50 kHz'), HZ)).problem?.kind).toBe('not-finite');
    }
  });

  const model = fc
    .record({
      number: fc.constantFrom('5', '12.80', '-3.1', '.5', '1e3', '2.50e-6', '00.10'),
      space: fc.constantFrom('', ' '),
      unit: fc.constantFrom(...allUnits().map(({ symbol }) => symbol), 'µs', 'uV/rtHz', 'mV/g', 'lux', ''),
    })
    .map(({ number, space, unit }) => number + space + unit);
  const value = fc
    .tuple(fc.double({ min: 1, max: 10, noNaN: true }), fc.integer({ min: -12, max: 12 }), fc.boolean())
    .map(([mantissa, power, negative]) => mantissa * 10 ** power * (negative ? -1 : 1));

  it('reads back within 1e-9, in the same unit', () => {
    fc.assert(
      fc.property(value, model, (number, text) => {
        const imitated = like(text);
        const back = like(writeLike(number, imitated, undefined));
        if (back.kind !== 'scalar' || imitated.kind !== 'scalar') throw new Error(text);
        expect(Math.abs(back.value - number)).toBeLessThanOrEqual(1e-9 * Math.abs(number));
        expect(back.unitText).toBe(imitated.unitText);
      }),
      { seed: 21, numRuns: runs(20_000) },
    );
  });

  it('comes out as it was where the value is the same and the digits are plain', () => {
    const plain = fc.tuple(
      fc.integer({ min: 1, max: 99_999 }),
      fc.integer({ min: 0, max: 4 }),
      fc.constantFrom(...allUnits()),
    );
    fc.assert(
      fc.property(plain, ([digits, decimals, unit]) => {
        const text = `${(digits / 10 ** decimals).toFixed(decimals)} ${unit.symbol}`;
        const quantity = like(text);
        if (quantity.kind !== 'scalar') throw new Error(text);
        expect(writeLike(quantity.value, quantity, undefined)).toBe(text);
      }),
      { seed: 22, numRuns: runs(5000) },
    );
  });
});

describe('a range written like another', () => {
  it.each([
    [10, 8000, '5 Hz .. 10 kHz', '10 Hz .. 8 kHz'],
    [10, 8000, '5 Hz..10 kHz', '10 Hz..8 kHz'],
    [20, 40, '600..3000 rpm', '1200..2400 rpm'],
    [2, 64, '1..128', '2..64'],
    [10, 8000, '5 kHz', '0.01 kHz .. 8 kHz'],
    [-5, 5, '±10 V', '-5 V .. 5 V'],
  ])('%d, %d like %s is %s', (low, high, model, text) =>
    expect(writeRangeLike(low, high, like(model), undefined)).toBe(text),
  );

  it('uses the unit at hand where there is nothing to imitate, or nothing with a unit', () => {
    expect(writeRangeLike(10, 8000, undefined, HZ)).toBe('10 Hz .. 8000 Hz');
    expect(writeRangeLike(10, 8000, like('5..10000'), HZ)).toBe('10 Hz..8000 Hz');
  });
});

describe('what messages show', () => {
  it.each([
    [9600, '9.6 kHz'],
    [12_800, '12.8 kHz'],
    [13_107_200, '13.107 MHz'],
    [999.9999, '1 kHz'],
    [999_999_999, '1 GHz'],
    [0, '0 Hz'],
    [0.2, '0.2 Hz'],
    [1 / 3, '0.33333 Hz'],
    [-9600, '-9.6 kHz'],
    [1e-9, '1e-9 Hz'],
    [Number.POSITIVE_INFINITY, 'Infinity GHz'],
    [Number.NaN, 'NaN Hz'],
  ])('%d Hz is %s', (hz, text) => expect(formatHz(hz)).toBe(text));

  it('gives more digits when asked', () => expect(formatHz(13_107_200, 7)).toBe('13.1072 MHz'));

  it.each([
    [-64.0812, 'dbfs', '-64.08 dBFS'],
    [-0.001, 'dbfs', '0 dBFS'],
    [27.9588, 'decibel', '27.96 dB'],
    [6, 'slope', '6 dB/oct'],
    [0.001, 'ratio', '0.1 %'],
    [25e-6, 'ratio', '25 ppm'],
    [0.4, 'voltage', '400 mV'],
    [100, 'time', '100 s'],
    [5400, 'time', '5400 s'],
    [9000, 'time', '2.5 h'],
    [50, 'rotation', '3000 rpm'],
    [25_600, 'rate', '25.6 kS/s'],
    [5e11, 'data', '500 GB'],
    [0.2, 'of-rate', '0.2 fs'],
    [120_000_000, 'rotation', '7200000000 rpm'],
    [0, 'ratio', '0 %'],
    [2.236068, 'number', '2.2361'],
  ] as const)('%d as %s is %s', (value, dimension, text) => expect(formatQuantity(value, dimension)).toBe(text));

  it('keeps to a unit that is given', () => {
    expect(formatQuantity(19.6133, findUnit('g')!)).toBe('2 g');
    expect(formatQuantity(9600, HZ)).toBe('9600 Hz');
    expect(formatQuantity(0.1 / 9.80665, findUnit('mV/g')!)).toBe('100 mV/g');
  });

  it('reads back as the value it shows, in every dimension that has units', () => {
    const dimensions = [...new Set(allUnits().map(({ dimension }) => dimension))];
    fc.assert(
      fc.property(
        fc.constantFrom(...dimensions),
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        (dimension, value) => {
          const shown = like(formatQuantity(value, dimension, 5));
          if (shown.kind !== 'scalar') throw new Error(dimension);
          expect(unitsOf(dimension)).toContainEqual(shown.unit);
          expect(Math.abs(shown.value - value)).toBeLessThanOrEqual(0.5001e-4 * value);
        },
      ),
      { seed: 23, numRuns: runs(5000) },
    );
  });
});
