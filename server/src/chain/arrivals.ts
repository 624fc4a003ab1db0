import type { HeardSource, Source } from '../rig/model.ts';
import { type FoldedPiece, foldHz } from '../signal/folding.ts';
import { componentsOf } from './components.ts';
import { cutAtBand } from './cut-piece.ts';
import { landingIn } from './landing.ts';
import type { Arrival, Chain, LevelScale, SignalPath } from './model.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';
import { componentLevel, sourceLevelsOf } from './source-level.ts';
import { type Strongest, strongestOf, surelyTakenOff } from './strongest.ts';
import { type TracedMany, type TracedPart, type TracedPiece, tracedParts } from './traced-parts.ts';
import { type BandImages, bandImages, worstFolds } from './worst-fold.ts';

/**
 * A range that is sure to lose this much, and to end this far under full scale and under the fold limit, is given the
 * level that it is sure to stay under instead of its true maximum: where two deep stop bands ripple, that would take
 * long to find.
 */
const PLAINLY_LOW_DB = 60;
const PLAINLY_UNDER_FULL_SCALE_DB = 120;
const PLAINLY_UNDER_LIMIT_DB = 10;

/** Frequencies nearer than this, relative to the rate, are the same. */
const SAME_PLACE = 1e-9;

/** Levels are compared with limits to this, so that one that is exactly at its limit is not over it. */
export const LEVEL_ROUNDING_DB = 1e-9;

interface TracedSource {
  readonly source: Source;
  readonly entersAtSensor: boolean;
  readonly parts: readonly TracedPart[];
}

interface NotedArrivals {
  readonly question: Pick<Chain, 'bandLowHz' | 'bandHighHz' | 'scale' | 'isBandpass'>;
  readonly heard: readonly HeardSource[];
  readonly arrivals: readonly Arrival[];
  /** The highest that folds into the band; `-Infinity` where nothing does. */
  readonly highestFoldDb: number;
}

const TRACED: NoteKind<TracedSource> = { name: 'traced sources', most: 64 };
const ARRIVALS: NoteKind<NotedArrivals> = { name: 'arrivals', most: 24 };

/**
 * Where everything that a channel hears arrives in its record: each piece of each component of each source, in the
 * order in which the sources are heard. Native pieces are among them. What would be very many pieces that first fold
 * at one stage is one arrival, recorded all over; its level is the highest that lands in the band.
 */
export function arrivalsOf(chain: Chain): readonly Arrival[] {
  const { heard } = chain.channel;
  for (const noted of notesOn(chain.path, ARRIVALS)) if (isSameQuestion(noted, chain)) return noted.arrivals;
  const arrivals: Arrival[] = [];
  const { bandLowHz, bandHighHz, scale, isBandpass } = chain;
  let images: BandImages | undefined;
  const imagesOnce = (): BandImages => {
    images ??= bandImages(chain);
    return images;
  };
  for (const one of heard) addArrivals(arrivals, one, chain, imagesOnce);
  const highestFoldDb = highestFoldOf(arrivals);
  note(chain.path, ARRIVALS, {
    question: { bandLowHz, bandHighHz, scale, isBandpass },
    heard,
    arrivals,
    highestFoldDb,
  });
  return arrivals;
}

function highestFoldOf(arrivals: readonly Arrival[]): number {
  let highest = -Infinity;
  for (const { folded, inBand, level } of arrivals) if (folded && inBand && level > highest) highest = level;
  return highest;
}

/** Whether all that the arrivals depend on, besides the path, is the same. */
function isSameQuestion({ question: before, heard, highestFoldDb }: NotedArrivals, chain: Chain): boolean {
  return (
    before.bandHighHz === chain.bandHighHz &&
    before.bandLowHz === chain.bandLowHz &&
    before.isBandpass === chain.isBandpass &&
    isSameScale(before.scale, chain.scale) &&
    isSameLimit(before.scale, chain.scale, highestFoldDb) &&
    isSameHearing(heard, chain.channel.heard)
  );
}

/** Whether two limits tell the arrivals apart in the same way. */
function isSameLimit(first: LevelScale, second: LevelScale, highestFoldDb: number): boolean {
  if (first.foldLimit === second.foldLimit) return true;
  const lower = Math.min(first.foldLimit, second.foldLimit);
  return highestFoldDb <= lower && lower - PLAINLY_UNDER_LIMIT_DB >= first.fullScaleDb - PLAINLY_UNDER_FULL_SCALE_DB;
}

