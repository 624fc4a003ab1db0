import type { Filter, FilterFrequencies, FilterFrequency, FilterResponse } from '../rig/model.ts';
import { analogueResponse } from '../signal/analogue.ts';
import { singlePolesCutoff } from '../signal/butterworth.ts';
import { digitalResponse } from '../signal/digital.ts';
import type { AnalogueFilter, CurveFilter, DigitalFilter, PoleFilter, StepFilter } from '../signal/filter-spec.ts';
import type { Response } from '../signal/response.ts';

/** The rates that a digital filter works between. */
export interface DigitalPlace {
  /** What `fs` stands for: the channel's rate in a `decimation-filter`, the step's input rate in `then`. */
  readonly fractionOfHz: number;
  /** The rate of the samples that it is given. */
  readonly inputRateHz: number;
  /** The factor by which the rate falls behind it; 1 where it does not. */
  readonly decimation: number;
}

/**
 * Compiled responses by the filter they are of. A `Filter` is never changed, so what is kept can't go out of date; it
 * is kept because thousands of channels share a filter, and a compiled one costs up to a Fourier transform.
 */
const compiled = new WeakMap<Filter, Map<string, Response>>();

/** Rates at which one filter's responses are kept: a search over rates must not fill the memory. */
const MOST_KEPT = 64;

/** The response of a filter ahead of the converter; `undefined` for one that was not understood or is digital only. */
export function analogueResponseOf(filter: Filter, rateHz: number): Response | undefined {
  if (!filter.response) return undefined;
  return kept(filter, isOfRate(filter.response) ? `${rateHz}` : '', () => {
    const spec = analogueSpecOf(filter, rateHz);
    return spec && analogueResponse(spec);
  });
}

/** What such a filter is, in bare numbers. */
export function analogueSpecOf({ response, tolerance }: Filter, rateHz: number): AnalogueFilter | undefined {
  const spec = response && specOf(response, rateHz, 1);
  return spec === undefined || isStepFilter(spec) ? undefined : { ...spec, tolerance };
}

/** The response of a filter after the converter; `undefined` for one that was not understood. */
export function digitalResponseOf(filter: Filter, place: DigitalPlace): Response | undefined {
  if (!filter.response) return undefined;
  const { fractionOfHz, inputRateHz, decimation } = place;
  return kept(filter, `${fractionOfHz} ${inputRateHz} ${decimation}`, () => {
    const spec = digitalSpecOf(filter, place);
    return spec && digitalResponse(spec, inputRateHz);
  });
}

/** What such a filter is, in bare numbers. */
export function digitalSpecOf(
  { response, tolerance, passes }: Filter,
  { fractionOfHz, decimation }: DigitalPlace,
): DigitalFilter | undefined {
  return response && { ...specOf(response, fractionOfHz, decimation), tolerance, passes };
}

function kept(filter: Filter, key: string, compile: () => Response | undefined): Response | undefined {
  let byRate = compiled.get(filter);
  const known = byRate?.get(key);
  if (known) return known;
  const response = compile();
  if (!response) return undefined;
  if (!byRate || byRate.size >= MOST_KEPT) {
    byRate = new Map();
    compiled.set(filter, byRate);
  }
  byRate.set(key, response);
  return response;
}

function isStepFilter(spec: PoleFilter | CurveFilter | StepFilter): spec is StepFilter {
  switch (spec.response) {
    case 'fir':
    case 'kaiser':
    case 'half-band':
    case 'moving-average':
    case 'cic':
      return true;
    default:
      return false;
  }
}

/** The frequencies that a response is specified by. */
export function frequenciesOf(response: FilterResponse): readonly FilterFrequency[] {
  switch (response.response) {
    case 'mask':
    case 'kaiser':
      return [response.pass.value, response.stop.value];
    case 'half-band':
      return 'pass' in response ? [response.pass.value] : [];
    case 'points':
      return response.points.map(({ at }) => at);
    case 'aperture':
    case 'fir':
    case 'moving-average':
    case 'cic':
      return [];
    default:
      return [response.edge.value.low, response.edge.value.high];
  }
}

function isOfRate(response: FilterResponse): boolean {
  return frequenciesOf(response).some(({ kind }) => kind === 'of-rate');
}

/** A frequency of a filter in Hz. */
export function hzOf(frequency: FilterFrequency, fractionOfHz: number): number {
  return frequency.kind === 'hz' ? frequency.hz : frequency.fraction * fractionOfHz;
}

function specOf(
  response: FilterResponse,
  fractionOfHz: number,
  decimation: number,
): PoleFilter | CurveFilter | StepFilter {
  const hz = (frequency: FilterFrequency): number => hzOf(frequency, fractionOfHz);
  const ends = ({ low, high }: FilterFrequencies) => ({ lowHz: hz(low), highHz: hz(high) });
  switch (response.response) {
    case 'mask':
      return {
        response: 'mask',
        passHz: hz(response.pass.value),
        stopHz: hz(response.stop.value),
        stopbandDb: response.stopbandDb,
        rippleDb: response.rippleDb,
      };
    case 'points':
      return {
        response: 'points',
        points: response.points.map(({ at, attenuationDb }) => [hz(at), attenuationDb] as const),
      };
    case 'aperture':
      return { response: 'aperture', timeS: response.timeS.value };
    case 'fir':
    case 'moving-average':
      return response;
    case 'kaiser': {
      const { pass, stop, stopbandDb } = response;
      return { response: 'kaiser', passHz: hz(pass.value), stopHz: hz(stop.value), stopbandDb };
    }
    case 'half-band': {
      if ('taps' in response) return response;
      return { response: 'half-band', passHz: hz(response.pass.value), stopbandDb: response.stopbandDb };
    }
    case 'cic':
      return { response: 'cic', order: response.order, delay: response.delay, decimation };
    case 'rc':
      return singlePoles(response, ends(response.edge.value));
    default: {
      const { order, shape, rippleDb, stopbandDb, edge } = response;
      const spec = { order, shape, rippleDb, stopbandDb, edge: { at: edge.at, ...ends(edge.value) } };
      return { response: response.response, ...spec };
    }
  }
}

interface Ends {
  readonly lowHz: number;
  readonly highHz: number;
}

/** Each pole's own corner, from the corner or from where all of them together are 3.0103 dB down. */
function singlePoles({ order, shape, edge }: Extract<FilterResponse, { response: 'rc' }>, ends: Ends): PoleFilter {
  const cornerHz = edge.at === 'corner' ? ends : cornersOfCutoff(ends, shape, singlePolesCutoff(order));
  return { response: 'rc', order, shape, given: edge.at, cornerHz };
}

/** @param cutoff of all poles together, relative to the corner of each */
function cornersOfCutoff({ lowHz, highHz }: Ends, shape: PoleFilter['shape'], cutoff: number): Ends {
  if (shape === 'low-pass') return { lowHz: lowHz / cutoff, highHz: highHz / cutoff };
  if (shape === 'high-pass') return { lowHz: lowHz * cutoff, highHz: highHz * cutoff };
  // The width grows, the geometric centre stays.
  const width = (highHz - lowHz) / cutoff;
  const low = (Math.sqrt(width * width + 4 * lowHz * highHz) - width) / 2;
  return { lowHz: low, highHz: low + width };
}
