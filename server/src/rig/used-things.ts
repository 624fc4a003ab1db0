import type { Thing } from './model.ts';
import type { Place } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import type { ProblemName } from './problem.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/** Kinds of things that other files may name. */
export type NamedKind = Exclude<ThingKind, 'channel'>;
export const NAMED_KINDS: readonly NamedKind[] = ['clock', 'digitizer', 'sensor', 'filter', 'source', 'group'];

export type ByKind<T> = Readonly<Record<NamedKind, T>>;

export function byKind<T>(of: (kind: NamedKind) => T): ByKind<T> {
  return Object.fromEntries(NAMED_KINDS.map((kind) => [kind, of(kind)])) as ByKind<T>;
}

/** A name that a file offers to those that use it. */
export interface Exported {
  /** `undefined` for one that stands for nothing that could be read, of which its own file tells. */
  readonly thing: Thing | undefined;
  /** Where the name stands. */
  readonly place: Place;
}

/** Everything that a file offers to those that use it: its own named things, and what it uses itself. */
export interface Exports {
  readonly things: ByKind<ReadonlyMap<string, Exported>>;
  /** False where not all that the file uses has been read. */
  readonly isComplete: boolean;
  /** Why not, where that can be told. */
  readonly gap: Gap | undefined;
}

/** A file that is used and can't be read. */
export interface Gap {
  readonly name: ProblemName;
  /** A clause: `` `lib.rig.yaml` does not exist``. */
  readonly clause: string;
  /** Where `uses` names it. */
  readonly place: Place;
}

/** What became of an item of `uses`. */
export type UsedFile =
  | { readonly kind: 'read'; readonly exports: Exports }
  /** Nobody has told yet what it holds. */
  | { readonly kind: 'unread' }
  | {
      readonly kind: 'fault';
      readonly name: ProblemName;
      /** What is wrong, to be said of the path: `does not exist`. */
      readonly fault: string;
      readonly related: PlacedProblem['related'];
    };

/** What became of the items of a file's `uses`, by the paths as they are written; one that is not there is unread. */
export type UsedFiles = ReadonlyMap<string, UsedFile>;

export const NO_USED_FILES: UsedFiles = new Map();

/** A name that comes from a used file. */
export interface Brought extends Exported {
  /** The item of `uses` that it comes by. */
  readonly item: UsesItem;
}

/** An item of `uses`. */
export interface UsesItem {
  /** As it is written. */
  readonly path: string;
  readonly place: Place;
}

/** The things of all files that a file uses. */
export interface JoinedThings {
  readonly things: ByKind<ReadonlyMap<string, Brought>>;
  readonly isComplete: boolean;
  readonly gap: Gap | undefined;
}

export const NOTHING_JOINED: JoinedThings = { things: byKind(() => new Map()), isComplete: true, gap: undefined };