function isSameScale(first: LevelScale, second: LevelScale): boolean {
  return (
    first.unit === second.unit &&
    first.fullScaleDb === second.fullScaleDb &&
    first.fullScaleV === second.fullScaleV &&
    first.sensitivity === second.sensitivity &&
    first.sensor?.measures?.value === second.sensor?.measures?.value &&
    first.sensor?.unit === second.sensor?.unit
  );
}

function isSameHearing(first: readonly HeardSource[], second: readonly HeardSource[]): boolean {
  if (first === second) return true;
  if (first.length !== second.length) return false;
  for (let index = 0; index < first.length; index++) {
    const one = first[index]!;
    const other = second[index]!;
    if (one.source !== other.source || one.level?.value !== other.level?.value) return false;
  }
  return true;
}

function addArrivals(arrivals: Arrival[], heard: HeardSource, chain: Chain, images: () => BandImages): void {
  const levels = sourceLevelsOf(heard, chain.channel.sensor, chain.scale);
  const entersAtSensor = levels.entry === 'sensor';
  const { parts } = tracedSource(chain.path, heard.source, entersAtSensor);
  for (const traced of chain.isBandpass ? partsOfBandpass(parts, chain) : parts) {
    const level = componentLevel(levels, traced.component);
    const landed =
      traced.kind === 'piece'
        ? landedPiece(traced, entersAtSensor, level, chain)
        : landedMany(traced, entersAtSensor, chain, images());
    arrivals.push(arrivalOf(heard.source, traced, landed, level, levels.known, chain));
  }
}

function tracedSource(path: SignalPath, source: Source, entersAtSensor: boolean): TracedSource {
  for (const noted of notesOn(path, TRACED)) {
    if (noted.source === source && noted.entersAtSensor === entersAtSensor) return noted;
  }
  const parts = componentsOf(source).flatMap((component) => tracedParts(component, path));
  return note(path, TRACED, { source, entersAtSensor, parts });
}

/** What belongs to a band that is folded on purpose does not fold; everything else does, whatever the stage. */
function partsOfBandpass(parts: readonly TracedPart[], chain: Chain): readonly TracedPart[] {
  const { bandLowHz, bandHighHz } = chain;
  return parts.flatMap((part): readonly TracedPart[] => {
    if (part.kind !== 'piece') return [part];
    const { inside, outside } = cutAtBand(part.piece, bandLowHz, bandHighHz);
    const cut = (piece: FoldedPiece, isBesideBand: boolean): TracedPiece => ({
      ...part,
      piece,
      isBesideBand,
      whole: undefined,
      surely: undefined,
    });
    const isBeside = movesWithBand(part.piece, chain);
    const folded = outside.map((piece) => cut({ ...piece, foldsAtStage: piece.foldsAtStage ?? 1 }, isBeside));
    return inside ? [cut({ ...inside, foldsAtStage: null }, false), ...folded] : folded;
  });
}

/** Whether a piece is folded about the same frequency as the band is. */
function movesWithBand(piece: FoldedPiece, { recordedBand, bandLowHz, rateHz }: Chain): boolean {
  const { lowHz, highHz, mirrored } = recordedBand;
  if (piece.mirrored !== mirrored) return false;
  const band = mirrored ? bandLowHz + highHz : bandLowHz - lowHz;
  const own = mirrored ? piece.trueLowHz + piece.recordedHighHz : piece.trueLowHz - piece.recordedLowHz;
  return Math.abs(band - own) <= SAME_PLACE * rateHz;
}

/** What of a part lands in the band, or all of it where nothing does. */
interface Landed {
  readonly inBand: boolean;
  readonly slackHz: number;
  readonly strongest: Strongest;
}

function landedPiece(traced: TracedPiece, entersAtSensor: boolean, componentDb: number, chain: Chain): Landed {
  const { piece } = traced;
  const { path } = chain;
  const slackHz = slackOf(piece, path.clockTolerance);
  const { recordedBand } = chain;
  const landing = landingIn(piece, recordedBand.lowHz - slackHz, recordedBand.highHz + slackHz);
  const inBand = landing !== undefined;
  if (traced.isBesideBand) return { inBand: false, slackHz, strongest: wholeOf(traced, entersAtSensor, path) };
  const isPart = landing !== undefined && (landing.from > 0 || landing.to < 1);
  const sure = isPart
    ? surelyTakenOff(path, piece, entersAtSensor, landing.from, landing.to)
    : surelyOf(traced, entersAtSensor, path);
  if (isPlainlyLow(sure, componentDb, chain)) return { inBand, slackHz, strongest: sure };
  const strongest = isPart
    ? strongestOf(path, piece, entersAtSensor, landing.from, landing.to)
    : wholeOf(traced, entersAtSensor, path);
  return { inBand, slackHz, strongest };
}

