import { arrivalsOf } from '../../server/src/chain/arrivals.ts';
import { chainOf } from '../../server/src/chain/chain.ts';
import type { Arrival, Chain } from '../../server/src/chain/model.ts';
import type { AliasMap } from '../../server/src/picture/alias-map-model.ts';
import { aliasMapModel } from '../../server/src/picture/alias-map-model.ts';
import { readChannel } from '../../server/src/rig/channel-reading.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';

export interface DrawnChannel {
  readonly name: string;
  readonly chain: Chain;
  readonly arrivals: readonly Arrival[];
  readonly map: AliasMap;
}

/** The map of every channel of a rig that has a chain. */
export function mapsOf(text: string): readonly DrawnChannel[] {
  const environment = readEnvironment(readSnapshot(text), []);
  return environment.channelEntries.flatMap((entry) => {
    const chain = chainOf(readChannel(entry, environment).channel);
    if (!chain) return [];
    const arrivals = arrivalsOf(chain);
    return [{ name: entry.name, chain, arrivals, map: aliasMapModel(chain, arrivals) }];
  });
}

/** Every channel of the samples and of the worked example. */
export const MAPS: readonly DrawnChannel[] = [EXTRACT_FAN, ...SAMPLES.map(({ text }) => text)].flatMap(mapsOf);
