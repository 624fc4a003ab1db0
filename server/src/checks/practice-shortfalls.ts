import type { Chain, StageFilter } from '../chain/model.ts';
import { sagOver } from '../chain/sag.ts';
import { leastAttenuations } from '../chain/undeclared.ts';
import type { Requirement } from '../practices/model.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Channel, FollowedPractice } from '../rig/model.ts';
import type { ChannelView } from './check.ts';
import type { RelatedPlace } from './finding.ts';
import { type Standing, standingOn, standingOnFilters, standingOnStage } from './standing.ts';
import { supplyHzOf, supplyMatches } from './supply.ts';
import { differenceText, hzText, rateText } from './wording.ts';
import { isOwnFilter, worstFilter } from './worst-filter.ts';

/** How a channel misses one requirement of a practice. */
export interface PracticeShortfall {
  /** At the value that has to change. */
  readonly standing: Standing;
  /** What will happen, and the number, as the first half of a sentence. */
  readonly what: string;
  readonly figures: Readonly<Record<string, number | string>>;
  readonly excess: number;
}

type Of<Kind extends Requirement['kind']> = Extract<Requirement, { readonly kind: Kind }>;

/** Relative. */
const ROUNDING = 1e-9;
const ROUNDING_DB = 1e-9;

/** The search for the least attenuation is no more exact than this. */
const BOUND_ROUNDING_DB = 0.01;

/**
 * How a channel misses a requirement of a practice that it follows; `undefined` where it meets it, or where that can't
 * be known. Of a band that is folded on purpose no practice says how it goes with rates and filters.
 */
export function shortfallBy(
  view: ChannelView,
  followed: FollowedPractice,
  requirement: Requirement,
): PracticeShortfall | undefined {
  switch (requirement.kind) {
    case 'rate':
      return rateShortfall(view, requirement);
    case 'rate-over-band':
      return marginShortfall(view, requirement);
    case 'band':
      return bandShortfall(view, requirement);
    case 'pass':
      return passShortfall(view, followed, requirement);
    case 'fold':
      return foldShortfall(view, requirement);
    case 'order':
      return orderShortfall(view, followed, requirement);
    case 'record':
      return recordShortfall(view, followed, requirement);
    case 'window':
      return windowShortfall(view, requirement);
  }
}

function isBelow(value: number, least: number): boolean {
  return value < least * (1 - ROUNDING);
}

/** The rate at which the record is left. */
function recordRateHz({ ratesHz }: Chain): number {
  return ratesHz[ratesHz.length - 1]!;
}

function rateShortfall({ chain }: ChannelView, { leastHz }: Of<'rate'>): PracticeShortfall | undefined {
  const rateHz = recordRateHz(chain);
  if (!isBelow(rateHz, leastHz)) return undefined;
  return {
    standing: standingOnStage(chain, chain.stages.length),
    what: `The channel will be recorded at ${rateText(rateHz)}`,
    figures: { rateHz, leastHz },
    excess: leastHz / rateHz,
  };
}

function marginShortfall({ chain }: ChannelView, { least }: Of<'rate-over-band'>): PracticeShortfall | undefined {
  const rateHz = recordRateHz(chain);
  const { bandHighHz } = chain;
  if (chain.isBandpass || !isBelow(rateHz, least * bandHighHz)) return undefined;
  const times = rateHz / bandHighHz;
  return {
    standing: standingOnStage(chain, chain.stages.length),
    what: `The channel will be recorded at ${rateText(rateHz)}, ${formatQuantity(times, 'number', 3)} times the ${formatHz(bandHighHz)} that its band reaches to`,
    figures: { rateHz, bandHighHz, rateOverBand: times, leastRateOverBand: least, leastHz: least * bandHighHz },
    excess: least / times,
  };
}

function bandShortfall({ channel, chain }: ChannelView, { lowHz, highHz }: Of<'band'>): PracticeShortfall | undefined {
  const { bandLowHz, bandHighHz } = chain;
  const isTooHigh = lowHz !== undefined && isBelow(lowHz, bandLowHz);
  if (!isTooHigh && !isBelow(bandHighHz, highHz)) return undefined;
  return {
    standing: standingOn(channel, channel.band),
    what: `Only the band ${hzText(bandLowHz, bandHighHz)} will be used`,
    figures: { bandLowHz, bandHighHz, ...(lowHz === undefined ? {} : { dueLowHz: lowHz }), dueHighHz: highHz },
    excess: Math.max(highHz / bandHighHz, lowHz === undefined ? 0 : bandLowHz / lowHz),
  };
}

