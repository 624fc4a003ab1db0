import type { TextEdit } from '../rig/snapshot.ts';
import type { RemedyKind } from './remedy.ts';
import type { Search } from './search.ts';

/** What a remedy's reference page says of it. */
export interface RemedyPage {
  readonly name: string;
  readonly kind: RemedyKind;
  /** One sentence: what it finds and writes. */
  readonly finds: string;
  /** Why that helps, and what it costs. */
  readonly why: string;
  /** The checks whose findings it is searched for. */
  readonly answers: readonly string[];
}

/** One remedy, as its file exports it: documentation and the search. */
export interface RemedyDefinition extends RemedyPage {
  /** What its titles begin with, where that is not what those of its kind do. */
  readonly titleBegins?: string;
  /** What may be offered, best first; chosen so that the channel alone would be rid of the finding, not yet proved. */
  readonly search: (search: Search) => readonly Proposal[];
}

/** What a search proposes. */
export interface Proposal {
  /** What it does: `Sample at 51.2 kHz`. In lower case for kinds whose titles begin with a condition. */
  readonly does: string;
  /** What comes of it and what it costs: `inverter arrives at 16 kHz, outside the band (data x2)`. */
  readonly outcome: string;
  readonly edits: readonly TextEdit[];
  /** The same at the place that several channels have the value from. */
  readonly shared?: SharedEdit;
  /** Where a person has to put the real value, in the edited text. */
  readonly fillIn?: { readonly start: number; readonly end: number };
}

export interface SharedEdit {
  readonly edits: readonly TextEdit[];
  /** How many channels it reaches. */
  readonly channels: number;
}
