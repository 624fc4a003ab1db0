import { mostAverages } from '../chain/run-averages.ts';
import { type ChannelSpectrum, spectrumOf } from '../chain/spectrum.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Channel, Given, Run, Spectrum } from '../rig/model.ts';
import { totalTimeS } from '../signal/spectrum-plan.ts';
import { type Check, type RigView, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import { standingOn } from './standing.ts';

export const recordTooLong: Check<'rig'> = {
  name: 'record-too-long',
  kind: 'rig',
  severity: 'warning',
  finds: 'The records that a spectrum is averaged over do not fit in what is recorded.',
  why: 'An average over more records than there are is cut short: the spectrum scatters more than was planned, or the analysis refuses. Records that overlap take less time. Where records are triggered, each of them has to hold a record of the spectrum, and all of them together the averages.',
  shows: `rig: Fan bearing
run: { duration: 10 s }
channels:
  bearing:
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    undeclared: -80 dBFS
    spectrum: { record: 0.8 s, averages: 13 }
`,
  clean: `rig: Fan bearing
run: { duration: 10.4 s }
channels:
  bearing:
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    undeclared: -80 dBFS
    spectrum: { record: 0.8 s, averages: 13 }
`,
  sources: ['Arithmetic: record x (1 + (averages - 1) x (1 - overlap)).'],
  run: ({ environment: { run }, channels }: RigView) => {
    if (!run) return SAYS_NOTHING;
    const said: SaidOfRig[] = [];
    // Most channels have one spectrum and one rate from the defaults: what fits for one fits for the next.
    let fitting: { readonly spectrum: Spectrum; readonly rateHz: number } | undefined;
    for (const { result } of channels) {
      const { channel, chain } = result;
      if (!channel.spectrum || !chain) continue;
      const rateHz = chain.ratesHz[chain.ratesHz.length - 1]!;
      if (fitting?.spectrum === channel.spectrum.value && fitting.rateHz === rateHz) continue;
      const spectrum = spectrumOf(chain);
      const one = spectrum && overlong(channel, spectrum, run);
      if (one) said.push(one);
      else fitting = { spectrum: channel.spectrum.value, rateHz };
    }
    return said;
  },
};

function overlong(channel: Channel, spectrum: ChannelSpectrum, run: Run): SaidOfRig | undefined {
  const most = mostAverages(spectrum, run);
  if (most === undefined || spectrum.settings.averages <= most) return undefined;
  const { durationS, records, recordS } = run;
  if (records && recordS) return overTriggered(channel, spectrum, most, records.value, recordS);
  return durationS && overDuration(channel, spectrum, most, durationS);
}

function overDuration(channel: Channel, spectrum: ChannelSpectrum, most: number, durationS: Given<number>): SaidOfRig {
  const { settings, record } = spectrum;
  const totalS = totalTimeS(record.recordS, settings.overlap, settings.averages);
  const time = timeText(durationS.value);
  const what =
    settings.averages === 1
      ? `A record of ${timeText(record.recordS)} will not fit in the ${time} that are recorded.`
      : `${settings.averages} averages will not fit in the ${time} that are recorded: with records of ${timeText(record.recordS)} they take ${timeText(totalS)}.`;
  return saidOf(channel, spectrum, most > 0, what, durationS, { totalS, recordedS: durationS.value });
}

function overTriggered(
  channel: Channel,
  spectrum: ChannelSpectrum,
  most: number,
  records: number,
  recordS: Given<number>,
): SaidOfRig {
  const { settings, record } = spectrum;
  const time = timeText(recordS.value);
  const what =
    most === 0
      ? `A record of ${timeText(record.recordS)} will not fit in the ${time} of a triggered record.`
      : `${settings.averages} averages will not fit in ${records} triggered records of ${time}: at ${timeText(record.recordS)} each, ${most} do.`;
  const totalS = most === 0 ? record.recordS : (recordS.value * settings.averages) / most;
  return saidOf(channel, spectrum, most > 0, what, recordS, { totalS, recordedS: recordS.value });
}

/** It is the averages that are too many, or else the record itself that is too long. */
function saidOf(
  channel: Channel,
  { spectrum }: ChannelSpectrum,
  isAveraged: boolean,
  message: string,
  limit: Given<number>,
  figures: { readonly totalS: number; readonly recordedS: number },
): SaidOfRig {
  const standing = standingOn(channel, (isAveraged ? spectrum.averages : undefined) ?? spectrum.length);
  return {
    channel: channel.name,
    message,
    place: standing.place,
    related: [...standing.related, { place: limit.place, message: 'What is recorded stands here.' }],
    figures,
    excess: figures.totalS / figures.recordedS,
  };
}

function timeText(seconds: number): string {
  return formatQuantity(seconds, 'time', 4);
}
