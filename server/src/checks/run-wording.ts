import type { RunStorage } from '../chain/run-storage.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { ChannelResult } from './channel-result.ts';
import type { ChannelSummary } from './check.ts';

export function* resultsOf(channels: readonly ChannelSummary[]): Generator<ChannelResult> {
  for (const { result } of channels) yield result;
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
