/** What a filter is, in bare numbers: frequencies in Hz, levels in dB. */

export type FilterShape = 'low-pass' | 'high-pass' | 'band-pass';

/**
 * Where a filter's corner stands.
 *
 * `at` says which point of the curve is given: `cutoff` is 3.0103 dB down in one pass, `pass-edge` is where the
 * response is last within its ripple, `stop-edge` where it first reaches its stop-band attenuation. A low-pass or a
 * high-pass has one frequency (`lowHz === highHz`), a band-pass has both.
 */
export interface FilterEdge {
  readonly at: 'cutoff' | 'pass-edge' | 'stop-edge';
  readonly lowHz: number;
  readonly highHz: number;
}

/** The responses that have poles, analogue by nature; used digitally through the bilinear transform. */
export type PoleFilter =
  | {
      readonly response: 'butterworth';
      readonly order: number;
      readonly shape: FilterShape;
      readonly edge: FilterEdge;
    }
  | {
      readonly response: 'bessel';
      readonly order: number;
      readonly shape: FilterShape;
      readonly edge: FilterEdge;
    }
  | {
      readonly response: 'chebyshev';
      readonly order: number;
      readonly rippleDb: number;
      readonly shape: FilterShape;
      readonly edge: FilterEdge;
    }
  | {
      readonly response: 'inverse-chebyshev';
      readonly order: number;
      readonly stopbandDb: number;
      readonly shape: FilterShape;
      readonly edge: FilterEdge;
    }
  | {
      readonly response: 'elliptic';
      readonly order: number;
      readonly rippleDb: number;
      readonly stopbandDb: number;
      readonly shape: FilterShape;
      readonly edge: FilterEdge;
    }
  /**
   * `cornerHz` is each pole's own. `given` says what was written down: with `cutoff`, a digital filter holds the
   * 3.0103 dB point of all poles together where it was asked for, and lets the corners move; left out, the corners.
   */
  | {
      readonly response: 'rc';
      readonly order: number;
      readonly shape: FilterShape;
      readonly given?: 'corner' | 'cutoff';
      readonly cornerHz: { readonly lowHz: number; readonly highHz: number };
    };

/** The responses without poles of their own, usable ahead of a converter. */
export type CurveFilter =
  | {
      readonly response: 'mask';
      readonly passHz: number;
      readonly stopHz: number;
      readonly stopbandDb: number;
      readonly rippleDb: number;
    }
  /** Points ascend in frequency. */
  | {
      readonly response: 'points';
      readonly points: readonly (readonly [frequencyHz: number, attenuationDb: number])[];
    }
  | { readonly response: 'aperture'; readonly timeS: number };

/** The responses that exist only in numbers, at an input rate given beside them. */
export type StepFilter =
  | { readonly response: 'fir'; readonly taps: readonly number[] }
  | {
      readonly response: 'kaiser';
      readonly passHz: number;
      readonly stopHz: number;
      readonly stopbandDb: number;
    }
  | { readonly response: 'half-band'; readonly taps: readonly number[] }
  | {
      readonly response: 'half-band';
      readonly passHz: number;
      readonly stopbandDb: number;
    }
  | { readonly response: 'moving-average'; readonly length: number }
  /** `decimation` is the rate change the integrators and combs are built around. */
  | {
      readonly response: 'cic';
      readonly order: number;
      readonly delay: number;
      readonly decimation: number;
    };

/** `tolerance` is relative, on every frequency of the filter (0.05 is ±5 %). */
export type AnalogueFilter = (PoleFilter | CurveFilter) & {
  readonly tolerance: number;
};

/** `passes` is 2 for a filter run forward and backward. */
export type DigitalFilter = (PoleFilter | CurveFilter | StepFilter) & {
  readonly tolerance: number;
  readonly passes: 1 | 2;
};
