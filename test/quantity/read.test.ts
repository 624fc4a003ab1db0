import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  inUnit,
  peakOf,
  type Quantity,
  type QuantityProblem,
  type Range,
  readQuantity,
  type Scalar,
} from '../../server/src/quantity/quantity.ts';
import { allUnits, findUnit } from '../../server/src/quantity/unit.ts';
import { runs } from '../tools/runs.ts';

function read(text: string): Quantity {
  const { quantity, problem } = readQuantity(text);
  if (!quantity) throw new Error(`${text}: ${problem.kind}`);
  return quantity;
}

function scalar(text: string): Scalar {
  const quantity = read(text);
  if (quantity.kind !== 'scalar') throw new Error(`${text} is a ${quantity.kind}`);
  return quantity;
}

function range(text: string): Range {
  const quantity = read(text);
  if (quantity.kind !== 'range') throw new Error(`${text} is a ${quantity.kind}`);
  return quantity;
}

function problem(text: string): QuantityProblem {
  const reading = readQuantity(text);
  if (!reading.problem) throw new Error(`${text} is a ${reading.quantity.kind}`);
  return reading.problem;
}

/** Every form of a quantity that a rig file may hold. */
const FORMS = [
  '25.6 kHz',
  '5 Hz .. 10 kHz',
  '600..3000 rpm',
  '±10 V',
  '+/-10 V',
  '0.453 fs',
  '2 g',
  '2 g peak',
  '1.4 g rms',
  '4 g p-p',
  '-80 dBFS',
  '0.1 %',
  '25 ppm',
  '80 dB',
  '10 uV/rtHz',
  '10 µV/√Hz',
  '100 mV/g',
  '41 uV/K',
  '2 mV/V',
  '6 dB/oct',
  '1..128',
  '0..5 V',
  '12 lux',
  '1e3 Hz',
];

describe('one number and its unit', () => {
  it.each([
    ['25.6 kHz', 25_600, 'frequency'],
    ['25.6kHz', 25_600, 'frequency'],
    ['8.2 kHz', 8200, 'frequency'],
    ['13.1072 MHz', 13_107_200, 'frequency'],
    ['1e3 Hz', 1000, 'frequency'],
    ['1.5E-3 Hz', 0.0015, 'frequency'],
    ['51.2 kS/s', 51_200, 'rate'],
    ['3000 rpm', 50, 'rotation'],
    ['20 ms', 0.02, 'time'],
    ['10 min', 600, 'time'],
    ['400 mV', 0.4, 'voltage'],
    ['1 g', 9.80665, 'acceleration'],
    ['0.453 fs', 0.453, 'of-rate'],
    ['64 fs', 64, 'of-rate'],
    ['-80 dBFS', -80, 'dbfs'],
    ['\u221280 dBFS', -80, 'dbfs'],
    ['0.1 %', 0.001, 'ratio'],
    ['0.1%', 0.001, 'ratio'],
    ['25 ppm', 25e-6, 'ratio'],
    ['80 dB', 80, 'decibel'],
    ['6 dB/oct', 6, 'slope'],
    ['100 ue', 1e-4, 'strain'],
    ['24 bit', 24, 'bits'],
    ['500 GB', 5e11, 'data'],
    ['100 MB/s', 1e8, 'data-rate'],
    ['180 deg', 180, 'angle'],
    ['10 uV/rtHz', 1e-5, 'density'],
    ['41 uV/K', 41e-6, 'sensitivity'],
    ['2 N.m', 2, 'torque'],
    ['3 mm/s', 0.003, 'velocity'],
    ['12 lux', 12, 'other'],
    ['40 %RH', 40, 'other'],
    ['16', 16, 'number'],
    ['+5', 5, 'number'],
    ['.5', 0.5, 'number'],
    ['5.', 5, 'number'],
    ['0.1234567890123456789', Number('0.1234567890123456789'), 'number'],
    ['-12345678901234567890e-10', Number('-1234567890.123456789'), 'number'],
    ['  5\u00A0Hz ', 5, 'frequency'],
  ])('%s', (text, value, dimension) => {
    expect(scalar(text).value).toBe(value);
    expect(scalar(text).dimension).toBe(dimension);
  });

  it('100 mV/g is 0.1 V per 9.80665 m/s2', () => expect(scalar('100 mV/g').value).toBeCloseTo(0.1 / 9.80665, 15));

  it('tells what was written and where', () => {
    expect(scalar(' 25.60 µs')).toMatchObject({
      number: {
        value: 25.6,
        text: '25.60',
        decimals: 2,
        exponent: 0,
        start: 1,
        end: 6,
      },
      unitSpan: { start: 7, end: 9 },
      unitText: 'µs',
      unit: { symbol: 'us' },
    });
    expect(scalar('1.50e-3').number).toMatchObject({
      value: 0.0015,
      text: '1.50e-3',
      decimals: 2,
      exponent: -3,
    });
  });

  it.each([
    ['25.6 kHz', 50],
    ['25600 Hz', 0.5],
    ['3413.33 Hz', 0.005],
    ['1.5e6 Hz', 50_000],
    ['10 kHz', 500],
    ['600 rpm', 0.5 / 60],
    ['0.1 %', 0.0005],
  ])('half a unit of the last digit of %s is %d', (text, half) => expect(scalar(text).halfDigit).toBeCloseTo(half, 12));

  it('has no minus zero', () => {
    for (const text of ['-0', '-0.0 V', '-0e5', '\u22120 Hz', '-1e-400'])
      expect(Object.is(scalar(text).value, 0)).toBe(true);
    expect(Object.is(scalar('-0').number.value, 0)).toBe(true);
  });

  it('reads a bare number in a unit', () => {
    expect(inUnit(scalar('600'), findUnit('rpm')!)).toMatchObject({
      value: 10,
      dimension: 'rotation',
    });
    expect(inUnit(scalar('1e308'), findUnit('kHz')!)).toBeUndefined();
  });
});

