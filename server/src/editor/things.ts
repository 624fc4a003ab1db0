import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Filter, Group, Source } from '../rig/model.ts';
import type { ThingKind } from '../rig/vocabulary-kinds.ts';
import type { Evaluation } from '../workbench/evaluation.ts';

/** A named thing with what tells it from others, in a few words. */
export interface NamedThing {
  readonly name: string;
  readonly detail: string;
}

/** Every thing of a kind that a rig names, in document order. */
export function thingsOf({ environment, channels }: Evaluation, kind: ThingKind): readonly NamedThing[] {
  switch (kind) {
    case 'clock':
      return [...environment.clocks.values()].map(({ name, frequencyHz }) => ({
        name,
        detail: frequencyHz ? formatHz(frequencyHz.value, 9) : 'clock',
      }));
    case 'digitizer':
      return [...environment.digitizers.values()].map(({ name, bits }) => ({
        name,
        detail: bits ? `${bits.value} bit` : 'digitizer',
      }));
    case 'sensor':
      return [...environment.sensors.values()].map(({ name, measures }) => ({
        name,
        detail: measures?.value ?? 'sensor',
      }));
    case 'filter':
      return [...environment.filters.values()].map((filter) => ({ name: filter.name, detail: filterWords(filter) }));
    case 'source':
      return [...environment.sources.values()].map((source) => ({ name: source.name, detail: sourceWords(source) }));
    case 'channel':
      return channels.map(({ result: { channel } }) => ({
        name: channel.name,
        detail: channel.count > 1 ? `${channel.count} channels` : 'channel',
      }));
    case 'group':
      return [...environment.groups.values()].map((group) => ({ name: group.name, detail: groupWords(group) }));
  }
}

/** A filter in a few words: `butterworth, order 6`. */
export function filterWords({ response, order }: Filter): string {
  if (!response) return 'filter';
  return order ? `${response.response}, order ${order.value}` : response.response;
}

/** A source in a few words: `tone at 50 Hz, 10 harmonics`. */
export function sourceWords(source: Source): string {
  const harmonics = source.harmonics > 1 ? `, ${source.harmonics} harmonics` : '';
  switch (source.type) {
    case 'tone':
      return `tone ${span(source.frequency.value)}${harmonics}`;
    case 'rotating':
      return `order ${source.order} of a shaft${harmonics}`;
    case 'modulated':
      return `carrier ${span(source.carrier.value)}${harmonics}`;
    case 'broadband':
      return `noise ${span(source.spans.value)}`;
  }
}

/** A group in a few words: `within 2 deg up to 1 kHz`. */
export function groupWords({ within, upToHz }: Group): string {
  if (!within || !upToHz) return 'group';
  const limit =
    within.value.kind === 'time'
      ? formatQuantity(within.value.seconds, 'time')
      : formatQuantity(within.value.degrees, 'angle');
  return `within ${limit} up to ${formatHz(upToHz.value)}`;
}

function span({ lowHz, highHz }: { readonly lowHz: number; readonly highHz: number }): string {
  return lowHz === highHz ? `at ${formatHz(lowHz)}` : `${formatHz(lowHz)} .. ${formatHz(highHz)}`;
}
