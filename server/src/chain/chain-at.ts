import type { Channel } from '../rig/model.ts';
import { levelScaleOf } from './level-scale.ts';
import type { Chain, SignalPath, Stage, StageFilter } from './model.ts';
import { exactRate } from './reachable.ts';
import { foldedBand } from './recorded-band.ts';
import type { PlannedFilter } from './signal-path.ts';
import { planOf, signalPathOf } from './signal-path.ts';

/**
 * A channel's signal chain, with every filter resolved at the rate that it works at; `undefined` for a channel whose
 * rate or band is missing.
 *
 * Where it is resampled to shaft angle, that is at the upper end of its speed: see `chainOf`.
 *
 * A written rate that the digitizer can make stands for the exact one; one that it can't make is taken as written.
 */
export function chainAt(channel: Channel): Chain | undefined {
  const { rateHz: rate } = channel;
  if (!channel.complete || !rate || !(rate.value > 0 && rate.value < Infinity)) return undefined;
  // Of a pulse train all of the record is used.
  const band = channel.band?.value ?? (channel.pulses && { lowHz: 0, highHz: rate.value / 2 });
  if (!band || !(band.highHz > 0)) return undefined;
  const exact = exactRate(channel.digitizer, rate);
  const rateHz = exact ?? rate.value;
  const plan = planOf(channel, rateHz);
  const path = signalPathOf(channel, plan, rateHz);
  const stages = plan.stages.map(({ kind, step, filters }, index): Stage => {
    const stageRateHz = path.ratesHz[index]!;
    const inputRateHz = index === 0 ? undefined : path.ratesHz[index - 1]!;
    return {
      rateHz: stageRateHz,
      nyquistHz: stageRateHz / 2,
      inputRateHz,
      kind,
      step,
      filters: resolved(filters, path, index),
    };
  });
  const scale = levelScaleOf(channel);
  const { lowHz, highHz } = band;
  const isBandpass = channel.sampling?.value === 'bandpass';
  const recordedBand = isBandpass ? foldedBand(lowHz, highHz, path.ratesHz) : { lowHz, highHz, mirrored: false };
  return {
    channel,
    stages,
    after: resolved(plan.after, path, stages.length),
    rateHz,
    ratesHz: path.ratesHz,
    sensor: path.sensor,
    scale,
    bandLowHz: lowHz,
    bandHighHz: highHz,
    recordedBand,
    isBandpass,
    margin: stages[stages.length - 1]!.nyquistHz / recordedBand.highHz,
    foldLimit: scale.foldLimit,
    levelUnit: scale.unit,
    path,
    rateReachable: exact !== undefined,
    understood: !lacksDigitizer(channel) && path.responses.every((stage) => stage.every((one) => one !== undefined)),
  };
}

/** Whether the channel names a digitizer that is not known, and with it what filters stand in its input. */
function lacksDigitizer({ digitizer, digitizerPlace }: Channel): boolean {
  return digitizer === undefined && digitizerPlace !== undefined;
}

/** The filters ahead of a stage; one that was not understood attenuates nothing and is left out. */
function resolved(filters: readonly PlannedFilter[], path: SignalPath, stage: number): readonly StageFilter[] {
  const found: StageFilter[] = [];
  for (let index = 0; index < filters.length; index++) {
    const response = path.responses[stage]![index];
    const { use, role } = filters[index]!;
    if (response) found.push({ use, role, response });
  }
  return found;
}
