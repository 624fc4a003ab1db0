import type { Undeclared } from '../rig/model.ts';
import { analogueResponse } from '../signal/analogue.ts';
import { type Along, leastPointAlong } from '../signal/cascade.ts';
import { type FoldedPiece, foldsInto } from '../signal/folding.ts';
import type { Response } from '../signal/response.ts';
import { impliedEntry, placedLevel } from './level-scale.ts';
import type { Chain, SignalPath } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';

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

/** Zones that are looked at one by one before what is beyond them is taken at its bound. */
const MOST_ZONES = 64;

/** Pieces that are searched for their least before the rest are taken at their bounds. */
const MOST_SEARCHED = 4096;

/** Where no more than this can be gained by looking on, the bound is taken: an equal ripple would never end. */
const CLOSE_DB = 0.01;

/** The bound on what is not declared: the same at every frequency, or a curve. */
interface Bound {
  /** On the chain's scale; 0 where there is a curve. */
  readonly constantDb: number;
  /** Its negative as an attenuation. */
  readonly curve: Response | undefined;
  readonly entersAtSensor: boolean;
}

/** Where a search for the least attenuation stands. */
interface Least {
  readonly attenuationDb: number;
  readonly atHz: number;
}

interface NotedLeast {
  readonly bandLowHz: number;
  readonly bandHighHz: number;
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
  const { path, bandLowHz, bandHighHz } = chain;
  const entersAtSensor = bound.entersAtSensor && !path.sensorIsFlat;
  if (bound.curve) return searched(chain, entersAtSensor, bound.curve);
  for (const noted of notesOn(path, LEAST)) {
    const isSame =
      noted.bandHighHz === bandHighHz && noted.bandLowHz === bandLowHz && noted.entersAtSensor === entersAtSensor;
    if (isSame) return noted.least;
  }
  const least = searched(chain, entersAtSensor, undefined);
  return note(path, LEAST, { bandLowHz, bandHighHz, entersAtSensor, least }).least;
}

/** A range below the first Nyquist frequency that ends in the band, and what is sure to be taken off it on the way. */
interface Image {
  readonly piece: FoldedPiece;
  readonly laterDb: number;
}

function searched(chain: Chain, entersAtSensor: boolean, curve: Response | undefined): readonly (Least | undefined)[] {
  const { path } = chain;
  const ahead = [...path.known[0]!];
  if (entersAtSensor) ahead.push(path.sensor);
  if (curve) ahead.push(curve);
  const found: (Least | undefined)[] = path.ratesHz.map(() => undefined);
  let searches = 0;
  const consider = (stage: number, image: Image, zone: number): void => {
    const before = found[stage];
    const { lowHz, highHz } = trueRange(image, zone, path);
    const boundDb = image.laterDb + sumOfLeast(ahead, lowHz, highHz);
    if (before && boundDb >= before.attenuationDb) return;
    const isSearched = !image.piece.collapsed && searches++ < MOST_SEARCHED;
    const least = isSearched ? leastOf(image, zone, ahead, path) : { attenuationDb: boundDb, atHz: lowHz };
    if (!before || least.attenuationDb < before.attenuationDb) found[stage] = least;
  };
  for (const image of imagesOf(chain)) {
    // Stages count from 0 here, and the pieces' own from the second one.
    if (image.piece.foldsAtStage !== null) consider(image.piece.foldsAtStage, image, 0);
    for (let zone = 1; zone <= MOST_ZONES; zone++) {
      const beyondHz = trueRange(image, zone, path).lowHz;
      const boundDb = image.laterDb + sumOfLeast(ahead, beyondHz, Infinity);
      const before = found[0];
      if (before && boundDb >= before.attenuationDb - CLOSE_DB) {
        if (boundDb < before.attenuationDb) found[0] = { attenuationDb: boundDb, atHz: before.atHz };
        break;
      }
      if (zone === MOST_ZONES) found[0] = { attenuationDb: boundDb, atHz: beyondHz };
      else consider(0, image, zone);
    }
  }
  return found;
}

/** Everything below the first Nyquist frequency that ends in the band, the least attenuated later on first. */
function imagesOf({ path, bandLowHz, bandHighHz }: Chain): readonly Image[] {
  const firstNyquistHz = path.ratesHz[0]! / 2;
  const lastNyquistHz = path.ratesHz[path.ratesHz.length - 1]! / 2;
  const pieces = foldsInto(bandLowHz, Math.min(bandHighHz, lastNyquistHz), path.ratesHz.slice(1), firstNyquistHz);
  const images = pieces.map((piece): Image => {
    let laterDb = 0;
    for (const { response, lowHz, highHz } of laterMembers(piece, path)) laterDb += response.leastDb(lowHz, highHz);
    return { piece, laterDb };
  });
  return images.sort((first, second) => first.laterDb - second.laterDb);
}

/** The filters behind the first stage, as they see an image. */
function laterMembers(piece: FoldedPiece, { known, ratesHz }: SignalPath): readonly Along[] {
  const recorded = { lowHz: piece.recordedLowHz, highHz: piece.recordedHighHz, reversed: piece.mirrored };
  return known.slice(1).flatMap((responses, index) => {
    const input = index + 1 < ratesHz.length ? piece.inputs[index]! : recorded;
    return responses.map((response) => ({ ...input, response }));
  });
}

/** The true frequencies in a zone of the first stage (from 0) that fold onto an image, with the clock's tolerance. */
function trueRange(
  { piece }: Image,
  zone: number,
  path: SignalPath,
): { readonly lowHz: number; readonly highHz: number } {
  const nyquistHz = path.ratesHz[0]! / 2;
  const isMirrored = zone % 2 === 1;
  const lowHz = isMirrored ? (zone + 1) * nyquistHz - piece.trueHighHz : zone * nyquistHz + piece.trueLowHz;
  const highHz = isMirrored ? (zone + 1) * nyquistHz - piece.trueLowHz : zone * nyquistHz + piece.trueHighHz;
  const slackHz = 2 * Math.ceil(zone / 2) * nyquistHz * path.clockTolerance;
  return { lowHz: Math.max(lowHz - slackHz, 0), highHz: highHz + slackHz };
}

function leastOf(image: Image, zone: number, ahead: readonly Response[], path: SignalPath): Least {
  const { lowHz, highHz } = trueRange(image, zone, path);
  const isMirrored = zone % 2 === 1;
  const members: Along[] = ahead.map((response) => ({ response, lowHz, highHz, reversed: false }));
  for (const member of laterMembers(image.piece, path)) {
    members.push(isMirrored ? { ...member, reversed: !member.reversed } : member);
  }
  if (members.length === 0) return { attenuationDb: 0, atHz: lowHz };
  const { attenuationDb, t } = leastPointAlong(members);
  return { attenuationDb, atHz: Math.min(lowHz + t * (highHz - lowHz), highHz) };
}

function sumOfLeast(responses: readonly Response[], lowHz: number, highHz: number): number {
  let sum = 0;
  for (const response of responses) sum += response.leastDb(lowHz, highHz);
  return sum;
}
