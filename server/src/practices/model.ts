import type { WindowName } from '../signal/windows.ts';

/** So many periods of the supply at its nominal frequency. */
export interface SupplyCycles {
  readonly supplyHz: number;
  readonly cycles: number;
}

/** What has to hold, by its kind. Every number is the published one. */
type Demand =
  /** The rate of the record, at least. */
  | { readonly kind: 'rate'; readonly leastHz: number }
  /** The rate of the record over the top of the band, at least. */
  | { readonly kind: 'rate-over-band'; readonly least: number }
  /** What the band has to cover; `lowHz` is left out where nothing is asked of its bottom. */
  | { readonly kind: 'band'; readonly lowHz?: number; readonly highHz: number }
  /** The most that the filters may take off anywhere in a range, the sensor apart. */
  | { readonly kind: 'pass'; readonly lowHz: number; readonly highHz: number; readonly mostDb: number }
  /** The least that has to be taken off whatever folds into the band; what folds at the rate of a modulator does not count. */
  | { readonly kind: 'fold'; readonly leastDb: number }
  /** The multiple of the supply's frequency that the band has to hold. */
  | { readonly kind: 'order'; readonly order: number }
  /** The length of the record behind one spectrum, in periods of the supply. */
  | { readonly kind: 'record'; readonly of: readonly SupplyCycles[] }
  | { readonly kind: 'window'; readonly window: WindowName };

/** One thing that has to hold of a channel that follows a practice; its name tells it from the practice's others. */
export type Requirement = Demand & { readonly name: string };

/** Where a practice stands written. */
export type Authority =
  | {
      readonly kind: 'published';
      readonly documents: readonly PublishedDocument[];
      /** How its figures came here. */
      readonly read: 'from memory' | 'with the text at hand';
    }
  | { readonly kind: 'common-practice'; readonly reason: string };

export interface PublishedDocument {
  /** `ISO 6487`. */
  readonly designation: string;
  /** What it is about, in our words. */
  readonly subject: string;
  /** `2016`, `2002 with amendment 1 of 2008`. */
  readonly edition: string;
}

/** One row of the table of practices. */
export interface Practice {
  /** As `follows` names it. */
  readonly name: string;
  /** What it is for, in a sentence without its full stop. */
  readonly title: string;
  readonly requirements: readonly Requirement[];
  readonly authority: Authority;
  /** What the source also asks for and the table does not hold. */
  readonly leftOut: readonly string[];
}
