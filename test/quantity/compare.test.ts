import { describe, expect, it } from 'vitest';
import { matchesExact, sameFrequency } from '../../server/src/quantity/compare.ts';
import { readQuantity, type Scalar } from '../../server/src/quantity/quantity.ts';

function scalar(text: string): Scalar {
  const { quantity } = readQuantity(text);
  if (quantity?.kind !== 'scalar') throw new Error(text);
  return quantity;
}

describe('frequencies written by hand', () => {
  it.each([
    ['25.6 kHz', '25600 Hz', true],
    ['25.6 kHz', '25.65 kHz', true],
    ['25.6 kHz', '25.66 kHz', false],
    ['25.60 kHz', '25.65 kHz', false],
    ['13.107 MHz', '13.1072 MHz', true],
    ['3000 rpm', '50 Hz', true],
    ['50 Hz', '51.2 kHz', false],
  ])('%s and %s: %s', (a, b, same) => {
    expect(sameFrequency(scalar(a), scalar(b))).toBe(same);
    expect(sameFrequency(scalar(b), scalar(a))).toBe(same);
  });

  // 13.1072 MHz / 3840 = 3413.3333... Hz, by arithmetic.
  it.each([
    ['3413.33 Hz', 13_107_200 / 3840, true],
    ['3413.3 Hz', 13_107_200 / 3840, true],
    ['3413.34 Hz', 13_107_200 / 3840, false],
    ['3413.333333333333 Hz', 13_107_200 / 3840, true],
    ['25.6 kHz', 25_600, true],
    ['25600 Hz', 25_600.6, false],
    ['10 kHz', Number.NaN, false],
    ['10 kHz', Number.POSITIVE_INFINITY, false],
  ])('%s stands for %d: %s', (text, exactHz, matches) => expect(matchesExact(scalar(text), exactHz)).toBe(matches));

  it('does not let a rate of few digits pass for another one, a thousandth away or more', () => {
    expect(matchesExact(scalar('51 kHz'), 51_200)).toBe(false);
    expect(matchesExact(scalar('10 kHz'), 10_240)).toBe(false);
    expect(matchesExact(scalar('10 kHz'), 10_000.4)).toBe(true);
  });
});
