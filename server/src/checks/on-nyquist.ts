import { LEVEL_ROUNDING_DB } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { recordedPointHz } from '../chain/on-nyquist.ts';
import { formatHz } from '../quantity/write.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOnStage } from './standing.ts';
import { levelFigures, levelText, rateText, stageText } from './wording.ts';

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
  let worst: Arrival[] | undefined;
  for (const arrival of arrivals) {
    if (arrival.onNyquistAtStage === null || !isToBeSaid(arrival, chain)) continue;
    worst ??= [];
    const { source, onNyquistAtStage, level } = arrival;
    const same = worst.findIndex((one) => one.source === source && one.onNyquistAtStage === onNyquistAtStage);
    if (same < 0) worst.push(arrival);
    else if (level > worst[same]!.level) worst[same] = arrival;
  }
  return worst?.map((arrival) => saidOf(arrival, chain)) ?? SAYS_NOTHING;
}

/** Above the fold limit, and recorded in the band, or near a point that is in the band. */
function isToBeSaid({ level, inBand, nominalHz, onNyquistAtStage }: Arrival, chain: Chain): boolean {
  if (level <= chain.foldLimit + LEVEL_ROUNDING_DB) return false;
  if (inBand || nominalHz === undefined || onNyquistAtStage === null) return inBand;
  const pointHz = recordedPointHz(nominalHz, onNyquistAtStage, chain.ratesHz);
  return pointHz >= chain.bandLowHz && pointHz <= chain.bandHighHz;
}

function saidOf(worst: Arrival, chain: Chain): Said {
  const { source, component, level, levelKnown, atHz } = worst;
  const stage = worst.onNyquistAtStage ?? 1;
  const nominalHz = worst.nominalHz ?? atHz;
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
