import { quantityOfLevel, quantityOfSensor } from '../rig/levels.ts';
import type { Channel, Level, Limit, Sensor } from '../rig/model.ts';
import { decibels } from '../signal/decibel.ts';
import { fullScalePeakV } from '../signal/levels.ts';
import type { LevelScale, LevelUnit } from './model.ts';

/** 0.1 % of full scale: what may fold where nothing is said, and what full scale is assumed to be above any limit. */
export const DEFAULT_FOLD_LIMIT_DB = -60;

/** Where a level enters the channel. */
export type Entry = 'sensor' | 'wiring';

/** The scale on which a channel's levels are compared. */
export function levelScaleOf(channel: Channel): LevelScale {
  const { sensor } = channel;
  const fullScaleV = fullScaleOf(channel);
  const sensitivity = sensor?.sensitivity?.value;
  const limit = channel.foldLimit?.value;
  const unit = unitFor(limit, fullScaleV, sensitivity, sensor);
  const given = limit && placedLimit(limit, { unit, fullScaleV, sensitivity, sensor });
  const foldLimit = given ?? DEFAULT_FOLD_LIMIT_DB;
  return {
    unit,
    fullScaleV,
    sensitivity,
    sensor,
    foldLimit,
    foldLimitAssumed: limit !== undefined && given === undefined,
    fullScaleDb: unit === 'dbfs' || unit === 'relative' ? 0 : foldLimit - DEFAULT_FOLD_LIMIT_DB,
  };
}

/** Peak volts of a full-scale sinusoid at the digitizer's input. */
function fullScaleOf(channel: Channel): number | undefined {
  const given = channel.fullScale ?? channel.digitizer?.fullScale;
  if (!given) return undefined;
  const volts = fullScalePeakV(given.value.lowV, given.value.highV, gainOf(channel));
  return volts > 0 && Number.isFinite(volts) ? volts : undefined;
}

/** Gain ahead of the converter. */
export function gainOf(channel: Channel): number {
  return channel.gain?.value ?? channel.digitizer?.gain?.value ?? 1;
}

/** Without a full scale it is the limit that decides what levels can be compared with. */
function unitFor(
  limit: Limit | undefined,
  fullScaleV: number | undefined,
  sensitivity: number | undefined,
  sensor: Sensor | undefined,
): LevelUnit {
  if (fullScaleV !== undefined) return 'dbfs';
  if (limit === undefined || limit.kind === 'ratio' || limit.kind === 'dbfs') return 'relative';
  if (limit.kind === 'volts' && !measuresVolts(sensor)) return 'db-volt';
  return sensitivity === undefined ? 'db-measured' : 'db-volt';
}

type Placing = Pick<LevelScale, 'unit' | 'fullScaleV' | 'sensitivity' | 'sensor'>;

function placedLimit(limit: Limit, scale: Placing): number | undefined {
  if (limit.kind !== 'ratio') return placedLevel(limit, scale);
  return scale.unit === 'dbfs' || scale.unit === 'relative' ? decibels(limit.ratio) : undefined;
}

/**
 * A level on a channel's scale, by sensitivity alone: what the sensor does to the frequency comes on top where the
 * level enters there. `undefined` where it can't be placed.
 *
 * @param enters volts at the sensor of a channel that measures volts are scaled by its sensitivity
 */
export function placedLevel(level: Level, scale: Placing, enters: Entry = 'wiring'): number | undefined {
  if (level.kind === 'dbfs') return scale.unit === 'dbfs' || scale.unit === 'relative' ? level.dbfs : undefined;
  if (level.kind === 'volts') {
    const isMeasured = enters === 'sensor' && measuresVolts(scale.sensor);
    return isMeasured ? placedMeasured(level.peakV, scale) : placedVolts(level.peakV, scale);
  }
  return isMeasuredHere(level, scale) ? placedMeasured(level.peak, scale) : undefined;
}

/** Whether a level is in what the sensor measures. The same unit is so without looking either of them up. */
function isMeasuredHere(level: Extract<Level, { kind: 'measured' }>, { sensor }: Placing): boolean {
  if (sensor?.unit !== undefined && level.unit === sensor.unit) return true;
  return quantityOfLevel(level) === quantityOfSensor(sensor);
}

function placedMeasured(peak: number, scale: Placing): number | undefined {
  if (scale.unit === 'db-measured') return decibels(peak);
  return scale.sensitivity === undefined ? undefined : placedVolts(peak * Math.abs(scale.sensitivity), scale);
}

function placedVolts(peakV: number, { unit, fullScaleV }: Placing): number | undefined {
  if (unit === 'db-volt') return decibels(peakV);
  return unit === 'dbfs' && fullScaleV !== undefined ? decibels(peakV / fullScaleV) : undefined;
}

/** Where a level enters where that is not said: in the measured unit at the sensor, otherwise behind it. */
export function impliedEntry(level: Level | undefined, sensor: Sensor | undefined): Entry {
  if (level?.kind === 'measured') return 'sensor';
  return level?.kind === 'volts' && measuresVolts(sensor) ? 'sensor' : 'wiring';
}

function measuresVolts(sensor: Sensor | undefined): boolean {
  return sensor?.measures?.value === 'voltage';
}
