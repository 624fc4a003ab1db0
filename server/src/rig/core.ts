import type { Acceptance } from './acceptance.ts';
import { anchorTable, sameItems } from './anchors.ts';
import { type Dependencies, dependenciesHold, dependenciesOf } from './dependencies.ts';
import { type Entry, KIND_OF_SECTION, NAMED_SECTIONS } from './entry.ts';
import { duplicateName, yamlProblem } from './entry-problems.ts';
import type { Epochs } from './epochs.ts';
import type { Field } from './fields.ts';
import type { Clock, Digitizer, Filter, Given, Group, Run, Sensor, Source, Thing } from './model.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { readClock } from './read-clock.ts';
import { readDigitizer } from './read-digitizer.ts';
import { readGroup } from './read-group.ts';
import { readNamedFilter, readNamedSensor } from './read-named.ts';
import { MAINS, readSource } from './read-source.ts';
import { missingRigName, readTopLevel, type SeverityChoice, type TopLevel } from './read-top-level.ts';
import {
  type Mention,
  type NameList,
  type Noted,
  notedBy,
  type Reader,
  type Scope,
  type SourceSet,
  startReading,
} from './reader.ts';
import { hiddenThings } from './used-problems.ts';
import {
  type Brought,
  type ByKind,
  byKind,
  type JoinedThings,
  type NamedKind,
  NOTHING_JOINED,
  type UsedFiles,
} from './used-things.ts';
import { withFollows } from './with-follows.ts';

/** What was read of one entry, and what the reading looked at. */
export interface EntryReading extends Noted {
  readonly value: unknown;
  readonly dependencies: Dependencies;
}

/** Everything of a rig file that can matter to more than one channel. */
export interface Core {
  /** The entries it was read from, in document order. */
  readonly significant: readonly Entry[];
  readonly checkNames: readonly string[];
  /** What became of the files that it uses. */
  readonly used: UsedFiles;
  /** The first entry of each name, by kind, in document order. */
  readonly named: ByKind<readonly Entry[]>;
  /** What comes from used files; a name of the file's own hides it. */
  readonly joined: JoinedThings;
  readonly scope: Scope;
  readonly readings: ReadonlyMap<Entry, EntryReading>;
  readonly defaultsEntry: Entry | undefined;
  /** The fields of `defaults`; the same object as before where they are. */
  readonly defaults: ReadonlyMap<string, Field>;
  /** In document order; the same object as before where they are. */
  readonly acceptances: readonly Acceptance[];
  readonly severities: ReadonlyMap<string, SeverityChoice>;
  readonly rigName: Given<string> | undefined;
  readonly run: Run | undefined;
  readonly problems: readonly PlacedProblem[];
  /** Problems of text that things inherit, said at its origin. */
  readonly origin: readonly PlacedProblem[];
  readonly notComputed: readonly PlacedProblem[];
  readonly mentions: readonly Mention[];
}

interface Sorted {
  readonly named: Core['named'];
  readonly topLevel: ReadonlyMap<string, Entry>;
  readonly problems: PlacedProblem[];
}

function sortSignificant(significant: readonly Entry[]): Sorted {
  const named = byKind(() => new Map<string, Entry>());
  const topLevel = new Map<string, Entry>();
  const problems: PlacedProblem[] = [];
  for (const entry of significant) {
    if (entry.section === 'channels') continue;
    for (const problem of entry.problems) problems.push(yamlProblem(entry, problem));
    if (entry.key === undefined) continue;
    const kind = entry.section && KIND_OF_SECTION[entry.section];
    const isMains = kind === undefined && entry.name === MAINS;
    const others = kind ? named[kind] : topLevel;
    const first = others.get(entry.name) ?? (isMains ? named.source.get(MAINS) : undefined);
    if (first) {
      const what = kind ?? (isMains ? 'source' : isSection(entry.name) ? 'section' : 'key');
      problems.push(duplicateName(entry, what, first));
      continue;
    }
    others.set(entry.name, entry);
    if (isMains) named.source.set(MAINS, entry);
  }
  return { named: byKind((kind) => [...named[kind].values()]), topLevel, problems };
}

function isSection(name: string): boolean {
  return NAMED_SECTIONS.some((section) => section === name);
}

/**
 * Reads everything but the channels: names first, so that a thing may name one that stands further down, then the
 * things in an order in which those that are named come before those that name them.
 *
 * @param previous an earlier core, whose readings are kept where nothing that they looked at has changed
 */
