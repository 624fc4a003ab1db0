/**
 * How many cases a property test tries: 50 in everyday runs, the full count of the issue when
 * `RATEWRIGHT_FULL=1` (as the continuous-integration script sets it).
 *
 * @param full the full count
 */
export function runs(full: number): number {
  return process.env.RATEWRIGHT_FULL === '1' ? full : Math.min(50, full);
}
