import type { HeardSource, Source } from '../rig/model.ts';
import { type FoldedPiece, foldThrough } from '../signal/folding.ts';
import { type Component, componentsOf } from './components.ts';
import type { Arrival, Chain, LevelScale, SignalPath } from './model.ts';
import { onNyquistAtStage } from './on-nyquist.ts';
import { type NoteKind, note, notesOn } from './path-notes.ts';
import { componentLevel, sourceLevelsOf } from './source-level.ts';
import { type Strongest, strongestOf } from './strongest.ts';

/** Pieces that one component is split into; what is left is one piece that claims the whole record. */
const MOST_PIECES_OF_COMPONENT = 256;

/** Pieces of all components of one source. */
const MOST_PIECES_OF_SOURCE = 4096;

/** Levels are compared with limits to this, so that one that is exactly at its limit is not over it. */
export const LEVEL_ROUNDING_DB = 1e-9;

/** One piece of a component, and how much is left of it at most. */
interface TracedPiece {
  readonly component: Component;
  readonly onNyquistAtStage: number | null;
  readonly piece: FoldedPiece;
  readonly strongest: Strongest;
}

interface TracedSource {
  readonly source: Source;
  readonly entersAtSensor: boolean;
  readonly pieces: readonly TracedPiece[];
}

interface NotedArrivals {
  readonly question: Pick<Chain, 'bandLowHz' | 'bandHighHz' | 'scale'>;
  readonly heard: readonly HeardSource[];
  readonly arrivals: readonly Arrival[];
}

const TRACED: NoteKind<TracedSource> = { name: 'traced sources', most: 64 };
const ARRIVALS: NoteKind<NotedArrivals> = { name: 'arrivals', most: 24 };

/**
 * Where everything that a channel hears arrives in its record: each piece of each component of each source, in the
 * order in which the sources are heard. Native pieces are among them.
 */
export function arrivalsOf(chain: Chain): readonly Arrival[] {
  const { heard } = chain.channel;
  for (const noted of notesOn(chain.path, ARRIVALS)) if (isSameQuestion(noted, chain)) return noted.arrivals;
  const arrivals: Arrival[] = [];
  for (const one of heard) addArrivals(arrivals, one, chain);
  const { bandLowHz, bandHighHz, scale } = chain;
  note(chain.path, ARRIVALS, { question: { bandLowHz, bandHighHz, scale }, heard, arrivals });
  return arrivals;
}

/** Whether all that the arrivals depend on, besides the path, is the same. */
function isSameQuestion({ question: before, heard }: NotedArrivals, chain: Chain): boolean {
  return (
    before.bandHighHz === chain.bandHighHz &&
    before.bandLowHz === chain.bandLowHz &&
    isSameScale(before.scale, chain.scale) &&
    isSameHearing(heard, chain.channel.heard)
  );
}

function isSameScale(first: LevelScale, second: LevelScale): boolean {
  return (
    first.foldLimit === second.foldLimit &&
    first.unit === second.unit &&
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

function addArrivals(arrivals: Arrival[], heard: HeardSource, chain: Chain): void {
  const levels = sourceLevelsOf(heard, chain.channel.sensor, chain.scale);
  const entersAtSensor = levels.entry === 'sensor';
  for (const traced of tracedSource(chain.path, heard.source, entersAtSensor).pieces) {
    const level = componentLevel(levels, traced.component);
    arrivals.push(arrivalOf(heard.source, traced, entersAtSensor, level, levels.known, chain));
  }
}

function tracedSource(path: SignalPath, source: Source, entersAtSensor: boolean): TracedSource {
  for (const noted of notesOn(path, TRACED)) {
    if (noted.source === source && noted.entersAtSensor === entersAtSensor) return noted;
  }
  const components = componentsOf(source);
  const limit = Math.min(MOST_PIECES_OF_COMPONENT, Math.ceil(MOST_PIECES_OF_SOURCE / components.length));
  const pieces = components.flatMap((component) => {
    const onMultiple = onNyquistAtStage(component, path);
    return foldThrough(component.lowHz, component.highHz, path.ratesHz, limit).map((piece): TracedPiece => {
      const strongest = strongestOf(path, piece, entersAtSensor);
      return { component, onNyquistAtStage: onMultiple, piece, strongest };
    });
  });
  return note(path, TRACED, { source, entersAtSensor, pieces });
}

function arrivalOf(
  source: Source,
  { component, onNyquistAtStage, piece, strongest }: TracedPiece,
  entersAtSensor: boolean,
  componentDb: number,
  levelKnown: boolean,
  chain: Chain,
): Arrival {
  const slackHz = slackOf(piece, chain.path.clockTolerance);
  const landing = landingIn(piece, chain.bandLowHz - slackHz, chain.bandHighHz + slackHz);
  const isWhole = !landing || (landing.from <= 0 && landing.to >= 1) || piece.collapsed;
  const { attenuationDb, filtersDb, atHz } = isWhole
    ? strongest
    : strongestOf(chain.path, piece, entersAtSensor, landing.from, landing.to);
  const level = componentDb - attenuationDb;
  const folded = piece.foldsAtStage !== null;
  const inBand = landing !== undefined;
  return {
    source,
    component: component.label,
    trueLowHz: piece.trueLowHz,
    trueHighHz: piece.trueHighHz,
    recordedLowHz: piece.recordedLowHz,
    recordedHighHz: piece.recordedHighHz,
    recordedSlackHz: slackHz,
    level,
    attenuationDb: filtersDb,
    atHz,
    folded,
    foldsAtStage: piece.foldsAtStage,
    mirrored: piece.mirrored,
    inBand,
    overLimit: folded && inBand && level > chain.foldLimit + LEVEL_ROUNDING_DB,
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
  if (piece.collapsed) return piece.trueHighHz * clockTolerance;
  const foldedAboutHz = piece.mirrored
    ? piece.trueLowHz + piece.recordedHighHz
    : Math.abs(piece.trueLowHz - piece.recordedLowHz);
  return foldedAboutHz * clockTolerance;
}

/** Where an arrival is recorded at the point of its level. */
export function recordedAtHz(arrival: Arrival): number {
  const { trueLowHz, recordedLowHz, recordedHighHz, mirrored, atHz } = arrival;
  const along = atHz - trueLowHz;
  const hz = mirrored ? recordedHighHz - along : recordedLowHz + along;
  return Math.min(Math.max(hz, recordedLowHz), recordedHighHz);
}

/** The part of a piece that is recorded within a range, along its true frequency from 0 to 1. */
function landingIn(
  piece: FoldedPiece,
  lowHz: number,
  highHz: number,
): { readonly from: number; readonly to: number } | undefined {
  const { recordedLowHz, recordedHighHz, mirrored } = piece;
  const start = Math.max(recordedLowHz, lowHz);
  const end = Math.min(recordedHighHz, highHz);
  if (start > end) return undefined;
  const width = recordedHighHz - recordedLowHz;
  if (width === 0) return { from: 0, to: 1 };
  return mirrored
    ? { from: (recordedHighHz - end) / width, to: (recordedHighHz - start) / width }
    : { from: (start - recordedLowHz) / width, to: (end - recordedLowHz) / width };
}
