/** Polynomials with real coefficients, constant term first. */

export function product(first: readonly number[], second: readonly number[]): readonly number[] {
  const result = new Array<number>(first.length + second.length - 1).fill(0);
  first.forEach((a, i) => {
    second.forEach((b, j) => {
      result[i + j]! += a * b;
    });
  });
  return result;
}

export function valueAt(coefficients: readonly number[], x: number): number {
  let value = 0;
  for (let degree = coefficients.length - 1; degree >= 0; degree--) value = value * x + coefficients[degree]!;
  return value;
}

/**
 * Where the polynomial changes sign between `low` and `high`, both above 0, ascending: its derivative's own sign
 * changes part the interval into stretches where it is monotone, each of which is bisected.
 */
export function signChanges(coefficients: readonly number[], low: number, high: number): readonly number[] {
  if (coefficients.length <= 1) return [];
  if (coefficients.length === 2) {
    const root = -coefficients[0]! / coefficients[1]!;
    return root > low && root < high ? [root] : [];
  }
  const slope = coefficients.slice(1).map((coefficient, index) => coefficient * (index + 1));
  const stations = [low, ...signChanges(slope, low, high), high];
  const found: number[] = [];
  for (let i = 1; i < stations.length; i++) {
    const start = stations[i - 1]!;
    const end = stations[i]!;
    const isRising = valueAt(coefficients, end) > 0;
    if (valueAt(coefficients, start) > 0 !== isRising) found.push(bisected(coefficients, start, end, isRising));
  }
  return found;
}

function bisected(coefficients: readonly number[], start: number, end: number, isRising: boolean): number {
  let low = start;
  let high = end;
  // Enough to bring any two doubles together, halving their ratio while they are far apart.
  for (let step = 0; step < 100; step++) {
    const middle = high > 4 * low ? Math.sqrt(low) * Math.sqrt(high) : (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (valueAt(coefficients, middle) > 0 === isRising) high = middle;
    else low = middle;
  }
  return high;
}
