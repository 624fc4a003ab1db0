import type { BandResponse } from '../chain/band-response.ts';
import type { ImageArrival } from '../chain/images.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import type { NoiseBudget } from '../chain/noise.ts';
import type { ChannelSpectrum } from '../chain/spectrum.ts';
import type { UndeclaredFold } from '../chain/undeclared.ts';
import type { Environment } from '../rig/environment.ts';
import type { Channel } from '../rig/model.ts';
import type { Finding, Severity } from './finding.ts';
import type { ChannelSummary, Roster } from './roster.ts';

/** Two ends in volts at the digitizer's input. */
export interface Volts {
  readonly lowV: number;
  readonly highV: number;
}

/** What is expected at a channel's input, and what it takes. */
export interface InputRange {
  readonly peak: Volts;
  /** Ends of the full scale, over the gain ahead of the converter. */
  readonly ends: Volts;
  /** The least distance from what is expected to an end other than 0; negative past it. */
  readonly headroomDb: number;
}

/**
 * What is wrong with the filtering ahead of a channel's samplings, in one word: of the three, a channel is told one,
 * and none where a declared source folds into the band, which says it better.
 */
export type Shortfall =
  | { readonly kind: 'no-filter'; readonly fold: UndeclaredFold }
  | { readonly kind: 'thin-margin'; readonly fold: UndeclaredFold; readonly margin: number }
  | {
      readonly kind: 'filter-short';
      readonly fold: UndeclaredFold;
      /** True at a modulator's own stage until it is stated what is undeclared. */
      readonly isHint: boolean;
    };

/** Everything a check of one channel may look at. */
export interface ChannelView {
  readonly channel: Channel;
  readonly chain: Chain;
  readonly arrivals: readonly Arrival[];
  /** By stage: the worst that what no source declares may leave in the band. */
  readonly undeclared: readonly (UndeclaredFold | undefined)[];
  readonly bandResponse: BandResponse;
  /** What uneven sampling makes of the sources, inside the band and above the fold limit. */
  readonly images: readonly ImageArrival[];
  /** What is to be said of the filtering: at most one of three checks speaks. */
  readonly shortfall: Shortfall | undefined;
  /** What is expected at the input and what it takes, where both are known in volts. */
  readonly input: InputRange | undefined;
  /** How the record is turned into a spectrum, where that is said. */
  readonly spectrum: ChannelSpectrum | undefined;
  /** The noise in the band; `undefined` where the channel declares none. */
  readonly noise: NoiseBudget | undefined;
}

/** What a check says; channel and check name are filled in by the list that runs it, and the severity where it is the usual one. */
export type Said = Omit<
  Finding,
  'check' | 'severity' | 'channel' | 'thing' | 'stage' | 'about' | 'related' | 'figures' | 'excess'
> &
  Partial<Pick<Finding, 'severity' | 'stage' | 'about' | 'related' | 'figures' | 'excess'>>;

/** What a check over many channels says. */
export type SaidOfRig = Said & Partial<Pick<Finding, 'channel' | 'thing'>>;

/** A check as its reference page shows it. */
export interface CheckPage {
  readonly name: string;
  readonly severity: Severity;
  /** One sentence: what it finds. */
  readonly finds: string;
  /** Why it matters to the data, in a paragraph. */
  readonly why: string;
  /** A rig file that shows it, and one that just doesn't. */
  readonly shows: string;
  readonly clean: string;
  readonly sources: readonly string[];
}

/** One check, as its file exports it: documentation, examples and the function. */
export interface Check<Kind extends 'channel' | 'rig'> extends CheckPage {
  readonly kind: Kind;
  readonly run: Kind extends 'channel'
    ? (view: ChannelView) => readonly Said[]
    : (rig: RigView) => readonly SaidOfRig[];
}

/** A fold over many channels, said in the name of a check. */
export type RigFold = Pick<Check<'rig'>, 'name' | 'severity' | 'run'>;

export interface RigView {
  readonly environment: Environment;
  readonly channels: readonly ChannelSummary[];
  /** The same, sorted by what they have to do with others. */
  readonly roster: Roster;
}

/** What nothing is said in. */
export const SAYS_NOTHING: readonly never[] = [];
