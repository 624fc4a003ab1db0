import type { Channel, Undeclared } from '../rig/model.ts';
import { channelValue } from './channel-edit.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import type { Search } from './search.ts';
import { cured, furthestCured } from './search.ts';

/** The range of levels that is searched. */
const LOWEST_DBFS = -200;

export const stateUndeclared: RemedyDefinition = {
  name: 'state-undeclared',
  kind: 'claim',
  finds:
    'The highest level of what no source declares at which the finding is gone, for a person to confirm or replace.',
  why: 'Without a bound, anything up to full scale is assumed at every frequency. A measurement of the idle rig with a fast recorder tells what there is.',
  answers: ['no-filter', 'filter-short', 'thin-margin', 'step-without-filter'],
  search: searchBound,
};

function searchBound(search: Search): readonly Proposal[] {
  const { channel, context } = search;
  if (!channel || context.result?.chain?.levelUnit !== 'dbfs') return [];
  const bounded = (dbfs: number): Channel => withBound(channel, dbfs);
  if (!cured(search, bounded(LOWEST_DBFS))) return [];
  const highest = furthestCured(search, LOWEST_DBFS, 0, bounded, 14);
  const dbfs = Math.floor(highest * 10) / 10;
  if (!cured(search, bounded(dbfs))) return [];
  const level = `${dbfs} dBFS`;
  const edited = channelValue(search, 'undeclared', (other) => other.undeclared, level);
  const edit = edited?.edits[0];
  if (!edited || !edit) return [];
  const start = edit.start + edit.text.lastIndexOf(level);
  return [
    {
      does: `nothing undeclared exceeds ${level} at the input`,
      outcome: '',
      edits: edited.edits,
      fillIn: { start, end: start + level.length },
    },
  ];
}

function withBound(channel: Channel, dbfs: number): Channel {
  const value: Undeclared = { kind: 'level', level: { kind: 'dbfs', dbfs } };
  return { ...channel, undeclared: { value, place: channel.place } };
}
