import { LEVEL_ROUNDING_DB } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import { foldHz } from '../signal/folding.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOnStage } from './standing.ts';
import { levelFigures, levelText, rateText, stageText } from './wording.ts';

/** Frequencies closer than this, relative to a rate, are the same. */
const ROUNDING = 1e-9;

export const onNyquist: Check<'channel'> = {
  name: 'on-nyquist',
  kind: 'channel',
  severity: 'warning',
  finds: 'A source may stand exactly on a multiple of half the rate, where its phase decides how high it is recorded.',
  why: 'A tone at a multiple of half the rate is caught at the same one or two points of its cycle, sample after sample. By its phase it is recorded as anything from nothing to its full height: as an offset at even multiples, as an alternation at odd ones. A trial run may look clean and the next one not.',
  shows: `rig: Greenhouse
digitizers:
  logger: { bits: 16, full-scale: ±1 V }
filters:
  input: { response: rc, order: 1, corner: 3 Hz }
sources:
  pick-up: { frequency: 50 Hz, tolerance: 1 %, level: 200 mV }
channels:
  bench:
    digitizer: logger
    rate: 10 Hz
    filter: input
    band: 0 Hz .. 0.5 Hz
`,
  clean: `rig: Greenhouse
digitizers:
  logger: { bits: 16, full-scale: ±1 V }
filters:
  input: { response: rc, order: 1, corner: 3 Hz }
sources:
  pick-up: { frequency: 50 Hz, tolerance: 1 %, level: 200 mV }
channels:
  bench:
    digitizer: logger
    # 50 Hz is recorded at 2 Hz, and 2.5 Hz and 0 Hz are out of its reach.
    rate: 12 Hz
    filter: input
    band: 0 Hz .. 0.5 Hz
`,
  sources: ['Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling.'],
  run: onNyquistOf,
};

function onNyquistOf({ arrivals, chain }: ChannelView): readonly Said[] {
  if (!chain.understood) return SAYS_NOTHING;
  let said: (Said & { readonly level: number })[] | undefined;
  let start = 0;
  while (start < arrivals.length) {
    const end = endOfComponent(arrivals, start);
    const found = onMultiple(arrivals, start, end, chain);
    start = end;
    if (!found) continue;
    said ??= [];
    const same = said.findIndex(({ about, stage }) => about === found.about && stage === found.stage);
    if (same < 0) said.push(found);
    else if (found.level > said[same]!.level) said[same] = found;
  }
  return said?.map(({ level: _, ...rest }) => rest) ?? SAYS_NOTHING;
}

/** Pieces of one component stand one after another. */
function endOfComponent(arrivals: readonly Arrival[], start: number): number {
  const { source, component } = arrivals[start]!;
  let end = start + 1;
  while (end < arrivals.length && arrivals[end]!.source === source && arrivals[end]!.component === component) end++;
  return end;
}

/** The first stage at which the component of the pieces `start .. end` may stand on a multiple of half the rate. */
function onMultiple(
  arrivals: readonly Arrival[],
  start: number,
  end: number,
  chain: Chain,
): (Said & { readonly level: number }) | undefined {
  const { nominalHz } = arrivals[start]!;
  // What sweeps over a range passes such a point and does not stay there.
  if (nominalHz === undefined) return undefined;
  const worst = highest(arrivals, start, end);
  if (worst.level <= chain.foldLimit + LEVEL_ROUNDING_DB) return undefined;
  const reachHz = Math.max(nominalHz - arrivals[start]!.trueLowHz, arrivals[end - 1]!.trueHighHz - nominalHz);
  let hz = nominalHz;
  for (let index = 0; index < chain.ratesHz.length; index++) {
    const rateHz = chain.ratesHz[index]!;
    const multiple = Math.round((2 * hz) / rateHz);
    const pointHz = (multiple * rateHz) / 2;
    // Whose tolerance spans whole zones stands on a multiple whatever the rate.
    const isNear =
      multiple >= 1 &&
      reachHz < rateHz / 2 &&
      Math.abs(hz - pointHz) <= reachHz + pointHz * chain.path.clockTolerance + ROUNDING * rateHz;
    if (isNear && concernsBand(arrivals, start, end, pointHz, index, chain)) {
      return { ...saidOf(worst, nominalHz, index + 1, chain), level: worst.level };
    }
    hz = foldHz(hz, rateHz);
  }
  return undefined;
}

function highest(arrivals: readonly Arrival[], start: number, end: number): Arrival {
  let worst = arrivals[start]!;
  for (let index = start + 1; index < end; index++) if (arrivals[index]!.level > worst.level) worst = arrivals[index]!;
  return worst;
}

/** Whether the component is recorded in the band, or the point itself is. */
function concernsBand(
  arrivals: readonly Arrival[],
  start: number,
  end: number,
  pointHz: number,
  stage: number,
  { ratesHz, bandLowHz, bandHighHz }: Chain,
): boolean {
  for (let index = start; index < end; index++) if (arrivals[index]!.inBand) return true;
  let hz = pointHz;
  for (let later = stage; later < ratesHz.length; later++) hz = foldHz(hz, ratesHz[later]!);
  return hz >= bandLowHz && hz <= bandHighHz;
}

function saidOf(worst: Arrival, nominalHz: number, stage: number, chain: Chain): Said {
  const { source, component, level, levelKnown } = worst;
  const { rateHz } = chain.stages[stage - 1]!;
  const standing = standingOnStage(chain, stage);
  const where = stageText(chain, stage);
  const assumed = levelKnown ? '' : ' Its level is not known here; full scale is assumed.';
  return {
    about: source.name,
    stage,
    message: `\`${source.name}\` will be recorded anywhere from nothing to ${levelText(level, chain)}, by its phase, because its ${component} at ${formatHz(nominalHz)} may stand on a multiple of half of ${rateText(rateHz)}${where === '' ? '' : `, ${where}`}. The fold limit is ${levelText(chain.foldLimit, chain)}.${assumed}`,
    place: standing.place,
    related: [...standing.related, { place: source.place, message: `\`${source.name}\` is declared here.` }],
    figures: { trueHz: nominalHz, ...levelFigures(level, chain), stage },
    excess: level - chain.foldLimit,
  };
}
