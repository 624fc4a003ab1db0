import fc from 'fast-check';

/** Numbers spread evenly, both ends among them; those of fast-check crowd around 0, by their exponents. */
export function evenly(min: number, max: number): fc.Arbitrary<number> {
  return fc.integer({ min: 0, max: 1_000_000 }).map((n) => min + ((max - min) * n) / 1_000_000);
}
