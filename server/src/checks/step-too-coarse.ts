import { placedLevel } from '../chain/level-scale.ts';
import type { Chain } from '../chain/model.ts';
import { powerSum } from '../chain/noise.ts';
import { findUnit, ownUnit } from '../quantity/unit.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Level } from '../rig/model.ts';
import type { Place } from '../rig/place.ts';
import { decibels, ratioOf } from '../signal/decibel.ts';
import { quantizerStep } from '../signal/quantizer.ts';
import { type ChannelView, type Check, SAYS_NOTHING } from './check.ts';
import { largestOf, originInSentence } from './noise-wording.ts';
import { standingOn } from './standing.ts';
import { differenceText } from './wording.ts';

const ROUNDING_DB = 1e-9;
const DIGITS = 3;

/** Half the span of a full scale whose volts don't matter. */
const FULL_SCALE = 1;

/** Something that is not to be larger than `resolve`. */
interface Hindrance {
  /** On the chain's scale. */
  readonly level: number;
  readonly place: Place;
  /** What it is, given its size in the unit of `resolve`. */
  readonly says: (size: string) => string;
}

export const stepTooCoarse: Check<'channel'> = {
  name: 'step-too-coarse',
  kind: 'channel',
  severity: 'warning',
  finds: 'One step of the converter, or the noise in the band, is larger than `resolve`.',
  why: 'What is smaller than a step of the converter is rounded away or turned into noise, and what is smaller than the noise in the band is seen only after averaging. The noise counts as a sinusoid with the same rms does: what is native to the band, and what folds into it.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { bits: 12, full-scale: ±10 V }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    resolve: 0.01 g
`,
  clean: `rig: Fan bearing
digitizers:
  # One step is 20 V / 65536 = 0.305 mV, so 3.05 mg.
  front-end: { bits: 16, full-scale: ±10 V }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    resolve: 0.01 g
`,
  sources: ['Arithmetic: step = span / 2^bits. IEEE Std 1241.'],
  run(view) {
    const { channel, chain } = view;
    const { resolve } = channel;
    const resolveDb = resolve && placedLevel(resolve.value, chain.scale);
    if (!resolve || resolveDb === undefined) return SAYS_NOTHING;
    const worst = worstOf(view);
    if (!worst || !(worst.level > resolveDb + ROUNDING_DB)) return SAYS_NOTHING;
    const excess = worst.level - resolveDb;
    const standing = standingOn(channel, resolve);
    const sizeOf = (moreDb: number): string => sizeText(resolve.value, moreDb);
    return [
      {
        message: `A change of ${sizeOf(0)} will not be seen: ${worst.says(sizeOf(excess))}, ${differenceText(excess)} more than \`resolve\`.`,
        place: standing.place,
        related: [...standing.related, { place: worst.place, message: 'This is where that comes from.' }],
        figures: { excessDb: excess },
        excess,
      },
    ];
  },
};

function worstOf(view: ChannelView): Hindrance | undefined {
  const step = stepOf(view.chain);
  const noise = noiseOf(view);
  if (!step || !noise) return step ?? noise;
  return noise.level > step.level ? noise : step;
}

function stepOf({ channel, scale }: Chain): Hindrance | undefined {
  const bits = channel.digitizer?.bits;
  const hasFullScale = scale.unit === 'dbfs' || scale.unit === 'relative';
  if (!bits || !hasFullScale) return undefined;
  return {
    level: scale.fullScaleDb + decibels(quantizerStep(2 * FULL_SCALE, bits.value) / FULL_SCALE),
    place: bits.place,
    says: (size) => `one step of the converter's ${bits.value} bits is ${size}`,
  };
}

function noiseOf({ chain, noise }: ChannelView): Hindrance | undefined {
  if (!noise || !chain.understood) return undefined;
  const largest = largestOf(noise.contributions, ({ nativeDb, foldedDb }) =>
    powerSum([nativeDb, foldedDb ?? -Infinity]),
  );
  if (!largest) return undefined;
  return {
    level: noise.totalDb,
    place: largest.place,
    says: (size) =>
      `the noise in the band has the rms of a sinusoid of ${size} (most of it is ${originInSentence(largest.origin)})`,
  };
}

/** A level that is so much more than another, in the other's unit. */
function sizeText(level: Level, moreDb: number): string {
  switch (level.kind) {
    case 'dbfs':
      return formatQuantity(level.dbfs + moreDb, 'dbfs');
    case 'volts':
      return formatQuantity(level.peakV * ratioOf(moreDb), 'voltage', DIGITS);
    case 'measured':
      return formatQuantity(level.peak * ratioOf(moreDb), findUnit(level.unit) ?? ownUnit(level.unit), DIGITS);
  }
}
