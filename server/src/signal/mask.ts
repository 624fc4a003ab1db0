import type { Curve } from './curve.ts';
import { onStraightLine } from './points.ts';

/** A datasheet's promise: ripple up to `passHz`, `stopbandDb` from `stopHz` on, nothing in between. */
export interface Mask {
  readonly passHz: number;
  readonly stopHz: number;
  readonly stopbandDb: number;
  readonly rippleDb: number;
}

/**
 * What may fold is taken 0 dB off below `stopHz` and exactly the stop band from there; what should be kept is taken
 * the ripple off up to `passHz` and, above it, anything (`Infinity`). `at` draws a line between the two promises.
 */
export function maskCurve({ passHz, stopHz, stopbandDb, rippleDb }: Mask): Curve {
  return {
    at(hz) {
      if (hz >= stopHz) return stopbandDb;
      return hz <= passHz ? rippleDb : onStraightLine([passHz, rippleDb], [stopHz, stopbandDb], hz);
    },
    least: (low) => (low < stopHz ? 0 : stopbandDb),
    greatest: (_low, high) => (high <= passHz ? rippleDb : Infinity),
  };
}
