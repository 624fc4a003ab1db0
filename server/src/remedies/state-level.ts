import type { Source } from '../rig/model.ts';
import type { TextEdit } from '../rig/snapshot.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { replaceNode, setKey } from './edit-text.ts';
import type { Search } from './search.ts';
import type { NewValue } from './written-value.ts';

/** A level is proposed this far below what would just do, so that rounding can not spoil it. */
const MARGIN_DB = 0.1;

export const stateLevel: RemedyDefinition = {
  name: 'state-level',
  kind: 'claim',
  finds:
    'The level of a source that has none, at the highest value that spoils no channel, for a person to confirm or replace.',
  why: 'Without a level full scale is assumed, which is rarely so. What it really is, only somebody who measures it or has the data sheet can say.',
  answers: ['fold-unlevelled', 'on-nyquist'],
  search: searchLevel,
};

function searchLevel(search: Search): readonly Proposal[] {
  const { context, channel } = search;
  const { about } = context.finding;
  const source = channel?.heard.find((heard) => heard.source.name === about)?.source;
  if (!source || source.levels.length > 0) return [];
  const excess = worstExcess(search, source);
  if (excess === undefined) return [];
  const dbfs = Math.floor((-excess - MARGIN_DB) * 10) / 10;
  const level = `${dbfs} dBFS`;
  const edits = levelEdits(search, source, level);
  const edit = edits?.[0];
  if (!edits || !edit) return [];
  const start = edit.start + edit.text.lastIndexOf(level);
  return [
    {
      does: `${source.name} stays below ${level} at the input`,
      outcome: '',
      edits,
      fillIn: { start, end: start + level.length },
    },
  ];
}

/** dB by which the source, taken as full scale, is too high in the channel where it is worst. */
function worstExcess({ context }: Search, source: Source): number | undefined {
  const { finding, results } = context;
  let worst: number | undefined;
  for (const result of results) {
    for (const { check, about, excess } of result.findings) {
      if (check !== 'fold-unlevelled' && check !== finding.check) continue;
      if (about !== source.name || !Number.isFinite(excess)) continue;
      if (result.chain?.levelUnit !== 'dbfs') return undefined;
      worst = Math.max(worst ?? excess, excess);
    }
  }
  return worst;
}

function levelEdits({ context }: Search, source: Source, level: string): readonly TextEdit[] | undefined {
  const { snapshot } = context;
  const { entry } = source.place;
  if (entry.value.kind !== 'scalar') return setKey(snapshot, entry, entry.value, 'level', level);
  // `mains: 50 Hz` says the frequency alone.
  const map = new Map<string, NewValue>([
    ['frequency', entry.value.text],
    ['level', level],
  ]);
  return replaceNode(snapshot, entry, entry.value, map);
}
