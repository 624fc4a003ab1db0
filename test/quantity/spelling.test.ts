import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nearest, slipsBetween } from '../../server/src/quantity/spelling.ts';
import { runs } from '../tools/runs.ts';

const KEYS = ['rate', 'range', 'ranges', 'filter', 'full-scale', 'frequency', 'fold-limit', 'band', 'sensor'];

describe('the nearest word', () => {
  it.each([
    ['rtae', 'rate'],
    ['Rate', 'rate'],
    ['fulscale', 'full-scale'],
    ['full_scale', 'full-scale'],
    ['freq', 'frequency'],
    ['snesor', 'sensor'],
    ['range', 'range'],
    ['bnd', 'band'],
    ['f', undefined],
    ['', undefined],
    ['colour', undefined],
    ['x'.repeat(10_000), undefined],
  ])('%s: %s', (word, found) => expect(nearest(word, KEYS)).toBe(found));

  it('prefers the same letters in another case to a slip, wherever they stand', () => {
    expect(nearest('Fan', ['fun', 'fan'])).toBe('fan');
    expect(nearest('fan', ['Fan', 'fan'])).toBe('fan');
  });

  it('takes the earlier of two that are as near', () => expect(nearest('cat', ['bat', 'hat'])).toBe('bat'));

  it('does not guess between two beginnings', () =>
    expect(nearest('acce', ['acceptance', 'acceleration'])).toBeUndefined());

  it('survives candidates of any length', () => expect(nearest('rate', ['r'.repeat(100_000), 'rates'])).toBe('rates'));
});

describe('slips', () => {
  // Textbook pairs for edit distance: kitten / sitting is 3 (Levenshtein); a swap of neighbours counts one (Damerau 1964).
  it.each([
    ['kitten', 'sitting', 3],
    ['saturday', 'sunday', 3],
    ['ab', 'ba', 1],
    ['ca', 'abc', 3],
    ['', 'abc', 3],
    ['same', 'same', 0],
  ])('%s, %s: %d', (one, other, slips) => expect(slipsBetween(one, other, 9)).toBe(slips));

  it('stop counting past the limit, and count alike both ways', () => {
    const word = fc.string({
      unit: fc.constantFrom('a', 'b', 'c'),
      maxLength: 8,
    });
    fc.assert(
      fc.property(word, word, fc.integer({ min: 0, max: 8 }), (one, other, most) => {
        const all = slipsBetween(one, other, 20);
        expect(slipsBetween(one, other, most)).toBe(Math.min(all, most + 1));
        expect(slipsBetween(other, one, 20)).toBe(all);
      }),
      { seed: 31, numRuns: runs(5000) },
    );
  });
});
