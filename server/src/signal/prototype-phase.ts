/**
 * Phase and delay of the low-pass prototypes over the angular frequency relative to an edge, x.
 *
 * x is given as a fraction over / under (under not negative), since high-pass and band-pass filters and the bilinear
 * transform bring in x = ±Infinity: high-pass x = -edge / f, band-pass x = (f^2 - low high) / (f (high - low)), both
 * with their sign, over which phase is odd and delay even.
 */
export interface PrototypePhase {
  phaseRad(over: number, under: number): number;
  /** -d phase / d x over under^2: times under^2 dx / df it is the delay times 2 pi, with no infinity on the way. */
  scaledDelay(over: number, under: number): number;
}

/** A pole in the left half of the plane: at -decay + j position. */
export interface Pole {
  readonly decay: number;
  readonly position: number;
}

/** Poles, in pairs but for one on the real axis, and the positions above 0 of pairs of zeros on the imaginary axis. */
export interface PolesAndZeros {
  readonly poles: readonly Pole[];
  readonly zeros: readonly number[];
}

/** Source: Oppenheim and Schafer, Discrete-Time Signal Processing, phase and group delay of a pole. */
export function phaseOfPoles({ poles, zeros }: PolesAndZeros): PrototypePhase {
  return {
    phaseRad(over, under) {
      let phase = 0;
      for (const { decay, position } of poles) phase -= Math.atan2(over - position * under, decay * under);
      for (const zero of zeros) if (Math.abs(over) > zero * under) phase += Math.PI * Math.sign(over);
      return phase;
    },
    scaledDelay(over, under) {
      let delay = 0;
      for (const { decay, position } of poles) {
        delay += decay / ((decay * under) ** 2 + (over - position * under) ** 2);
      }
      return delay;
    },
  };
}

/** A prototype along an axis stretched so that what was at `factor` is at 1. */
export function stretchedPhase(prototype: PrototypePhase, factor: number): PrototypePhase {
  return {
    phaseRad: (over, under) => prototype.phaseRad(over * factor, under),
    scaledDelay: (over, under) => prototype.scaledDelay(over * factor, under) * factor,
  };
}
