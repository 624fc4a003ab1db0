import { type FrequencyRange, within } from './frequency-range.ts';
import { type Estimate, estimateOver, type Integrand, integralOver, isClose } from './integral.ts';
import { MinimumHeap } from './minimum-heap.ts';
import {
  cutTo,
  type Passing,
  passedPower,
  type Stretch,
  sampledInZone,
  seenBy,
  trueFrequencyOf,
  unfolded,
} from './noise-stretch.ts';
import { bernsteinFilters, landedOfSmooth } from './noise-zone.ts';

/** Filters and samplings that noise goes through, and where in the record it counts. */
export interface NoiseChain {
  /** The rate of each sampling, all above 0. */
  readonly ratesHz: readonly number[];
  /** Ahead of each sampling in turn, and last of those behind the last one. */
  readonly responses: readonly (readonly Passing[])[];
  /** Ranges of the record's frequencies, apart from one another. */
  readonly landing: readonly FrequencyRange[];
}

/** A chain whose far zones can be told by their mean, and whose smooth zones by a few figures. */
export interface NoiseFold extends NoiseChain {
  /** Per sampling, the share of white noise in its record that lands where it counts, after all that follows. */
  readonly shares: readonly number[];
  /** Per sampling, what lands of each of Bernstein's polynomials over its record. */
  readonly landed: readonly (readonly number[])[];
}

/** Zones of a sampling in which every image is followed by itself. */
const NEAR_ZONES = 32;

/** A far part this long, in sampling rates, is told by its mean when its power is smooth over it. */
const LEAST_RATES = 4;

/** Of one octave, parts that are not smooth and are followed image by image. */
const MOST_FOLLOWED = 8;

/** How often an octave is parted at most, in search of where it is not smooth. */
const MOST_PARTS = 64;

/** Octaves above a frequency, after which it is no longer told from infinity. */
const MOST_OCTAVES = 64;

/** A zone is whole within this. */
const WHOLE_ROUNDING = 1e-9;

/** Of what white noise would leave, what is not worth following. */
const SHARE_NEGLIGIBLE = 1e-7;

/** Works out what far zones bring in, from the last sampling back to the first. */
export function noiseFold(chain: NoiseChain): NoiseFold {
  const { ratesHz, responses, landing } = chain;
  let shares: readonly number[] = [];
  let landed: readonly (readonly number[])[] = [];
  const negligibleHz = SHARE_NEGLIGIBLE * widthOf(landing);
  for (let stage = ratesHz.length - 1; stage >= 0; stage--) {
    const nyquistHz = ratesHz[stage]! / 2;
    const [ahead = [], ...later] = responses.slice(stage + 1);
    const rest = { ratesHz: ratesHz.slice(stage + 1), landing, shares, landed };
    const own = bernsteinFilters(nyquistHz).map((filter) =>
      landedBandwidth(
        { ...rest, responses: [[filter, ...ahead], ...later] },
        { lowHz: 0, highHz: nyquistHz },
        negligibleHz,
      ),
    );
    shares = [own.reduce((sum, part) => sum + part, 0) / nyquistHz, ...shares];
    landed = [own, ...landed];
  }
  return { ...chain, shares, landed };
}

/**
 * What lands of white noise of density 1 that fills a range ahead of the first filter: the power, which is the
 * equivalent bandwidth in Hz.
 *
 * Images are followed one by one in the first 32 zones of each sampling, where the power over a zone is no polynomial.
 * Above, where the power is smooth over many
 * zones, every zone brings the same share: the mean over the zone (the error falls with the square of the zone's
 * number). Where it is not (a resonance, a mask's step) the images are followed after all; where there are too many to
 * be followed (the lobes of an average, without end) an octave brings the share that the one before did.
 *
 * @param range may reach to `Infinity` where the first responses fall by more than 3 dB an octave
 * @param negligibleHz what need not be found, of any one image
 */
export function landedBandwidth(fold: NoiseFold, range: FrequencyRange, negligibleHz: number): number {
  if (!(range.lowHz < range.highHz)) return 0;
  return landedOf(fold, unfolded(range, fold.responses[0] ?? []), negligibleHz);
}

