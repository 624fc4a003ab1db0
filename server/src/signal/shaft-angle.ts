import { type FoldedPiece, foldHz, foldsInto, foldThrough, MOST_PIECES } from './folding.ts';

/**
 * Resampling to shaft angle: `perTurn` samples in each turn, evenly spaced in angle, at whatever speed. The new rate is
 * perTurn x speed / 60 in Hz and perTurn in orders (cycles a turn), so orders fold at perTurn / 2 at every speed.
 * Source: common practice of order tracking; the fold is that of any sampling, with turns in the place of seconds.
 */

/** Speeds in rpm, 0 <= low <= high. */
export interface SpeedRange {
  readonly lowRpm: number;
  readonly highRpm: number;
}

/** A step that resamples to shaft angle. */
export interface ShaftResampling {
  /** Above 0. */
  readonly perTurn: number;
  readonly speed: SpeedRange;
}

/** Part of what enters a resampling to shaft angle, as it is recorded. */
export interface OrderPiece {
  /** The speeds at which something of this piece arrives. */
  readonly speed: SpeedRange;
  /** Before the resampling: what a filter in orders sees. */
  readonly lowOrder: number;
  readonly highOrder: number;
  /** After it, 0 .. perTurn / 2. */
  readonly recordedLowOrder: number;
  readonly recordedHighOrder: number;
  /** Whether the recorded order falls while that before the resampling rises. */
  readonly mirrored: boolean;
  /** Whether the resampling moves it. */
  readonly folded: boolean;
  /** Set where the folds are too many to tell apart: recorded anywhere in 0 .. perTurn / 2. */
  readonly collapsed: boolean;
}

/** The rate after the resampling at lowest and highest speed, in Hz. Half of the lower is the first to fold. */
export function angularRates({ perTurn, speed }: ShaftResampling): { readonly lowHz: number; readonly highHz: number } {
  return { lowHz: (perTurn * speed.lowRpm) / 60, highHz: (perTurn * speed.highRpm) / 60 };
}

/** Where an order of the shaft is recorded: 0 .. perTurn / 2, the same at every speed. */
export function foldOrder(order: number, perTurn: number): number {
  return foldHz(order, perTurn);
}

/** The order of a frequency at a speed, f 60 / speed; 0 Hz is order 0 even at rest, where any other is `Infinity`. */
export function orderOf(frequencyHz: number, speedRpm: number): number {
  return frequencyHz === 0 ? 0 : (frequencyHz * 60) / speedRpm;
}

/**
 * Where fixed frequencies arrive: a range `lowHz .. highHz`, as sampled before the resampling, sweeps the orders
 * lowHz 60 / high speed .. highHz 60 / low speed. Pieces ascend in order.
 *
 * No pieces where the range, the speeds or `perTurn` are none.
 */
export function fixedInOrders(
  lowHz: number,
  highHz: number,
  { perTurn, speed }: ShaftResampling,
  limit: number = MOST_PIECES,
): readonly OrderPiece[] {
  if (!isResampling({ perTurn, speed }) || !(lowHz >= 0 && lowHz <= highHz)) return [];
  const orders = foldThrough(orderOf(lowHz, speed.highRpm), orderOf(highHz, speed.lowRpm), [perTurn], limit);
  return orders.map((piece) =>
    inOrders(piece, {
      lowRpm: clamped(orElse((lowHz * 60) / piece.trueHighHz, speed.lowRpm), speed),
      highRpm: clamped(orElse((highHz * 60) / piece.trueLowHz, speed.highRpm), speed),
    }),
  );
}

/**
 * Where an order of the shaft arrives that was sampled in time before. What those samplings leave where it is stays at
 * its order, which then folds once, exactly; what they fold is locked to the shaft no more, and sweeps orders.
 *
 * Pieces ascend in speed; past `limit` one collapsed piece stands for all that is left. No pieces where the speeds, the
 * order or `perTurn` are none.
 *
 * @param ratesHz of the samplings in time, all above 0
 */
