/**
 * What a quantity is a quantity of.
 *
 * Base units, in which `Scalar.value` is held:
 * - `frequency`, `rate`, `rotation`: Hz (1 rpm is 1/60 Hz; 1 S/s is 1 Hz). A `rate` is a sample rate; where one is
 *   due, Hz is as good.
 * - `time` s, `voltage` V, `current` A, `resistance` ohm, `acceleration` m/s2, `velocity` m/s, `displacement` m,
 *   `pressure` Pa, `force` N, `torque` N.m, `temperature` K (always a difference), `angle` degrees
 * - `strain`, `ratio`, `of-rate` (a fraction of a sample rate): 1
 * - `dbfs`, `decibel`: dB; `slope`: dB per octave; they stay logarithmic
 * - `bits` bit, `data` bytes, `data-rate` bytes per second
 * - `density`: the base unit of its numerator per root hertz; `sensitivity`: volts per base unit of its denominator
 * - `number`: a bare number; `other`: a unit outside the table, a channel's own, taken as written
 */
export type Dimension =
  | 'frequency'
  | 'rate'
  | 'rotation'
  | 'time'
  | 'voltage'
  | 'current'
  | 'resistance'
  | 'acceleration'
  | 'velocity'
  | 'displacement'
  | 'pressure'
  | 'force'
  | 'torque'
  | 'strain'
  | 'temperature'
  | 'angle'
  | 'dbfs'
  | 'decibel'
  | 'slope'
  | 'ratio'
  | 'bits'
  | 'data'
  | 'data-rate'
  | 'of-rate'
  | 'density'
  | 'sensitivity'
  | 'number'
  | 'other';
