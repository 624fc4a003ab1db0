import { LEVEL_ROUNDING_DB } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { nearNyquistAtStage, recordedPointHz } from '../chain/on-nyquist.ts';
import { formatHz } from '../quantity/write.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOnStage } from './standing.ts';
import { levelFigures, levelText, rateText, stageText } from './wording.ts';

export const onNyquist: Check<'channel'> = {
  name: 'on-nyquist',
  kind: 'channel',
  severity: 'warning',
  finds: 'A source may stand exactly on a multiple of half the rate, where its phase decides how high it is recorded.',
  why: 'A tone at a multiple of half the rate is caught at the same one or two points of its cycle, sample after sample. By its phase it is recorded as anything from nothing to its full height: as an offset at even multiples, as an alternation at odd ones. A trial run may look clean and the next one not. Where a channel says how its spectrum is taken, the same goes for a tone that is within one line of such a point: it shares its lines with its own mirror image.',
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

/** An arrival and the first stage, from 1, at which it may stand on such a point. */
interface Standing {
  readonly arrival: Arrival;
  readonly stage: number;
  /** True where it is the lines of the spectrum that reach there, and not the source. */
  readonly withinOneLine: boolean;
}

function onNyquistOf({ arrivals, chain, spectrum }: ChannelView): readonly Said[] {
  if (!chain.understood) return SAYS_NOTHING;
  const lineHz = spectrum?.record.resolutionHz ?? 0;
  let worst: Standing[] | undefined;
  for (const arrival of arrivals) {
    const standing = standingOf(arrival, chain, lineHz);
    if (!standing || !isToBeSaid(standing, chain)) continue;
    worst ??= [];
    const same = worst.findIndex((one) => one.arrival.source === arrival.source && one.stage === standing.stage);
    if (same < 0) worst.push(standing);
    else if (arrival.level > worst[same]!.arrival.level) worst[same] = standing;
  }
  return worst?.map((standing) => saidOf(standing, chain, lineHz)) ?? SAYS_NOTHING;
}

function standingOf(arrival: Arrival, chain: Chain, lineHz: number): Standing | undefined {
  const { onNyquistAtStage, nominalHz, source } = arrival;
  if (onNyquistAtStage !== null) return { arrival, stage: onNyquistAtStage, withinOneLine: false };
  if (lineHz === 0 || nominalHz === undefined) return undefined;
  // Within one line of its own mirror image a tone adds to it or takes from it, by its phase, as on the point itself.
  const reachHz = Math.max(lineHz, nominalHz * source.tolerance);
  const stage = nearNyquistAtStage(nominalHz, reachHz, chain.path);
  return stage === null ? undefined : { arrival, stage, withinOneLine: true };
}

/** Above the fold limit, and recorded in the band, or near a point that is in the band. */
function isToBeSaid({ arrival: { level, inBand, nominalHz }, stage }: Standing, chain: Chain): boolean {
  if (level <= chain.foldLimit + LEVEL_ROUNDING_DB) return false;
  if (inBand || nominalHz === undefined) return inBand;
  const pointHz = recordedPointHz(nominalHz, stage, chain.ratesHz);
  const { lowHz, highHz } = chain.recordedBand;
  return pointHz >= lowHz && pointHz <= highHz;
}

function saidOf({ arrival, stage, withinOneLine }: Standing, chain: Chain, lineHz: number): Said {
  const { source, component, level, levelKnown, atHz } = arrival;
  const nominalHz = arrival.nominalHz ?? atHz;
  const { rateHz } = chain.stages[stage - 1]!;
  const standing = standingOnStage(chain, stage);
  const where = stageText(chain, stage);
  const assumed = levelKnown ? '' : ' Its level is not known here; full scale is assumed.';
  const stands = withinOneLine ? `is within one line (${formatHz(lineHz)}) of` : 'may stand on';
  return {
    about: source.name,
    stage,
    message: `\`${source.name}\` will be recorded anywhere from nothing to ${levelText(level, chain)}, by its phase, because its ${component} at ${formatHz(nominalHz)} ${stands} a multiple of half of ${rateText(rateHz)}${where === '' ? '' : `, ${where}`}. The fold limit is ${levelText(chain.foldLimit, chain)}.${assumed}`,
    place: standing.place,
    related: [...standing.related, { place: source.place, message: `\`${source.name}\` is declared here.` }],
    figures: { trueHz: nominalHz, ...levelFigures(level, chain), stage },
    excess: level - chain.foldLimit,
  };
}
