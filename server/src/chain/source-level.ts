import type { HeardSource, Level, Sensor } from '../rig/model.ts';
import type { Component } from './components.ts';
import { type Entry, impliedEntry, placedLevel } from './level-scale.ts';
import type { LevelScale } from './model.ts';

/** A source's level on one channel's scale. */
export interface SourceLevels {
  readonly entry: Entry;
  /** False where there is no level, or one that the scale has no place for: full scale stands in. */
  readonly known: boolean;
  /** Of the harmonics whose levels are given, the fundamental first; never empty. */
  readonly harmonicsDb: readonly number[];
  readonly fallsDbPerOctave: number;
}

/** Where a source enters a channel: what the text says, or what its level implies. */
export function entryOf({ source, level }: HeardSource, sensor: Sensor | undefined): Entry {
  if (source.entersSaid) return source.enters;
  return impliedEntry(level?.value ?? source.levels[0]?.value, sensor);
}

/** The level of what a channel hears of a source, on the channel's scale. */
export function sourceLevelsOf(heard: HeardSource, sensor: Sensor | undefined, scale: LevelScale): SourceLevels {
  const entry = entryOf(heard, sensor);
  const given = levelsOf(heard);
  const placed = given.map((level) => placedLevel(level, scale, entry));
  const known = placed.length > 0 && placed.every((level) => level !== undefined);
  const harmonicsDb = known ? placed.map((level) => level ?? 0) : [scale.fullScaleDb];
  return { entry, known, harmonicsDb, fallsDbPerOctave: heard.source.fallsDbPerOctave };
}

/** The levels that are given for a source on a channel: the channel's own, or the source's. */
export function levelsOf({ source, level }: HeardSource): readonly Level[] {
  return level ? [level.value] : source.levels.map((given) => given.value);
}

/** The level of one component ahead of the filters, the sensor's response to its frequency left out. */
export function componentLevel({ harmonicsDb, fallsDbPerOctave }: SourceLevels, component: Component): number {
  const { harmonic, belowDb } = component;
  const given = harmonicsDb.length;
  if (harmonic <= given) return harmonicsDb[harmonic - 1]! - belowDb;
  return harmonicsDb[given - 1]! - fallsDbPerOctave * Math.log2(harmonic / given) - belowDb;
}
