import { LEVEL_ROUNDING_DB } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import type { ChannelSpectrum } from '../chain/spectrum.ts';
import { formatHz } from '../quantity/write.ts';
import { foldHz } from '../signal/folding.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOnStage } from './standing.ts';
import { levelFigures, levelText, stageText } from './wording.ts';

/** A fold this far below the line it lands on changes it by a tenth at most. */
const HARMLESS_DB = 20;

export const foldHides: Check<'channel'> = {
  name: 'fold-hides',
  kind: 'channel',
  severity: 'hint',
  finds: 'A folded line lands within one resolution of a line of a `wanted` source.',
  why: 'A line that has folded looks like any other. Where it lands beside a line that the test is after, or on it, the two are read as one, and the level that is read is of neither. It is said of lines that stand still, and where the fold is above the fold limit or no more than 20 dB below the line that it lands on.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
sources:
  bearing-tone: { frequency: 9.6 kHz, level: 20 mV, wanted: true }
  inverter: { frequency: 16 kHz, level: 4 mV }
channels:
  bearing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    undeclared: -90 dBFS
    spectrum: { lines: 800 }
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
sources:
  bearing-tone: { frequency: 9.6 kHz, level: 20 mV, wanted: true }
  # 15.98 kHz is recorded at 9.62 kHz, more than one line of 12.5 Hz away.
  inverter: { frequency: 15.98 kHz, level: 4 mV }
channels:
  bearing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    undeclared: -90 dBFS
    spectrum: { lines: 800 }
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling: recorded(f) = |f - rate round(f / rate)|.',
    '20 dB, a tenth: common practice, no source.',
  ],
  run(view) {
    const { spectrum, chain, channel } = view;
    if (!spectrum || !chain.understood || !channel.heard.some(({ source }) => source.wanted)) return SAYS_NOTHING;
    return hidden(view, spectrum);
  },
};

/** A line that stands still in the record. */
interface StillLine {
  readonly arrival: Arrival;
  readonly hz: number;
}

interface Hiding {
  readonly fold: StillLine;
  readonly wanted: StillLine;
}

function hidden({ arrivals, chain }: ChannelView, spectrum: ChannelSpectrum): readonly Said[] {
  const still = stillLines(arrivals, chain);
  const wanted = still.filter(({ arrival }) => arrival.source.wanted && !arrival.folded);
  if (wanted.length === 0) return SAYS_NOTHING;
  wanted.sort((one, other) => one.hz - other.hz);
  const worst: Hiding[] = [];
  for (const fold of still) {
    if (!fold.arrival.folded) continue;
    const nearest = nearestOf(wanted, fold.hz);
    if (Math.abs(nearest.hz - fold.hz) > spectrum.record.resolutionHz || !isToBeSaid(fold, nearest, chain)) continue;
    const { source, foldsAtStage, level } = fold.arrival;
    const same = worst.findIndex(
      (one) => one.fold.arrival.source === source && one.fold.arrival.foldsAtStage === foldsAtStage,
    );
    if (same < 0) worst.push({ fold, wanted: nearest });
    else if (level > worst[same]!.fold.arrival.level) worst[same] = { fold, wanted: nearest };
  }
  return worst.map((hiding) => saidOf(hiding, chain, spectrum));
}

function stillLines(arrivals: readonly Arrival[], { ratesHz }: Chain): readonly StillLine[] {
  return arrivals.flatMap((arrival) =>
    arrival.inBand && arrival.nominalHz !== undefined
      ? [{ arrival, hz: ratesHz.reduce(foldHz, arrival.nominalHz) }]
      : [],
  );
}

/** Of lines in ascending order, the one nearest to a frequency. */
function nearestOf(lines: readonly StillLine[], hz: number): StillLine {
  let low = 0;
  let high = lines.length - 1;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (lines[middle]!.hz < hz) low = middle + 1;
    else high = middle;
  }
  const above = lines[low]!;
  const below = lines[low - 1];
  return below && hz - below.hz < Math.abs(above.hz - hz) ? below : above;
}

function isToBeSaid({ arrival: fold }: StillLine, { arrival: wanted }: StillLine, { foldLimit }: Chain): boolean {
  if (fold.level > foldLimit + LEVEL_ROUNDING_DB) return true;
  return fold.levelKnown && wanted.levelKnown && fold.level >= wanted.level - HARMLESS_DB;
}

function saidOf({ fold, wanted }: Hiding, chain: Chain, { record }: ChannelSpectrum): Said {
  const { source, component, level, levelKnown, nominalHz, atHz } = fold.arrival;
  const stage = fold.arrival.foldsAtStage ?? 1;
  const where = stageText(chain, stage);
  const standing = standingOnStage(chain, stage);
  const target = wanted.arrival;
  const assumed = levelKnown ? '' : ' Its level is not known; full scale is assumed.';
  const against = target.levelKnown ? ` against ${levelText(target.level, chain)}` : '';
  return {
    about: source.name,
    stage,
    message: `\`${target.source.name}\` (${target.component} at ${formatHz(wanted.hz)}) will be read together with \`${source.name}\`, whose ${component} at ${formatHz(nominalHz ?? atHz)} is recorded at ${formatHz(fold.hz)}, within one line of ${formatHz(record.resolutionHz)}: ${levelText(level, chain)}${against}.${where === '' ? '' : ` It folds ${where}.`}${assumed}`,
    place: standing.place,
    related: [
      ...standing.related,
      { place: source.place, message: `\`${source.name}\` is declared here.` },
      { place: target.source.place, message: `\`${target.source.name}\` is declared here.` },
    ],
    figures: {
      recordedHz: fold.hz,
      wantedHz: wanted.hz,
      resolutionHz: record.resolutionHz,
      ...levelFigures(level, chain),
      stage,
    },
    excess: level,
  };
}
