import type { BroadbandSource, Channel, FrequencyRange, Level } from '../rig/model.ts';
import type { Place } from '../rig/place.ts';
import { powerDecibels } from '../signal/decibel.ts';
import { jitterNoiseDb } from '../signal/jitter.ts';
import { peakOfRms } from '../signal/levels.ts';
import type { NoiseEntry } from '../signal/noise-bandwidth.ts';
import { idealSignalToNoiseDb } from '../signal/quantizer.ts';
import { impliedEntry, placedLevel } from './level-scale.ts';
import type { Chain } from './model.ts';
import { entryOf } from './source-level.ts';

/** What noise comes from. */
export type NoiseOrigin =
  | { readonly kind: 'source'; readonly source: BroadbandSource }
  | { readonly kind: 'sensor' | 'input' | 'steps' | 'jitter' };

/** Noise that a channel declares, on its way in. */
export interface NoiseInput {
  readonly origin: NoiseOrigin;
  readonly enters: NoiseEntry;
  /** The level of a sinusoid with the rms of 1 Hz of it, on the chain's scale. */
  readonly densityDb: number;
  /** What it fills; all there is where nothing is said. */
  readonly spans: FrequencyRange | undefined;
  /** Where it is declared. */
  readonly place: Place;
}

/** Whether anything in a channel's text makes its noise worth computing: a converter's steps alone do not. */
export function declaresNoise({ sensor, digitizer, heard }: Channel): boolean {
  if (sensor?.noise || digitizer?.noise || digitizer?.jitterS) return true;
  for (const { source } of heard) if (source.type === 'broadband') return true;
  return false;
}

/**
 * Every noise that a channel declares and that its scale has a place for: the sensor's, broadband sources, the
 * digitizer's input, the converter's steps, and jitter.
 *
 * The input's noise and the steps are of the samples that the digitizer hands out, so they enter the record of the
 * channel's own rate; jitter enters where the signal is first sampled. All three are white up to half of that rate.
 */
export function noiseInputs(chain: Chain): readonly NoiseInput[] {
  return [...ofSensor(chain), ...ofSources(chain), ...ofInput(chain), ...ofSteps(chain), ...ofJitter(chain)].filter(
    ({ densityDb }) => densityDb > -Infinity,
  );
}

function ofSensor({ channel, scale }: Chain): readonly NoiseInput[] {
  const noise = channel.sensor?.noise;
  if (!noise) return [];
  const at = impliedEntry(noise.value, channel.sensor);
  const densityDb = placedLevel(noise.value, scale, at);
  if (densityDb === undefined) return [];
  return [{ origin: { kind: 'sensor' }, enters: { at }, densityDb, spans: undefined, place: noise.place }];
}

function ofSources({ channel, scale }: Chain): readonly NoiseInput[] {
  return channel.heard.flatMap((heard): readonly NoiseInput[] => {
    const { source } = heard;
    if (source.type !== 'broadband') return [];
    const at = entryOf(heard, channel.sensor);
    const densityDb = placedLevel(source.levels[0]!.value, scale, at);
    if (densityDb === undefined) return [];
    return [
      { origin: { kind: 'source', source }, enters: { at }, densityDb, spans: source.spans.value, place: source.place },
    ];
  });
}

function ofInput({ channel, rateHz, scale, stages }: Chain): readonly NoiseInput[] {
  const noise = channel.digitizer?.noise;
  if (!noise) return [];
  const { value, place } = noise;
  const rms = value.kind === 'rms' ? value.rmsV : value.voltsPerRootHz;
  const level = placedLevel({ kind: 'volts', peakV: peakOfRms(rms) }, scale);
  if (level === undefined) return [];
  const densityDb = value.kind === 'rms' ? level - powerDecibels(rateHz / 2) : level;
  return [{ origin: { kind: 'input' }, enters: ownRecord(stages), densityDb, spans: undefined, place }];
}

function ofSteps({ channel, rateHz, scale, stages }: Chain): readonly NoiseInput[] {
  const bits = channel.digitizer?.bits;
  const hasFullScale = scale.unit === 'dbfs' || scale.unit === 'relative';
  if (!bits || !hasFullScale) return [];
  const densityDb = scale.fullScaleDb - idealSignalToNoiseDb(bits.value) - powerDecibels(rateHz / 2);
  const { place } = bits;
  return [{ origin: { kind: 'steps' }, enters: ownRecord(stages), densityDb, spans: undefined, place }];
}

/** All the noise that jitter makes of what is expected at the band's top, in the band or not. */
export function jitterLevelOf(chain: Chain): number | undefined {
  const jitter = chain.channel.digitizer?.jitterS;
  const peakDb = jitter && peakLevel(chain);
  return peakDb === undefined ? undefined : peakDb + jitterNoiseDb(chain.bandHighHz, jitter?.value ?? 0, 0);
}

function ofJitter(chain: Chain): readonly NoiseInput[] {
  const jitter = chain.channel.digitizer?.jitterS;
  const wholeDb = jitterLevelOf(chain);
  if (!jitter || wholeDb === undefined) return [];
  const { place } = jitter;
  const densityDb = wholeDb - powerDecibels(chain.ratesHz[0]! / 2);
  return [{ origin: { kind: 'jitter' }, enters: { at: 'record', stage: 1 }, densityDb, spans: undefined, place }];
}

/** The record in which the samples have the channel's own rate: behind a modulator, the second. */
function ownRecord(stages: Chain['stages']): NoiseEntry {
  return { at: 'record', stage: stages[0]?.kind === 'modulator' ? 2 : 1 };
}

/**
 * A sinusoid as large as what is expected, by sensitivity alone: as large as one value, or as half of what it spans
 * where it stands for a range, as it does on a full scale that has one side.
 */
function peakLevel({ channel, scale }: Chain): number | undefined {
  const peak = channel.peak?.value;
  if (!peak) return undefined;
  const { low, high, single } = peak;
  if (high.kind === 'dbfs') return placedLevel(high, scale);
  const fullScale = (channel.fullScale ?? channel.digitizer?.fullScale)?.value;
  const isOneSided = fullScale !== undefined && (fullScale.lowV >= 0 || fullScale.highV <= 0);
  const highest = sizeOf(high);
  const lowest = single ? (isOneSided ? 0 : -highest) : sizeOf(low);
  const half = Math.abs(highest - lowest) / 2;
  return placedLevel(high.kind === 'volts' ? { ...high, peakV: half } : { ...high, peak: half }, scale);
}

function sizeOf(level: Level): number {
  switch (level.kind) {
    case 'volts':
      return level.peakV;
    case 'measured':
      return level.peak;
    case 'dbfs':
      return 0;
  }
}