describe('amplitudes', () => {
  it.each([
    ['2 V', undefined, 2],
    ['2 V peak', 'peak', 2],
    ['1.4 V rms', 'rms', 1.4 * Math.SQRT2],
    ['4 V p-p', 'p-p', 2],
    ['4 p-p', 'p-p', 2],
    ['10 uV/rtHz rms', 'rms', 1e-5],
  ])('%s', (text, amplitude, peak) => {
    expect(scalar(text).amplitude).toBe(amplitude);
    expect(peakOf(scalar(text))).toBeCloseTo(peak, 12);
  });

  it('keeps the value as written', () => expect(scalar('4 V p-p').value).toBe(4));

  it.each(['10 Hz rms', '-80 dBFS rms', '6 dB/oct peak', '0.4 fs p-p'])('%s makes no sense', (text) => {
    const amplitude = text.split(' ').at(-1)!;
    const start = text.length - amplitude.length;
    expect(problem(text)).toEqual({
      kind: 'amplitude-misplaced',
      start,
      end: text.length,
      text: amplitude,
    });
  });
});

describe('ranges', () => {
  it.each([
    ['5 Hz .. 10 kHz', 5, 10_000],
    ['5 Hz..10 kHz', 5, 10_000],
    ['5Hz..10kHz', 5, 10_000],
    ['600..3000 rpm', 10, 50],
    ['600 rpm..3000 rpm', 10, 50],
    ['0..5 V', 0, 5],
    ['-10..10 V', -10, 10],
    ['1..128', 1, 128],
    ['0.5.. 1.5', 0.5, 1.5],
    ['1 .. .5', 1, 0.5],
    ['0.2 fs .. 0.4 fs', 0.2, 0.4],
    ['10 kHz .. 5 Hz', 10_000, 5],
  ])('%s', (text, low, high) => {
    expect(range(text).low.value).toBe(low);
    expect(range(text).high.value).toBe(high);
    expect(range(text).low.dimension).toBe(range(text).high.dimension);
  });

  it('gives a bare low end the unit and the amplitude of the high one, and a bare high end nothing', () => {
    expect(range('1..2 g rms').low).toMatchObject({
      amplitude: 'rms',
      dimension: 'acceleration',
      unitSpan: undefined,
    });
    expect(range('1 Hz .. 2').high.dimension).toBe('number');
  });

  it('keeps the separator', () => {
    expect(range('1..2').separator).toBe('..');
    expect(range('1 Hz  .. 2 Hz').separator).toBe('  .. ');
  });

  it('refuses a low end that is infinite in the unit of the high one', () =>
    expect(problem('1e308..2 kHz')).toMatchObject({
      kind: 'not-finite',
      start: 0,
      end: 5,
    }));
});

it('reads symmetric limits', () => {
  expect(read('±10 V')).toMatchObject({
    kind: 'symmetric',
    limit: { value: 10 },
    sign: '±',
  });
  expect(read('± 10 V')).toMatchObject({
    kind: 'symmetric',
    limit: { value: 10 },
    sign: '± ',
  });
  expect(read('+/-500 mV')).toMatchObject({
    kind: 'symmetric',
    limit: { value: 0.5 },
    sign: '+/-',
  });
});

