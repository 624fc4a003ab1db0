import type { FrequencyRange, Source } from '../rig/model.ts';

/** One line of a source, or the range over which it may stand. */
export interface Component {
  /** `fundamental`, `harmonic 3`, `carrier`, `sideband +2`, `carrier x3`, `carrier x3 sideband -1`. */
  readonly label: string;
  /** With the source's tolerance. */
  readonly lowHz: number;
  readonly highHz: number;
  /** Without it, where nothing else makes it a range: what a text would say. */
  readonly nominalHz: number | undefined;
  /** The multiple whose level it goes by, from 1. */
  readonly harmonic: number;
  /** What it is below that, dB. */
  readonly belowDb: number;
}

/** Components of one source that are told apart; what is left stands as one range at the highest level of them. */
export const MOST_COMPONENTS = 4096;

/**
 * Components by the source they are of. A `Source` is never changed, so what is kept can't go out of date; it is kept
 * because every channel of a rig hears the same few sources.
 */
const expanded = new WeakMap<Source, readonly Component[]>();

/**
 * Everything that a source consists of: harmonics and sidebands, each a point or a range of true frequency. Noise has
 * no components.
 */
export function componentsOf(source: Source): readonly Component[] {
  const known = expanded.get(source);
  if (known) return known;
  const components = bounded(source, linesOf(source));
  expanded.set(source, components);
  return components;
}

type SimpleSource = Exclude<Source, { type: 'modulated' | 'broadband' }>;

function linesOf(source: Source): Iterable<Component> {
  if (source.type === 'broadband') return [];
  return source.type === 'modulated' ? modulated(source) : harmonics(source);
}

function* harmonics(source: SimpleSource): Generator<Component> {
  const fundamental = fundamentalOf(source);
  for (let multiple = 1; multiple <= source.harmonics; multiple++) {
    const label = multiple === 1 ? 'fundamental' : `harmonic ${multiple}`;
    yield component(label, multiple, 0, scaled(fundamental, multiple), source.tolerance);
  }
}

function fundamentalOf(source: SimpleSource): FrequencyRange {
  return source.type === 'tone' ? source.frequency.value : scaled(source.speed.value, source.order);
}

function* modulated(source: Extract<Source, { type: 'modulated' }>): Generator<Component> {
  const carrier = source.carrier.value;
  const modulation = source.modulation.value;
  for (let multiple = 1; multiple <= source.harmonics; multiple++) {
    const label = multiple === 1 ? 'carrier' : `carrier x${multiple}`;
    const prefix = multiple === 1 ? '' : `${label} `;
    const centre = scaled(carrier, multiple);
    yield component(label, multiple, 0, centre, source.tolerance);
    for (let pair = 1; pair <= source.sidebands; pair++) {
      const belowDb = pair * source.sidebandsFallDb;
      const offset = scaled(modulation, pair);
      const lower = { lowHz: centre.lowHz - offset.highHz, highHz: centre.highHz - offset.lowHz };
      const upper = { lowHz: centre.lowHz + offset.lowHz, highHz: centre.highHz + offset.highHz };
      // Each frequency of the source may be off by the tolerance, and the two by opposite amounts.
      const eitherWayHz = source.tolerance * (centre.highHz + offset.highHz);
      yield sideband(`${prefix}sideband -${pair}`, multiple, belowDb, lower, eitherWayHz);
      yield sideband(`${prefix}sideband +${pair}`, multiple, belowDb, upper, eitherWayHz);
    }
  }
}

function scaled({ lowHz, highHz }: FrequencyRange, factor: number): FrequencyRange {
  return { lowHz: lowHz * factor, highHz: highHz * factor };
}

function component(
  label: string,
  harmonic: number,
  belowDb: number,
  { lowHz, highHz }: FrequencyRange,
  tolerance: number,
): Component {
  const nominalHz = lowHz === highHz ? lowHz : undefined;
  return { label, harmonic, belowDb, nominalHz, lowHz: lowHz * (1 - tolerance), highHz: highHz * (1 + tolerance) };
}

/** A sideband below 0 Hz is one above it. */
function sideband(
  label: string,
  harmonic: number,
  belowDb: number,
  range: FrequencyRange,
  eitherWayHz: number,
): Component {
  const nominalHz = range.lowHz === range.highHz ? Math.abs(range.lowHz) : undefined;
  const low = range.lowHz - eitherWayHz;
  const high = range.highHz + eitherWayHz;
  const ends = { label, harmonic, belowDb, nominalHz };
  if (low >= 0) return { ...ends, lowHz: low, highHz: high };
  const highHz = Math.max(-low, high);
  return { ...ends, lowHz: high < 0 ? -high : 0, highHz };
}

/** The components that are told apart, and one that stands for all that are too many. */
function bounded(source: Source, components: Iterable<Component>): readonly Component[] {
  const told: Component[] = [];
  for (const next of components) {
    if (told.length === MOST_COMPONENTS - 1) return [...told, restFrom(next, source)];
    told.push(next);
  }
  return told;
}

/** Everything from a component on, as high as the highest of it. Only a modulated source has so many. */
function restFrom(first: Component, source: Source): Component {
  const label = `${first.label} and more`;
  const { harmonic } = first;
  if (source.type !== 'modulated') return { ...first, label };
  const carrier = source.carrier.value;
  const reachHz = source.sidebands * source.modulation.value.highHz;
  const range = {
    lowHz: harmonic * carrier.lowHz - reachHz,
    highHz: source.harmonics * carrier.highHz + reachHz,
  };
  const eitherWayHz = source.tolerance * range.highHz;
  return { ...sideband(label, harmonic, 0, range, eitherWayHz), nominalHz: undefined };
}
