/**
 * What a filter does to phase and time, nominal (no tolerance). Frequencies in Hz, not negative.
 *
 * Poles, averages and symmetric taps give a phase that is counted on from 0 Hz; where the response is 0 it jumps up by
 * pi. Taps that are not symmetric give it to within whole turns.
 */
export interface PhaseResponse {
  /** Angle of H(f) in rad; negative where the output is late. */
  phaseRad(frequencyHz: number): number;
  /** -d phase / d omega in s, without the jumps. */
  groupDelayS(frequencyHz: number): number;
}

/** Neither phase nor delay: nothing at all, or a filter that is run forward and backward. */
export const NO_PHASE: PhaseResponse = { phaseRad: () => 0, groupDelayS: () => 0 };

/** Several one after another: phases and delays add. */
export function phaseOfAll(responses: readonly PhaseResponse[]): PhaseResponse {
  return {
    phaseRad: (hz) => responses.reduce((sum, response) => sum + response.phaseRad(hz), 0),
    groupDelayS: (hz) => responses.reduce((sum, response) => sum + response.groupDelayS(hz), 0),
  };
}

/**
 * `count` averages over the time `timeS` of `length` samples each, `Infinity` of them for a continuous one. The samples
 * are spread over the time, so the first is 1 / length of it before the last plus one: the delay is half of the rest.
 */
export function averagePhase(length: number, count: number, timeS: number): PhaseResponse {
  const delayS = (count * timeS * (1 - 1 / length)) / 2;
  return {
    phaseRad: (hz) => Math.PI * (count * Math.floor(hz * timeS) - 2 * hz * delayS),
    groupDelayS: () => delayS,
  };
}
