import type { Practice } from '../practices/model.ts';
import type { Quantity } from '../quantity/quantity.ts';
import type { FilterShape } from '../signal/filter-spec.ts';
import type { Interleave } from '../signal/interleave.ts';
import type { SlotPattern } from '../signal/pattern.ts';
import type { PulseTrain } from '../signal/pulse-train.ts';
import type { RecordLength } from '../signal/spectrum-plan.ts';
import type { WindowName } from '../signal/windows.ts';
import type { Place } from './place.ts';

/** Where a value came from when the channel does not say it itself. */
export interface Inheritance {
  readonly from: 'defaults' | 'merge' | 'alias';
  readonly place: Place;
}

/**
 * A value as somebody wrote it. Numbers are in base units (Hz, s, V, m/s2, ...; ratios as fractions; angles in
 * degrees) or in the unit that the field's name says.
 */
export interface Given<T> {
  readonly value: T;
  /** The value's own text. */
  readonly place: Place;
  /** The quantity as written, where the value is one: what an edit imitates. */
  readonly written?: Quantity;
  readonly inherited?: Inheritance;
}

/** Every named thing: its name and where the name stands. In-place ones have the name `''`. */
export interface Thing {
  readonly name: string;
  readonly place: Place;
}

export interface Clock extends Thing {
  readonly kind: 'clock';
  readonly frequencyHz: Given<number> | undefined;
  /** The dividers that exist, ascending; `undefined` for any whole or broken divider. */
  readonly divide: Dividers | undefined;
  /** Relative: 25 ppm is 25e-6. */
  readonly tolerance: number;
  readonly lockedTo: Given<string> | undefined;
}

/** Whole dividers between a clock and a sample rate. */
export type Dividers =
  | { readonly kind: 'range'; readonly low: number; readonly high: number; readonly step: number }
  | { readonly kind: 'list'; readonly values: readonly number[] };

/** The two ends of a converter's input, in volts at its own terminals. */
export interface FullScale {
  readonly lowV: number;
  readonly highV: number;
}

export interface Digitizer extends Thing {
  readonly kind: 'digitizer';
  readonly clock: (Given<string> & { readonly thing: Clock | undefined }) | undefined;
  readonly prescale: number;
  /** Rates that exist, instead of a clock: a list, or a range in which every rate exists. */
  readonly rates: Given<ListedRates> | undefined;
  readonly maxRateHz: Given<number> | undefined;
  readonly together: Given<'free' | 'same' | 'sub-multiples'>;
  readonly sampling: Given<'simultaneous' | 'scanned'> | undefined;
  /** From one channel's conversion to the next one's; `undefined` where the scan is spread over the sample period. */
  readonly scanIntervalS: Given<number> | undefined;
  /** Time constant of the input after the switch has moved on. */
  readonly settlingS: Given<number> | undefined;
  readonly bits: Given<number> | undefined;
  /** At its input, as it stands in the record: white up to half the rate. */
  readonly noise: Given<InputNoise> | undefined;
  /** Rms uncertainty of the instant of sampling. */
  readonly jitterS: Given<number> | undefined;
  readonly fullScale: Given<FullScale> | undefined;
  readonly gain: Given<number> | undefined;
  readonly ranges: Given<readonly FullScale[]> | undefined;
  readonly gains: Given<readonly number[]> | undefined;
  readonly lowCornerHz: Given<number> | undefined;
  readonly filters: readonly FilterUse[];
  /** The converter's internal rate as a multiple of the channel's. */
  readonly modulatorMultiple: Given<number> | undefined;
  readonly decimationFilter: FilterUse | undefined;
  readonly interleave: Given<Interleave> | undefined;
  /** True where the delay of digital filters is taken out of the time stamps. */
  readonly delayCompensated: boolean;
}

export type InputNoise =
  | { readonly kind: 'rms'; readonly rmsV: number }
  | { readonly kind: 'density'; readonly voltsPerRootHz: number };

