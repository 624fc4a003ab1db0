import { type Curve, firstAtOrAbove, type Turn, turningCurve } from './curve.ts';

/**
 * A measured curve: straight lines in dB over log frequency between the points, the first value below them, the last
 * above. Two points at one frequency are a step, which counts as both. No points at all attenuate nothing.
 *
 * @param points ascending in frequency
 */
export function pointsCurve(points: readonly (readonly [frequencyHz: number, attenuationDb: number])[]): Curve {
  const positions = points.map(([hz]) => hz);
  const turns: readonly Turn[] = points.map(([x, db]) => ({ x, db }));
  return turningCurve((hz) => interpolated(points, positions, hz), turns);
}

function interpolated(
  points: readonly (readonly [number, number])[],
  positions: readonly number[],
  hz: number,
): number {
  const index = firstAtOrAbove(positions, hz);
  const above = points[index];
  const below = points[index - 1];
  if (above === undefined) return below?.[1] ?? 0;
  if (below === undefined || above[0] === hz) return above[1];
  return onStraightLine(below, above, hz);
}

/** In dB over log frequency; from 0 Hz, where that has no meaning, the upper value holds. */
export function onStraightLine(
  [lowHz, lowDb]: readonly [number, number],
  [highHz, highDb]: readonly [number, number],
  hz: number,
): number {
  if (!(lowHz > 0)) return highDb;
  const width = Math.log(highHz) - Math.log(lowHz);
  return width > 0 ? lowDb + ((highDb - lowDb) * (Math.log(hz) - Math.log(lowHz))) / width : highDb;
}
