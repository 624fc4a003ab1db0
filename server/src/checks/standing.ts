import type { Chain } from '../chain/model.ts';
import type { Channel, Inheritance } from '../rig/model.ts';
import type { Place } from '../rig/place.ts';
import type { RelatedPlace } from './finding.ts';
import { isOwnFilter } from './worst-filter.ts';

/** Where a finding stands, and where else the reader should look because of that. */
export interface Standing {
  readonly place: Place;
  readonly related: readonly RelatedPlace[];
}

interface Placed {
  readonly place: Place;
  readonly inherited?: Inheritance;
}

const NOTHING_RELATED: readonly RelatedPlace[] = [];

/**
 * Where a finding about a value of a channel stands: at the value, or on the channel's name where the value is
 * inherited, which is then related to where it comes from.
 */
export function standingOn(channel: Channel, value: Placed | undefined): Standing {
  if (!value) return { place: channel.place, related: NOTHING_RELATED };
  const { place, inherited } = value;
  if (!inherited && place.entry === channel.place.entry) return { place, related: NOTHING_RELATED };
  return {
    place: channel.place,
    related: [{ place: inherited?.place ?? place, message: 'The value comes from here.' }],
  };
}

/** Where a finding about the rate of a stage (from 1) stands: the rate itself, or the factor of a step. */
export function standingOnStage({ channel, stages }: Chain, stage: number): Standing {
  const step = stages[stage - 1]?.step;
  if (step) return standingOn(channel, step.kind === 'decimate' ? step.factor : step.perTurn);
  return standingOn(channel, channel.rateHz);
}

/** At the channel's own filter ahead of a stage (from 1), or at the stage's rate where it has none of its own. */
export function standingOnFilters(chain: Chain, stage: number): Standing {
  const own = chain.stages[stage - 1]!.filters.find(isOwnFilter);
  return own?.use ? standingOn(chain.channel, own.use) : standingOnStage(chain, stage);
}

/** The filters ahead of a stage (from 1) that the file names, each with a word on it. */
export function filtersAhead({ stages }: Chain, stage: number): readonly RelatedPlace[] {
  const filters = stages[stage - 1]?.filters ?? [];
  return filters.flatMap(({ use }) => {
    if (!use?.filter) return [];
    const name = use.filter.name === '' ? 'This filter' : `\`${use.filter.name}\``;
    return [{ place: use.filter.place, message: `${name} stands before this sampling.` }];
  });
}
