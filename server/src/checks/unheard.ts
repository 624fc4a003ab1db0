import type { Source } from '../rig/model.ts';
import type { Brought } from '../rig/used-things.ts';
import type { RigView, SaidOfRig } from './check.ts';
import { levelUnplaced } from './level-unplaced.ts';

/**
 * One hint for each source that channels leave out of `hears: all`, because its level is in a quantity that they don't
 * measure: told at the source, as `level-unplaced`, with the number of those channels. One of a used file is told where that file
 * is named.
 */
export function unheardSources({ environment, roster }: RigView): readonly SaidOfRig[] {
  const counts = new Map<Source, number>();
  for (const { result } of roster.unhearing) {
    const { unheard, sensor, sensorPlace, count } = result.channel;
    // What a sensor measures that is named and not known, nobody can say.
    if (sensorPlace && !sensor) continue;
    for (const source of unheard) counts.set(source, (counts.get(source) ?? 0) + count);
  }
  const { joined } = environment.core;
  return [...counts].map(([source, count]) => {
    const brought = joined.things.source.get(source.name);
    return saidOf(source, count, brought?.thing === source ? brought : undefined);
  });
}

function saidOf(source: Source, count: number, brought: Brought | undefined): SaidOfRig {
  const level = source.levels[0]?.value;
  const unit = level?.kind === 'measured' ? level.unit : 'another unit';
  const [who, which] =
    count === 1
      ? ['1 channel does not hear', 'that channel does not measure']
      : [`${count.toLocaleString('en')} channels do not hear`, 'those channels do not measure'];
  return {
    severity: 'hint',
    thing: `sources/${source.name}`,
    message: `${who} \`${source.name}\`, because its level is in ${unit}, which ${which}. A channel that hears it all the same has to name it in \`hears\`.`,
    place: brought ? brought.item.place : source.place,
    related: brought ? [{ place: source.place, message: `\`${source.name}\` is declared here.` }] : [],
    figures: { channels: count },
    excess: count,
  };
}

/** The check that this is told as. */
export const UNHEARD_IS = levelUnplaced.name;
