import { reachableRates } from '../chain/reachable.ts';
import type { Finding } from '../checks/finding.ts';
import { formatHz } from '../quantity/write.ts';
import type { NamedSection } from '../rig/entry.ts';
import type { Channel } from '../rig/model.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { TreeNode } from '../rig/tree.ts';
import type { ContextName } from '../rig/vocabulary.ts';
import { keyRow } from '../rig/vocabulary.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { setKey } from './edit-text.ts';
import { roundedHz } from './filter-model.ts';
import { firstPair } from './new-thing.ts';
import { rateText } from './rates.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import { nodeAt } from './steps.ts';

/** Common practice asks a rate of 2.56 times the band's top for spectrum work. */
const USUAL_RATE_OVER_TOP = 2.56;

/** Of the widest usual band. */
const BAND_PARTS = [1, 1 / 2, 1 / 4, 1 / 8, 1 / 16, 1 / 32] as const;

export const addMissingKey: RemedyDefinition = {
  name: 'add-missing-key',
  kind: 'text',
  finds: 'The key that is missing, with a value that shows how it is written.',
  why: 'Without it the thing can not be computed with. The value is a proposal for a person to replace, so it is never written without being asked for.',
  answers: ['missing-key'],
  search: searchKey,
};

const CONTEXT_OF_SECTION: Readonly<Record<NamedSection, ContextName>> = {
  clocks: 'clock',
  digitizers: 'digitizer',
  sensors: 'sensor',
  filters: 'filter',
  sources: 'source',
  groups: 'group',
  channels: 'channel',
};

const CONTEXT_OF_KEY: ReadonlyMap<string, ContextName> = new Map<string, ContextName>([
  ['filter', 'filter'],
  ['decimation-filter', 'filter'],
  ['sensor', 'sensor'],
  ['then', 'step'],
  ['mains', 'mains'],
]);

function searchKey(search: Search): readonly Proposal[] {
  const { finding, snapshot } = search.context;
  if (finding.cure?.kind !== 'add-key') return [];
  const { key } = finding.cure;
  const value = finding.cure.value ?? proposedValue(search, key);
  if (value === undefined) return [];
  const edits = keyEdits(snapshot, finding, key, value);
  const edit = edits?.find(({ text }) => text.includes(value));
  if (!edits || !edit) return [];
  const isCertain = finding.cure.value !== undefined;
  const start = edit.start + edit.text.lastIndexOf(value) + shiftBefore(edits, edit);
  return [
    {
      does: `Add \`${key}: ${value}\``,
      outcome: isCertain ? '' : 'to be replaced by what is true',
      edits,
      ...(isCertain ? {} : { fillIn: { start, end: start + value.length } }),
    },
  ];
}

function keyEdits(snapshot: Snapshot, finding: Finding, key: string, value: string): readonly TextEdit[] | undefined {
  const { entry, start } = finding.place;
  if (key === 'rig' && entry.section === undefined) return firstPair(snapshot, key, value);
  const node: TreeNode | undefined = start === entry.key?.start ? entry.value : nodeAt(entry.value, start);
  return node && setKey(snapshot, entry, node, key, value);
}

/** How far edits ahead of one move it. */
function shiftBefore(edits: readonly TextEdit[], one: TextEdit): number {
  let shift = 0;
  for (const { start, end, text } of edits) if (start < one.start) shift += text.length - (end - start);
  return shift;
}

/** A rate that suits the band; for any other key the example of the vocabulary. */
function proposedValue(search: Search, key: string): string | undefined {
  const { channel, context } = search;
  const band = channel?.band?.value;
  if (channel && key === 'rate' && band && context.finding.place.entry === channel.place.entry) {
    const due = band.highHz * USUAL_RATE_OVER_TOP;
    const [rate] = reachableRates(channel.digitizer, due * (1 - 1e-9), due * 100, 1);
    if (rate !== undefined) return rateText(channel, rate);
  }
  if (channel && key === 'band') return proposedBand(search, channel);
  if (key === 'rig') return 'Untitled rig';
  const found = keyRow(contextOf(context.finding), key);
  return found?.example;
}

/** The widest of a few bands in which nothing is found; the widest of all where none is clean. */
function proposedBand(search: Search, channel: Channel): string | undefined {
  const { rateHz, place } = channel;
  if (!rateHz) return undefined;
  const widest = rateHz.value / USUAL_RATE_OVER_TOP;
  const found = firstCured(search, BAND_PARTS, (part) => {
    const value = { lowHz: 0, highHz: roundedHz(widest * part) };
    return { ...channel, complete: true, band: { value, place } };
  });
  return `0 Hz .. ${formatHz(roundedHz(widest * (found?.value ?? 1)))}`;
}

function contextOf({ about, place }: Finding): ContextName {
  const path = (about ?? '').split('.');
  const parent = path.at(-2)?.replace(/\[\d+\]$/, '');
  const inPlace = parent === undefined ? undefined : CONTEXT_OF_KEY.get(parent);
  if (inPlace) return inPlace;
  const { section, name } = place.entry;
  if (section) return CONTEXT_OF_SECTION[section];
  return CONTEXT_OF_KEY.get(name) ?? (name === 'run' ? 'run' : 'rig');
}
