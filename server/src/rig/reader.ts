import type { AnchorTable } from './anchors.ts';
import type { Entry } from './entry.ts';
import { MOST_ENTRY_PROBLEMS, MOST_INHERITED_PROBLEMS } from './limits.ts';
import type { Clock, Digitizer, Filter, Group, HeardSource, Sensor, Source } from './model.ts';
import type { Place } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import type { Cure, ProblemName } from './problem.ts';
import type { TreeNode } from './tree.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/** A place where a thing is named: for going from a name to what it stands for and back. */
export interface Mention {
  readonly kind: ThingKind;
  readonly name: string;
  readonly place: Place;
}

/** The names of one kind of thing in this file and those that it uses; the same object as before where they are the same names. */
export interface NameList {
  readonly names: readonly string[];
  readonly set: ReadonlySet<string>;
}

/** Named things that have been read, by name. */
export interface Things {
  readonly clock: ReadonlyMap<string, Clock>;
  readonly digitizer: ReadonlyMap<string, Digitizer>;
  readonly sensor: ReadonlyMap<string, Sensor>;
  readonly filter: ReadonlyMap<string, Filter>;
  readonly source: ReadonlyMap<string, Source>;
  readonly group: ReadonlyMap<string, Group>;
}

/** A thing written in place of a name in text that many entries inherit: read once, whatever was said of it with it. */
export interface SharedThing {
  readonly thing: object;
  readonly problems: readonly PlacedProblem[];
}

/** Sources heard by those who hear all, and those left out because they are in another quantity. */
export interface AllHeard {
  readonly heard: readonly HeardSource[];
  readonly unheard: readonly Source[];
}

/** The sources of a file and those that it uses; the same object as before where they are the same ones in the same order. */
export interface SourceSet {
  readonly sources: readonly Source[];
  /** Who hears all hears the same as everybody else who measures the same quantity: worked out once for each. */
  readonly allHeard: Map<string | undefined, AllHeard>;
}

/** What a reading may look at besides its own entry. */
export interface Scope {
  readonly names: Readonly<Record<Exclude<ThingKind, 'channel'>, NameList>>;
  readonly things: Things;
  readonly anchors: AnchorTable;
  /** How many anchor-setting entries stand before an entry. */
  readonly epochOf: (entry: Entry) => number;
  /** False where not all files that are used have been read: a name nobody knows may be one of theirs. */
  readonly knowsAllNames: boolean;
  /** Every readable source, in document order; those of used files behind them. */
  readonly sources: SourceSet;
  /** Things written in place in text that entries inherit, by their map: kept so that all who inherit share them. */
  readonly inPlace: Map<TreeNode, SharedThing>;
}

/** A name that a reading looked up, and what it found. */
export type Lookup =
  | { readonly kind: keyof Things; readonly name: string; readonly thing: object | undefined }
  /** Whether there is a thing of that name, which depends on all the names there are. */
  | {
      readonly kind: Exclude<ThingKind, 'channel'>;
      readonly name: string;
      readonly names: NameList;
      readonly knowsAllNames: boolean;
    };

/** A reading in progress: where it stands, and what it has found so far. */
export interface Reader {
  readonly entry: Entry;
  readonly scope: Scope;
  /** How many anchor-setting entries stand before the entry. */
  readonly epoch: number;
  /** Problems of the entry's own text. */
  readonly own: PlacedProblem[];
  /** Problems of text that the entry inherits; they are said once, at their origin. */
  readonly origin: PlacedProblem[];
  /** Keys of this entry that are known but not computed. */
  readonly notComputed: PlacedProblem[];
  readonly mentions: Mention[];
  readonly lookups: Lookup[];
  /** How many aliases have been followed. */
  expansions: number;
}

/** Begins the reading of an entry. */
export function startReading(entry: Entry, scope: Scope, epoch: number): Reader {
  return {
    entry,
    scope,
    epoch,
    own: [],
    origin: [],
    notComputed: [],
    mentions: [],
    lookups: [],
    expansions: 0,
  };
}

/** What a reading has noted besides what it has made of the text. */
export interface Noted {
  /** What is wrong in the entry's own text. */
  readonly problems: readonly PlacedProblem[];
  /** What is wrong in text that it inherits: to be said once, at its origin, however many inherit it. */
  readonly origin: readonly PlacedProblem[];
  /** Keys of its own that are known but not computed: to be said once for each key of the file. */
  readonly notComputed: readonly PlacedProblem[];
  /** Where it names things in its own text. */
  readonly mentions: readonly Mention[];
}

export function notedBy({ own, origin, notComputed, mentions }: Reader): Noted {
  return {
    problems: orNone(own),
    origin: orNone(origin),
    notComputed: orNone(notComputed),
    mentions: orNone(mentions),
  };
}

const NONE: readonly never[] = [];

/** Spares ten thousand channels an empty list each. */
export function orNone<T>(items: readonly T[]): readonly T[] {
  return items.length === 0 ? NONE : items;
}

export interface Report {
  readonly name: ProblemName;
  readonly place: Place;
  readonly message: string;
  readonly about?: string;
  readonly severity?: 'hint';
  readonly cure?: Cure | undefined;
  readonly related?: PlacedProblem['related'];
}

const NOTHING_RELATED: PlacedProblem['related'] = [];

/** A problem at its place. */
export function placedProblem({ name, place, message, about, severity, cure, related }: Report): PlacedProblem {
  const problem = {
    name,
    start: place.start,
    end: place.end,
    message,
    ...(about === undefined ? {} : { about }),
    ...(severity === undefined ? {} : { severity }),
    ...(cure === undefined ? {} : { cure }),
  };
  return { problem, place, related: related ?? NOTHING_RELATED };
}

/**
 * Notes a problem, once: where an anchor and its aliases stand in one entry, the same text is read more than once.
 * Two problems of one name about the same thing are told apart by a number, so that each has an identity of its own.
 */
export function report(reader: Reader, said: Report): void {
  if (hasSaidEnough(reader, said.place.entry)) return;
  const problems = said.place.entry === reader.entry ? reader.own : reader.origin;
  let about = said.about;
  let alike = 1;
  for (const { problem, place } of problems) {
    if (problem.name !== said.name) continue;
    const samePlace =
      place.start === said.place.start && place.end === said.place.end && place.entry === said.place.entry;
    // Several keys may be missing at one place.
    if (samePlace && (said.name !== 'missing-key' || problem.about === said.about)) return;
    if (problem.about === about) about = `${said.about ?? ''} ${++alike}`;
  }
  problems.push(placedProblem(about === said.about || about === undefined ? said : { ...said, about }));
}

/** True where so much has been said of a text already that more would help nobody. */
export function hasSaidEnough(reader: Reader, entry: Entry): boolean {
  if (entry === reader.entry) return reader.own.length >= MOST_ENTRY_PROBLEMS;
  return reader.origin.length >= MOST_INHERITED_PROBLEMS;
}

/** Notes that a thing is named in the entry's own text. */
export function mention(reader: Reader, kind: ThingKind, name: string, place: Place): void {
  if (place.entry === reader.entry) reader.mentions.push({ kind, name, place });
}
