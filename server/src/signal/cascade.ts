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
  /** The bound that holds: the extreme, or on its safe side by as much as `leastAlong` says. */
  readonly attenuationDb: number;
  /** Where along the piece, from 0 to 1, the sum comes closest to it. */
  readonly t: number;
}

/** How close the bound must come to a value that is attained. */
const CLOSE_DB = 1e-6;

/**
 * After so many partings this is close enough. It takes them only where members pull opposite ways about a least
 * inside the piece: there the bound's distance falls no faster than with the square of their number.
 */
const MANY_STEPS = 8;
const STILL_CLOSE_DB = 1e-4;

/** How often a piece is parted at most. */
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
 * upper one; the part with the lowest bound is parted until the two are within 1e-6 dB (1e-4 dB where that takes more
 * than 8 partings). What is returned is the lower bound, never more than is so; after 4,096 partings, as it is.
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
  const along: Along[] = [];
  stages.forEach((responses, stage) => {
    const { lowHz, highHz, reversed } = piece.inputs[stage] ?? recordedRange(piece);
    for (const given of responses) {
      for (const member of membersOf(given)) {
        const response = piece.collapsed ? heldAt(member, lowHz, highHz) : member;
        along.push({ response, lowHz, highHz, reversed });
      }
    }
  });
  return along;
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
  return {
    attenuationDb: () => leastDb,
    leastDb: () => leastDb,
    greatestDb: () => greatestDb,
  };
}

/** What is made least: a figure of a response at a point, and its least over a range. */
interface Figure {
  at(response: Response, hz: number): number;
  over(response: Response, lowHz: number, highHz: number): number;
}

/** A part of the piece, the sums at its ends, and what no sum in it is under. */
interface Part {
  readonly start: number;
  readonly end: number;
  readonly atStart: number;
  readonly atEnd: number;
  readonly bound: number;
}

function leastOf(members: readonly Along[], figure: Figure): PointAlong {
  const atStart = sumAt(members, figure, 0);
  if (members.every((member) => member.lowHz === member.highHz)) return { attenuationDb: atStart, t: 0 };
  const atEnd = sumAt(members, figure, 1);
  const whole: Part = {
    start: 0,
    end: 1,
    atStart,
    atEnd,
    bound: boundOver(members, figure, 0, 1),
  };
  const best = atEnd < atStart ? { attenuationDb: atEnd, t: 1 } : { attenuationDb: atStart, t: 0 };
  // All members least at one common end: nothing to search.
  if (whole.bound >= best.attenuationDb - CLOSE_DB) return { ...best, attenuationDb: whole.bound };
  return searched(members, figure, whole, best);
}

function searched(members: readonly Along[], figure: Figure, whole: Part, ends: PointAlong): PointAlong {
  let best = ends;
  const parts = new MinimumHeap<Part>((part) => part.bound);
  parts.add(whole);
  for (let step = 0; step < MOST_STEPS; step++) {
    const lowest = parts.least();
    // Nothing goes below minus infinity, and parting would not find where it is.
    if (
      lowest === undefined ||
      lowest.bound >= best.attenuationDb - (step < MANY_STEPS ? CLOSE_DB : STILL_CLOSE_DB) ||
      lowest.bound === -Infinity
    )
      break;
    const t = step < MANY_STEPS ? partingOf(lowest, best.attenuationDb) : (lowest.start + lowest.end) / 2;
    if (t <= lowest.start || t >= lowest.end) break;
    parts.removeLeast();
    const value = sumAt(members, figure, t);
    if (value < best.attenuationDb) best = { attenuationDb: value, t };
    // A part's own bound can't be lower than that of the whole it is part of.
    const lower = Math.max(boundOver(members, figure, lowest.start, t), lowest.bound);
    const upper = Math.max(boundOver(members, figure, t, lowest.end), lowest.bound);
    // Written out, because spreading an object in a loop as hot as this costs more than all the rest.
    const { start, end, atStart, atEnd } = lowest;
    if (lower < best.attenuationDb) parts.add({ start, end: t, atStart, atEnd: value, bound: lower });
    if (upper < best.attenuationDb) parts.add({ start: t, end, atStart: value, atEnd, bound: upper });
  }
  const bound = parts.least()?.bound ?? best.attenuationDb;
  return { ...best, attenuationDb: Math.min(bound, best.attenuationDb) };
}

/**
 * Where to part: in the middle, but closer to the lower end where that is enough to be done with the rest.
 *
 * Of members that rise by `rise` and others that fall, what is past a share `x` of the way is at least `rise x` above
 * the part's bound: past (best - bound) / rise nothing can be lower than what is known. Where the rise is steep at one
 * end only this would creep, so it is given up after a few partings.
 */
function partingOf({ start, end, atStart, atEnd, bound }: Part, bestDb: number): number {
  const rise = Math.max(atStart, atEnd) - bound;
  const needed = (bestDb - bound) / rise;
  const share = needed < 0.25 && rise < Infinity ? Math.max(1.5 * needed, 1e-3) : 0.5;
  return start + (end - start) * (atStart <= atEnd ? share : 1 - share);
}

function sumAt(members: readonly Along[], figure: Figure, t: number): number {
  let sum = 0;
  for (const member of members) sum += figure.at(member.response, frequencyAt(member, t));
  return sum;
}

function boundOver(members: readonly Along[], figure: Figure, start: number, end: number): number {
  let sum = 0;
  for (const member of members) {
    const first = frequencyAt(member, start);
    const second = frequencyAt(member, end);
    sum += figure.over(member.response, Math.min(first, second), Math.max(first, second));
  }
  return sum;
}

function frequencyAt({ lowHz, highHz, reversed }: Along, t: number): number {
  const part = reversed ? 1 - t : t;
  if (part <= 0) return lowHz;
  return part >= 1 ? highHz : Math.min(lowHz + part * (highHz - lowHz), highHz);
}