function landedOf(fold: NoiseFold, stretch: Stretch, negligibleHz: number): number {
  if (!(stretch.lowHz < stretch.highHz)) return 0;
  const power = passedPower(stretch);
  if (isNegligible(power, stretch, negligibleHz)) return 0;
  const rateHz = fold.ratesHz[stretch.views.length - 1];
  if (rateHz === undefined) return inRecord(fold, stretch, power, negligibleHz);
  const seen = seenBy(stretch);
  const nearHz = (NEAR_ZONES * rateHz) / 2;
  let sum = 0;
  for (const near of octavesOf(seen.lowHz, Math.min(seen.highHz, nearHz), rateHz / 2)) {
    sum += followed(fold, cutTo(stretch, near), rateHz, negligibleHz);
    // Of no use to follow what remains under a hundred-thousandth of what has been found.
    if (isTailNegligible(power, cutTo(stretch, { ...seen, lowHz: near.highHz }), negligibleHz + 1e-5 * sum)) return sum;
  }
  if (seen.highHz <= nearHz) return sum;
  const far = { lowHz: Math.max(seen.lowHz, nearHz), highHz: seen.highHz };
  return sum + landedFromFar(fold, stretch, far, negligibleHz + 1e-6 * sum);
}

function inRecord({ landing }: NoiseFold, stretch: Stretch, power: Integrand, negligibleHz: number): number {
  return within(landing, seenBy(stretch)).reduce((sum, range) => {
    const { lowHz, highHz } = cutTo(stretch, range);
    return sum + integralOver(power, lowHz, highHz, negligibleHz);
  }, 0);
}

/** Zone by zone. */
function followed(fold: NoiseFold, stretch: Stretch, rateHz: number, negligibleHz: number): number {
  const { lowHz, highHz } = seenBy(stretch);
  const nyquistHz = rateHz / 2;
  const responses = fold.responses[stretch.views.length] ?? [];
  const first = Math.floor(lowHz / nyquistHz);
  const count = Math.ceil(highHz / nyquistHz) - first;
  let sum = 0;
  // Counted, since so far up that a double holds no odd number a zone has no successor.
  for (let index = 0; index < count; index++) {
    const zone = first + index;
    const inZone = cutTo(stretch, { lowHz: zone * nyquistHz, highHz: (zone + 1) * nyquistHz });
    const sampled = sampledInZone(inZone, rateHz, zone, responses);
    sum += landedOfWhole(fold, inZone, sampled, nyquistHz, negligibleHz) ?? landedOf(fold, sampled, negligibleHz);
  }
  return sum;
}

/** Of a whole zone in which the power is smooth, by what lands of a few polynomials; `undefined` of any other. */
function landedOfWhole(
  fold: NoiseFold,
  inZone: Stretch,
  sampled: Stretch,
  nyquistHz: number,
  negligibleHz: number,
): number | undefined {
  if (inZone.highHz - inZone.lowHz < nyquistHz * (1 - WHOLE_ROUNDING)) return undefined;
  const power = passedPower(inZone);
  return landedOfSmooth(
    (part) => power.at(trueFrequencyOf(sampled, part * nyquistHz)),
    () => power.bound(inZone.lowHz, inZone.highHz),
    fold.landed[inZone.views.length - 1]!,
    negligibleHz,
  );
}

/** The same for zones so far up that a share can stand for each; whole multiples of the rate, with what is left over. */
function landedFromFar(fold: NoiseFold, stretch: Stretch, far: FrequencyRange, negligibleHz: number): number {
  const rateHz = fold.ratesHz[stretch.views.length - 1]!;
  const startHz = Math.ceil(far.lowHz / rateHz) * rateHz;
  const endHz = far.highHz === Infinity ? Infinity : Math.floor(far.highHz / rateHz) * rateHz;
  const follow = (lowHz: number, highHz: number): number =>
    lowHz < highHz ? followed(fold, cutTo(stretch, { lowHz, highHz }), rateHz, negligibleHz) : 0;
  if (!(endHz - startHz >= LEAST_RATES * rateHz)) return follow(far.lowHz, far.highHz);
  const power = passedPower(stretch);
  let sum = follow(far.lowHz, startHz) + follow(endHz, far.highHz);
  let previous: Octave | undefined;
  for (const range of octavesOf(startHz, endHz, rateHz)) {
    const rest = cutTo(stretch, { lowHz: range.lowHz, highHz: endHz });
    if (isTailNegligible(power, rest, negligibleHz + 1e-5 * sum)) break;
    previous = landedOfOctave(fold, stretch, range, previous, negligibleHz + 1e-6 * sum);
    sum += previous.landedHz;
  }
  return sum;
}

