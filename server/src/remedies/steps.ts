import type { Channel, FilterUse, Given, Step } from '../rig/model.ts';
import type { TreeNode } from '../rig/tree.ts';
import type { Edited } from './channel-edit.ts';
import { channelsOf } from './channel-edit.ts';
import { setEntryKey, setKey } from './edit-text.ts';
import type { Search } from './search.ts';
import type { NewValue } from './written-value.ts';

export type DecimateStep = Extract<Step, { readonly kind: 'decimate' }>;

/** A decimating step and its place among the channel's steps. */
export interface PlacedStep {
  readonly index: number;
  readonly step: DecimateStep;
}

/** The decimating step that the finding's stage stands for; every one where the finding names no stage. */
export function stepsOfFinding({ context, channel }: Search): readonly PlacedStep[] {
  const { finding, result } = context;
  if (!channel) return [];
  const stage = finding.stage === undefined ? undefined : result?.chain?.stages[finding.stage - 1];
  return channel.steps.flatMap((step, index) => {
    if (step.kind !== 'decimate') return [];
    if (finding.stage !== undefined && stage?.step !== step) return [];
    return [{ index, step }];
  });
}

export function withStep(channel: Channel, index: number, step: Step): Channel {
  return { ...channel, steps: channel.steps.map((old, at) => (at === index ? step : old)) };
}

/** Edits that write a key of one step; where the steps are inherited, all of them are written into the channel. */
export function stepValue(
  search: Search,
  { index, step }: PlacedStep,
  key: 'decimate' | 'filter',
  value: NewValue,
): Edited | undefined {
  const { channel, context } = search;
  if (!channel) return undefined;
  const { entry } = channel.place;
  if (step.place.entry === entry) {
    const node = nodeAt(entry.value, step.place.start);
    const edits = node && setKey(context.snapshot, entry, node, key, value);
    return edits && { edits };
  }
  const all = channel.steps.map((one, at) => stepText(one, at === index ? new Map([[key, value]]) : new Map()));
  if (all.some((one) => one === undefined)) return undefined;
  const edits = setEntryKey(context.snapshot, entry, 'then', all as readonly NewValue[]);
  if (!edits) return undefined;
  const shared = sharedStep(search, { index, step }, key, value);
  return shared ? { edits, shared } : { edits };
}

function sharedStep(search: Search, { index, step }: PlacedStep, key: string, value: NewValue): Edited['shared'] {
  const { snapshot, results } = search.context;
  const { entry, start } = step.place;
  const node = nodeAt(entry.value, start);
  const edits = node && setKey(snapshot, entry, node, key, value);
  if (!edits) return undefined;
  const users = results.filter(({ channel }) => {
    const place = channel.steps[index]?.place;
    return place?.entry === entry && place.start === start;
  });
  return users.length > 1 ? { edits, channels: channelsOf(users) } : undefined;
}

function textAt({ entry, start, end }: Given<unknown>['place']): string {
  return entry.text.slice(start, end);
}

/** A step as it would be written; `undefined` where it has a filter without a name. */
function stepText(step: Step, changes: ReadonlyMap<string, NewValue>): NewValue | undefined {
  const pairs = new Map<string, NewValue>();
  if (step.kind === 'decimate') pairs.set('decimate', String(step.factor.value));
  if (step.kind === 'per-turn') {
    pairs.set('per-turn', String(step.perTurn.value));
    pairs.set('speed', textAt(step.speed.place));
  }
  if (step.filters.length > 0 && !changes.has('filter')) {
    const names = filterNames(step.filters);
    if (!names) return undefined;
    pairs.set('filter', names.length === 1 ? (names[0] as string) : names);
  }
  for (const [key, value] of changes) pairs.set(key, value);
  return pairs;
}

/** The names of filters that all have one. */
export function filterNames(uses: readonly FilterUse[]): readonly string[] | undefined {
  const names = uses.map(({ filter }) => filter?.name ?? '');
  return names.includes('') ? undefined : names;
}

/** The map, list or scalar that begins at an offset of an entry; the outermost of several. */
export function nodeAt(node: TreeNode, start: number): TreeNode | undefined {
  if (node.start === start && node.kind !== 'list') return node;
  if (node.start > start || node.end <= start) return undefined;
  if (node.kind === 'map')
    return firstFound(
      node.pairs.map(({ value }) => value),
      start,
    );
  if (node.kind === 'list') return firstFound(node.items, start) ?? (node.start === start ? node : undefined);
  return undefined;
}

function firstFound(nodes: readonly TreeNode[], start: number): TreeNode | undefined {
  for (const node of nodes) {
    const found = nodeAt(node, start);
    if (found) return found;
  }
  return undefined;
}

/** A value that no text says: for channels that a search makes up. */
export function madeUp<T>(value: T, place: Given<T>['place']): Given<T> {
  return { value, place };
}
