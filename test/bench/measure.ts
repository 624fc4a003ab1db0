import { performance } from 'node:perf_hooks';

/** The median of some numbers. */
export function median(values: readonly number[]): number {
  return percentile(values, 0.5);
}

/** The value below which the fraction `p` of the numbers lies. */
export function percentile(values: readonly number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(p * sorted.length))]!;
}

/** Milliseconds of each of `times` runs, after `warm` runs that do not count. */
export function timesOf(run: () => void, times = 9, warm = 2): readonly number[] {
  for (let index = 0; index < warm; index++) run();
  return Array.from({ length: times }, () => {
    const start = performance.now();
    run();
    return performance.now() - start;
  });
}
