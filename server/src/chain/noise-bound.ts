import { powerDecibels, powerRatioOf } from '../signal/decibel.ts';
import type { FrequencyRange } from '../signal/frequency-range.ts';
import type { Chain, SignalPath } from './model.ts';
import { noiseInputs } from './noise-inputs.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';

/** What lies above half the rate is looked at in so many steps an octave, each at the least that is taken off it. */
const STEPS_PER_OCTAVE = 6;
const MOST_OCTAVES = 24;

/** Where each step holds so much less than the one before, the rest is a series that ends. */
const FALLING = 0.8;

/** A rest of this part of the whole is no longer followed. */
const SMALL = 1e-6;

interface NotedBound {
  readonly seesSensor: boolean;
  readonly spans: FrequencyRange | undefined;
  readonly bandwidthHz: number | undefined;
}

const BOUNDS: NoteKind<NotedBound> = { name: 'noise above half the rate', most: 8 };

/**
 * A level that all noise that folds into the band stays under, found in no time: everything above half the rate, as if
 * all of it landed in the band. `undefined` where that is not so simple (several samplings, a band folded on purpose,
 * filters that let some through for good): then it has to be worked out.
 */
export function foldedNoiseAtMostDb(chain: Chain): number | undefined {
  if (chain.stages.length !== 1 || chain.isBandpass) return undefined;
  let power = 0;
  for (const { enters, densityDb, spans } of noiseInputs(chain)) {
    // What enters the record is white in it, and folds no more.
    if (enters.at === 'record') continue;
    const bandwidthHz = bandwidthAbove(chain.path, enters.at === 'sensor', spans);
    if (bandwidthHz === undefined) return undefined;
    power += powerRatioOf(densityDb) * bandwidthHz;
  }
  return powerDecibels(power);
}

function bandwidthAbove(path: SignalPath, entersAtSensor: boolean, spans: FrequencyRange | undefined) {
  const seesSensor = entersAtSensor && !path.sensorIsFlat;
  for (const noted of notesOn(path, BOUNDS)) {
    if (noted.seesSensor === seesSensor && noted.spans === spans) return noted.bandwidthHz;
  }
  return note(path, BOUNDS, { seesSensor, spans, bandwidthHz: summed(path, seesSensor, spans) }).bandwidthHz;
}

function summed(path: SignalPath, seesSensor: boolean, spans: FrequencyRange | undefined): number | undefined {
  const ahead = seesSensor ? [...path.known[0]!, path.sensor] : path.known[0]!;
  const ratio = 2 ** (1 / STEPS_PER_OCTAVE);
  let lowHz = Math.max(path.ratesHz[0]! / 2, spans?.lowHz ?? 0);
  const endHz = spans?.highHz ?? Infinity;
  let sumHz = 0;
  let before = Infinity;
  for (let step = 0; step < STEPS_PER_OCTAVE * MOST_OCTAVES && lowHz < endHz; step++) {
    const highHz = Math.min(lowHz * ratio, endHz);
    let attenuationDb = 0;
    for (const response of ahead) attenuationDb += response.leastDb(lowHz, highHz);
    const partHz = (highHz - lowHz) * powerRatioOf(-attenuationDb);
    sumHz += partHz;
    const isEnding = partHz <= FALLING * before && partHz <= SMALL * sumHz;
    if (isEnding) return sumHz + (partHz * FALLING) / (1 - FALLING);
    before = partHz;
    lowHz = highHz;
  }
  return lowHz >= endHz ? sumHz : undefined;
}
