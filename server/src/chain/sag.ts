import { type Along, greatestPointAlong } from '../signal/cascade.ts';
import type { SignalPath } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';

/** The most that all filters of a path together take off anywhere in a range, the sensor apart. */
export interface Sag {
  /** At the worst of their tolerances; `Infinity` where nothing is promised. */
  readonly sagDb: number;
  readonly sagAtHz: number;
}

interface NotedSag {
  readonly lowHz: number;
  readonly highHz: number;
  readonly sag: Sag;
}

const SAGS: NoteKind<NotedSag> = { name: 'sag', most: 24 };

/** The sag over `lowHz .. highHz`, which every filter meets where it is, as far as the last Nyquist frequency lets it be recorded. */
export function sagOver(path: SignalPath, lowHz: number, highHz: number): Sag {
  for (const noted of notesOn(path, SAGS)) {
    if (noted.lowHz === lowHz && noted.highHz === highHz) return noted.sag;
  }
  const lastNyquistHz = path.ratesHz[path.ratesHz.length - 1]! / 2;
  const fromHz = Math.min(lowHz, lastNyquistHz);
  const toHz = Math.min(highHz, lastNyquistHz);
  const filters = path.known.flat().map((response) => ({ response, lowHz: fromHz, highHz: toHz, reversed: false }));
  return note(path, SAGS, { lowHz, highHz, sag: sagAlong(filters, fromHz, toHz) }).sag;
}

/** The greatest sum of some filters along a piece, told by the frequency that it has on a range `lowHz .. highHz`. */
export function sagAlong(filters: readonly Along[], lowHz: number, highHz: number): Sag {
  const { attenuationDb, t } = filters.length === 0 ? { attenuationDb: 0, t: 0 } : greatestPointAlong(filters);
  return { sagDb: attenuationDb, sagAtHz: t >= 1 ? highHz : lowHz + t * (highHz - lowHz) };
}
