import { type Along, alongPiece, leastPointAlong } from '../signal/cascade.ts';
import type { FoldedPiece, StageInput } from '../signal/folding.ts';
import type { SignalPath } from './model.ts';

/** Where a piece comes through least attenuated. */
export interface Strongest {
  /** Of everything on the way, the sensor too where the piece enters there; dB. */
  readonly attenuationDb: number;
  /** Of the filters alone. */
  readonly filtersDb: number;
  /** True frequency. */
  readonly atHz: number;
}

/**
 * The point at which a piece, or a part of it, is recorded highest: the true extreme of all responses together, worst
 * tolerance, not the value at an end.
 *
 * @param from start of the part along the true frequency, 0 to 1
 * @param to end of it
 */
export function strongestOf(
  path: SignalPath,
  piece: FoldedPiece,
  entersAtSensor: boolean,
  from = 0,
  to = 1,
): Strongest {
  const { trueLowHz, trueHighHz } = piece;
  const seesSensor = entersAtSensor && !path.sensorIsFlat;
  if (trueLowHz === trueHighHz) {
    const filtersDb = attenuationAtPoint(path, piece);
    const sensorDb = seesSensor ? path.sensor.leastDb(trueLowHz, trueLowHz) : 0;
    return { attenuationDb: filtersDb + sensorDb, filtersDb, atHz: trueLowHz };
  }
  const members: Along[] = [];
  for (const { response, lowHz, highHz, reversed } of alongPiece(piece, path.known)) {
    const part = partOf({ lowHz, highHz, reversed }, from, to);
    members.push({ response, lowHz: part.lowHz, highHz: part.highHz, reversed });
  }
  const truth = partOf({ lowHz: trueLowHz, highHz: trueHighHz, reversed: false }, from, to);
  if (seesSensor) members.push({ response: path.sensor, lowHz: truth.lowHz, highHz: truth.highHz, reversed: false });
  if (members.length === 0) return { attenuationDb: 0, filtersDb: 0, atHz: truth.lowHz };
  const { attenuationDb, t } = leastPointAlong(members);
  const atHz = Math.min(truth.lowHz + t * (truth.highHz - truth.lowHz), truth.highHz);
  const sensorDb = seesSensor ? path.sensor.leastDb(atHz, atHz) : 0;
  return { attenuationDb, filtersDb: seesSensor ? attenuationDb - sensorDb : attenuationDb, atHz };
}

/**
 * What is sure to be taken off a piece, or a part of it: the least of each response by itself. It is found in no time,
 * and is the same as `strongestOf` for a point; for a range it may claim that more comes through than does.
 */
export function surelyTakenOff(
  path: SignalPath,
  piece: FoldedPiece,
  entersAtSensor: boolean,
  from = 0,
  to = 1,
): Strongest {
  let filtersDb = 0;
  for (let stage = 0; stage < path.known.length; stage++) {
    const input = piece.inputs[stage];
    const range = input ?? { lowHz: piece.recordedLowHz, highHz: piece.recordedHighHz, reversed: piece.mirrored };
    const { lowHz, highHz } = partOf(range, from, to);
    for (const response of path.known[stage]!) filtersDb += response.leastDb(lowHz, highHz);
  }
  const { lowHz, highHz } = partOf({ lowHz: piece.trueLowHz, highHz: piece.trueHighHz, reversed: false }, from, to);
  const sensorDb = entersAtSensor && !path.sensorIsFlat ? path.sensor.leastDb(lowHz, highHz) : 0;
  return { attenuationDb: filtersDb + sensorDb, filtersDb, atHz: lowHz };
}

/** A point sees each filter at one frequency. */
function attenuationAtPoint(path: SignalPath, piece: FoldedPiece): number {
  let sum = 0;
  for (let stage = 0; stage < path.known.length; stage++) {
    const hz = piece.inputs[stage]?.lowHz ?? piece.recordedLowHz;
    for (const response of path.known[stage]!) sum += response.leastDb(hz, hz);
  }
  return sum;
}

/** The part of a range that a member sees from `from` to `to` along the piece. */
export function partOf(range: StageInput, from: number, to: number): StageInput {
  if (from <= 0 && to >= 1) return range;
  const { lowHz, highHz, reversed } = range;
  const width = highHz - lowHz;
  const start = reversed ? highHz - to * width : lowHz + from * width;
  const end = reversed ? highHz - from * width : lowHz + to * width;
  return { lowHz: Math.max(start, lowHz), highHz: Math.min(Math.max(start, end), highHz), reversed };
}
