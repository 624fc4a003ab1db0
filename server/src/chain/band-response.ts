import { alongPiece } from '../signal/cascade.ts';
import { foldThrough } from '../signal/folding.ts';
import type { Chain } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';
import { type Sag, sagAlong, sagOver } from './sag.ts';

/** What the filters and the sensor do inside the band. */
export interface BandResponse extends Sag {
  /** The most that the sensor alone lifts anywhere in the band; negative where it only takes off. */
  readonly liftDb: number;
  readonly liftAtHz: number;
}

interface NotedBand {
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly isBandpass: boolean;
  readonly response: BandResponse;
}

/** Of a band that crosses multiples of half the rate, which is an error anyway. */
const MOST_PIECES = 16;

const BANDS: NoteKind<NotedBand> = { name: 'response in the band', most: 24 };

/** The extremes of a chain's response over its band, as far as the last Nyquist frequency lets it be recorded. */
export function bandResponseOf(chain: Chain): BandResponse {
  const { path, bandLowHz, bandHighHz, isBandpass } = chain;
  for (const noted of notesOn(path, BANDS)) {
    const isSame = noted.bandHighHz === bandHighHz && noted.bandLowHz === bandLowHz && noted.isBandpass === isBandpass;
    if (isSame) return noted.response;
  }
  const response: BandResponse = {
    ...(isBandpass ? foldedSag(chain) : sagOver(path, bandLowHz, bandHighHz)),
    liftDb: -path.sensor.leastDb(bandLowHz, bandHighHz),
    liftAtHz: liftedMost(chain),
  };
  return note(path, BANDS, { bandLowHz, bandHighHz, isBandpass, response }).response;
}

/** Each filter meets the band as folded so far, a piece at a time. */
function foldedSag({ path, bandLowHz, bandHighHz }: Chain): Sag {
  let worst: Sag = { sagDb: 0, sagAtHz: bandLowHz };
  for (const piece of foldThrough(bandLowHz, bandHighHz, path.ratesHz, MOST_PIECES)) {
    const sag = sagAlong(alongPiece(piece, path.known), piece.trueLowHz, piece.trueHighHz);
    if (sag.sagDb > worst.sagDb) worst = sag;
  }
  return worst;
}

/** Where the sensor lifts most: at the resonance where that is in the band, otherwise at one of its ends. */
function liftedMost({ path, channel, bandLowHz, bandHighHz }: Chain): number {
  const resonanceHz = channel.sensor?.resonanceHz?.value ?? bandHighHz;
  const inside = Math.min(Math.max(resonanceHz, bandLowHz), bandHighHz);
  return path.sensor.attenuationDb(inside) <= path.sensor.attenuationDb(bandLowHz) ? inside : bandLowHz;
}
