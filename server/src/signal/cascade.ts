import type { FoldedPiece, StageInput } from './folding.ts';
import { MinimumHeap } from './minimum-heap.ts';
import type { Response } from './response.ts';

/** Several responses one after another, each seeing the same frequency. */
export interface Cascade extends Response {
  readonly members: readonly Response[];
}

/** A response and the range over which it sees one piece, from end to end or from end to start. */
export interface Along {
  readonly response: Response;
  readonly lowHz: number;
  readonly highHz: number;
  readonly reversed: boolean;
}

/** An extreme of a sum along a piece. */
export interface PointAlong {
  /** The bound that holds: the extreme itself to 1e-6 dB, or less exact but on the safe side where steps ran out. */
  readonly attenuationDb: number;
  /** Where along the piece, from 0 to 1, the sum comes closest to it. */
  readonly t: number;
}

/** How close the bound must come to a value that is attained. */
const CLOSE_DB = 1e-6;

/** How often a piece is halved at most. */
const MOST_STEPS = 4096;

/**
 * The sum of several responses. Its extremes are those of the sum, not the sum of the extremes: see `leastAlong`.
 * None at all attenuate nothing; cascades among them are taken apart.
 */
export function cascade(responses: readonly Response[]): Cascade {
  const members = responses.flatMap(membersOf);
  const along = (lowHz: number, highHz: number): readonly Along[] =>
    members.map((response) => ({ response, lowHz, highHz, reversed: false }));
  return {
    members,
    attenuationDb: (hz) => members.reduce((sum, member) => sum + member.attenuationDb(hz), 0),
    leastDb: (lowHz, highHz) => leastAlong(along(lowHz, highHz)),
    greatestDb: (lowHz, highHz) => greatestAlong(along(lowHz, highHz)),
  };
}

/**
 * Least sum of attenuations along a piece, each with the worst of its own tolerance.
 *
 * Branch and bound: over any part of the piece the sum of each member's least is a lower bound, the sum at a point an
 * upper one; the part with the lowest bound is halved until the two are within 1e-6 dB. After 4,096 halvings the lower
 * bound is returned as it is: never more than is so.
 */
export function leastAlong(members: readonly Along[]): number {
  const only = members[0];
  if (members.length === 1 && only !== undefined) return only.response.leastDb(only.lowHz, only.highHz);
  return leastPointAlong(members).attenuationDb;
}

/** The same, and where along the piece it is. */
export function leastPointAlong(members: readonly Along[]): PointAlong {
  return leastOf(members, {
    at: (response, hz) => response.leastDb(hz, hz),
    over: (response, lowHz, highHz) => response.leastDb(lowHz, highHz),
  });
}

/** Greatest sum of attenuations along a piece, found as `leastAlong` finds the least; never less than is so. */
export function greatestAlong(members: readonly Along[]): number {
  const only = members[0];
  if (members.length === 1 && only !== undefined) return only.response.greatestDb(only.lowHz, only.highHz);
  return greatestPointAlong(members).attenuationDb;
}

/** The same, and where along the piece it is. */
export function greatestPointAlong(members: readonly Along[]): PointAlong {
  const { attenuationDb, t } = leastOf(members, {
    at: (response, hz) => -response.greatestDb(hz, hz),
    over: (response, lowHz, highHz) => -response.greatestDb(lowHz, highHz),
  });
  // 0 - x, lest an attenuation of 0 become -0.
  return { attenuationDb: 0 - attenuationDb, t };
}

/**
 * The responses of every stage as they see one folded piece, ready for `leastAlong`.
 *
 * A collapsed piece has no frequency in common between its stages, so each response is given at its own least: what
 * comes out is a bound on the safe side for what may fold.
 *
 * @param stages the responses ahead of each sampling, in the order of the piece's `inputs`, and after those any that
 *   follow the last sampling
 */
export function alongPiece(piece: FoldedPiece, stages: readonly (readonly Response[])[]): readonly Along[] {
  return stages.flatMap((responses, stage) => {
    const input = piece.inputs[stage] ?? recordedRange(piece);
    return responses.flatMap(membersOf).map((response) => ({
      ...input,
      response: piece.collapsed ? heldAt(response, input.lowHz, input.highHz) : response,
    }));
  });
}

function recordedRange({ recordedLowHz, recordedHighHz, mirrored }: FoldedPiece): StageInput {
  return { lowHz: recordedLowHz, highHz: recordedHighHz, reversed: mirrored };
}

function membersOf(response: Response): readonly Response[] {
  return 'members' in response ? (response as Cascade).members : [response];
}

/** Everywhere what the response is at worst over one range. */
function heldAt(response: Response, lowHz: number, highHz: number): Response {
  const leastDb = response.leastDb(lowHz, highHz);
  const greatestDb = response.greatestDb(lowHz, highHz);
  return { attenuationDb: () => leastDb, leastDb: () => leastDb, greatestDb: () => greatestDb };
}

/** What is made least: a figure of a response at a point, and its least over a range. */
interface Figure {
  at(response: Response, hz: number): number;
  over(response: Response, lowHz: number, highHz: number): number;
}

interface Part {
  readonly start: number;
  readonly end: number;
  readonly bound: number;
}

function leastOf(members: readonly Along[], figure: Figure): PointAlong {
  const valueAt = (t: number): number => sumOf(members, (member) => figure.at(member.response, frequencyAt(member, t)));
  const boundOver = (start: number, end: number): number =>
    sumOf(members, (member) => {
      const first = frequencyAt(member, start);
      const second = frequencyAt(member, end);
      return first <= second
        ? figure.over(member.response, first, second)
        : figure.over(member.response, second, first);
    });

  let best = { attenuationDb: valueAt(0), t: 0 };
  const consider = (t: number): void => {
    const attenuationDb = valueAt(t);
    if (attenuationDb < best.attenuationDb) best = { attenuationDb, t };
  };
  if (members.every((member) => member.lowHz === member.highHz)) return best;
  consider(1);

  const whole: Part = { start: 0, end: 1, bound: boundOver(0, 1) };
  const parts = new MinimumHeap<Part>((part) => part.bound);
  parts.add(whole);
  for (let step = 0; step < MOST_STEPS; step++) {
    const lowest = parts.least();
    // Nothing goes below minus infinity, and halving would not find where it is.
    if (lowest === undefined || lowest.bound >= best.attenuationDb - CLOSE_DB || lowest.bound === -Infinity) break;
    const middle = (lowest.start + lowest.end) / 2;
    if (middle <= lowest.start || middle >= lowest.end) break;
    parts.removeLeast();
    consider(middle);
    for (const [start, end] of [
      [lowest.start, middle],
      [middle, lowest.end],
    ] as const) {
      // A part's own bound can't be lower than that of the whole it is part of.
      const bound = Math.max(boundOver(start, end), lowest.bound);
      if (bound < best.attenuationDb) parts.add({ start, end, bound });
    }
  }
  const bound = parts.least()?.bound ?? best.attenuationDb;
  return { attenuationDb: Math.min(bound, best.attenuationDb), t: best.t };
}

function sumOf(members: readonly Along[], term: (member: Along) => number): number {
  let sum = 0;
  for (const member of members) sum += term(member);
  return sum;
}

function frequencyAt({ lowHz, highHz, reversed }: Along, t: number): number {
  const part = reversed ? 1 - t : t;
  if (part <= 0) return lowHz;
  return part >= 1 ? highHz : Math.min(lowHz + part * (highHz - lowHz), highHz);
}
