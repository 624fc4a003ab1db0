import { type ChannelSpectrum, spectrumOf } from '../chain/spectrum.ts';
import type { Channel, Given, Spectrum } from '../rig/model.ts';
import type { Edited } from './channel-edit.ts';
import { setEntryKey, setKey } from './edit-text.ts';
import type { Search } from './search.ts';
import { nodeAt } from './steps.ts';
import type { NewValue } from './written-value.ts';

/** The keys of a spectrum that remedies write. */
export type SpectrumKey = 'lines' | 'resolution' | 'record' | 'window' | 'averages';

/** The spectrum of the finding's channel as it stands. */
export function spectrumNow({ context }: Search): ChannelSpectrum | undefined {
  const chain = context.result?.chain;
  return chain && spectrumOf(chain);
}

/** The channel with parts of its spectrum changed. */
export function withSpectrum(channel: Channel, changes: Partial<Spectrum>): Channel | undefined {
  const { spectrum } = channel;
  return spectrum && { ...channel, spectrum: { ...spectrum, value: { ...spectrum.value, ...changes } } };
}

/** A value in place of one that was written, or of none, at the same place. */
export function inPlaceOf<T>(given: Given<unknown> | undefined, value: T, channel: Channel): Given<T> {
  return { value, place: given?.place ?? channel.place };
}

/**
 * Edits that write a key of the channel's spectrum; where the spectrum is inherited, all of it is written into the
 * channel, and the same is offered at its origin.
 */
export function spectrumValue(search: Search, key: SpectrumKey, value: string): Edited | undefined {
  const { channel, context } = search;
  const given = channel?.spectrum;
  if (!channel || !given) return undefined;
  const { entry } = channel.place;
  const there = keyEdits(search, given, key, value);
  if (!given.inherited && given.place.entry === entry) return there && { edits: there };
  const edits = setEntryKey(context.snapshot, entry, 'spectrum', spectrumText(given.value, key, value));
  if (!edits) return undefined;
  const channels = countSharing(search, given);
  return there && channels > 1 ? { edits, shared: { edits: there, channels } } : { edits };
}

/** Edits of the map where it stands. */
function keyEdits({ context }: Search, { place }: Given<Spectrum>, key: SpectrumKey, value: string) {
  const node = nodeAt(place.entry.value, place.start);
  return node && setKey(context.snapshot, place.entry, node, key, value);
}

function countSharing({ context }: Search, { place }: Given<Spectrum>): number {
  let channels = 0;
  for (const { channel } of context.results) {
    const other = channel.spectrum?.place;
    if (other?.entry === place.entry && other.start === place.start) channels++;
  }
  return channels;
}

/** A spectrum as it would be written, one value of it changed. */
function spectrumText(spectrum: Spectrum, key: SpectrumKey, value: string): NewValue {
  const { length, window, overlap, averages, separateHz } = spectrum;
  const pairs = new Map<string, NewValue>();
  const add = (name: string, given: Given<unknown> | undefined): void => {
    if (given) pairs.set(name, textOf(given));
  };
  add(length.value.by, length);
  add('window', window);
  add('overlap', overlap);
  add('averages', averages);
  add('separate', separateHz);
  return pairs.set(key, value);
}

function textOf({ place }: Given<unknown>): string {
  return place.entry.text.slice(place.start, place.end);
}
