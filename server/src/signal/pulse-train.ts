/** A train of pulses that is read for its edges. */
export interface PulseTrain {
  readonly perTurn: number;
  readonly topSpeedRpm: number;
  /** The part of each period that is high, 0 .. 1. */
  readonly duty: number;
}

/** Samples that the shorter of high and low must last. Common practice: one may fall on the edge. */
export const LEAST_PULSE_SAMPLES = 2;

/**
 * How long the shorter of high and low lasts at top speed, in s; `Infinity` where nothing turns. 0 for a train that is
 * never high or never low, or whose numbers are none.
 */
export function shorterPulseS({ perTurn, topSpeedRpm, duty }: PulseTrain): number {
  const shorter = Math.min(duty, 1 - duty);
  if (!(shorter > 0 && perTurn >= 0 && topSpeedRpm >= 0)) return 0;
  const pulsesPerS = (perTurn * topSpeedRpm) / 60;
  return Number.isNaN(pulsesPerS) ? 0 : shorter / pulsesPerS;
}

/** The least rate at which the shorter of high and low lasts `LEAST_PULSE_SAMPLES`; `Infinity` where none does. */
export function leastPulseRateHz(train: PulseTrain): number {
  return LEAST_PULSE_SAMPLES / shorterPulseS(train);
}
