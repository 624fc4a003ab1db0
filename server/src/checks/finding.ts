import type { Acceptance } from '../rig/acceptance.ts';
import type { Place } from '../rig/place.ts';
import type { Cure } from '../rig/problem.ts';

export type Severity = 'error' | 'warning' | 'hint';
export const SEVERITIES: readonly Severity[] = ['error', 'warning', 'hint'];

export interface RelatedPlace {
  readonly place: Place;
  readonly message: string;
}

/**
 * What will happen to the data, where, by how much.
 *
 * Its identity is (check, file, channel or thing, about, stage): never its place, its message or its figures.
 */
export interface Finding {
  readonly check: string;
  readonly severity: Severity;
  /** The channel it is about, where it is about one. */
  readonly channel: string | undefined;
  /** The named thing or key it is about, where it is about no channel: `filters/tidy`. */
  readonly thing: string | undefined;
  /** A source, a key, a neighbour: what tells it from others of the same check on the same channel. */
  readonly about: string | undefined;
  /** The stage of the chain, from 1, where that matters. */
  readonly stage: number | undefined;
  readonly message: string;
  readonly place: Place;
  readonly related: readonly RelatedPlace[];
  readonly figures: Readonly<Record<string, number | string>>;
  /** How far past its limit it is, in whatever unit the check measures: a proof compares it before and after. */
  readonly excess: number;
  readonly cure?: Cure;
  /** True where an item of `accept` is about it and counts: it stays a finding, and fails nothing. */
  readonly accepted?: true;
  /** The item by which it is accepted. */
  readonly acceptance?: Acceptance;
}

/** The finding's identity within its file, as one string. */
export function identityOf(finding: Finding): string {
  return [finding.check, finding.channel ?? '', finding.thing ?? '', finding.about ?? '', finding.stage ?? ''].join(
    '\u0000',
  );
}
