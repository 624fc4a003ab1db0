import { type RunStorage, runStorage } from '../chain/run-storage.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Evaluation } from './evaluation.ts';

export type { RunStorage } from '../chain/run-storage.ts';

/** What the run of a file makes of data; `undefined` for a file without `run`. */
export function runTotals({ environment, channels }: Evaluation): RunStorage | undefined {
  return environment.run && runStorage(environment.run, channels);
}

/** Totals in a few words: `76.8 kB/s, 2.212 GB in all`, and how many channels are not among them, if any. */
export function totalsText({ bytesPerSecond, bytes, channelsLeftOut }: Omit<RunStorage, 'channels'>): string {
  const rate = formatQuantity(bytesPerSecond, 'data-rate', 4);
  const all = bytes === undefined ? rate : `${rate}, ${formatQuantity(bytes, 'data', 4)} in all`;
  if (channelsLeftOut === 0) return all;
  return `${all}, without ${channelsLeftOut === 1 ? '1 channel' : `${channelsLeftOut} channels`} whose rate or bits are not known`;
}
