import { type RunStorage, runStorage } from '../chain/run-storage.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Run } from '../rig/model.ts';
import type { RigView } from './check.ts';

/** What has been added up already: two checks ask for the same sums, one after the other. */
const sums = new WeakMap<RigView, RunStorage>();

/** What the run of a rig makes of data, all channels together. */
export function storageOf(rig: RigView, run: Run): RunStorage {
  const known = sums.get(rig);
  if (known) return known;
  const storage = runStorage(run, rig.channels);
  sums.set(rig, storage);
  return storage;
}

/** Whose data it is: `64 channels`, `64 of 70 channels` where the rest is not known. */
export function channelsText({ channels, channelsLeftOut }: RunStorage): string {
  if (channelsLeftOut > 0) return `${channels} of ${channels + channelsLeftOut} channels`;
  return channels === 1 ? 'the samples of 1 channel' : `${channels} channels`;
}

export function bytesText(bytes: number): string {
  return formatQuantity(bytes, 'data', 4);
}

export function rateText(bytesPerSecond: number): string {
  return formatQuantity(bytesPerSecond, 'data-rate', 4);
}
