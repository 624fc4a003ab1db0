import { tableUnit } from '../quantity/unit.ts';
import { writeLike } from '../quantity/write.ts';
import type { Channel, Filter, FilterFrequency, FilterResponse } from '../rig/model.ts';
import type { NewValue } from './written-value.ts';

/** A response with an order and an edge. */
export type OrderedResponse = Extract<FilterResponse, { readonly edge: unknown }>;

export interface OrderAndEdge {
  readonly order: number;
  /** Hz, or the fraction of the rate where the edge is written as one. */
  readonly edge: number;
}

/** The response of a low-pass with an order; anything else can't be made steeper this way. */
export function orderedLowPass(filter: Filter | undefined): OrderedResponse | undefined {
  const response = filter?.response;
  return response && 'edge' in response && response.shape === 'low-pass' ? response : undefined;
}

export function magnitudeOf(frequency: FilterFrequency): number {
  return frequency.kind === 'hz' ? frequency.hz : frequency.fraction;
}

/** The filter with another order and edge. */
export function withOrder(filter: Filter, response: OrderedResponse, { order, edge }: OrderAndEdge): Filter {
  const { written: _, ...given } = response.edge;
  const at: FilterFrequency =
    response.edge.value.high.kind === 'hz' ? { kind: 'hz', hz: edge } : { kind: 'of-rate', fraction: edge };
  const changed = { ...response, order, edge: { ...given, value: { low: at, high: at } } } as OrderedResponse;
  return { ...filter, response: changed };
}

/** An edge frequency as the filter's own is written. */
export function edgeText(response: OrderedResponse, edge: number): string {
  const isHz = response.edge.value.high.kind === 'hz';
  const unit = isHz ? (edge >= 1000 ? 'kHz' : 'Hz') : 'fs';
  return writeLike(edge, response.edge.written, tableUnit(unit));
}

/** A whole filter as the text of a map. */
export function filterText(filter: Filter, response: OrderedResponse, { order, edge }: OrderAndEdge): NewValue {
  const pairs = new Map<string, NewValue>([
    ['response', response.response],
    ['order', String(order)],
  ]);
  if (response.response !== 'rc') {
    if (response.rippleDb > 0) pairs.set('ripple', `${response.rippleDb} dB`);
    if (response.stopbandDb > 0) pairs.set('stopband', `${response.stopbandDb} dB`);
  }
  pairs.set(response.edge.at, edgeText(response, edge));
  if (filter.tolerance > 0) pairs.set('tolerance', `${Number((filter.tolerance * 100).toPrecision(12))} %`);
  return pairs;
}

export function withFilter(channel: Channel, index: number, filter: Filter): Channel {
  return { ...channel, filters: channel.filters.map((use, at) => (at === index ? { ...use, filter } : use)) };
}

/** Rounded as a catalogue would have it. */
export function roundedHz(hz: number, digits = 2): number {
  return Number(hz.toPrecision(digits));
}
