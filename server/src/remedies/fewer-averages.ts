import { mostAverages } from '../chain/run-averages.ts';
import { formatQuantity } from '../quantity/write.ts';
import { effectiveAverages, type SpectrumSettings, totalTimeS } from '../signal/spectrum-plan.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import type { Search } from './search.ts';
import { cured } from './search.ts';
import { inPlaceOf, spectrumNow, spectrumValue, withSpectrum } from './spectrum-edit.ts';

export const fewerAverages: RemedyDefinition = {
  name: 'fewer-averages',
  kind: 'setting',
  finds: 'The most averages that there is time for.',
  why: 'Fewer averages take less time, and leave more scatter: the random error of a spectrum falls with the square root of their number.',
  answers: ['record-too-long'],
  search: searchFewer,
};

function searchFewer(search: Search): readonly Proposal[] {
  const { channel, context } = search;
  const today = spectrumNow(search);
  const { run } = context.environment;
  const most = today && run && mostAverages(today, run);
  if (!channel || !today || most === undefined || most < 1 || most >= today.settings.averages) return [];
  const { averages } = today.spectrum;
  // What is said of the run is for the proof to judge: here the channel by itself is.
  if (!cured(search, withSpectrum(channel, { averages: inPlaceOf(averages, most, channel) }))) return [];
  const edited = spectrumValue(search, 'averages', String(most));
  if (!edited) return [];
  const time = formatQuantity(totalTimeS(today.record.recordS, today.settings.overlap, most), 'time', 4);
  const error = `${errorText({ ...today.settings, averages: most })} instead of ${errorText(today.settings)}`;
  return [
    {
      does: `Average ${most} instead of ${today.settings.averages}`,
      outcome: `${time}, random error ${error}`,
      ...edited,
    },
  ];
}

function errorText({ window, overlap, averages }: SpectrumSettings): string {
  return formatQuantity(1 / Math.sqrt(effectiveAverages(window, overlap, averages)), 'ratio', 3);
}
