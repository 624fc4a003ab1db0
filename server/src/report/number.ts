/** A number as reports in JSON print it: twelve significant digits, so that they are the same to the byte everywhere. */
export function reported(value: number): number {
  return Number(value.toPrecision(12));
}
