import type { Chain } from '../chain/model.ts';
import { reachableRates } from '../chain/reachable.ts';
import { acceptanceOf } from '../checks/accepting.ts';
import type { Guard } from '../checks/channel-result.ts';
import { judgeModel } from '../checks/judge.ts';
import { rateText, sampledAt } from '../remedies/rates.ts';
import type { Channel } from '../rig/model.ts';
import { rateAmongWindows } from '../signal/bandpass.ts';
import { leastPulseRateHz } from '../signal/pulse-train.ts';
import type { Evaluation, JudgedChannel } from './evaluation.ts';

/** A rate that a channel could be sampled at, and what would then be found. */
export interface RateVerdict {
  readonly rateHz: number;
  /** The rate as the file would write it. */
  readonly text: string;
  readonly isToday: boolean;
  /** Nyquist frequency of the last stage over the band's top; 0 where the chain can't be known. */
  readonly margin: number;
  readonly errors: number;
  readonly warnings: number;
  /** The names of the gravest findings, at most three. */
  readonly worst: readonly string[];
}

/** Rates are looked for from the band's top to this multiple of it: beyond, a faster rate changes nothing but the disk. */
const HIGHEST_MULTIPLE = 32;
const MOST_RATES = 40;
const MOST_SEARCHED = 2000;
const SAME_RATE = 1e-9;

/** A check that fails on a made-up channel says nothing of it. */
const withoutFault: Guard = (_checkName, run, otherwise) => {
  try {
    return run();
  } catch {
    return otherwise;
  }
};

/**
 * The rates around a channel's band that its digitizer can make, ascending, each judged as if the channel were
 * sampled at it, what is accepted left out; empty where the channel has no readable band.
 */
export function ratesAround({ result }: JudgedChannel, { environment, accepting }: Evaluation): readonly RateVerdict[] {
  const { chain } = result;
  const { pulses } = result.channel;
  const topHz = result.channel.band?.value.highHz ?? (pulses && leastPulseRateHz(pulses.value) / 2);
  if (topHz === undefined) return [];
  const todayHz = result.channel.rateHz?.value;
  // A channel whose rate is still to be written is judged at others all the same.
  const channel: Channel = {
    ...result.channel,
    complete: true,
    rateHz: result.channel.rateHz ?? { value: 2 * topHz, place: result.channel.place },
  };
  const ratesHz = chain?.isBandpass ? ratesForBandpass(channel, chain) : ratesForBaseband(channel, chain, topHz);
  const isToday = (rateHz: number): boolean =>
    todayHz !== undefined && Math.abs(rateHz - todayHz) <= todayHz * SAME_RATE;
  const shownHz =
    todayHz === undefined || ratesHz.some(isToday) ? ratesHz : [...ratesHz, todayHz].sort((a, b) => a - b);
  return shownHz.map((rateHz) => {
    const made = isToday(rateHz) ? channel : sampledAt(channel, rateHz);
    const judged = made && judgeModel(made, environment.severities, withoutFault);
    const findings = judged?.findings ?? [];
    const grave = findings.filter((finding) => finding.severity !== 'hint' && !acceptanceOf(finding, accepting));
    return {
      rateHz,
      text: rateText(channel, rateHz),
      isToday: isToday(rateHz),
      margin: judged?.chain?.margin ?? 0,
      errors: grave.filter(({ severity }) => severity === 'error').length,
      warnings: grave.filter(({ severity }) => severity === 'warning').length,
      worst: [...new Set(grave.map(({ check }) => check))].slice(0, 3),
    };
  });
}

function ratesForBaseband(channel: Channel, chain: Chain | undefined, topHz: number): readonly number[] {
  // A chain that decimates samples faster than its record: the least rate that leaves the band below Nyquist at its end.
  const decimation = chain ? chain.stages[0]!.rateHz / chain.stages.at(-1)!.rateHz : 1;
  const lowestHz = 2 * topHz * Math.max(1, Math.min(decimation, HIGHEST_MULTIPLE));
  return reachableRates(channel.digitizer, lowestHz, lowestHz * HIGHEST_MULTIPLE, MOST_RATES);
}

/** Those that keep a band whole that is folded on purpose: from twice its width to where it need not be folded. */
function ratesForBandpass(channel: Channel, { bandLowHz, bandHighHz, path }: Chain): readonly number[] {
  const band = { lowHz: bandLowHz, highHz: bandHighHz, rateTolerance: path.clockTolerance };
  const found = reachableRates(channel.digitizer, 2 * (bandHighHz - bandLowHz), 2 * bandHighHz, MOST_SEARCHED);
  return found.filter((rateHz) => rateAmongWindows(band, rateHz).kind === 'inside').slice(0, MOST_RATES);
}
