import type { Channel, FilterUse, Sensor, Source, Step } from '../rig/model.ts';
import type { Response } from '../signal/response.ts';
import type { RecordedBand } from './recorded-band.ts';

/** One sampling of the chain: the converter's, or a decimation's. */
export interface Stage {
  /** The rate at which this stage leaves its record. */
  readonly rateHz: number;
  readonly nyquistHz: number;
  /** The rate of what it is given; `undefined` for the first, which is given the analogue signal. */
  readonly inputRateHz: number | undefined;
  /** Everything between the stage before (or the sensor) and this sampling, worst case and nominal. */
  readonly filters: readonly StageFilter[];
  readonly kind: 'converter' | 'modulator' | 'modulator-decimation' | 'decimate' | 'per-turn';
  readonly step: Extract<Step, { kind: 'decimate' | 'per-turn' }> | undefined;
}

export interface StageFilter {
  readonly use: FilterUse | undefined;
  /** `low-corner` is the digitizer's AC coupling. */
  readonly role: 'channel' | 'digitizer' | 'low-corner' | 'decimation' | 'step';
  readonly response: Response;
}

/**
 * The scale on which a channel's levels and limits are compared, in decibels: of full scale, of 1 V, of one base unit
 * of what is measured. `relative` is dBFS of a full scale whose volts nobody knows.
 */
export type LevelUnit = 'dbfs' | 'db-volt' | 'db-measured' | 'relative';

/** What one volt, one measured unit and 0 dBFS have to do with one another on a channel. */
export interface LevelScale {
  /** The scale on which this channel's levels and limits are compared. */
  readonly unit: LevelUnit;
  /** Peak volts of a full-scale sinusoid at the digitizer's input; `undefined` without a full scale. */
  readonly fullScaleV: number | undefined;
  /** Volts per base unit at the sensor; `undefined` without a sensitivity. */
  readonly sensitivity: number | undefined;
  /** Whose measured unit levels may be in. */
  readonly sensor: Sensor | undefined;
  readonly foldLimit: number;
  /** True where the fold limit that was given can't be placed on the scale and the default stands in for it. */
  readonly foldLimitAssumed: boolean;
  /** What full scale is on this scale: 0 dB, or an assumed 60 dB above the fold limit where the scale has none. */
  readonly fullScaleDb: number;
}

/** What filters and sampling do to a signal: the same object for every channel whose filters and rates are the same. */
export interface SignalPath {
  /** The rate of each stage, the converter's first. */
  readonly ratesHz: readonly number[];
  /** Of the filters ahead of each stage in turn, and last of those behind the last stage; `undefined` for one not understood. */
  readonly responses: readonly (readonly (Response | undefined)[])[];
  /** The same without the gaps. */
  readonly known: readonly (readonly Response[])[];
  readonly sensor: Response;
  /** True where the sensor does the same to every frequency. */
  readonly sensorIsFlat: boolean;
  /** Of everything that is derived from the clock, relative. */
  readonly clockTolerance: number;
}

/** A channel's way from the sensor to the record. */
export interface Chain {
  readonly channel: Channel;
  readonly stages: readonly Stage[];
  /** Digital filters after the last sampling (steps that do not decimate). */
  readonly after: readonly StageFilter[];
  /** The channel's own rate, exact. */
  readonly rateHz: number;
  /** The rate of each stage. */
  readonly ratesHz: readonly number[];
  readonly sensor: Response;
  readonly scale: LevelScale;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  /** Where the band is in the record: itself, unless it is folded on purpose. */
  readonly recordedBand: RecordedBand;
  /** True where the band is folded on purpose. */
  readonly isBandpass: boolean;
  /** Nyquist frequency of the last stage over the top of the band as it is recorded. */
  readonly margin: number;
  /** On the scale of `levelUnit`. */
  readonly foldLimit: number;
  readonly levelUnit: LevelUnit;
  /** What the chain has in common with every other channel that is filtered and sampled like this one. */
  readonly path: SignalPath;
  /** False where the digitizer can't make the rate that is written: what is written is computed with all the same. */
  readonly rateReachable: boolean;
  /** False where a filter, or the digitizer, was not understood: what it does is not known, so little is said of what folds. */
  readonly understood: boolean;
}

/** One piece of one component of a source, as it arrives in the record. */
export interface Arrival {
  readonly source: Source;
  /** `fundamental`, `harmonic 3`, `carrier`, `sideband +2`, `carrier x3`, `carrier x3 sideband -1`, ... */
  readonly component: string;
  readonly trueLowHz: number;
  readonly trueHighHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
  /** By how much the clock's tolerance may move it in the record, either way. */
  readonly recordedSlackHz: number;
  /** Highest over the piece, or over the part that lands in the band where some does; on the chain's level scale. */
  readonly level: number;
  /** Of analogue and digital filters together at the point of `level` (the sensor not included), dB. */
  readonly attenuationDb: number;
  /** The true frequency at which `level` is reached. */
  readonly atHz: number;
  /** False too for what belongs to a band that is folded on purpose. */
  readonly folded: boolean;
  /** The first stage, from 1, at which it folded. */
  readonly foldsAtStage: number | null;
  readonly mirrored: boolean;
  readonly inBand: boolean;
  /** Folded, in the band, and above the fold limit. */
  readonly overLimit: boolean;
  /** False where no level was given, or one that can't be placed, and full scale was assumed. */
  readonly levelKnown: boolean;
  /** Where it stands without its source's tolerance; `undefined` where it is a range all the same. */
  readonly nominalHz: number | undefined;
  /**
   * The first stage, from 1, at which it may stand on a multiple of half the rate, where its phase decides how high it
   * is recorded; `null` where it can't, or sweeps past.
   */
  readonly onNyquistAtStage: number | null;
}
