import { anchorTable, sameItems } from './anchors.ts';
import { type Dependencies, dependenciesHold, dependenciesOf } from './dependencies.ts';
import { type Entry, KIND_OF_SECTION, NAMED_SECTIONS } from './entry.ts';
import { duplicateName, yamlProblem } from './entry-problems.ts';
import type { Field } from './fields.ts';
import type { Given, Run, Source } from './model.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { readClock } from './read-clock.ts';
import { readDigitizer } from './read-digitizer.ts';
import { readNamedFilter, readNamedGroup, readNamedSensor } from './read-named.ts';
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
import type { ThingKind } from './vocabulary-kinds.ts';

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
  readonly scope: Scope;
  readonly readings: ReadonlyMap<Entry, EntryReading>;
  readonly defaultsEntry: Entry | undefined;
  /** The fields of `defaults`; the same object as before where they are. */
  readonly defaults: ReadonlyMap<string, Field>;
  readonly severities: ReadonlyMap<string, SeverityChoice>;
  readonly rigName: Given<string> | undefined;
  readonly run: Run | undefined;
  readonly problems: readonly PlacedProblem[];
  /** Problems of text that things inherit, said at its origin. */
  readonly origin: readonly PlacedProblem[];
  readonly notComputed: readonly PlacedProblem[];
  readonly mentions: readonly Mention[];
}

type NamedKind = Exclude<ThingKind, 'channel'>;

interface Sorted {
  /** The first entry of each name, by kind, in document order. */
  readonly named: Readonly<Record<NamedKind, readonly Entry[]>>;
  readonly topLevel: ReadonlyMap<string, Entry>;
  readonly problems: PlacedProblem[];
}

function sortSignificant(significant: readonly Entry[]): Sorted {
  const named: Record<NamedKind, Map<string, Entry>> = {
    clock: new Map(),
    digitizer: new Map(),
    sensor: new Map(),
    filter: new Map(),
    source: new Map(),
    group: new Map(),
  };
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
  const lists = Object.fromEntries(Object.entries(named).map(([kind, entries]) => [kind, [...entries.values()]]));
  return { named: lists as unknown as Sorted['named'], topLevel, problems };
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
  settingEntries: readonly Entry[],
  epochOf: (entry: Entry) => number,
  previous: Core | undefined,
): Core {
  const { named, topLevel, problems } = sortSignificant(significant);
  const old = previous && sameItems(previous.checkNames, checkNames) ? previous : undefined;
  const things = {
    clock: new Map(),
    digitizer: new Map(),
    sensor: new Map(),
    filter: new Map(),
    source: new Map<string, Source>(),
  };
  const noSources: SourceSet = { sources: [], allHeard: new Map() };
  const base = {
    names: nameLists(named, old?.scope.names),
    things,
    anchors: anchorTable(settingEntries, old?.scope.anchors),
    epochOf,
    usesOthers: topLevel.has('uses'),
    inPlace: new Map(),
  };
  const earlier: Scope = { ...base, sources: noSources };
  const readings = new Map<Entry, EntryReading>();
  const read = <T>(entry: Entry, scope: Scope, how: (reader: Reader) => T): T => {
    const reading = readEntry(entry, scope, how, old?.readings.get(entry));
    readings.set(entry, reading);
    return reading.value as T;
  };
  for (const entry of named.clock) things.clock.set(entry.name, read(entry, earlier, readClock));
  for (const entry of named.filter) things.filter.set(entry.name, read(entry, earlier, readNamedFilter));
  for (const entry of named.sensor) things.sensor.set(entry.name, read(entry, earlier, readNamedSensor));
  for (const entry of named.digitizer) things.digitizer.set(entry.name, read(entry, earlier, readDigitizer));
  for (const entry of named.group) read(entry, earlier, readNamedGroup);
  for (const entry of named.source) {
    const source = entry.section
      ? read(entry, earlier, readSource)
      : read(entry, earlier, (reader) => readTopLevel(reader, checkNames)).mains;
    if (source) things.source.set(entry.name, source);
  }
  const scope: Scope = { ...base, sources: sourceSet([...things.source.values()], old?.scope.sources) };
  let top: TopLevel = {};
  for (const entry of topLevel.values()) {
    if (entry.name === MAINS) continue;
    top = { ...top, ...read(entry, scope, (reader) => readTopLevel(reader, checkNames)) };
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
    scope,
    readings,
    defaultsEntry: topLevel.get('defaults'),
    defaults: top.defaults ?? NO_DEFAULTS,
    severities: top.severities ?? NO_SEVERITIES,
    rigName: top.rigName,
    run: top.run,
    problems,
    origin,
    notComputed,
    mentions,
  };
}

const NO_DEFAULTS: ReadonlyMap<string, Field> = new Map();
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

function nameLists(named: Sorted['named'], old: Scope['names'] | undefined): Scope['names'] {
  const list = (kind: NamedKind): NameList => {
    const names = named[kind].map(({ name }) => name);
    const before = old?.[kind];
    return before && sameItems(before.names, names) ? before : { names, set: new Set(names) };
  };
  return {
    clock: list('clock'),
    digitizer: list('digitizer'),
    sensor: list('sensor'),
    filter: list('filter'),
    source: list('source'),
    group: list('group'),
  };
}

function sourceSet(sources: readonly Source[], old: SourceSet | undefined): SourceSet {
  return old && sameItems(old.sources, sources) ? old : { sources, allHeard: new Map() };
}