describe('what is no quantity', () => {
  it.each<[string, QuantityProblem['kind'], number, number, string?]>([
    ['', 'not-a-quantity', 0, 0],
    ['   ', 'not-a-quantity', 0, 3],
    ['..', 'not-a-quantity', 0, 2],
    ['1..', 'not-a-quantity', 0, 3],
    ['1...5', 'not-a-quantity', 1, 5],
    ['1 .. 2 .. 3', 'not-a-quantity', 7, 11],
    ['±', 'not-a-quantity', 0, 1],
    ['±-3 V', 'not-a-quantity', 0, 5],
    ['±3 V .. 4 V', 'not-a-quantity', 5, 11],
    ['kHz', 'not-a-quantity', 0, 3],
    ['5 Hz or so', 'not-a-quantity', 5, 10],
    ['2024-05-01', 'not-a-quantity', 4, 10],
    ['3.2.1', 'not-a-quantity', 3, 5],
    ['10^9', 'not-a-quantity', 2, 4],
    ['.', 'not-a-quantity', 0, 1],
    ['-', 'not-a-quantity', 0, 1],
    ['1e400', 'not-finite', 0, 5],
    ['-1e400 Hz', 'not-finite', 0, 6],
    ['1e308 GHz', 'not-finite', 0, 5],
    ['0e400', 'not-finite', 0, 5],
    ['1e99999999999999999999', 'not-finite', 0, 22],
    ['NaN', 'not-finite', 0, 3],
    ['.nan', 'not-finite', 0, 4],
    ['-.inf Hz', 'not-finite', 0, 5],
    ['Infinity', 'not-finite', 0, 8],
    ['1_000 Hz', 'digit-separator', 0, 5, '1000'],
    ['1,5 kHz', 'digit-separator', 0, 3],
    ['1,000,000', 'digit-separator', 0, 9],
    ['0x1F', 'digit-separator', 0, 4],
    ['25.6 khz', 'unknown-unit', 5, 8, 'kHz'],
    ['5 Hz .. 10 khz', 'unknown-unit', 11, 14, 'kHz'],
    ['41 uV/°C', 'unknown-unit', 3, 8, 'uV/degC'],
    ['5 abcdefghijklmnopqrstuvw', 'unknown-unit', 2, 25],
    ['9'.repeat(10_000), 'too-long', 0, 10_000],
  ])('%j', (text, kind, start, end, suggestion) => {
    const found = problem(text);
    expect([found.kind, found.start, found.end, found.suggestion]).toEqual([kind, start, end, suggestion]);
    expect(found.text).toBe(text.slice(start, end).slice(0, 40));
  });

  it('leaves a quantity behind when a suggestion is taken', () => {
    for (const text of ['25.6 khz', '41 uV/°C', '3 Vrms', '9.8 m/s^2', '10 uV/sqrt(Hz)', '1_000 Hz', '5 KSPS']) {
      const { start, end, suggestion } = problem(text);
      expect(readQuantity(text.slice(0, start) + suggestion + text.slice(end)).problem).toBeUndefined();
    }
  });
});

describe('for any text', () => {
  const piece = fc.constantFrom(
    ...FORMS.flatMap((form) => form.split(/(?<= )|(?= )/)),
    ...[
      '..',
      '.',
      ' ',
      '±',
      '+/-',
      'e',
      '-',
      '/',
      '√Hz',
      '(',
      ')',
      '1e400',
      'NaN',
      '_',
      ',',
      '°C',
      '\u{1F600}',
      '\ud800',
    ],
  );
  const text = fc.oneof(
    fc.array(piece, { maxLength: 8 }).map((pieces) => pieces.join('')),
    fc.string({ unit: 'grapheme', maxLength: 40 }),
    fc.tuple(fc.double().map(String), fc.string({ maxLength: 20 })).map(([number, rest]) => number + rest),
  );

  function expectSound(source: string): void {
    const { quantity, problem: found } = readQuantity(source);
    if (found) {
      expect(found.start).toBeGreaterThanOrEqual(0);
      expect(found.start).toBeLessThanOrEqual(found.end);
      expect(found.end).toBeLessThanOrEqual(source.length);
      return;
    }
    const scalars =
      quantity.kind === 'scalar'
        ? [quantity]
        : quantity.kind === 'range'
          ? [quantity.low, quantity.high]
          : [quantity.limit];
    for (const { value, halfDigit, number, unitSpan, unitText } of scalars) {
      expect(Number.isFinite(value) && Number.isFinite(halfDigit) && !Object.is(value, -0)).toBe(true);
      expect(source.slice(number.start, number.end)).toBe(number.text);
      if (unitSpan) expect(source.slice(unitSpan.start, unitSpan.end)).toBe(unitText);
    }
  }

  it('there is a sound answer', () => {
    fc.assert(fc.property(text, expectSound), {
      seed: 11,
      numRuns: runs(20_000),
    });
  });

  it('there is one for every beginning and every ending of every form', () => {
    for (const form of FORMS) {
      expect(readQuantity(form).problem).toBeUndefined();
      for (let cut = 0; cut <= form.length; cut += 1) {
        expectSound(form.slice(0, cut));
        expectSound(form.slice(cut));
      }
    }
  });

  it('a decimal number in a power-of-ten unit is rounded once, as one literal would be', () => {
    const decimal = allUnits().filter(({ times, over }) => times === 1 && over === 1);
    fc.assert(
      fc.property(
        fc.integer({ min: -99_999_999, max: 99_999_999 }),
        fc.integer({ min: 0, max: 9 }),
        fc.constantFrom(...decimal),
        (digits, decimals, unit) => {
          const number = (digits / 10 ** decimals).toFixed(decimals);
          expect(scalar(`${number} ${unit.symbol}`).value).toBe(Number(`${number}e${unit.tens}`) + 0);
        },
      ),
      { seed: 12, numRuns: runs(10_000) },
    );
  });
});