function isPlainlyLow({ attenuationDb }: Strongest, componentDb: number, { foldLimit, scale }: Chain): boolean {
  const under = Math.min(foldLimit - PLAINLY_UNDER_LIMIT_DB, scale.fullScaleDb - PLAINLY_UNDER_FULL_SCALE_DB);
  return attenuationDb > PLAINLY_LOW_DB && componentDb - attenuationDb < under;
}

function surelyOf(traced: TracedPiece, entersAtSensor: boolean, path: SignalPath): Strongest {
  traced.surely ??= surelyTakenOff(path, traced.piece, entersAtSensor);
  return traced.surely;
}

function wholeOf(traced: TracedPiece, entersAtSensor: boolean, path: SignalPath): Strongest {
  traced.whole ??= strongestOf(path, traced.piece, entersAtSensor);
  return traced.whole;
}

/** Of many pieces, the one that is recorded highest in the band. */
function landedMany(traced: TracedMany, entersAtSensor: boolean, chain: Chain, images: BandImages): Landed {
  const { lowHz, highHz, stage } = traced;
  const { path } = chain;
  const ahead = path.known[0]!;
  const seesSensor = entersAtSensor && !path.sensorIsFlat;
  const least = worstFolds(images, seesSensor ? [...ahead, path.sensor] : ahead, lowHz, highHz)[stage - 1];
  const slackHz = highHz * path.clockTolerance;
  if (!least) {
    const attenuationDb = ahead.reduce((sum, response) => sum + response.leastDb(lowHz, highHz), 0);
    return { inBand: false, slackHz, strongest: { attenuationDb, filtersDb: attenuationDb, atHz: lowHz } };
  }
  const { attenuationDb, atHz } = least;
  const sensorDb = seesSensor ? path.sensor.leastDb(atHz, atHz) : 0;
  return { inBand: true, slackHz, strongest: { attenuationDb, filtersDb: attenuationDb - sensorDb, atHz } };
}

function arrivalOf(
  source: Source,
  traced: TracedPart,
  { inBand, slackHz, strongest }: Landed,
  componentDb: number,
  levelKnown: boolean,
  chain: Chain,
): Arrival {
  const { component, onNyquistAtStage } = traced;
  const { attenuationDb, filtersDb, atHz } = strongest;
  const level = componentDb - attenuationDb;
  const isMany = traced.kind === 'many';
  const foldsAtStage = isMany ? traced.stage : traced.piece.foldsAtStage;
  return {
    source,
    component: component.label,
    trueLowHz: isMany ? traced.lowHz : traced.piece.trueLowHz,
    trueHighHz: isMany ? traced.highHz : traced.piece.trueHighHz,
    recordedLowHz: isMany ? 0 : traced.piece.recordedLowHz,
    recordedHighHz: isMany ? chain.stages[chain.stages.length - 1]!.nyquistHz : traced.piece.recordedHighHz,
    recordedSlackHz: slackHz,
    level,
    attenuationDb: filtersDb,
    atHz,
    folded: foldsAtStage !== null,
    foldsAtStage,
    mirrored: isMany ? false : traced.piece.mirrored,
    inBand,
    overLimit: foldsAtStage !== null && inBand && level > chain.foldLimit + LEVEL_ROUNDING_DB,
    levelKnown,
    nominalHz: component.nominalHz,
    onNyquistAtStage,
  };
}

/**
 * How far the clock's tolerance moves a piece in the record, either way: what the samplings take off or fold it about
 * is a whole multiple of the last rate, and that multiple is off by the tolerance.
 */
export function slackOf(piece: FoldedPiece, clockTolerance: number): number {
  if (piece.foldsAtStage === null || clockTolerance === 0) return 0;
  const foldedAboutHz = piece.mirrored
    ? piece.trueLowHz + piece.recordedHighHz
    : Math.abs(piece.trueLowHz - piece.recordedLowHz);
  return foldedAboutHz * clockTolerance;
}

/** Where an arrival is recorded at the point of its level. */
export function recordedAtHz({ atHz }: Arrival, { ratesHz }: Chain): number {
  return ratesHz.reduce(foldHz, atHz);
}
