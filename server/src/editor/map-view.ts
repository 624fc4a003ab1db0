import { arrivalsOf } from '../chain/arrivals.ts';
import { aliasMapCharacters } from '../picture/alias-map-characters.ts';
import { aliasMapModel } from '../picture/alias-map-model.ts';
import { aliasMapSvg } from '../picture/alias-map-svg.ts';
import type { Position } from '../rig/place.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import { worstChannel } from '../workbench/worst-channel.ts';
import type { ClientAbilities } from './client-abilities.ts';

/** What a view beside the file shows. */
export interface MapView {
  readonly title: string;
  readonly svg: string;
  /** The same in characters, for those who read it so. */
  readonly text: string;
}

/** The alias map of the channel under the cursor, or of the one with the gravest findings where there is none. */
export function mapAt(evaluation: Evaluation, position: Position, abilities: ClientAbilities): MapView | null {
  const judged = channelAt(evaluation, position) ?? worstChannel(evaluation);
  const chain = judged?.result.chain;
  if (!chain) return null;
  const model = aliasMapModel(chain, arrivalsOf(chain));
  return {
    title: chain.channel.name,
    svg: aliasMapSvg(model, { theme: abilities.theme }),
    text: aliasMapCharacters(model, { ascii: false }),
  };
}

/** The channel whose entry holds a position. */
export function channelAt(evaluation: Evaluation, position: Position): JudgedChannel | undefined {
  const entry = evaluation.snapshot.entryAt(evaluation.snapshot.offsetAt(position));
  if (entry?.section !== 'channels') return undefined;
  return evaluation.channels.find(({ result }) => result.channel.place.entry === entry);
}
