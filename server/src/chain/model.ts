import type { Channel, FilterUse, Source, Step } from '../rig/model.ts';
import type { Response } from '../signal/response.ts';

/** One sampling of the chain: the converter's, or a decimation's. */
export interface Stage {
  /** The rate at which this stage leaves its record. */
  readonly rateHz: number;
  readonly nyquistHz: number;
  /** The rate of what it is given; `undefined` for the first, which is given the analogue signal. */
  readonly inputRateHz: number | undefined;
  /** Everything between the stage before (or the sensor) and this sampling, worst case and nominal. */
  readonly filters: readonly StageFilter[];
  readonly kind: 'converter' | 'modulator' | 'modulator-decimation' | 'decimate';
  readonly step: Extract<Step, { kind: 'decimate' }> | undefined;
}

export interface StageFilter {
  readonly use: FilterUse | undefined;
  /** `low-corner` is the digitizer's AC coupling. */
  readonly role: 'channel' | 'digitizer' | 'low-corner' | 'decimation' | 'step';
  readonly response: Response;
}

/** What one volt, one measured unit and 0 dBFS have to do with one another on this channel. */
export interface LevelScale {
  /** Peak volts of a full-scale sinusoid at the digitizer's input; `undefined` without a full scale. */
  readonly fullScaleV: number | undefined;
  /** Volts per base unit at the sensor; `undefined` without a sensitivity. */
  readonly sensitivity: number | undefined;
}

/** A channel's way from the sensor to the record. */
export interface Chain {
  readonly channel: Channel;
  readonly stages: readonly Stage[];
  /** Digital filters after the last sampling (steps that do not decimate). */
  readonly after: readonly StageFilter[];
  readonly ratesHz: readonly number[];
  readonly sensor: Response;
  readonly scale: LevelScale;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  /** Nyquist frequency of the last stage over the band's top. */
  readonly margin: number;
  /** On the scale of `levelUnit`. */
  readonly foldLimit: number;
  /** The scale on which this channel's levels and limits are compared. */
  readonly levelUnit: 'dbfs' | 'db-volt' | 'db-measured' | 'relative';
}

/** One piece of one component of a source, as it arrives in the record. */
export interface Arrival {
  readonly source: Source;
  /** `fundamental`, `harmonic 3`, `carrier`, `sideband +2`, `sideband -1`, `carrier x3`, ... */
  readonly component: string;
  readonly trueLowHz: number;
  readonly trueHighHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
  /** Highest over the piece, or over the part that lands in the band where some does; on the chain's level scale. */
  readonly level: number;
  /** Of analogue and digital filters together at the point of `level` (the sensor not included), dB. */
  readonly attenuationDb: number;
  /** The true frequency at which `level` is reached. */
  readonly atHz: number;
  readonly folded: boolean;
  /** The first stage, from 1, at which it folded. */
  readonly foldsAtStage: number | null;
  readonly mirrored: boolean;
  readonly inBand: boolean;
  /** Folded, in the band, and above the fold limit. */
  readonly overLimit: boolean;
  /** False where no level was given and full scale was assumed. */
  readonly levelKnown: boolean;
}
