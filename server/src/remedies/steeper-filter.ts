import type { ChannelResult } from '../checks/channel-result.ts';
import { formatHz } from '../quantity/write.ts';
import type { Channel, Filter } from '../rig/model.ts';
import type { TextEdit } from '../rig/snapshot.ts';
import type { Edited } from './channel-edit.ts';
import { channelsOf } from './channel-edit.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { outcomeOf } from './describe.ts';
import { replaceScalar, setEntryKey } from './edit-text.ts';
import type { OrderAndEdge, OrderedResponse } from './filter-model.ts';
import { edgeText, filterText, magnitudeOf, orderedLowPass, roundedHz, withFilter, withOrder } from './filter-model.ts';
import { addThing, freeName } from './new-thing.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import { filterNames } from './steps.ts';

/** The highest order that is proposed: what can be bought. */
const HIGHEST_ORDER = 12;

/** Cutoffs are tried in steps of a sixth of an octave, up to an octave and a half to either side. */
const STEPS_PER_OCTAVE = 6;
const MOST_STEPS = 9;

export const steeperFilter: RemedyDefinition = {
  name: 'steeper-filter',
  kind: 'hardware',
  finds:
    'The lowest order of the same response, then the cutoff nearest the present one, with which the finding is gone.',
  why: 'A steeper filter takes more off what would fold and leaves more of the band. It is a remedy only if the filter in the rig is changed with the text.',
  answers: [
    'fold-in-band',
    'fold-unlevelled',
    'filter-short',
    'thin-margin',
    'on-nyquist',
    'band-droop',
    'noise-folds',
  ],
  search: searchSteeper,
};

function searchSteeper(search: Search): readonly Proposal[] {
  const { channel } = search;
  if (!channel) return [];
  return channel.filters.flatMap(({ filter }, index) => {
    const response = orderedLowPass(filter);
    return filter && response ? steeper(search, channel, index, filter, response) : [];
  });
}

function steeper(
  search: Search,
  channel: Channel,
  index: number,
  filter: Filter,
  response: OrderedResponse,
): readonly Proposal[] {
  const found = firstCured(search, designs(response), (design) =>
    withFilter(channel, index, withOrder(filter, response, design)),
  );
  const edited = found && filterEdits(search, channel, index, filter, response, found.value);
  if (!found || !edited) return [];
  const { order, edge } = found.value;
  const what = filter.name === '' ? `the ${response.response}` : filter.name;
  const at = response.edge.value.high.kind === 'hz' ? formatHz(edge) : edgeText(response, edge);
  return [{ does: `${what} of order ${order} at ${at}`, outcome: outcomeOf(search, found.after), ...edited }];
}

/** Orders from the present one up; of each, edges from the present one outward. */
function* designs(response: OrderedResponse): Generator<OrderAndEdge> {
  const today = magnitudeOf(response.edge.value.high);
  for (let order = response.order; order <= Math.max(HIGHEST_ORDER, response.order); order++) {
    if (order > response.order) yield { order, edge: today };
    for (let step = 1; step <= MOST_STEPS; step++) {
      const ratio = 2 ** (step / STEPS_PER_OCTAVE);
      yield { order, edge: roundedHz(today * ratio) };
      yield { order, edge: roundedHz(today / ratio) };
    }
  }
}

/**
 * The filter's own text where this channel alone has it; a new filter, named by this channel, where others share it or
 * it stands in a used file, which others may use too.
 */
function filterEdits(
  search: Search,
  channel: Channel,
  index: number,
  filter: Filter,
  response: OrderedResponse,
  design: OrderAndEdge,
): Edited | undefined {
  const users = usersOf(search, filter);
  const isOwn = search.context.snapshot.startOf(filter.place.entry) !== undefined;
  const inFilter = isOwn ? editsInFilter(search, filter, response, design) : undefined;
  if (users.length <= 1 && isOwn) return inFilter && { edits: inFilter };
  const edits = newFilter(search, channel, index, filter, response, design);
  if (!edits) return undefined;
  return inFilter ? { edits, shared: { edits: inFilter, channels: channelsOf(users) } } : { edits };
}

function usersOf({ context }: Search, filter: Filter): readonly ChannelResult[] {
  return context.results.filter(
    ({ channel }) =>
      channel.filters.some((use) => use.filter === filter) ||
      channel.digitizer?.filters.some((use) => use.filter === filter) ||
      channel.digitizer?.decimationFilter?.filter === filter ||
      channel.steps.some((step) => step.filters.some((use) => use.filter === filter)),
  );
}

function editsInFilter(
  { context }: Search,
  filter: Filter,
  response: OrderedResponse,
  { order, edge }: OrderAndEdge,
): readonly TextEdit[] | undefined {
  if (!filter.order || filter.order.inherited || response.edge.inherited) return undefined;
  const edits: TextEdit[] = [];
  if (order !== response.order) {
    const edit = replaceScalar(context.snapshot, filter.order.place, String(order));
    if (!edit) return undefined;
    edits.push(edit);
  }
  if (edge !== magnitudeOf(response.edge.value.high)) {
    const edit = replaceScalar(context.snapshot, response.edge.place, edgeText(response, edge));
    if (!edit) return undefined;
    edits.push(edit);
  }
  return edits;
}

function newFilter(
  { context }: Search,
  channel: Channel,
  index: number,
  filter: Filter,
  response: OrderedResponse,
  design: OrderAndEdge,
): readonly TextEdit[] | undefined {
  const { snapshot, environment } = context;
  const use = channel.filters[index];
  const names = filterNames(channel.filters);
  if (!use || !names) return undefined;
  const taken = environment.core.scope.names.filter.set;
  const name = freeName(snapshot, 'filters', `${filter.name}-order-${design.order}`, taken);
  const thing = addThing(snapshot, 'filters', name, filterText(filter, response, design));
  if (!thing) return undefined;
  const { entry } = channel.place;
  const changed = names.map((old, at) => (at === index ? name : old));
  const isOwn = !use.inherited && use.place.entry === entry;
  const inPlace = isOwn ? replaceScalar(snapshot, use.place, name) : undefined;
  const mention = inPlace ? [inPlace] : setEntryKey(snapshot, entry, 'filter', changed.length === 1 ? name : changed);
  return mention && [...thing, ...mention];
}
