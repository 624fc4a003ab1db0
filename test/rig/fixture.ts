import { expect } from 'vitest';
import type { ChannelReading } from '../../server/src/rig/channel-reading.ts';
import { readChannel } from '../../server/src/rig/channel-reading.ts';
import type { Environment } from '../../server/src/rig/environment.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import { NO_USES, nameUses } from '../../server/src/rig/name-uses.ts';
import type { Place } from '../../server/src/rig/place.ts';
import type { PlacedProblem } from '../../server/src/rig/placed-problem.ts';
import type { Cure } from '../../server/src/rig/problem.ts';
import { rigProblems } from '../../server/src/rig/rig-problems.ts';
import type { Snapshot } from '../../server/src/rig/snapshot.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { unusedNames } from '../../server/src/rig/unused-names.ts';

export const CHECK_NAMES: readonly string[] = ['fold-in-band', 'thin-margin', 'band-droop'];

/** A rig text, read. */
export interface ReadRig {
  readonly snapshot: Snapshot;
  readonly environment: Environment;
  readonly readings: readonly ChannelReading[];
  /** Everything that was said of the text: of each channel, and of the rest. */
  readonly problems: readonly PlacedProblem[];
}

/** Reads a rig text from nothing. */
export function readRig(text: string): ReadRig {
  const snapshot = readSnapshot(text);
  const environment = readEnvironment(snapshot, CHECK_NAMES);
  const readings = environment.channelEntries.map((entry) => readChannel(entry, environment));
  const channels = readings.map((reading) => ({ reading }));
  const problems = [
    ...readings.flatMap((reading) => reading.problems),
    ...rigProblems(environment, channels),
    ...unusedNames(environment, nameUses(channels, NO_USES)),
  ];
  return { snapshot, environment, readings, problems };
}

/** The text at a place. */
export function textAt({ entry, start, end }: Place): string {
  return entry.text.slice(start, end);
}

/** Problems as `name: text at fault`, hints about unused names left out. */
export function saidOf(rig: ReadRig): readonly string[] {
  return rig.problems
    .filter(({ problem }) => problem.name !== 'unused-name')
    .map(({ problem, place }) => `${problem.name}: ${textAt(place)}`);
}

const OPEN = '⟦';
const CLOSE = '⟧';

/**
 * Reads a text in which the place at fault is marked, `⟦like this⟧`, and expects that exactly one thing is said of
 * it: this. Hints about unused names don't count.
 */
export function expectOneProblem(marked: string, name: string, cure?: Cure): PlacedProblem {
  const start = marked.indexOf(OPEN);
  const text = marked.replace(OPEN, '').replace(CLOSE, '');
  const end = marked.indexOf(CLOSE) - OPEN.length;
  const rig = readRig(text);
  const said = rig.problems.filter(({ problem }) => problem.name !== 'unused-name');
  expect(said.map(({ problem, place }) => ({ name: problem.name, at: textAt(place) }))).toEqual([
    { name, at: text.slice(start, end) },
  ]);
  const { problem, place } = said[0]!;
  expect((rig.snapshot.startOf(place.entry) ?? 0) + place.start).toBe(start);
  if (cure) expect(problem.cure).toEqual(cure);
  return said[0]!;
}

/** A rig around one channel with the given keys. */
export function channelRig(keys: string, rest = ''): string {
  return `rig: R\n${rest}channels:\n  a:\n    rate: 1 kHz\n    band: 1 Hz .. 100 Hz\n${indented(keys, 4)}`;
}

/** A rig with one more named thing. */
export function thingRig(section: string, keys: string, rest = ''): string {
  return `rig: R\n${rest}${section}:\n  x:\n${indented(keys, 4)}`;
}

function indented(keys: string, width: number): string {
  return keys
    .split('\n')
    .filter((line) => line !== '')
    .map((line) => `${' '.repeat(width)}${line}\n`)
    .join('');
}