export type ListedRates =
  | { readonly kind: 'list'; readonly ratesHz: readonly number[] }
  | { readonly kind: 'range'; readonly lowHz: number; readonly highHz: number };

export type Measured =
  | 'acceleration'
  | 'velocity'
  | 'displacement'
  | 'strain'
  | 'pressure'
  | 'sound-pressure'
  | 'force'
  | 'torque'
  | 'temperature'
  | 'voltage'
  | 'current'
  | 'speed'
  | 'other';

export interface Sensor extends Thing {
  readonly kind: 'sensor';
  readonly measures: Given<Measured> | undefined;
  /** Volts per base unit of what is measured; `undefined` where it can't be known. */
  readonly sensitivity: Given<number> | undefined;
  /** The unit that the sensitivity names, such as `g`, `K`, or a channel's own. */
  readonly unit: string | undefined;
  readonly resonanceHz: Given<number> | undefined;
  readonly q: number;
  readonly cornerHz: Given<number> | undefined;
  readonly lowCornerHz: Given<number> | undefined;
  /** The largest magnitude it can measure, in the base unit. */
  readonly range: Given<number> | undefined;
  /** Of its own, at whatever frequency. */
  readonly noise: Given<NoiseLevel> | undefined;
}

/** A frequency in a filter: absolute, or a fraction of the rate that the filter's place decides. */
export type FilterFrequency =
  | { readonly kind: 'hz'; readonly hz: number }
  | { readonly kind: 'of-rate'; readonly fraction: number };

export interface FilterFrequencies {
  readonly low: FilterFrequency;
  readonly high: FilterFrequency;
}

/** A response as it was read; complete, or it is not made at all. */
export type FilterResponse =
  | {
      readonly response: 'butterworth' | 'bessel' | 'chebyshev' | 'inverse-chebyshev' | 'elliptic';
      readonly order: number;
      readonly shape: FilterShape;
      readonly edge: Given<FilterFrequencies> & { readonly at: 'cutoff' | 'pass-edge' | 'stop-edge' };
      /** 0 where the response has none. */
      readonly rippleDb: number;
      /** 0 where the response has none. */
      readonly stopbandDb: number;
    }
  | {
      readonly response: 'rc';
      readonly order: number;
      readonly shape: FilterShape;
      readonly edge: Given<FilterFrequencies> & { readonly at: 'corner' | 'cutoff' };
    }
  | {
      readonly response: 'mask';
      readonly pass: Given<FilterFrequency>;
      readonly stop: Given<FilterFrequency>;
      readonly stopbandDb: number;
      readonly rippleDb: number;
    }
  | {
      readonly response: 'points';
      readonly points: readonly { readonly at: FilterFrequency; readonly attenuationDb: number }[];
    }
  | { readonly response: 'aperture'; readonly timeS: Given<number> }
  | { readonly response: 'fir'; readonly taps: readonly number[] }
  | {
      readonly response: 'kaiser';
      readonly pass: Given<FilterFrequency>;
      readonly stop: Given<FilterFrequency>;
      readonly stopbandDb: number;
    }
  | { readonly response: 'half-band'; readonly taps: readonly number[] }
  | { readonly response: 'half-band'; readonly pass: Given<FilterFrequency>; readonly stopbandDb: number }
  | { readonly response: 'moving-average'; readonly length: number }
  | { readonly response: 'cic'; readonly order: number; readonly delay: number };

export interface Filter extends Thing {
  readonly kind: 'filter';
  /** `undefined` where the text lacks what the response needs (which has been said at the filter). */
  readonly response: FilterResponse | undefined;
  readonly order: Given<number> | undefined;
  readonly tolerance: number;
  readonly passes: 1 | 2;
}

/** A mention of a filter: the name (or the filter in place) and what it stands for. */
export interface FilterUse {
  readonly place: Place;
  readonly filter: Filter | undefined;
  readonly inherited?: Inheritance;
}

