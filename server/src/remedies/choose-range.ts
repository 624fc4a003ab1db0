import { readQuantity } from '../quantity/quantity.ts';
import { tableUnit } from '../quantity/unit.ts';
import { formatQuantity, writeLike, writeRangeLike } from '../quantity/write.ts';
import type { Channel, FullScale } from '../rig/model.ts';
import type { Edited } from './channel-edit.ts';
import { channelValue } from './channel-edit.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { formatNumber } from './describe.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';

/** How many listed ranges and gains are tried. */
const MOST_LISTED = 64;

const STEP_TOO_COARSE = 'step-too-coarse';

export const chooseRange: RemedyDefinition = {
  name: 'choose-range',
  kind: 'setting',
  finds:
    'Among the ranges and gains that the digitizer lists, the most sensitive one with which the finding is gone; of steps that are too coarse, the least sensitive one, and only where `peak` is known.',
  why: 'A range that is too small cuts the peaks off, one that is too large wastes the resolution of the converter.',
  answers: ['clips', 'headroom-thin', 'range-wasted', 'step-too-coarse'],
  search: (search) => (mayChoose(search) ? [...byRange(search), ...byGain(search)] : []),
};

/** A finer step is had from a range that may be too small: without a peak, nobody can say that it is not. */
function mayChoose({ context, channel }: Search): boolean {
  return context.finding.check !== STEP_TOO_COARSE || channel?.peak !== undefined;
}

/** Most sensitive first, but no finer step than is needed. */
function inOrder<T>(search: Search, mostSensitiveFirst: readonly T[]): readonly T[] {
  return search.context.finding.check === STEP_TOO_COARSE ? [...mostSensitiveFirst].reverse() : mostSensitiveFirst;
}

function byRange(search: Search): readonly Proposal[] {
  const { channel } = search;
  const ranges = channel?.digitizer?.ranges?.value;
  if (!channel || !ranges) return [];
  const smallestFirst = [...ranges].slice(0, MOST_LISTED).sort((a, b) => spanOf(a) - spanOf(b));
  const found = firstCured(search, inOrder(search, smallestFirst), (range) => ranged(channel, range));
  const edited = found && rangeEdits(search, channel, found.value);
  return found && edited
    ? [{ does: `Use the ${rangeName(found.value)} range`, outcome: changeOf(channel, found.value), ...edited }]
    : [];
}

function byGain(search: Search): readonly Proposal[] {
  const { channel } = search;
  const gains = channel?.digitizer?.gains?.value;
  if (!channel || !gains) return [];
  const largestFirst = [...gains].slice(0, MOST_LISTED).sort((a, b) => b - a);
  const found = firstCured(search, inOrder(search, largestFirst), (gain) => amplified(channel, gain));
  if (!found) return [];
  const edited = channelValue(search, 'gain', (other) => other.gain ?? other.digitizer?.gain, String(found.value));
  const today = channel.gain?.value ?? channel.digitizer?.gain?.value ?? 1;
  return edited
    ? [{ does: `Use a gain of ${found.value}`, outcome: `full scale x${formatNumber(today / found.value)}`, ...edited }]
    : [];
}

function ranged(channel: Channel, value: FullScale): Channel {
  return { ...channel, fullScale: { value, place: channel.place } };
}

function amplified(channel: Channel, value: number): Channel {
  return { ...channel, gain: { value, place: channel.place } };
}

function rangeEdits(search: Search, channel: Channel, range: FullScale): Edited | undefined {
  const written = (channel.fullScale ?? channel.digitizer?.fullScale)?.written;
  return channelValue(
    search,
    'full-scale',
    (other) => other.fullScale ?? other.digitizer?.fullScale,
    rangeText(range, written),
  );
}

function rangeText({ lowV, highV }: FullScale, written: Parameters<typeof writeLike>[1]): string {
  const volts = tableUnit('V');
  if (lowV !== -highV) return writeRangeLike(lowV, highV, written?.kind === 'range' ? written : undefined, volts);
  const like = written?.kind === 'symmetric' ? written : readQuantity('±1 V').quantity;
  return writeLike(highV, like, volts);
}

function rangeName({ lowV, highV }: FullScale): string {
  const high = formatQuantity(highV, 'voltage');
  return lowV === -highV ? `±${high}` : `${formatQuantity(lowV, 'voltage')} .. ${high}`;
}

function changeOf(channel: Channel, range: FullScale): string {
  const today = channel.fullScale ?? channel.digitizer?.fullScale;
  return today ? `full scale x${formatNumber(spanOf(range) / spanOf(today.value))}` : '';
}

function spanOf({ lowV, highV }: FullScale): number {
  return highV - lowV;
}
