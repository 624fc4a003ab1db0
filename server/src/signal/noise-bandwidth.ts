import { foldThrough } from './folding.ts';
import { type FrequencyRange, merged, within, without } from './frequency-range.ts';
import { landedBandwidth, type NoiseFold, noiseFold } from './noise-fold.ts';
import type { Passing } from './noise-stretch.ts';
import type { Response } from './response.ts';

/** What noise goes through on the way from a sensor to a record. */
export interface NoisePath {
  /** The rate of each sampling, the converter's first. */
  readonly ratesHz: readonly number[];
  /** Ahead of each sampling in turn, and last of those behind the last one. */
  readonly responses: readonly (readonly Response[])[];
  readonly sensor: Response;
}

/** The band that is used, in true frequency. With `bandpass` it is folded on purpose and read where it lands. */
export interface NoiseBand extends FrequencyRange {
  readonly sampling: 'baseband' | 'bandpass';
}

/**
 * Where noise comes in: at the sensor (its response comes first), in the wiring ahead of the analogue filters, or in
 * the record of a sampling, from 1 (a converter's own noise: 1), up to half its rate.
 */
export type NoiseEntry =
  | { readonly at: 'sensor' }
  | { readonly at: 'wiring' }
  | { readonly at: 'record'; readonly stage: number };

/** What lands in the band of noise of power density 1, as the bandwidths in Hz that would hold as much of it. */
export type NoiseBandwidth =
  | { readonly kind: 'bounded'; readonly nativeHz: number; readonly foldedHz: number }
  /**
   * Nothing says how high the noise reaches, and the filters ahead of the first sampling take off no more than
   * `floorDb` however high it does: what folds has no bound.
   */
  | { readonly kind: 'unbounded'; readonly nativeHz: number; readonly floorDb: number };

/** Where the fall of a filter is looked at, far above any edge of one. */
const FAR_HZ = 1e13;
const FARTHER_HZ = 1e15;

/** Two decades apart: more than the 10 dB a decade under which the integral of a power never ends. */
const LEAST_FALL_DB = 30;

/**
 * What lands in the band of noise of power density 1, native (recorded at its true frequency, or, of a band folded on
 * purpose, truly in the band) and folded. Power densities add, at every sampling anew. Both are worked out to 0.01 dB,
 * the folded part to that or to 60 dB under the native one. The tolerance of every filter counts as what lets most
 * through.
 *
 * Nothing lands in a band without width, above the last Nyquist frequency, or of a path whose rates are not positive.
 *
 * @param spans what the noise fills; left out, all there is
 */
export function noiseBandwidth(
  path: NoisePath,
  band: NoiseBand,
  enters: NoiseEntry,
  spans: FrequencyRange = { lowHz: 0, highHz: Infinity },
): NoiseBandwidth {
  const nothing: NoiseBandwidth = { kind: 'bounded', nativeHz: 0, foldedHz: 0 };
  if (!path.ratesHz.every((rateHz) => rateHz > 0 && rateHz < Infinity)) return nothing;
  const { fold, native, topHz } = approachOf(path, band, enters);
  const lowHz = Math.max(spans.lowHz, 0);
  const filled = { lowHz, highHz: Math.min(spans.highHz, topHz) };
  if (!(filled.lowHz < filled.highHz)) return nothing;
  const nativeHz = within(native, filled).reduce((sum, range) => sum + landedBandwidth(fold, range, 0), 0);
  if (filled.highHz === Infinity) {
    const floorDb = floorOf(fold.responses[0] ?? []);
    if (floorDb !== undefined) return { kind: 'unbounded', nativeHz, floorDb };
  }
  let foldedHz = 0;
  for (const range of without(filled, native)) {
    foldedHz += landedBandwidth(fold, range, 1e-8 * nativeHz + 1e-6 * foldedHz);
  }
  return { kind: 'bounded', nativeHz, foldedHz };
}

/** From where noise comes in: what is still to come, which of its frequencies are native, and where they end. */
interface Approach {
  readonly fold: NoiseFold;
  readonly native: readonly FrequencyRange[];
  readonly topHz: number;
}

function approachOf({ ratesHz, responses, sensor }: NoisePath, band: NoiseBand, enters: NoiseEntry): Approach {
  const passed = enters.at === 'record' ? Math.min(Math.max(enters.stage, 1), ratesHz.length) : 0;
  const lastNyquistHz = (ratesHz[ratesHz.length - 1] ?? Infinity) / 2;
  const highHz = band.sampling === 'baseband' ? Math.min(band.highHz, lastNyquistHz) : band.highHz;
  const pieces = band.lowHz < highHz ? foldThrough(Math.max(band.lowHz, 0), highHz, ratesHz) : [];
  const recorded = pieces.map((piece) => ({ lowHz: piece.recordedLowHz, highHz: piece.recordedHighHz }));
  const native = pieces.map((piece, index) => piece.inputs[passed] ?? recorded[index]!);
  const ahead = responses.slice(passed);
  const fold = noiseFold({
    ratesHz: ratesHz.slice(passed),
    responses: enters.at === 'sensor' ? [[sensor, ...(ahead[0] ?? [])], ...ahead.slice(1)] : ahead,
    landing: merged(recorded),
  });
  return { fold, native: merged(native), topHz: passed === 0 ? Infinity : ratesHz[passed - 1]! / 2 };
}

/** The least that the responses take off however high the frequency; `undefined` where what they let through ends. */
function floorOf(responses: readonly Passing[]): number | undefined {
  const farDb = takenAbove(responses, FAR_HZ);
  const fartherDb = takenAbove(responses, FARTHER_HZ);
  return fartherDb === Infinity || fartherDb - farDb > LEAST_FALL_DB ? undefined : fartherDb;
}

function takenAbove(responses: readonly Passing[], lowHz: number): number {
  return responses.reduce((sum, response) => sum + response.leastDb(lowHz, Infinity), 0);
}