/** A level of a sinusoid, as a peak. */
export type Level =
  | { readonly kind: 'dbfs'; readonly dbfs: number }
  | { readonly kind: 'volts'; readonly peakV: number }
  /** In base units of what `measured` says; `unit` is the unit as written, own units included. */
  | { readonly kind: 'measured'; readonly peak: number; readonly measured: Measured; readonly unit: string };

/** A one-sided density of noise: the level of a sinusoid that has the rms of 1 Hz of it. */
export type NoiseLevel = Exclude<Level, { readonly kind: 'dbfs' }>;

interface SourceBase extends Thing {
  readonly kind: 'source';
  readonly harmonics: number;
  /** One per harmonic as far as they are given; empty where no level is known. Of noise: the one of 1 Hz of it. */
  readonly levels: readonly Given<Level>[];
  readonly fallsDbPerOctave: number;
  readonly tolerance: number;
  readonly wanted: boolean;
  /** Decided here once: what the text says, or what its level implies. */
  readonly enters: 'sensor' | 'wiring';
  /** True where the text says it. Otherwise volts enter at the sensor of a channel that measures a voltage. */
  readonly entersSaid: boolean;
}

/** How far apart the members of a group may be: at any frequency, in degrees; or in time. */
export type PhaseLimit =
  | { readonly kind: 'angle'; readonly degrees: number }
  | { readonly kind: 'time'; readonly seconds: number };

/** Channels whose phase is compared. */
export interface Group extends Thing {
  readonly kind: 'group';
  readonly within: Given<PhaseLimit> | undefined;
  /** The highest frequency at which it matters. */
  readonly upToHz: Given<number> | undefined;
}

export interface FrequencyRange {
  readonly lowHz: number;
  readonly highHz: number;
}

export type Source =
  | (SourceBase & { readonly type: 'tone'; readonly frequency: Given<FrequencyRange> })
  | (SourceBase & { readonly type: 'rotating'; readonly order: number; readonly speed: Given<FrequencyRange> })
  | (SourceBase & {
      readonly type: 'modulated';
      readonly carrier: Given<FrequencyRange>;
      readonly modulation: Given<FrequencyRange>;
      readonly sidebands: number;
      readonly sidebandsFallDb: number;
    })
  | BroadbandSource;

/** Noise that is white over a range. It has no lines, so whatever follows lines passes it by. */
export type BroadbandSource = SourceBase & { readonly type: 'broadband'; readonly spans: Given<FrequencyRange> };

/** A source as one channel hears it. */
export interface HeardSource {
  readonly source: Source;
  /** The channel's own level for it (`hears` as a map), one value for the fundamental. */
  readonly level: Given<Level> | undefined;
  /** Where the channel names it, if it does. */
  readonly mention: Place | undefined;
}

/** A digital step after the converter, in order. */
export type Step =
  | {
      readonly kind: 'decimate';
      readonly factor: Given<number>;
      readonly filters: readonly FilterUse[];
      readonly place: Place;
    }
  | { readonly kind: 'filter'; readonly filters: readonly FilterUse[]; readonly place: Place }
  | {
      /** Resampling to shaft angle; `fs` in its filters is the rate that it leaves, so that they are in orders. */
      readonly kind: 'per-turn';
      readonly perTurn: Given<number>;
      /** In turns per second. */
      readonly speed: Given<FrequencyRange>;
      readonly filters: readonly FilterUse[];
      readonly place: Place;
    };

export type Limit = { readonly kind: 'ratio'; readonly ratio: number } | Level;

/** A bound on what no source declares. */
export type Undeclared =
  | { readonly kind: 'full-scale' }
  | { readonly kind: 'level'; readonly level: Level }
  | { readonly kind: 'points'; readonly points: readonly { readonly frequencyHz: number; readonly level: Level }[] };

