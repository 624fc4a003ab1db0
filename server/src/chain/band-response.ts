import { type Along, alongPiece, greatestPointAlong } from '../signal/cascade.ts';
import { foldThrough } from '../signal/folding.ts';
import type { Chain } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';

/** What the filters and the sensor do inside the band. */
export interface BandResponse {
  /** The most that the filters take off anywhere in the band, worst tolerance; `Infinity` where nothing is promised. */
  readonly sagDb: number;
  /** Where. */
  readonly sagAtHz: number;
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
    ...(isBandpass ? foldedSag(chain) : nativeSag(chain)),
    liftDb: -path.sensor.leastDb(bandLowHz, bandHighHz),
    liftAtHz: liftedMost(chain),
  };
  return note(path, BANDS, { bandLowHz, bandHighHz, isBandpass, response }).response;
}

type Sag = Pick<BandResponse, 'sagDb' | 'sagAtHz'>;

/** Every filter meets the band where it is. */
function nativeSag({ path, bandLowHz, bandHighHz }: Chain): Sag {
  const lastNyquistHz = path.ratesHz[path.ratesHz.length - 1]! / 2;
  const lowHz = Math.min(bandLowHz, lastNyquistHz);
  const highHz = Math.min(bandHighHz, lastNyquistHz);
  return sagAlong(
    path.known.flat().map((response) => ({ response, lowHz, highHz, reversed: false })),
    lowHz,
    highHz,
  );
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

function sagAlong(filters: readonly Along[], lowHz: number, highHz: number): Sag {
  const { attenuationDb, t } = filters.length === 0 ? { attenuationDb: 0, t: 0 } : greatestPointAlong(filters);
  return { sagDb: attenuationDb, sagAtHz: t >= 1 ? highHz : lowHz + t * (highHz - lowHz) };
}

/** Where the sensor lifts most: at the resonance where that is in the band, otherwise at one of its ends. */
function liftedMost({ path, channel, bandLowHz, bandHighHz }: Chain): number {
  const resonanceHz = channel.sensor?.resonanceHz?.value ?? bandHighHz;
  const inside = Math.min(Math.max(resonanceHz, bandLowHz), bandHighHz);
  return path.sensor.attenuationDb(inside) <= path.sensor.attenuationDb(bandLowHz) ? inside : bandLowHz;
}
