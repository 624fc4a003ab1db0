import type { PhaseResponse } from './phase-response.ts';
import type { SensorResponse } from './sensor-response.ts';

/**
 * Phase and delay of a sensor: H = 1 / (1 - u^2 + j u / Q), u = f / resonance; 1 / (1 + j f / corner);
 * 1 / (1 - j low-corner / f).
 */
export function sensorPhase({ resonanceHz, cornerHz, lowCornerHz, q: givenQ }: SensorResponse): PhaseResponse {
  const q = Math.max(givenQ, 1e-9);
  return {
    phaseRad(hz) {
      let phase = 0;
      if (resonanceHz !== undefined) phase -= Math.atan2(hz / resonanceHz / q, 1 - (hz / resonanceHz) ** 2);
      if (cornerHz !== undefined) phase -= Math.atan2(hz, cornerHz);
      if (lowCornerHz !== undefined) phase += Math.atan2(lowCornerHz, hz);
      return phase;
    },
    groupDelayS(hz) {
      let delay = 0;
      if (resonanceHz !== undefined) delay += resonanceDelay(hz / resonanceHz, q) / resonanceHz;
      if (cornerHz !== undefined) delay += firstOrderDelay(hz, cornerHz);
      if (lowCornerHz !== undefined) delay += firstOrderDelay(hz, lowCornerHz);
      return delay / (2 * Math.PI);
    },
  };
}

/** d / du of atan(u / Q / (1 - u^2)). */
function resonanceDelay(u: number, q: number): number {
  return (1 + u * u) / q / ((1 - u * u) ** 2 + (u / q) ** 2);
}

/** The same slope either side of a corner, low-pass or high-pass. */
function firstOrderDelay(hz: number, cornerHz: number): number {
  return cornerHz > 0 ? cornerHz / (cornerHz * cornerHz + hz * hz) : 0;
}
