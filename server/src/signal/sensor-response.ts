import { responseOf, turningCurve } from './curve.ts';
import { product, signChanges } from './polynomial.ts';
import type { Response } from './response.ts';

/** What a sensor does to a frequency, besides its sensitivity. */
export interface SensorResponse {
  /** Mounted resonance, second order. */
  readonly resonanceHz?: number;
  /** Of the resonance; without one it means nothing. */
  readonly q: number;
  /** First-order roll-off. */
  readonly cornerHz?: number;
  /** First-order high-pass: sensor power, AC coupling. */
  readonly lowCornerHz?: number;
}

/** Least |(1 - u^2)^2 + (u / Q)^2| that is told from 0, so that a resonance without damping stays finite. */
const LEAST_POWER = 1e-60;

/** Where (f / resonance)^2 is searched for turns. */
const LEAST_SQUARE = 1e-30;
const GREATEST_SQUARE = 1e30;

/**
 * Attenuation of a sensor, negative where its resonance lifts.
 *
 * |H| = 1 / sqrt((1 - u^2)^2 + (u / Q)^2), u = f / resonance; 1 / sqrt(1 + (f / corner)^2);
 * 1 / sqrt(1 + (low-corner / f)^2). Their product turns where a polynomial in f^2 of degree 4 at most is 0.
 */
export function sensorResponse(sensor: SensorResponse): Response {
  const { resonanceHz, cornerHz, lowCornerHz } = sensor;
  const q = Math.max(sensor.q, 1e-9);
  const attenuationDb = (hz: number): number => {
    let db = 0;
    if (resonanceHz !== undefined) db += resonanceDb(hz / resonanceHz, q);
    if (cornerHz !== undefined) db += firstOrderDb(hz / cornerHz);
    if (lowCornerHz !== undefined) db += firstOrderDb(lowCornerHz / hz);
    return db;
  };
  return responseOf(
    turningCurve(
      attenuationDb,
      turningPoints(sensor, q).map((x) => ({ x, db: attenuationDb(x) })),
    ),
    0,
  );
}

function resonanceDb(u: number, q: number): number {
  // Above this the 1 is lost beside u^2, and u^4 might overflow.
  if (u > 1e9) return 40 * Math.log10(u);
  return 10 * Math.log10(Math.max((1 - u * u) ** 2 + (u / q) ** 2, LEAST_POWER));
}

function firstOrderDb(ratio: number): number {
  if (ratio > 1e9) return 20 * Math.log10(ratio);
  // 0 / 0: a corner at 0 Hz takes nothing off.
  if (Number.isNaN(ratio)) return 0;
  return (10 * Math.log1p(ratio * ratio)) / Math.LN10;
}

/** With y = (f / scale)^2, 1 / |H|^2 = P(y) / y^m; it turns where y P'(y) = m P(y). */
function turningPoints({ resonanceHz, cornerHz, lowCornerHz }: SensorResponse, q: number): readonly number[] {
  const scaleHz = resonanceHz ?? cornerHz ?? lowCornerHz ?? 1;
  let power: readonly number[] = [1];
  if (resonanceHz !== undefined) power = product(power, [1, 1 / (q * q) - 2, 1]);
  if (cornerHz !== undefined) power = product(power, [1, (scaleHz / cornerHz) ** 2]);
  if (lowCornerHz !== undefined) power = product(power, [(lowCornerHz / scaleHz) ** 2, 1]);
  const shift = lowCornerHz === undefined ? 0 : 1;
  const condition = power.map((coefficient, degree) => coefficient * (degree - shift));
  // Without a low corner y = 0 always solves it: the end of the axis, no turn.
  return signChanges(shift === 0 ? condition.slice(1) : condition, LEAST_SQUARE, GREATEST_SQUARE).map(
    (y) => scaleHz * Math.sqrt(y),
  );
}
