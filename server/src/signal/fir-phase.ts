import type { PhaseResponse } from './phase-response.ts';

/** Relative size of sum h under which it is nothing, and of H where it is a null. */
const NOTHING = 1e-12;

/**
 * Phase and delay of taps. Those that mirror one another, with or without a change of sign, delay everything by half
 * of their number less one; otherwise the delay is Re(sum n h z^-n / sum h z^-n).
 *
 * The phase is counted from a straight line through the delay at 0 Hz (or the middle, where 0 Hz does not pass), to
 * within whole turns. In a null the delay is that of the line. No taps do nothing.
 */
export function firPhase(givenTaps: readonly number[], rateHz: number): PhaseResponse {
  const taps = Float64Array.from(givenTaps, (tap) => (Number.isFinite(tap) ? tap : 0));
  const middle = Math.max(taps.length - 1, 0) / 2;
  const size = taps.reduce((sum, tap) => sum + Math.abs(tap), 0);
  const mirror = taps.every((tap, n) => tap === taps[taps.length - 1 - n]);
  const isMirrored = mirror || taps.every((tap, n) => tap === -taps[taps.length - 1 - n]!);
  const line = isMirrored ? middle : lineOf(taps, size, middle);
  const radiansPerHz = (2 * Math.PI) / rateHz;
  const angleOf = (hz: number): number => radiansPerHz * Math.min(hz, rateHz / 2);
  return {
    phaseRad(hz) {
      const { re, im } = sumsAt(taps, angleOf(hz), line);
      // Of mirrored taps only rounding is left of the imaginary part.
      return Math.atan2(mirror ? 0 : im, re) - angleOf(hz) * line;
    },
    groupDelayS(hz) {
      if (isMirrored) return line / rateHz;
      const { re, im, firstRe, firstIm } = sumsAt(taps, angleOf(hz), line);
      const square = re * re + im * im;
      const late = square > (NOTHING * size) ** 2 ? (firstRe * re + firstIm * im) / square : 0;
      return (line + late) / rateHz;
    },
  };
}

/** The delay at 0 Hz in samples, where it is one within the taps. */
function lineOf(taps: Float64Array, size: number, middle: number): number {
  const sum = taps.reduce((total, tap) => total + tap, 0);
  if (Math.abs(sum) <= NOTHING * size) return middle;
  const mean = taps.reduce((total, tap, n) => total + n * tap, 0) / sum;
  return mean >= 0 && mean <= taps.length - 1 ? mean : middle;
}

interface Sums {
  /** Of h exp(-j w (n - line)). */
  readonly re: number;
  readonly im: number;
  /** The same with a factor of n - line. */
  readonly firstRe: number;
  readonly firstIm: number;
}

function sumsAt(taps: Float64Array, w: number, line: number): Sums {
  let re = 0;
  let im = 0;
  let firstRe = 0;
  let firstIm = 0;
  for (let n = 0; n < taps.length; n++) {
    const offset = n - line;
    const tapRe = taps[n]! * Math.cos(w * offset);
    const tapIm = -taps[n]! * Math.sin(w * offset);
    re += tapRe;
    im += tapIm;
    firstRe += offset * tapRe;
    firstIm += offset * tapIm;
  }
  return { re, im, firstRe, firstIm };
}