function passShortfall(
  { channel, chain }: ChannelView,
  followed: FollowedPractice,
  { lowHz, highHz, mostDb }: Of<'pass'>,
): PracticeShortfall | undefined {
  const { sagDb, sagAtHz } = sagOver(chain.path, lowHz, highHz);
  if (!chain.understood || chain.isBandpass || sagDb <= mostDb + ROUNDING_DB) return undefined;
  const worst = worstFilter(chain, lowHz, highHz);
  const digitizer = channel.digitizerPlace && { place: channel.digitizerPlace };
  const own = worst?.use && isOwnFilter(worst) ? worst.use : digitizer;
  const standing = standingOn(channel, own ?? followed);
  return {
    standing: { ...standing, related: [...standing.related, ...takesMost(channel, worst)] },
    what:
      sagDb < Infinity
        ? `What is at ${formatHz(sagAtHz)} will be recorded ${differenceText(sagDb)} too low`
        : `How high anything up to ${formatHz(highHz)} will be recorded is not promised by the filters`,
    figures: { ...(Number.isFinite(sagDb) ? { sagDb } : {}), atHz: sagAtHz, mostDb },
    excess: sagDb - mostDb,
  };
}

function takesMost({ digitizer }: Channel, worst: StageFilter | undefined): readonly RelatedPlace[] {
  if (worst?.role === 'low-corner' && digitizer?.lowCornerHz)
    return [{ place: digitizer.lowCornerHz.place, message: 'The AC coupling takes most of it.' }];
  const filter = worst?.use?.filter;
  if (!filter) return [];
  return [{ place: filter.place, message: `${filter.name ? `\`${filter.name}\`` : 'This filter'} takes most of it.` }];
}

function foldShortfall({ chain }: ChannelView, { leastDb }: Of<'fold'>): PracticeShortfall | undefined {
  if (!chain.understood) return undefined;
  let found: { readonly stage: number; readonly attenuationDb: number; readonly atHz: number } | undefined;
  for (const [index, least] of leastAttenuations(chain).entries()) {
    // A modulator's own stage samples so far above the band that its filter is hardly ever the one in question.
    if (!least || chain.stages[index]!.kind === 'modulator') continue;
    if (!found || least.attenuationDb < found.attenuationDb) found = { stage: index + 1, ...least };
  }
  if (!found || found.attenuationDb >= leastDb - BOUND_ROUNDING_DB) return undefined;
  const { stage, attenuationDb, atHz } = found;
  return {
    standing: standingOnFilters(chain, stage),
    what: `What is at ${formatHz(atHz)} will fold into the band with ${attenuationDb < 0.05 ? 'nothing' : differenceText(attenuationDb)} taken off it`,
    figures: { atHz, attenuationDb, leastDb },
    excess: leastDb - attenuationDb,
  };
}

function orderShortfall(
  { channel, chain }: ChannelView,
  { mains }: FollowedPractice,
  { order }: Of<'order'>,
): PracticeShortfall | undefined {
  const supplyHz = supplyHzOf(mains);
  const { bandHighHz } = chain;
  if (supplyHz === undefined || !isBelow(bandHighHz, order * supplyHz)) return undefined;
  return {
    standing: standingOn(channel, channel.band),
    what: `The harmonic ${order} of the ${formatHz(supplyHz)} supply, at ${formatHz(order * supplyHz)}, will not be used, because the band ends at ${formatHz(bandHighHz)}`,
    figures: { order, supplyHz, bandHighHz, dueHighHz: order * supplyHz },
    excess: (order * supplyHz) / bandHighHz,
  };
}

/** A record is as long as is asked for when no whole number of samples would come nearer. */
function recordShortfall(
  { channel, chain, spectrum }: ChannelView,
  followed: FollowedPractice,
  { of }: Of<'record'>,
): PracticeShortfall | undefined {
  const due = of.filter(({ supplyHz }) => supplyMatches(followed.mains, supplyHz));
  const first = due[0];
  if (!first) return undefined;
  const dueS = first.cycles / first.supplyHz;
  if (!spectrum) {
    return {
      standing: standingOn(channel, followed),
      what: 'How long a record there will be behind each spectrum is not said, because the channel has no `spectrum`',
      figures: { dueS },
      excess: 1,
    };
  }
  const { recordS } = spectrum.record;
  const slackS = (0.5 + ROUNDING) / recordRateHz(chain);
  if (due.some(({ cycles, supplyHz }) => Math.abs(recordS - cycles / supplyHz) <= slackS)) return undefined;
  return {
    standing: standingOn(channel, spectrum.spectrum.length),
    what: `Each spectrum will come from a record of ${formatQuantity(recordS, 'time')}`,
    figures: { recordS, dueS },
    excess: Math.abs(Math.log(recordS / dueS)),
  };
}

/** Where nothing is said of spectra at all, that is told once, of their record. */
function windowShortfall({ channel, spectrum }: ChannelView, { window }: Of<'window'>): PracticeShortfall | undefined {
  if (!spectrum || spectrum.settings.window === window) return undefined;
  const said = spectrum.spectrum.window;
  return {
    standing: standingOn(channel, said ?? channel.spectrum),
    what: `The record will be weighted with the window \`${spectrum.settings.window}\`${said ? '' : ', as nothing else is said'}`,
    figures: { window: spectrum.settings.window, dueWindow: window },
    excess: 1,
  };
}
