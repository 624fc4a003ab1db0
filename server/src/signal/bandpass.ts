/**
 * Bandpass sampling: a band that is folded on purpose must lie within one zone, so that no part of it folds onto
 * another. The rates that allow it are the windows 2 fH / n <= rate <= 2 fL / (n - 1), n = 1 .. floor(fH / (fH - fL)).
 * Source: R. G. Vaughan, N. L. Scott and D. R. White, The theory of bandpass sampling, IEEE Trans. Signal Processing
 * 1991.
 */

/** The band, in true frequency, and how far the clock may be off either way, as a part of the rate. */
export interface BandpassBand {
  readonly lowHz: number;
  readonly highHz: number;
  readonly rateTolerance: number;
}

/** Nominal rates that keep the band within one zone whatever the clock does in its tolerance; the ends are allowed. */
export interface RateWindow {
  /** The zone that the band is in, n. 1 is sampling as usual. */
  readonly index: number;
  readonly lowRateHz: number;
  /** `Infinity` for n = 1. */
  readonly highRateHz: number;
  /** Whether the record keeps the spectrum the right way up, as it does in odd zones. */
  readonly upright: boolean;
}

/** Where a rate is among the windows. */
export type RatePlace =
  | { readonly kind: 'inside'; readonly window: RateWindow }
  | {
      readonly kind: 'outside';
      /** The windows on either side; there is always one above. */
      readonly above: RateWindow;
      readonly below: RateWindow | undefined;
      /** How far the rate is from the nearer of them. */
      readonly missesByHz: number;
    }
  /** No rate is allowed, or the band or the rate is none. */
  | { readonly kind: 'none' };

/** What rounding may take off a whole number of bandwidths. */
const ROUNDING = 1e-9;

/** What rounding may take off a rate, as a part of it. */
const TOUCHING = 1e-12;

/**
 * How many windows there are, n = 1 .. this. `Infinity` for a band of no width and an exact clock; 0 where the band
 * is none (low below 0, or above high) or the tolerance is not in 0 .. 1.
 *
 * A clock's tolerance closes the narrow windows of many zones, just as a band widened by it would.
 */
export function rateWindowCount({ lowHz, highHz, rateTolerance }: BandpassBand): number {
  if (!(lowHz >= 0 && lowHz <= highHz && highHz > 0 && highHz < Infinity)) return 0;
  if (!(rateTolerance >= 0 && rateTolerance < 1)) return 0;
  const top = highHz * (1 + rateTolerance);
  return Math.max(1, Math.floor(top / (top - lowHz * (1 - rateTolerance)) + ROUNDING));
}

/** Window n, from the top down: 1 is the one without a highest rate. `undefined` where there is none. */
export function rateWindow(band: BandpassBand, index: number): RateWindow | undefined {
  if (!(Number.isInteger(index) && index >= 1 && index <= rateWindowCount(band))) return undefined;
  const { lowHz, highHz, rateTolerance } = band;
  const lowRateHz = (2 * highHz) / index / (1 - rateTolerance);
  const highRateHz = index === 1 ? Infinity : (2 * lowHz) / (index - 1) / (1 + rateTolerance);
  // A window of no width stays one when rounding crosses its ends.
  return { index, lowRateHz, highRateHz: Math.max(lowRateHz, highRateHz), upright: index % 2 === 1 };
}

/** The window that a nominal rate is in, or those on either side of it. */
export function rateAmongWindows(band: BandpassBand, rateHz: number): RatePlace {
  const count = rateWindowCount(band);
  if (count < 1 || !(rateHz > 0 && rateHz < Infinity)) return { kind: 'none' };
  const zone = Math.ceil((2 * band.highHz) / rateHz / (1 - band.rateTolerance));
  // Rounding may put a rate at the end of a window one zone off.
  for (const index of [zone - 1, zone, zone + 1]) {
    const window = rateWindow(band, index);
    if (window && isWithin(window, rateHz)) return { kind: 'inside', window };
  }
  return outside(band, rateHz, Math.min(zone, count, Number.MAX_SAFE_INTEGER));
}

/** Touching a multiple of half the rate is not crossing it, whatever rounding made of the touch. */
function isWithin({ lowRateHz, highRateHz }: RateWindow, rateHz: number): boolean {
  return rateHz >= lowRateHz * (1 - TOUCHING) && rateHz <= highRateHz * (1 + TOUCHING);
}

/** Goes on from a window near the rate, up to the lowest one above it. */
function outside(band: BandpassBand, rateHz: number, near: number): RatePlace {
  for (let index = near; index >= 1; index--) {
    const above = rateWindow(band, index);
    if (above === undefined) break;
    if (above.lowRateHz <= rateHz) continue;
    const below = rateWindow(band, index + 1);
    const fromBelowHz = below === undefined ? Infinity : rateHz - below.highRateHz;
    return { kind: 'outside', above, below, missesByHz: Math.min(above.lowRateHz - rateHz, fromBelowHz) };
  }
  return { kind: 'none' };
}
