import type { Channel, Digitizer, Filter, FilterUse, Sensor, Step } from '../rig/model.ts';
import { analogueResponse } from '../signal/analogue.ts';
import type { AnalogueFilter } from '../signal/filter-spec.ts';
import type { Response } from '../signal/response.ts';
import { type SensorResponse, sensorResponse } from '../signal/sensor-response.ts';
import { analogueResponseOf, digitalResponseOf } from './filter-response.ts';
import type { SignalPath, Stage, StageFilter } from './model.ts';
import { forgetNotes, keepNotes } from './path-notes.ts';

/** A filter on the way, before it is known what it does. */
export interface PlannedFilter {
  readonly use: FilterUse | undefined;
  readonly role: StageFilter['role'];
}

export interface PlannedStage {
  readonly kind: Stage['kind'];
  readonly step: Extract<Step, { kind: 'decimate' | 'per-turn' }> | undefined;
  /** Of the rate before it; 1 for the first stage. Not whole where a shaft decides the rate. */
  readonly factor: number;
  readonly filters: readonly PlannedFilter[];
}

/** A channel's samplings and the filters between them, in order. */
export interface Plan {
  /** The first stage's rate over the channel's. */
  readonly oversampling: number;
  readonly stages: readonly PlannedStage[];
  readonly after: readonly PlannedFilter[];
}

/** What a channel's text says is done to its signal. */
export function planOf(channel: Channel, channelRateHz: number): Plan {
  const { digitizer } = channel;
  const oversampling = Math.max(digitizer?.modulatorMultiple?.value ?? 1, 1);
  const analogue: PlannedFilter[] = planned(channel.filters, 'channel');
  if (digitizer) {
    if (digitizer.lowCornerHz) analogue.push({ use: undefined, role: 'low-corner' });
    for (const use of digitizer.filters) analogue.push({ use, role: 'digitizer' });
  }
  const kind = oversampling > 1 ? 'modulator' : 'converter';
  const stages: PlannedStage[] = [{ kind, step: undefined, factor: 1, filters: analogue }];
  if (oversampling > 1) {
    const filters = digitizer?.decimationFilter ? planned([digitizer.decimationFilter], 'decimation') : [];
    stages.push({ kind: 'modulator-decimation', step: undefined, factor: oversampling, filters });
  }
  let waiting: PlannedFilter[] = [];
  let rateHz = channelRateHz;
  for (const step of channel.steps) {
    waiting.push(...planned(step.filters, 'step'));
    const factor = factorOf(step, rateHz);
    if (step.kind === 'filter' || factor === 1) continue;
    stages.push({ kind: step.kind, step, factor, filters: waiting });
    rateHz /= factor;
    waiting = [];
  }
  return { oversampling, stages, after: waiting };
}

/** By how much a step lowers the rate; one that resamples to shaft angle is taken at the top of its speed. */
function factorOf(step: Step, inputRateHz: number): number {
  switch (step.kind) {
    case 'decimate':
      return step.factor.value;
    case 'per-turn':
      return inputRateHz / (step.perTurn.value * step.speed.value.highHz);
    case 'filter':
      return 1;
  }
}

function planned(uses: readonly FilterUse[], role: StageFilter['role']): PlannedFilter[] {
  return uses.map((use) => ({ use, role }));
}

/** Paths kept for each digitizer. */
const MOST_PATHS = 64;

interface SharedPaths {
  readonly paths: { readonly parts: readonly unknown[]; readonly path: SignalPath }[];
  next: number;
}

/**
 * Paths by the digitizer at their end. Everything that a path is made of is compared by identity or by value, so that
 * sharing one changes no answer; it is what makes ten thousand channels with a few ways of being filtered cheap.
 */
const shared = new WeakMap<object, SharedPaths>();
const NO_DIGITIZER = {};

/** The signal path of a channel at the exact rate that it is sampled at. */
export function signalPathOf(channel: Channel, plan: Plan, rateHz: number): SignalPath {
  const parts = partsOf(channel, plan, rateHz);
  if (!parts) return makePath(channel, plan, rateHz);
  const anchor = channel.digitizer ?? NO_DIGITIZER;
  let known = shared.get(anchor);
  if (!known) {
    known = { paths: [], next: 0 };
    shared.set(anchor, known);
  }
  for (const candidate of known.paths) if (isSame(candidate.parts, parts)) return candidate.path;
  const path = makePath(channel, plan, rateHz);
  keepNotes(path);
  const replaced = known.paths[known.next];
  if (replaced) forgetNotes(replaced.path);
  known.paths[known.next] = { parts, path };
  known.next = (known.next + 1) % MOST_PATHS;
  return path;
}

