import type { Filter } from '../rig/model.ts';
import { analoguePhase, digitalPhase } from '../signal/group-delay.ts';
import { type PhaseResponse, phaseOfAll } from '../signal/phase-response.ts';
import { sensorPhase } from '../signal/sensor-phase.ts';
import { analogueSpecOf, type DigitalPlace, digitalSpecOf } from './filter-response.ts';
import type { Chain, SignalPath, Stage, StageFilter } from './model.ts';
import { couplingOf, decimationAt, sensorSpecOf } from './signal-path.ts';

/** A filter that says nothing of its phase, and the rate that its frequencies may be fractions of. */
export interface UntoldPhase {
  readonly filter: Filter;
  readonly ofHz: number;
}

/**
 * What a chain does to phase and time as far as its filters tell, from the sensor to the record. Nominal: the tolerance
 * of a filter is not looked at. Decimations add nothing.
 */
export interface ChainPhase {
  readonly sensor: PhaseResponse;
  readonly analogue: PhaseResponse;
  /** What is left where a digitizer takes the delay of its digital filters out of the time stamps. */
  readonly digital: PhaseResponse;
  /** All of them together. */
  readonly whole: PhaseResponse;
  /** Masks and measured curves: what they do comes on top. */
  readonly untold: readonly UntoldPhase[];
}

/** Everything that a phase is made of is part of the path, so that it is worked out once for all who share the path. */
const phases = new WeakMap<SignalPath, ChainPhase>();

/** The phase of a chain; `undefined` where a filter was not understood, or the band is recorded at other frequencies. */
export function chainPhaseOf(chain: Chain): ChainPhase | undefined {
  if (!chain.understood || !keepsFrequencies(chain)) return undefined;
  const known = phases.get(chain.path);
  if (known) return known;
  const phase = madePhase(chain);
  phases.set(chain.path, phase);
  return phase;
}

/** Whether what is in the band is recorded at its own frequency: it is not folded on purpose, nor read in orders. */
export function keepsFrequencies({ isBandpass, stages }: Chain): boolean {
  return !isBandpass && stages.every(({ kind }) => kind !== 'per-turn');
}

/** The phase of one filter of a chain; `undefined` for a mask or points. */
export function filterPhaseOf(chain: Chain, stage: number, { use, role }: StageFilter): PhaseResponse | undefined {
  if (role === 'low-corner') return analoguePhase(couplingOf(chain.channel.digitizer));
  if (!use?.filter) return undefined;
  if (stage === 0) {
    const spec = analogueSpecOf(use.filter, chain.rateHz);
    return spec && analoguePhase(spec);
  }
  const place = digitalPlaceOf(chain, stage, use.filter);
  const spec = digitalSpecOf(use.filter, place);
  return spec && digitalPhase(spec, place.inputRateHz);
}

function madePhase(chain: Chain): ChainPhase {
  const { channel, stages, after } = chain;
  const untold: UntoldPhase[] = [];
  const told = (filters: readonly StageFilter[], stage: number): readonly PhaseResponse[] =>
    filters.flatMap((filter) => {
      const phase = filterPhaseOf(chain, stage, filter);
      if (phase) return phase;
      const named = filter.use?.filter;
      if (named) untold.push({ filter: named, ofHz: stage === 0 ? chain.rateHz : placeRate(chain, stage) });
      return [];
    });
  const sensor = sensorPhase(sensorSpecOf(channel.sensor));
  const [analogue = [], ...later] = [...stages.map(({ filters }) => filters), after].map(told);
  const digital = later.flat();
  const left = channel.digitizer?.delayCompensated ? digital.map(compensated) : digital;
  const parts = { sensor, analogue: phaseOfAll(analogue), digital: phaseOfAll(left) };
  return { ...parts, whole: phaseOfAll([parts.sensor, parts.analogue, parts.digital]), untold };
}

/** The delay at 0 Hz is the one that time stamps are put right by; what does not pass 0 Hz has none. */
function compensated(response: PhaseResponse): PhaseResponse {
  if (Math.abs(response.phaseRad(0)) > ROUNDING) return response;
  const delayS = response.groupDelayS(0);
  return {
    phaseRad: (hz) => response.phaseRad(hz) + 2 * Math.PI * hz * delayS,
    groupDelayS: (hz) => response.groupDelayS(hz) - delayS,
  };
}

/** In rad. */
const ROUNDING = 1e-9;

/** The rates that a digital filter ahead of a stage works between, counted from 0; behind the last, those of its record. */
function digitalPlaceOf(chain: Chain, stage: number, filter: Filter): DigitalPlace {
  const inputRateHz = chain.ratesHz[stage - 1]!;
  const decimation = decimationAt(filter, factorOf(chain, chain.stages[stage]));
  return { fractionOfHz: placeRate(chain, stage), inputRateHz, decimation };
}

function placeRate({ stages, ratesHz, rateHz }: Chain, stage: number): number {
  return stages[stage]?.kind === 'modulator-decimation' ? rateHz : ratesHz[stage - 1]!;
}

function factorOf({ channel }: Chain, stage: Stage | undefined): number {
  if (stage?.step?.kind === 'decimate') return stage.step.factor.value;
  return stage?.kind === 'modulator-decimation' ? (channel.digitizer?.modulatorMultiple?.value ?? 1) : 1;
}
