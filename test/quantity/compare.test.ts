import { describe, expect, it } from 'vitest';
import { matchesExact } from '../../server/src/quantity/compare.ts';
import { readQuantity, type Scalar } from '../../server/src/quantity/quantity.ts';

function scalar(text: string): Scalar {
  const { quantity } = readQuantity(text);
  if (quantity?.kind !== 'scalar') throw new Error(text);
  return quantity;
}

describe('a frequency written by hand', () => {
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
