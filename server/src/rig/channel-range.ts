import { clipped, innerSpan, namePlace } from './fields.ts';
import { MOST_CHANNELS } from './limits.ts';
import { type BraceRange, type NamePart, namePartsOf, namesOf, sizeOf } from './name-pattern.ts';
import { type Reader, report } from './reader.ts';

/** What the name of a channel's entry stands for. */
interface ChannelRange {
  readonly parts: readonly NamePart[];
  /** 1 for a range that can't be counted out, whose entry is then one channel like any other. */
  readonly count: number;
  readonly fault: Fault | undefined;
}

type Fault = { readonly kind: 'upside-down'; readonly range: BraceRange } | { readonly kind: 'huge' };

/** `undefined` for a plain name, as most are. */
export function channelRange(name: string): ChannelRange | undefined {
  if (!name.includes('{')) return undefined;
  const parts = namePartsOf(name);
  const ranges = parts.filter((part) => part.kind === 'numbers');
  if (ranges.length === 0) return undefined;
  const upsideDown = ranges.find((range) => sizeOf(range) < 1);
  if (upsideDown) return { parts, count: 1, fault: { kind: 'upside-down', range: upsideDown } };
  const count = ranges.reduce((product, range) => product * sizeOf(range), 1);
  return count > MOST_CHANNELS ? { parts, count: 1, fault: { kind: 'huge' } } : { parts, count, fault: undefined };
}

/** How many channels an entry of that name stands for. */
export function channelCount(name: string): number {
  return channelRange(name)?.count ?? 1;
}

/** The names of the channels that an entry of that name stands for; its own where that is the only one. */
export function channelNames(name: string): readonly string[] {
  const range = channelRange(name);
  return range && !range.fault ? namesOf(range.parts) : [name];
}

/** Says what is wrong with the brace ranges of the name of a channel that is being read. */
export function reportChannelRange(reader: Reader): void {
  const { entry } = reader;
  const fault = channelRange(entry.name)?.fault;
  if (!fault || !entry.key) return;
  const name = clipped(entry.name);
  if (fault.kind === 'huge') {
    const most = MOST_CHANNELS.toLocaleString('en');
    const message = `\`${name}\` stands for more channels than the ${most} that a file may have; it is checked as one channel.`;
    report(reader, { name: 'too-much', place: namePlace(entry), message, about: name });
    return;
  }
  const { start, end } = fault.range;
  const written = entry.name.slice(start, end);
  const turned = written.replace(/\{(\d+)\.\.(\d+)\}/, '{$2..$1}');
  report(reader, {
    name: 'out-of-range',
    place: innerSpan(entry, entry.key, start, end),
    message: `\`${written}\` is upside down, so it stands for no channels: write \`${turned}\`. Until then \`${name}\` is checked as one channel.`,
    about: name,
    cure: { kind: 'replace', text: turned },
  });
}