interface Octave {
  readonly landedHz: number;
  /** What is let through, wherever it lands. */
  readonly passedHz: number;
}

function landedOfOctave(
  fold: NoiseFold,
  stretch: Stretch,
  range: FrequencyRange,
  previous: Octave | undefined,
  negligibleHz: number,
): Octave {
  const stage = stretch.views.length - 1;
  const rateHz = fold.ratesHz[stage]!;
  const share = fold.shares[stage]!;
  const { passedHz, smoothHz, uneven } = partsOf(stretch, range, rateHz);
  if (uneven === undefined) {
    const ratio = previous !== undefined && previous.passedHz > 0 ? previous.landedHz / previous.passedHz : share;
    return { landedHz: ratio * passedHz, passedHz };
  }
  const landedHz = uneven.reduce(
    (sum, part) => sum + followed(fold, cutTo(stretch, part), rateHz, negligibleHz),
    share * smoothHz,
  );
  return { landedHz, passedHz };
}

interface Parts {
  readonly passedHz: number;
  /** What of it is let through where that is smooth over several times the rate. */
  readonly smoothHz: number;
  /** Where it is not; `undefined` where that is in too many places. */
  readonly uneven: readonly FrequencyRange[] | undefined;
}

interface Part extends FrequencyRange {
  readonly estimate: Estimate;
}

function partsOf(stretch: Stretch, range: FrequencyRange, rateHz: number): Parts {
  const power = passedPower(stretch);
  const parts = new MinimumHeap<Part>(({ estimate }) => -estimate.error);
  const uneven: FrequencyRange[] = [];
  let passedHz = 0;
  let smoothHz = 0;
  const add = (lowHz: number, highHz: number): void => {
    const part = cutTo(stretch, { lowHz, highHz });
    const estimate = estimateOver(power, part.lowHz, part.highHz);
    passedHz += estimate.value;
    if (isClose(estimate, 0)) smoothHz += estimate.value;
    else parts.add({ lowHz, highHz, estimate });
  };
  add(range.lowHz, range.highHz);
  for (let count = 1; count <= MOST_PARTS; count++) {
    const worst = parts.least();
    if (worst === undefined) return { passedHz, smoothHz, uneven };
    parts.removeLeast();
    const { lowHz, highHz, estimate } = worst;
    const rates = Math.round((highHz - lowHz) / rateHz);
    if (rates < 2 * LEAST_RATES) {
      if (uneven.length === MOST_FOLLOWED) break;
      uneven.push({ lowHz, highHz });
      continue;
    }
    passedHz -= estimate.value;
    const middleHz = lowHz + Math.floor(rates / 2) * rateHz;
    add(lowHz, middleHz);
    add(middleHz, highHz);
  }
  return { passedHz, smoothHz, uneven: undefined };
}

/** Ascending ranges that cover low..high, each ending at twice a whole multiple of `unitHz`, the first at one. */
function* octavesOf(lowHz: number, highHz: number, unitHz: number): Generator<FrequencyRange> {
  let startHz = lowHz;
  for (let count = 0; startHz < highHz && count < 2 * MOST_OCTAVES; count++) {
    const units = Math.max(2 * Math.floor(startHz / unitHz), 1);
    const endHz = Math.min(units * unitHz, highHz);
    yield { lowHz: startHz, highHz: endHz };
    startHz = endHz;
  }
}

function isNegligible(power: Integrand, { lowHz, highHz }: FrequencyRange, negligibleHz: number): boolean {
  if (highHz === Infinity) return false;
  return power.bound(lowHz, highHz) * (highHz - lowHz) <= negligibleHz;
}

/** Whether what is left of a stretch, octave after octave at its highest, is less than that. */
function isTailNegligible(power: Integrand, { lowHz, highHz }: FrequencyRange, negligibleHz: number): boolean {
  let sum = 0;
  let startHz = lowHz;
  for (let count = 0; startHz < highHz && count < MOST_OCTAVES; count++) {
    const endHz = startHz === 0 ? highHz : Math.min(2 * startHz, highHz);
    sum += power.bound(startHz, endHz) * (endHz - startHz);
    if (!(sum <= negligibleHz)) return false;
    startHz = endHz;
  }
  return true;
}

function widthOf(ranges: readonly FrequencyRange[]): number {
  return ranges.reduce((sum, { lowHz, highHz }) => sum + highHz - lowHz, 0);
}
