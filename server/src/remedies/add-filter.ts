import { tableUnit } from '../quantity/unit.ts';
import { formatHz, writeLike } from '../quantity/write.ts';
import type { Channel, Filter, FilterFrequency, FilterUse } from '../rig/model.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { outcomeOf } from './describe.ts';
import { setEntryKey } from './edit-text.ts';
import { roundedHz } from './filter-model.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import type { NewValue } from './written-value.ts';

/** Cutoffs that are tried, over the band's top. */
const CUTOFFS_OVER_TOP = [1.05, 1.12, 1.2, 1.3, 1.45, 1.6, 1.8, 2, 2.5, 3.2, 4, 5] as const;

/** Orders that are built; past the last butterworth, ripple buys a steeper flank. */
const BUTTERWORTH_ORDERS = [2, 3, 4, 5, 6, 7, 8] as const;
const ELLIPTIC_ORDERS = [5, 6, 7, 8, 9, 10] as const;

const ELLIPTIC_RIPPLE_DB = 0.1;
const ELLIPTIC_STOPBANDS_DB = [60, 80, 100] as const;
const ELLIPTIC_EDGES_OVER_TOP = [1.02, 1.1, 1.2, 1.4, 1.7, 2] as const;

export const addFilter: RemedyDefinition = {
  name: 'add-filter',
  kind: 'hardware',
  finds:
    'An analogue low-pass that fits between the band and what folds: a butterworth of the lowest order, or an elliptic where none is steep enough.',
  why: 'What has been sampled can not be told from what belongs there, so it has to be taken off before. It is a remedy only if the filter is built into the rig.',
  answers: ['no-filter', 'fold-in-band', 'fold-unlevelled', 'filter-short', 'thin-margin', 'on-nyquist', 'noise-folds'],
  search: searchFilter,
};

type Design =
  | { readonly response: 'butterworth'; readonly order: number; readonly hz: number }
  | { readonly response: 'elliptic'; readonly order: number; readonly stopbandDb: number; readonly hz: number };

function searchFilter(search: Search): readonly Proposal[] {
  const { channel } = search;
  const top = channel?.band?.value.highHz;
  if (!channel || top === undefined) return [];
  // Where there is a filter already, it is that one which is made steeper.
  if (channel.filters.length > 0) return [];
  const found = firstCured(search, designs(top), (design) => filtered(channel, design));
  if (!found) return [];
  const edits = setEntryKey(search.context.snapshot, channel.place.entry, 'filter', filterValue(channel, found.value));
  if (!edits) return [];
  const { response, order, hz } = found.value;
  const article = response === 'elliptic' ? 'an' : 'a';
  return [
    {
      does: `add ${article} ${response} of order ${order} at ${formatHz(hz)}`,
      outcome: outcomeOf(search, found.after),
      edits,
    },
  ];
}

function* designs(top: number): Generator<Design> {
  for (const order of BUTTERWORTH_ORDERS) {
    for (const over of CUTOFFS_OVER_TOP) yield { response: 'butterworth', order, hz: roundedHz(top * over) };
  }
  for (const order of ELLIPTIC_ORDERS) {
    for (const stopbandDb of ELLIPTIC_STOPBANDS_DB) {
      for (const over of ELLIPTIC_EDGES_OVER_TOP) {
        yield { response: 'elliptic', order, stopbandDb, hz: roundedHz(top * over, 3) };
      }
    }
  }
}

function filtered(channel: Channel, design: Design): Channel {
  const { place } = channel;
  const at: FilterFrequency = { kind: 'hz', hz: design.hz };
  const edge = {
    value: { low: at, high: at },
    place,
    at: design.response === 'elliptic' ? 'pass-edge' : 'cutoff',
  } as const;
  const filter: Filter = {
    kind: 'filter',
    name: '',
    place,
    response: {
      response: design.response,
      order: design.order,
      shape: 'low-pass',
      edge,
      rippleDb: design.response === 'elliptic' ? ELLIPTIC_RIPPLE_DB : 0,
      stopbandDb: design.response === 'elliptic' ? design.stopbandDb : 0,
    },
    order: { value: design.order, place },
    tolerance: 0,
    passes: 1,
  };
  const use: FilterUse = { place, filter };
  return { ...channel, filters: [...channel.filters, use] };
}

function filterValue(channel: Channel, design: Design): NewValue {
  const pairs = new Map<string, NewValue>([
    ['response', design.response],
    ['order', String(design.order)],
  ]);
  if (design.response === 'elliptic') {
    pairs.set('ripple', `${ELLIPTIC_RIPPLE_DB} dB`);
    pairs.set('stopband', `${design.stopbandDb} dB`);
  }
  const frequency = writeLike(design.hz, channel.rateHz?.written, tableUnit(design.hz >= 1000 ? 'kHz' : 'Hz'));
  pairs.set(design.response === 'elliptic' ? 'pass-edge' : 'cutoff', frequency);
  return pairs;
}
