import { greatestPointAlong } from '../signal/cascade.ts';
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
  readonly response: BandResponse;
}

const BANDS: NoteKind<NotedBand> = { name: 'response in the band', most: 24 };

/** The extremes of a chain's response over its band, as far as the last Nyquist frequency lets it be recorded. */
export function bandResponseOf(chain: Chain): BandResponse {
  const { path, bandLowHz, bandHighHz } = chain;
  for (const noted of notesOn(path, BANDS)) {
    if (noted.bandHighHz === bandHighHz && noted.bandLowHz === bandLowHz) return noted.response;
  }
  const lastNyquistHz = path.ratesHz[path.ratesHz.length - 1]! / 2;
  const lowHz = Math.min(bandLowHz, lastNyquistHz);
  const highHz = Math.min(bandHighHz, lastNyquistHz);
  const at = (t: number): number => (t >= 1 ? highHz : lowHz + t * (highHz - lowHz));
  const filters = path.known.flat().map((response) => ({ response, lowHz, highHz, reversed: false }));
  const sag = filters.length === 0 ? { attenuationDb: 0, t: 0 } : greatestPointAlong(filters);
  const response: BandResponse = {
    sagDb: sag.attenuationDb,
    sagAtHz: at(sag.t),
    liftDb: -path.sensor.leastDb(bandLowHz, bandHighHz),
    liftAtHz: liftedMost(chain),
  };
  return note(path, BANDS, { bandLowHz, bandHighHz, response }).response;
}

/** Where the sensor lifts most: at the resonance where that is in the band, otherwise at one of its ends. */
function liftedMost({ path, channel, bandLowHz, bandHighHz }: Chain): number {
  const resonanceHz = channel.sensor?.resonanceHz?.value ?? bandHighHz;
  const inside = Math.min(Math.max(resonanceHz, bandLowHz), bandHighHz);
  return path.sensor.attenuationDb(inside) <= path.sensor.attenuationDb(bandLowHz) ? inside : bandLowHz;
}
