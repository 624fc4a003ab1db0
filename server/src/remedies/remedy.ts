import type { ChannelResult } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import type { Environment } from '../rig/environment.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';

/** What an edit would mean to the rig itself: see the reference page of remedies. */
export type RemedyKind = 'text' | 'setting' | 'hardware' | 'requirement' | 'claim';

/** An edit that has been proved to take its finding away and to bring no other. */
export interface Remedy {
  /** `sample-faster`, `steeper-filter`, ...: the remedy's file name. */
  readonly name: string;
  readonly kind: RemedyKind;
  /** What it does and what it costs, beginning as its kind demands. */
  readonly title: string;
  readonly edits: readonly TextEdit[];
  /** The first proved `text` or `setting` remedy of its finding. */
  readonly preferred: boolean;
  /**
   * Where a person has to fill something in after a `claim`: offsets in the edited text. A claim whose value is
   * left to fill in can't be proved beyond leaving the rest of the document as it was.
   */
  readonly fillIn?: { readonly start: number; readonly end: number };
}

/** A candidate before its proof. */
export type Candidate = Omit<Remedy, 'preferred'>;

/** The findings of what an edit changes (every channel that is not as it was, and the rig), before it and after. */
export interface Recheck {
  readonly before: readonly Finding[];
  readonly after: readonly Finding[];
}

/**
 * Applies edits in memory, checks the document again, and tells whether every finding that it then has may stand; given
 * up at the first that may not. Findings of channels that the edits do not reach are not asked for.
 */
export type Trial = (edits: readonly TextEdit[], mayStand: (finding: Finding) => boolean) => boolean;

/** Everything a search may look at: it judges the channel alone. */
export interface RemedyContext {
  readonly finding: Finding;
  readonly snapshot: Snapshot;
  readonly environment: Environment;
  /** The finding's channel; `undefined` for findings about no channel. */
  readonly result: ChannelResult | undefined;
  /** Every channel of the file, for remedies that edit what many share. */
  readonly results: readonly ChannelResult[];
  readonly isCancelled: () => boolean;
}