export function lockedInOrders(
  order: number,
  ratesHz: readonly number[],
  { perTurn, speed }: ShaftResampling,
  limit: number = MOST_PIECES,
): readonly OrderPiece[] {
  if (!isResampling({ perTurn, speed }) || !(order >= 0 && order < Infinity)) return [];
  const rangeHz = { lowHz: (order * speed.lowRpm) / 60, highHz: (order * speed.highRpm) / 60 };
  const inTime = foldThrough(rangeHz.lowHz, rangeHz.highHz, ratesHz, limit);
  const pieces: OrderPiece[] = [];
  for (const [i, piece] of inTime.entries()) {
    const sweep = sweepOf(piece, order, {
      lowRpm: i === 0 ? speed.lowRpm : clamped((piece.trueLowHz * 60) / order, speed),
      highRpm: i + 1 === inTime.length ? speed.highRpm : clamped((piece.trueHighHz * 60) / order, speed),
    });
    const room = limit - pieces.length - (i + 1 < inTime.length ? 1 : 0);
    if (room < 1) {
      const rest = { lowRpm: sweep.speed.lowRpm, highRpm: speed.highRpm };
      const highOrder = orderOf((ratesHz[ratesHz.length - 1] ?? Infinity) / 2, rest.lowRpm);
      return [...pieces, ...foldThrough(0, highOrder, [perTurn], 0).map((part) => inOrders(part, rest))];
    }
    for (const part of foldThrough(sweep.lowOrder, sweep.highOrder, [perTurn], room)) {
      const first = sweep.speedAt(part.trueLowHz);
      const last = sweep.speedAt(part.trueHighHz);
      pieces.push(
        sweep.lowOrder === sweep.highOrder || part.collapsed
          ? inOrders(part, sweep.speed)
          : inOrders(part, { lowRpm: Math.min(first, last), highRpm: Math.max(first, last) }),
      );
    }
  }
  return pieces;
}

/** The orders that a piece of an order's frequencies has, once it is recorded in time. */
interface Sweep {
  readonly speed: SpeedRange;
  readonly lowOrder: number;
  readonly highOrder: number;
  readonly speedAt: (order: number) => number;
}

/**
 * Within a piece the recorded frequency is s (f - c), s being 1 or -1, with f in proportion to the speed: the order is
 * s (order - 60 c / speed), which only rises or only falls, so that its ends bound it.
 */
function sweepOf(piece: FoldedPiece, order: number, speed: SpeedRange): Sweep {
  if (piece.collapsed) {
    const highOrder = orderOf(piece.recordedHighHz, speed.lowRpm);
    return { speed, lowOrder: 0, highOrder, speedAt: () => speed.lowRpm };
  }
  if (piece.foldsAtStage === null) return { speed, lowOrder: order, highOrder: order, speedAt: () => speed.lowRpm };
  const sign = piece.mirrored ? -1 : 1;
  const [atLowHz, atHighHz] = piece.mirrored
    ? [piece.recordedHighHz, piece.recordedLowHz]
    : [piece.recordedLowHz, piece.recordedHighHz];
  const first = orderOf(atLowHz, speed.lowRpm);
  const last = orderOf(atHighHz, speed.highRpm);
  const turnsHz = piece.trueLowHz - sign * atLowHz;
  return {
    speed,
    lowOrder: Math.min(first, last),
    highOrder: Math.max(first, last),
    speedAt: (at) => clamped((60 * turnsHz) / (order - sign * at), speed),
  };
}

/**
 * Every range of the shaft's orders up to `upToOrder` that is recorded within `lowOrder .. highOrder`, ascending, the
 * one that is recorded where it is among them. Fixed frequencies come into the same orders at the speeds 60 f / order.
 */
export function ordersInto(
  lowOrder: number,
  highOrder: number,
  { perTurn, speed }: ShaftResampling,
  upToOrder: number,
  limit: number = MOST_PIECES,
): readonly OrderPiece[] {
  if (!isResampling({ perTurn, speed })) return [];
  return foldsInto(lowOrder, highOrder, [perTurn], upToOrder, limit).map((piece) => inOrders(piece, speed));
}

/** A piece whose frequencies stand for orders. */
function inOrders(piece: FoldedPiece, speed: SpeedRange): OrderPiece {
  return {
    speed,
    lowOrder: piece.trueLowHz,
    highOrder: piece.trueHighHz,
    recordedLowOrder: piece.recordedLowHz,
    recordedHighOrder: piece.recordedHighHz,
    mirrored: piece.mirrored,
    folded: piece.foldsAtStage !== null,
    collapsed: piece.collapsed,
  };
}

function isResampling({ perTurn, speed: { lowRpm, highRpm } }: ShaftResampling): boolean {
  return perTurn > 0 && perTurn < Infinity && lowRpm >= 0 && lowRpm <= highRpm && highRpm > 0 && highRpm < Infinity;
}

function clamped(rpm: number, { lowRpm, highRpm }: SpeedRange): number {
  return Math.min(Math.max(rpm, lowRpm), highRpm);
}

function orElse(value: number, otherwise: number): number {
  return Number.isNaN(value) ? otherwise : value;
}
