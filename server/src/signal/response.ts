/**
 * A filter's attenuation, ready to be asked.
 *
 * Attenuation is positive dB, `-20 log10 |H(f)|`; it is `Infinity` at a zero of the response and may be slightly
 * negative where a response lifts. Frequencies in Hz, not negative. The interval forms give the exact extremes of
 * the response with its tolerance over the whole closed interval, not just at its ends.
 *
 * `leastDb` answers "how little might be taken off what should not fold" and `greatestDb` "how much might be taken
 * off what should be kept"; for a mask the two differ even at one frequency, since a mask promises different things
 * to each question.
 */
export interface Response {
  /** Nominal attenuation at a frequency, without tolerance: what a picture draws. */
  attenuationDb(frequencyHz: number): number;
  /** Least attenuation over `lowHz..highHz`, whatever the tolerance allows. */
  leastDb(lowHz: number, highHz: number): number;
  /** Greatest attenuation over `lowHz..highHz`, whatever the tolerance allows; `Infinity` where nothing is promised. */
  greatestDb(lowHz: number, highHz: number): number;
}