/** The largest value expected, in base units of what the channel measures, or at the converter in volts or dBFS. */
export interface Peak {
  readonly low: Level;
  readonly high: Level;
  /** True where one value was given: it means ± on a two-sided full scale. */
  readonly single: boolean;
}

/** How a channel's record is turned into a spectrum. */
export interface Spectrum {
  /** Of one record; its place is that of the one key that says it. */
  readonly length: Given<RecordLength>;
  readonly window: Given<WindowName> | undefined;
  /** 0 to less than 1. */
  readonly overlap: Given<number> | undefined;
  readonly averages: Given<number> | undefined;
  /** Two tones this far apart have to be told from one another. */
  readonly separateHz: Given<number> | undefined;
}

/** How long is recorded, and where the data goes. */
export interface Run {
  readonly durationS: Given<number> | undefined;
  /** Triggered records: how many, and how long each is. */
  readonly records: Given<number> | undefined;
  readonly recordS: Given<number> | undefined;
  readonly diskBytes: Given<number> | undefined;
  readonly linkBytesPerSecond: Given<number> | undefined;
  /** Of one sample of any channel. */
  readonly sampleBits: Given<number> | undefined;
}

/** A practice that a channel follows, and where that is said. */
export interface FollowedPractice {
  readonly practice: Practice;
  readonly place: Place;
  readonly inherited?: Inheritance;
  /** The supply that its periods are counted by: the source `mains`, heard or not, where the practice needs it. */
  readonly mains: Source | undefined;
}

/**
 * A channel with everything it names resolved and everything it inherits filled in.
 *
 * A field is `undefined` where the text does not give it or gives it unreadably; the latter has been said as a
 * problem. `complete` is false where `rate` or `band` is missing (a pulse train needs no band): such a channel is not checked
 * further.
 */
export interface Channel extends Thing {
  readonly kind: 'channel';
  /** How many channels it stands for: more than 1 where its name has a brace range. */
  readonly count: number;
  readonly complete: boolean;
  readonly sensor: Sensor | undefined;
  readonly sensorPlace: Place | undefined;
  readonly digitizer: Digitizer | undefined;
  readonly digitizerPlace: Place | undefined;
  readonly rateHz: Given<number> | undefined;
  readonly gain: Given<number> | undefined;
  readonly fullScale: Given<FullScale> | undefined;
  /** Analogue filters of the channel's own, in order; those of the digitizer's input follow them in the path. */
  readonly filters: readonly FilterUse[];
  /** The place of the `filter` key's value, also where it says `none`. */
  readonly filterPlace: Place | undefined;
  /** Of the converter's samples, those that are kept; `undefined` for all. */
  readonly pattern: Given<SlotPattern> | undefined;
  readonly steps: readonly Step[];
  /** Where the channel is a pulse train; what is said of folding and filters does not apply to one. */
  readonly pulses: Given<PulseTrain> | undefined;
  readonly band: Given<FrequencyRange> | undefined;
  /** `bandpass` where the band is folded on purpose. */
  readonly sampling: Given<'baseband' | 'bandpass'> | undefined;
  readonly foldLimit: Given<Limit> | undefined;
  readonly undeclared: Given<Undeclared> | undefined;
  readonly flatnessDb: Given<number> | undefined;
  readonly heard: readonly HeardSource[];
  /** Sources with a level that this channel can't place, left out of `hears: all`. */
  readonly unheard: readonly Source[];
  readonly peak: Given<Peak> | undefined;
  readonly headroomDb: Given<number> | undefined;
  /** The smallest step that must be seen. */
  readonly resolve: Given<Level> | undefined;
  readonly spectrum: Given<Spectrum> | undefined;
  /** Each practice once. */
  readonly follows: readonly FollowedPractice[];
  /** The name of its group: what the group allows concerns no channel by itself. */
  readonly group: Given<string> | undefined;
}
