import type { FrequencyRange } from './frequency-range.ts';
import type { Integrand } from './integral.ts';
import type { Response } from './response.ts';

/** What noise goes through: all that is asked is how little it takes off. */
export type Passing = Pick<Response, 'leastDb'>;

/** What one stage's responses see of a true frequency f: slope f + shift, within one zone of every sampling so far. */
export interface View {
  readonly responses: readonly Passing[];
  readonly slope: 1 | -1;
  readonly shiftHz: number;
}

/** A range of true frequencies that folds as one, as far as it has been followed. */
export interface Stretch extends FrequencyRange {
  /** The stage reached comes last. */
  readonly views: readonly View[];
}

const POWER_NEPER_PER_DB = Math.LN10 / 10;

/** A stretch before any sampling. */
export function unfolded(range: FrequencyRange, responses: readonly Passing[]): Stretch {
  return { ...range, views: [{ responses, slope: 1, shiftHz: 0 }] };
}

/** The true frequency that the stage reached sees at a frequency. */
export function trueFrequencyOf(stretch: Stretch, seenHz: number): number {
  const { slope, shiftHz } = lastView(stretch);
  return slope * (seenHz - shiftHz);
}

/** Where the stage reached has a stretch. */
export function seenBy(stretch: Stretch): FrequencyRange {
  const { slope, shiftHz } = lastView(stretch);
  const first = slope * stretch.lowHz + shiftHz;
  const second = slope * stretch.highHz + shiftHz;
  return { lowHz: Math.max(Math.min(first, second), 0), highHz: Math.max(first, second) };
}

/** The part of a stretch that the stage reached has within a range. */
export function cutTo(stretch: Stretch, seen: FrequencyRange): Stretch {
  const first = trueFrequencyOf(stretch, seen.lowHz);
  const second = trueFrequencyOf(stretch, seen.highHz);
  return {
    views: stretch.views,
    lowHz: Math.max(stretch.lowHz, Math.min(first, second)),
    highHz: Math.min(stretch.highHz, Math.max(first, second)),
  };
}

/** A stretch, all of it in one zone (from 0) of the sampling at `rateHz`, as the stage after it has it. */
export function sampledInZone(stretch: Stretch, rateHz: number, zone: number, responses: readonly Passing[]): Stretch {
  const { slope, shiftHz } = lastView(stretch);
  const multipleHz = Math.ceil(zone / 2) * rateHz;
  const view: View =
    zone % 2 === 0
      ? { responses, slope, shiftHz: shiftHz - multipleHz }
      : { responses, slope: slope === 1 ? -1 : 1, shiftHz: multipleHz - shiftHz };
  return { lowHz: stretch.lowHz, highHz: stretch.highHz, views: [...stretch.views, view] };
}

/** What all responses on the way let through of a power density, over the true frequency. */
export function passedPower({ views }: Stretch): Integrand {
  return {
    at(hz) {
      let takenDb = 0;
      for (const { responses, slope, shiftHz } of views) {
        const seenHz = Math.max(slope * hz + shiftHz, 0);
        for (const response of responses) takenDb += response.leastDb(seenHz, seenHz);
      }
      return Math.exp(-takenDb * POWER_NEPER_PER_DB);
    },
    bound(lowHz, highHz) {
      let takenDb = 0;
      for (const { responses, slope, shiftHz } of views) {
        const first = Math.max(slope * lowHz + shiftHz, 0);
        const second = Math.max(slope * highHz + shiftHz, 0);
        for (const response of responses) takenDb += response.leastDb(Math.min(first, second), Math.max(first, second));
      }
      return Math.exp(-takenDb * POWER_NEPER_PER_DB);
    },
  };
}

function lastView({ views }: Stretch): View {
  return views[views.length - 1]!;
}
