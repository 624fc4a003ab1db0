import { powerDecibels, powerRatioOf } from '../signal/decibel.ts';
import type { FrequencyRange } from '../signal/frequency-range.ts';
import type { NoiseBand, NoiseBandwidth, NoiseEntry } from '../signal/noise-bandwidth.ts';
import { noiseBandwidth } from '../signal/noise-bandwidth.ts';
import type { Chain } from './model.ts';
import { declaresNoise, type NoiseInput, noiseInputs } from './noise-inputs.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';

/**
 * What one noise leaves in the band, as levels on the chain's scale: rms, told as the sinusoid of the same rms, so that
 * noise of rms s is 20 log10(sqrt 2 s / full scale).
 */
export interface NoiseContribution extends NoiseInput {
  /** Recorded where it belongs; `-Infinity` where nothing is. */
  readonly nativeDb: number;
  /** Folded into the band; `undefined` where nothing says how high the noise reaches and no filter ends it. */
  readonly foldedDb: number | undefined;
}

/** The noise in a channel's band. Powers add. */
export interface NoiseBudget {
  /** In the order in which the noise comes in. */
  readonly contributions: readonly NoiseContribution[];
  readonly nativeDb: number;
  /** Of all that has a bound. */
  readonly foldedDb: number;
  /** Native and folded. */
  readonly totalDb: number;
}

interface NotedBandwidth {
  readonly band: NoiseBand;
  readonly enters: NoiseEntry;
  readonly spans: FrequencyRange | undefined;
  readonly bandwidth: NoiseBandwidth;
}

const BANDWIDTHS: NoteKind<NotedBandwidth> = { name: 'noise bandwidths', most: 48 };

/**
 * The noise in a channel's band; `undefined` where the channel declares none that its scale has a place for, and for
 * samples that are taken in a pattern or read for their edges.
 */
export function noiseBudgetOf(chain: Chain): NoiseBudget | undefined {
  const { channel } = chain;
  if (!declaresNoise(channel) || channel.pattern || channel.pulses) return undefined;
  const inputs = noiseInputs(chain);
  if (inputs.every(({ origin }) => origin.kind === 'steps')) return undefined;
  const contributions = inputs.map((input) => contributionOf(input, chain));
  const nativeDb = powerSum(contributions.map((one) => one.nativeDb));
  const foldedDb = powerSum(contributions.map((one) => one.foldedDb ?? -Infinity));
  return { contributions, nativeDb, foldedDb, totalDb: powerSum([nativeDb, foldedDb]) };
}

function contributionOf(input: NoiseInput, chain: Chain): NoiseContribution {
  const bandwidth = bandwidthOf(input, chain);
  const levelOf = (hz: number): number => input.densityDb + powerDecibels(hz);
  return {
    ...input,
    nativeDb: levelOf(bandwidth.nativeHz),
    foldedDb: bandwidth.kind === 'bounded' ? levelOf(bandwidth.foldedHz) : undefined,
  };
}

function noiseBandOf({ bandLowHz, bandHighHz, isBandpass }: Chain): NoiseBand {
  return { lowHz: bandLowHz, highHz: bandHighHz, sampling: isBandpass ? 'bandpass' : 'baseband' };
}

/** The same for every channel that is filtered and sampled like this one, whatever the noise is. */
function bandwidthOf({ enters, spans }: NoiseInput, chain: Chain): NoiseBandwidth {
  const { path } = chain;
  const band = noiseBandOf(chain);
  for (const noted of notesOn(path, BANDWIDTHS)) {
    if (isSameBand(noted.band, band) && isSameEntry(noted.enters, enters) && isSameRange(noted.spans, spans)) {
      return noted.bandwidth;
    }
  }
  const through = { ratesHz: path.ratesHz, responses: path.known, sensor: path.sensor };
  const bandwidth = noiseBandwidth(through, band, enters, spans);
  return note(path, BANDWIDTHS, { band, enters, spans, bandwidth }).bandwidth;
}

function isSameBand(first: NoiseBand, second: NoiseBand): boolean {
  return first.sampling === second.sampling && isSameRange(first, second);
}

function isSameEntry(first: NoiseEntry, second: NoiseEntry): boolean {
  if (first.at !== second.at) return false;
  return first.at !== 'record' || second.at !== 'record' || first.stage === second.stage;
}

function isSameRange(first: FrequencyRange | undefined, second: FrequencyRange | undefined): boolean {
  return first?.lowHz === second?.lowHz && first?.highHz === second?.highHz;
}

/** The level of what adds up without a phase. */
export function powerSum(levels: readonly number[]): number {
  return powerDecibels(levels.reduce((sum, level) => sum + powerRatioOf(level), 0));
}
