import type { Source, Thing } from '../../rig/model.ts';
import type { ChannelSummary, RigView } from '../check.ts';
import { mentionCounts } from './mention-counts.ts';
import type { SaidOfDocument } from './problems.ts';

type Kind = 'clock' | 'digitizer' | 'sensor' | 'filter';

const SECTIONS: readonly (readonly [Kind, 'clocks' | 'digitizers' | 'sensors' | 'filters'])[] = [
  ['clock', 'clocks'],
  ['digitizer', 'digitizers'],
  ['sensor', 'sensors'],
  ['filter', 'filters'],
];

/** Named things that nothing names, and sources that no channel hears. */
export function unusedNames({ environment, channels }: RigView): readonly SaidOfDocument[] {
  const counts = mentionCounts(channels);
  const elsewhere = new Set(environment.mentions.map(({ kind, name }) => `${kind} ${name}`));
  const said: SaidOfDocument[] = [];
  for (const [kind, section] of SECTIONS) {
    const counted = counts.get(kind);
    const things: Iterable<Thing> = environment[section].values();
    for (const thing of things) {
      if (!counted?.has(thing.name) && !elsewhere.has(`${kind} ${thing.name}`)) said.push(saidOf(thing, kind, section));
    }
  }
  return [...said, ...unheardByAll(environment.sources, channels)];
}

function saidOf({ name, place }: Thing, kind: string, section: string): SaidOfDocument {
  return {
    check: 'unused-name',
    severity: 'hint',
    thing: `${section}/${name}`,
    message: `Nothing names the ${kind} \`${name}\`, so it has no part in any channel.`,
    place,
    excess: 1,
  };
}

/** Sources that every channel leaves out; those left out for their quantity are told elsewhere. */
function unheardByAll(
  sources: ReadonlyMap<string, Source>,
  channels: readonly ChannelSummary[],
): readonly SaidOfDocument[] {
  if (channels.length === 0) return [];
  const silent = new Set(sources.values());
  let before: readonly object[] | undefined;
  for (const { result } of channels) {
    if (silent.size === 0) break;
    const { heard, unheard } = result.channel;
    // Channels that hear all share one list.
    if (heard === before) continue;
    before = heard;
    for (const { source } of heard) silent.delete(source);
    for (const source of unheard) silent.delete(source);
  }
  return [...silent].map((source) => ({
    ...saidOf(source, 'source', 'sources'),
    message: `No channel hears the source \`${source.name}\`, so it has no part in the check.`,
  }));
}
