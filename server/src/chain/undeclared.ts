import type { Undeclared } from '../rig/model.ts';
import { analogueResponse } from '../signal/analogue.ts';
import type { Response } from '../signal/response.ts';
import { impliedEntry, placedLevel } from './level-scale.ts';
import type { Chain } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';
import { bandImages, type Least, worstFolds } from './worst-fold.ts';

/** The most that what no source declares may leave in the band by folding at one stage. */
export interface UndeclaredFold {
  /** From 1. */
  readonly stage: number;
  /** Least attenuation on the way, or as much as is sure. */
  readonly attenuationDb: number;
  /** The true frequency that it comes from. */
  readonly atHz: number;
  /** The bound on what is there, on the chain's scale. */
  readonly undeclaredDb: number;
  /** What may be left of it in the band, on the chain's scale. */
  readonly level: number;
}

/** The bound on what is not declared: the same at every frequency, or a curve. */
interface Bound {
  /** On the chain's scale; 0 where there is a curve. */
  readonly constantDb: number;
  /** Its negative as an attenuation. */
  readonly curve: Response | undefined;
  readonly entersAtSensor: boolean;
}

interface NotedLeast {
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly isBandpass: boolean;
  readonly entersAtSensor: boolean;
  readonly least: readonly (Least | undefined)[];
}

const LEAST: NoteKind<NotedLeast> = { name: 'least attenuation of what folds', most: 24 };

/**
 * For each stage of a chain in turn, the worst of all true frequencies that first fold there and end in the band,
 * however high: each weighed by the bound on what is undeclared. `undefined` where nothing can fold into the band.
 */
export function undeclaredFolds(chain: Chain): readonly (UndeclaredFold | undefined)[] {
  const bound = boundOf(chain);
  return leastByStage(chain, bound).map((least, index) => {
    if (!least) return undefined;
    const { atHz } = least;
    const undeclaredDb = bound.curve ? -bound.curve.attenuationDb(atHz) : bound.constantDb;
    const level = bound.constantDb - least.attenuationDb;
    return { stage: index + 1, attenuationDb: undeclaredDb - level, atHz, undeclaredDb, level };
  });
}

/** For each stage in turn, the least that is taken off anything that first folds there and ends in the band. */
export function leastAttenuations(chain: Chain): readonly (Least | undefined)[] {
  return leastByStage(chain, { constantDb: 0, curve: undefined, entersAtSensor: false });
}

function boundOf({ channel, scale }: Chain): Bound {
  const undeclared: Undeclared | undefined = channel.undeclared?.value;
  const fullScale: Bound = { constantDb: scale.fullScaleDb, curve: undefined, entersAtSensor: false };
  if (!undeclared || undeclared.kind === 'full-scale') return fullScale;
  if (undeclared.kind === 'level') {
    const entry = impliedEntry(undeclared.level, channel.sensor);
    const constantDb = placedLevel(undeclared.level, scale, entry);
    return constantDb === undefined ? fullScale : { ...fullScale, constantDb, entersAtSensor: entry === 'sensor' };
  }
  const entry = impliedEntry(undeclared.points[0]?.level, channel.sensor);
  const points: (readonly [number, number])[] = [];
  for (const { frequencyHz, level } of undeclared.points) {
    const placed = placedLevel(level, scale, entry);
    if (placed === undefined) return fullScale;
    points.push([frequencyHz, -placed]);
  }
  if (points.length === 0) return fullScale;
  points.sort(([first], [second]) => first - second);
  const curve = analogueResponse({ response: 'points', points, tolerance: 0 });
  return { constantDb: 0, curve, entersAtSensor: entry === 'sensor' };
}

function leastByStage(chain: Chain, bound: Bound): readonly (Least | undefined)[] {
  const { path, bandLowHz, bandHighHz, isBandpass } = chain;
  const entersAtSensor = bound.entersAtSensor && !path.sensorIsFlat;
  if (bound.curve) return searched(chain, entersAtSensor, bound.curve);
  for (const noted of notesOn(path, LEAST)) {
    const isSame =
      noted.bandHighHz === bandHighHz &&
      noted.bandLowHz === bandLowHz &&
      noted.isBandpass === isBandpass &&
      noted.entersAtSensor === entersAtSensor;
    if (isSame) return noted.least;
  }
  const least = searched(chain, entersAtSensor, undefined);
  return note(path, LEAST, { bandLowHz, bandHighHz, isBandpass, entersAtSensor, least }).least;
}

function searched(chain: Chain, entersAtSensor: boolean, curve: Response | undefined): readonly (Least | undefined)[] {
  const { path } = chain;
  const ahead = [...path.known[0]!];
  if (entersAtSensor) ahead.push(path.sensor);
  if (curve) ahead.push(curve);
  return worstFolds(bandImages(chain), ahead);
}
