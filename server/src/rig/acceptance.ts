import type { NamePattern } from './name-matching.ts';
import type { Place } from './place.ts';

/** An item of `accept`: findings that somebody has looked at and accepted. */
export interface Acceptance {
  /** The name of the check. */
  readonly finding: string;
  readonly findingPlace: Place;
  /** The channels that it is accepted on; `undefined` for all of them and for what is said of no channel. */
  readonly on: NamePattern | undefined;
  /** The source, or other name, that the finding is about; `undefined` for whatever it is about. */
  readonly about: string | undefined;
  /** Empty where it is still to be written: until then nothing is accepted. */
  readonly reason: string;
  readonly by: string | undefined;
  readonly until: LastDay | undefined;
}

/** The last day on which an acceptance counts, as `2027-03-31`: such dates compare as texts do. */
export interface LastDay {
  readonly day: string;
  readonly place: Place;
}
