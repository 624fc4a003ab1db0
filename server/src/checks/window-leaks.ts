import { recordedAtHz } from '../chain/arrivals.ts';
import { placedLevel } from '../chain/level-scale.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import type { ChannelSpectrum } from '../chain/spectrum.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Place } from '../rig/place.ts';
import { windowFigures } from '../signal/window-figures.ts';
import { SHORTEST_RECORD_SAMPLES, sideLobeEnvelopeDb } from '../signal/window-leakage.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOn } from './standing.ts';
import { levelFigures, levelText } from './wording.ts';

/** What is covered near a line is the price of any window; from this part of the band on it is said. Our choice. */
const LEAST_PART = 0.1;

/** Offsets are found to this many lines. */
const OFFSET_BINS = 0.01;

export const windowLeaks: Check<'channel'> = {
  name: 'window-leaks',
  kind: 'channel',
  severity: 'hint',
  finds:
    "A strong line's side lobes may cover `resolve`, or the fold limit, over more than a tenth of the band beside the line itself.",
  why: 'A line that does not fall on a whole number of periods spreads over the whole spectrum: how far, and how high, depends on the window. Without one, side lobes fall by only 6 dB an octave, and what is small disappears under them even far from the line. Side lobes are taken at their highest, which a line half-way between two bins has.',
  shows: `rig: Gearbox
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
sources:
  mesh: { frequency: 620 Hz, level: 5 V }
channels:
  casing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 5.12 kHz
    band: 10 Hz .. 2 kHz
    fold-limit: -80 dBFS
    undeclared: -90 dBFS
    spectrum: { lines: 800, window: rectangle }
`,
  clean: `rig: Gearbox
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
sources:
  mesh: { frequency: 620 Hz, level: 5 V }
channels:
  casing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 5.12 kHz
    band: 10 Hz .. 2 kHz
    fold-limit: -80 dBFS
    undeclared: -90 dBFS
    spectrum: { lines: 800, window: hann }
`,
  sources: [
    'Harris, On the use of windows for harmonic analysis with the discrete Fourier transform, Proc. IEEE 1978: side lobes and how they fall.',
    'A tenth of the band: our choice, no source.',
  ],
  run(view) {
    const { spectrum, chain } = view;
    // A shorter record than that has side lobes that are not bounded here.
    const isLongEnough = spectrum !== undefined && spectrum.record.recordSamples >= SHORTEST_RECORD_SAMPLES;
    return isLongEnough && chain.understood ? leaks(view, spectrum) : SAYS_NOTHING;
  },
};

/** What a line covers beside itself. */
interface Covered {
  readonly arrival: Arrival;
  readonly hz: number;
  /** As far as this to either side. */
  readonly reachHz: number;
  /** Of the band, the main lobe left out. */
  readonly part: number;
}

/** A level that has to be seen anywhere in the band. */
interface Floor {
  readonly name: string;
  readonly level: number;
  readonly place: Place | undefined;
}

function leaks(view: ChannelView, spectrum: ChannelSpectrum): readonly Said[] {
  const { arrivals, chain } = view;
  const floor = floorOf(chain);
  const worst = worstCover(arrivals, chain, spectrum, floor.level);
  if (!worst || worst.part <= LEAST_PART) return SAYS_NOTHING;
  const { arrival, hz, reachHz, part } = worst;
  const { source, component, level } = arrival;
  const { window, length } = spectrum.spectrum;
  const standing = standingOn(view.channel, window ?? length);
  const percent = formatQuantity(part, 'ratio', 2);
  return [
    {
      about: source.name,
      message: `What is small will not be seen over ${percent} of the band: the side lobes of \`${source.name}\` (${component} at ${formatHz(hz)}, ${levelText(level, chain)}) may stand above ${floor.name} of ${levelText(floor.level, chain)} as far as ${formatHz(reachHz)} from it, with the window \`${spectrum.settings.window}\` and lines ${formatHz(spectrum.record.resolutionHz)} apart.`,
      place: standing.place,
      related: [
        ...standing.related,
        { place: source.place, message: `\`${source.name}\` is declared here.` },
        ...(floor.place ? [{ place: floor.place, message: `${floor.name} stands here.` }] : []),
      ],
      figures: { ...levelFigures(level, { ...chain, foldLimit: floor.level }), reachHz, part },
      excess: part,
    },
  ];
}

/** What has to be seen: the lower of `resolve` and the fold limit. */
function floorOf(chain: Chain): Floor {
  const { resolve, foldLimit } = chain.channel;
  const level = resolve && placedLevel(resolve.value, chain.scale);
  return resolve && level !== undefined && level < chain.foldLimit
    ? { name: '`resolve`', level, place: resolve.place }
    : { name: '`fold-limit`', level: chain.foldLimit, place: foldLimit?.place };
}

function worstCover(
  arrivals: readonly Arrival[],
  chain: Chain,
  spectrum: ChannelSpectrum,
  floorDb: number,
): Covered | undefined {
  let worst: Covered | undefined;
  const reaches = new Map<number, number>();
  for (const arrival of arrivals) {
    if (!arrival.inBand || !arrival.levelKnown || arrival.level <= floorDb) continue;
    const belowDb = floorDb - arrival.level;
    const known = reaches.get(belowDb) ?? reachBins(spectrum, belowDb);
    reaches.set(belowDb, known);
    const covered = coverOf(arrival, known, chain, spectrum);
    if (!worst || covered.part > worst.part) worst = covered;
  }
  return worst;
}

/** How far from a line its side lobes may still be above `belowDb` of it, in bins; no farther than the record goes. */
function reachBins({ settings, record }: ChannelSpectrum, belowDb: number): number {
  let covered = 0;
  let beyond = record.recordSamples / 2;
  if (sideLobeEnvelopeDb(settings.window, beyond) > belowDb) return beyond;
  while (beyond - covered > OFFSET_BINS) {
    const middle = (covered + beyond) / 2;
    if (sideLobeEnvelopeDb(settings.window, middle) > belowDb) covered = middle;
    else beyond = middle;
  }
  return covered;
}

function coverOf(arrival: Arrival, bins: number, chain: Chain, { settings, record }: ChannelSpectrum): Covered {
  const { lowHz, highHz } = chain.recordedBand;
  const hz = recordedAtHz(arrival, chain);
  const reachHz = bins * record.resolutionHz;
  const ownHz = windowFigures(settings.window).bandwidth6DbBins * record.resolutionHz;
  const below = Math.min(reachHz, hz - lowHz) - ownHz;
  const above = Math.min(reachHz, highHz - hz) - ownHz;
  const part = (Math.max(below, 0) + Math.max(above, 0)) / (highHz - lowHz);
  return { arrival, hz, reachHz, part };
}