export function readCore(
  significant: readonly Entry[],
  checkNames: readonly string[],
  { settingEntries, epochOf }: Epochs,
  used: UsedFiles,
  previous: Core | undefined,
): Core {
  const { named, topLevel, problems } = sortSignificant(significant);
  const old = previous && sameItems(previous.checkNames, checkNames) ? previous : undefined;
  const things = {
    clock: new Map<string, Clock>(),
    digitizer: new Map<string, Digitizer>(),
    sensor: new Map<string, Sensor>(),
    filter: new Map<string, Filter>(),
    source: new Map<string, Source>(),
    group: new Map<string, Group>(),
  };
  const base: Scope = {
    names: nameLists(named, NOTHING_JOINED, undefined),
    things,
    anchors: anchorTable(settingEntries, old?.scope.anchors),
    epochOf,
    knowsAllNames: true,
    sources: { sources: [], allHeard: new Map() },
    inPlace: new Map(),
  };
  const readings = new Map<Entry, EntryReading>();
  const read = <T>(entry: Entry, scope: Scope, how: (reader: Reader) => T): T => {
    // What `uses` gives depends on the files that are used, which no lookup tells.
    const known = entry === usesEntry && old?.used !== used ? undefined : old?.readings.get(entry);
    const reading = readEntry(entry, scope, how, known);
    readings.set(entry, reading);
    return reading.value as T;
  };
  const readTop = (entry: Entry, scope: Scope): TopLevel =>
    read(entry, scope, (reader) => readTopLevel(reader, checkNames, used));
  const usesEntry = topLevel.get(USES);
  const joined = (usesEntry && readTop(usesEntry, base).joined) ?? NOTHING_JOINED;
  const earlier: Scope = {
    ...base,
    names: nameLists(named, joined, old?.scope.names),
    knowsAllNames: joined.isComplete,
  };
  const readAll = <T extends Thing>(kind: NamedKind, of: Map<string, T>, how: (reader: Reader) => T): void => {
    for (const entry of named[kind]) of.set(entry.name, read(entry, earlier, how));
    addJoined(of, named[kind], joined.things[kind]);
  };
  readAll('clock', things.clock, readClock);
  readAll('filter', things.filter, readNamedFilter);
  readAll('sensor', things.sensor, readNamedSensor);
  readAll('digitizer', things.digitizer, readDigitizer);
  readAll('group', things.group, readGroup);
  for (const entry of named.source) {
    const source = entry.section ? read(entry, earlier, readSource) : readTop(entry, earlier).mains;
    if (source) things.source.set(entry.name, source);
  }
  addJoined(things.source, named.source, joined.things.source);
  problems.push(...hiddenThings(named, joined));
  const scope: Scope = { ...earlier, sources: sourceSet([...things.source.values()], old?.scope.sources) };
  let top: TopLevel = {};
  for (const entry of topLevel.values()) {
    if (entry.name === MAINS || entry === usesEntry) continue;
    top = { ...top, ...readTop(entry, scope) };
  }
  if (!topLevel.has('rig')) problems.push(missingRigName(significant[0]));
  const origin: PlacedProblem[] = [];
  const notComputed: PlacedProblem[] = [];
  const mentions: Mention[] = [];
  for (const entry of significant) {
    const reading = readings.get(entry);
    if (!reading) continue;
    problems.push(...reading.problems);
    origin.push(...reading.origin);
    notComputed.push(...reading.notComputed);
    mentions.push(...reading.mentions);
  }
  return {
    significant,
    checkNames,
    used,
    named,
    joined,
    scope,
    readings,
    defaultsEntry: topLevel.get('defaults'),
    defaults: withFollows(top.defaults ?? NO_DEFAULTS, top.follows),
    acceptances: top.acceptances ?? NO_ACCEPTANCES,
    severities: top.severities ?? NO_SEVERITIES,
    rigName: top.rigName,
    run: top.run,
    problems,
    origin,
    notComputed,
    mentions,
  };
}

const USES = 'uses';
const NO_DEFAULTS: ReadonlyMap<string, Field> = new Map();
const NO_ACCEPTANCES: readonly Acceptance[] = [];
const NO_SEVERITIES: ReadonlyMap<string, SeverityChoice> = new Map();

function readEntry<T>(
  entry: Entry,
  scope: Scope,
  how: (reader: Reader) => T,
  known: EntryReading | undefined,
): EntryReading {
  const epoch = scope.epochOf(entry);
  if (known && dependenciesHold(known.dependencies, scope, epoch)) return known;
  const reader = startReading(entry, scope, epoch);
  const value = how(reader);
  return { value, ...notedBy(reader), dependencies: dependenciesOf(reader) };
}

/** Adds what used files bring, but for what the file names itself. */
function addJoined<T extends Thing>(
  things: Map<string, T>,
  own: readonly Entry[],
  brought: ReadonlyMap<string, Brought>,
): void {
  if (brought.size === 0) return;
  const hidden = new Set(own.map(({ name }) => name));
  // Things are kept by kind, so that this one is of the kind of the others.
  for (const [name, { thing }] of brought) if (thing && !hidden.has(name)) things.set(name, thing as T);
}

function nameLists(named: Core['named'], joined: JoinedThings, old: Scope['names'] | undefined): Scope['names'] {
  return byKind((kind): NameList => {
    const set = new Set(named[kind].map(({ name }) => name));
    for (const name of joined.things[kind].keys()) set.add(name);
    const names = [...set];
    const before = old?.[kind];
    return before && sameItems(before.names, names) ? before : { names, set };
  });
}

function sourceSet(sources: readonly Source[], old: SourceSet | undefined): SourceSet {
  return old && sameItems(old.sources, sources) ? old : { sources, allHeard: new Map() };
}
