import type { Curve } from './curve.ts';

/** Beyond so many nulls a double can't tell one lobe from the next; the envelope stands for them. */
const MOST_LOBES = 1e12;

/**
 * The lobed response of an average: A = -20 count log10 |sin(pi r) / (length sin(pi r / length))|, where r counts
 * nulls (r = f length / rate), over r = 0 .. length / 2. With `length` infinite it is the average over a continuous
 * time, |sin(pi r) / (pi r)|.
 *
 * Nulls stand at whole r, one lobe between each two, each lower than the one before up to `length / 2`.
 */
export function lobedCurve(length: number, count: number): Curve {
  const at = (r: number): number => count * attenuationOfOne(length, r);
  return {
    at,
    least(low, high) {
      if (low >= MOST_LOBES || low === high) return at(low);
      let least = Math.min(at(low), at(high));
      const lobe = Math.floor(low);
      // Only the first two can hold the highest peak: the first may have its peak behind it.
      for (const candidate of [lobe, lobe + 1]) {
        if (candidate < 1 || candidate >= high) continue;
        const peak = lobePeak(length, candidate);
        if (peak >= low && peak <= high) least = Math.min(least, at(peak));
      }
      return least;
    },
    greatest(low, high) {
      const firstNull = Math.max(1, Math.ceil(low));
      const hasNull = length > 1 && firstNull <= high && firstNull < length;
      return hasNull ? Infinity : Math.max(at(low), at(high));
    },
  };
}

function attenuationOfOne(length: number, r: number): number {
  if (r >= MOST_LOBES) return envelope(length, r);
  // Taken off the nearest null first, so that the nulls are exactly that.
  const numerator = Math.abs(Math.sin(Math.PI * (r - Math.round(r))));
  const denominator = sineOfPart(length, r);
  if (denominator === 0 || length === 1) return 0;
  // + 0 turns the -0 of a ratio of exactly 1 into 0.
  return -20 * Math.log10(Math.min(1, numerator / denominator)) + 0;
}

function envelope(length: number, r: number): number {
  return 20 * Math.log10(Math.max(1, sineOfPart(length, r)));
}

/** length sin(pi r / length), pi r where the length is infinite. */
function sineOfPart(length: number, r: number): number {
  return length === Infinity ? Math.PI * r : length * Math.sin((Math.PI * r) / length);
}

/** Where lobe `index` (from null `index` to the next) is highest, by Newton's method on d ln |.| / dr. */
function lobePeak(length: number, index: number): number {
  const end = Math.min(index + 1, length / 2);
  // An odd length ends half-way up its last lobe.
  if (end <= index + 0.5) return end;
  let r = index + 0.5;
  for (let step = 0; step < 20; step++) {
    const numerator = Math.PI / Math.tan(Math.PI * (r - index));
    const sine = Math.sin(Math.PI * (r - index));
    const part = (Math.PI * r) / length;
    const isContinuous = length === Infinity;
    const denominator = isContinuous ? 1 / r : Math.PI / length / Math.tan(part);
    const denominatorSlope = isContinuous ? 1 / (r * r) : (Math.PI / length / Math.sin(part)) ** 2;
    const slope = -((Math.PI / sine) ** 2) + denominatorSlope;
    const next = Math.min(Math.max(r - (numerator - denominator) / slope, index + 1e-6), end);
    if (Math.abs(next - r) < 1e-12) return next;
    r = next;
  }
  return r;
}
