/** A stretch of values laid over a stretch of a picture. */
export interface Axis {
  readonly low: number;
  readonly high: number;
  readonly from: number;
  readonly to: number;
}

export interface Tick {
  readonly value: number;
  readonly label: string;
}

/** Where a value stands in the picture; values outside the axis stand at its ends. */
export function placeOn(axis: Axis, value: number): number {
  const part = axis.high === axis.low ? 0 : (value - axis.low) / (axis.high - axis.low);
  return axis.from + Math.min(1, Math.max(0, part)) * (axis.to - axis.from);
}

const NICE = [1, 2, 2.5, 5, 10];

/** Round values from `low` to `high`, at most `most` of them, with the unit of frequency that suits the larger end. */
export function frequencyTicks(low: number, high: number, most: number): readonly Tick[] {
  const { factor, unit } = frequencyUnit(high);
  return roundValues(low, high, most).map((value) => ({
    value,
    label: value === 0 ? '0' : `${shortNumber(value / factor)} ${unit}`,
  }));
}

/**
 * Frequencies that are 1, 2 or 5 times a power of ten, or powers of ten alone where those are more than `most`, or
 * every second of them and so on; for a logarithmic axis from `low`, above 0, to `high`.
 */
export function logarithmicTicks(low: number, high: number, most: number): readonly Tick[] {
  const first = Math.floor(Math.log10(low) + 1e-9);
  const last = Math.floor(Math.log10(high) + 1e-9);
  const inside = (value: number): boolean => value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9);
  const powers = Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => first + index);
  const fine = powers.flatMap((power) => [1, 2, 5].map((times) => Number(`${times}e${power}`))).filter(inside);
  if (fine.length < 2) return frequencyTicks(low, high, most);
  const step = Math.max(1, Math.ceil((last - first + 1) / Math.max(1, most)));
  const coarse = powers
    .filter((power) => power % step === 0)
    .map((power) => Number(`1e${power}`))
    .filter(inside);
  return (fine.length <= most ? fine : coarse).map((value) => {
    const { factor, unit } = frequencyUnit(value);
    return { value, label: `${shortNumber(value / factor)} ${unit}` };
  });
}

/** Round values of a scale in decibels. */
export function levelTicks(low: number, high: number, most: number): readonly Tick[] {
  return roundValues(low, high, most).map((value) => ({ value, label: shortNumber(value) }));
}

/** Values that are whole multiples of 1, 2, 2.5 or 5 times a power of ten. */
export function roundValues(low: number, high: number, most: number): readonly number[] {
  const span = high - low;
  if (!(span > 0) || !Number.isFinite(span) || most < 1) return [low];
  const least = span / most;
  const power = 10 ** Math.floor(Math.log10(least));
  const step = power * (NICE.find((nice) => nice * power >= least * (1 - 1e-9)) ?? 10);
  const first = Math.ceil(low / step - 1e-9);
  const count = Math.floor(high / step + 1e-9) - first + 1;
  return Array.from({ length: Math.max(0, count) }, (_, index) => Number(((first + index) * step).toPrecision(12)));
}

function frequencyUnit(hz: number): { readonly factor: number; readonly unit: string } {
  if (hz >= 1e9) return { factor: 1e9, unit: 'GHz' };
  if (hz >= 1e6) return { factor: 1e6, unit: 'MHz' };
  return hz >= 1e3 ? { factor: 1e3, unit: 'kHz' } : { factor: 1, unit: 'Hz' };
}

function shortNumber(value: number): string {
  return String(Number(value.toPrecision(6)));
}
