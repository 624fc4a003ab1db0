import { foldHz, foldThrough } from '../signal/folding.ts';

/** Where a band is in the record. */
export interface RecordedBand {
  readonly lowHz: number;
  readonly highHz: number;
  /** Whether the record holds it upside down. */
  readonly mirrored: boolean;
}

/** Pieces of a band that crosses multiples of half a rate: all that have to be known to say where it ends up. */
const MOST_PIECES = 64;

/**
 * Where a band that is folded on purpose ends up: one range, as long as it crosses no multiple of half the rate of any
 * stage. One that does is taken to be recorded wherever some of it is.
 */
export function foldedBand(lowHz: number, highHz: number, ratesHz: readonly number[]): RecordedBand {
  const pieces = foldThrough(lowHz, highHz, ratesHz, MOST_PIECES);
  const first = pieces[0];
  if (!first) return { lowHz: ratesHz.reduce(foldHz, lowHz), highHz: ratesHz.reduce(foldHz, highHz), mirrored: false };
  return {
    lowHz: Math.min(...pieces.map(({ recordedLowHz }) => recordedLowHz)),
    highHz: Math.max(...pieces.map(({ recordedHighHz }) => recordedHighHz)),
    mirrored: first.mirrored,
  };
}