/** Everything that makes the path what it is; `undefined` where part of it is this channel's own and nobody can share it. */
function partsOf({ sensor }: Channel, plan: Plan, rateHz: number): readonly unknown[] | undefined {
  const parts: unknown[] = [
    rateHz,
    sensor?.resonanceHz?.value,
    sensor?.q,
    sensor?.cornerHz?.value,
    sensor?.lowCornerHz?.value,
    plan.oversampling,
  ];
  for (const { factor, filters } of plan.stages) {
    parts.push(factor);
    if (!addFilters(parts, filters)) return undefined;
  }
  parts.push(0);
  return addFilters(parts, plan.after) ? parts : undefined;
}

function addFilters(parts: unknown[], filters: readonly PlannedFilter[]): boolean {
  for (const { use } of filters) {
    if (!use) continue;
    if (use.filter?.name === '' && !use.inherited) return false;
    parts.push(use.filter);
  }
  return true;
}

function isSame(first: readonly unknown[], second: readonly unknown[]): boolean {
  if (first.length !== second.length) return false;
  for (let index = 0; index < first.length; index++) if (first[index] !== second[index]) return false;
  return true;
}

function makePath(channel: Channel, plan: Plan, rateHz: number): SignalPath {
  const { sensor, digitizer } = channel;
  const ratesHz: number[] = [];
  const responses: (readonly (Response | undefined)[])[] = [];
  let inputRateHz = rateHz * plan.oversampling;
  for (const { kind, factor, filters } of plan.stages) {
    const isInOrders = kind === 'per-turn';
    const fractionOfHz = kind === 'modulator-decimation' ? rateHz : isInOrders ? inputRateHz / factor : inputRateHz;
    responses.push(
      filters.map(({ use, role }) => {
        if (role === 'low-corner') return analogueResponse(couplingOf(digitizer));
        if (!use?.filter) return undefined;
        const isDigital = role === 'step' || role === 'decimation';
        if (!isDigital) return analogueResponseOf(use.filter, rateHz);
        return digitalResponseOf(use.filter, {
          fractionOfHz,
          inputRateHz,
          decimation: decimationAt(use.filter, factor),
        });
      }),
    );
    inputRateHz /= factor;
    ratesHz.push(inputRateHz);
  }
  const behind = { fractionOfHz: inputRateHz, inputRateHz, decimation: 1 };
  responses.push(plan.after.map(({ use }) => (use?.filter ? digitalResponseOf(use.filter, behind) : undefined)));
  return {
    ratesHz,
    responses,
    known: responses.map((stage) => stage.filter((response) => response !== undefined)),
    sensor: sensorResponse(sensorSpecOf(sensor)),
    sensorIsFlat: !sensor?.resonanceHz && !sensor?.cornerHz && !sensor?.lowCornerHz,
    clockTolerance: digitizer?.clock?.thing?.tolerance ?? 0,
  };
}

/** Only integrators and combs are built around the rate change. */
export function decimationAt(filter: Filter, factor: number): number {
  return filter.response?.response === 'cic' ? factor : 1;
}

/** The digitizer's AC coupling, a first-order high-pass. */
export function couplingOf(digitizer: Digitizer | undefined): AnalogueFilter {
  const cornerHz = digitizer?.lowCornerHz?.value ?? 0;
  const corner = { lowHz: cornerHz, highHz: cornerHz };
  return { response: 'rc', order: 1, shape: 'high-pass', cornerHz: corner, tolerance: 0 };
}

/** A sensor in bare numbers. */
export function sensorSpecOf(sensor: Sensor | undefined): SensorResponse {
  return {
    q: sensor?.q ?? 1,
    ...(sensor?.resonanceHz ? { resonanceHz: sensor.resonanceHz.value } : {}),
    ...(sensor?.cornerHz ? { cornerHz: sensor.cornerHz.value } : {}),
    ...(sensor?.lowCornerHz ? { lowCornerHz: sensor.lowCornerHz.value } : {}),
  };
}
