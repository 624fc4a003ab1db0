import { type ChannelSpectrum, spectrumOf } from '../chain/spectrum.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import { planSpectrum, type SpectrumPlan } from '../signal/spectrum-plan.ts';
import { windowFigures } from '../signal/window-figures.ts';
import type { JudgedChannel } from '../workbench/evaluation.ts';
import { codeMarkdown, tableMarkdown } from './picture-markdown.ts';
import type { Pointed } from './tree-path.ts';

/** Whether a word belongs to the `spectrum` of a channel: the key itself, or anything in its map. */
export function spectrumIsMeant({ path, pair, on }: Pointed): boolean {
  // Ahead of it stand the section and the channel's name, which may be any.
  const key = path[2] ?? { kind: 'key', key: pair?.key.text };
  const isKeyOrInside = path.length > 2 || on === 'key';
  return path.length >= 2 && isKeyOrInside && key.kind === 'key' && key.key === 'spectrum';
}

/**
 * What a channel's spectrum takes and gives: its record, its lines, the time of its averages, how far they can be
 * trusted, and the figures of its window. `undefined` for a channel whose spectrum is not known.
 */
export function spectrumMarkdown({ result }: JudgedChannel): string | undefined {
  const { chain, channel } = result;
  const found = chain && spectrumOf(chain);
  const plan = found && planSpectrum(found.settings, chain.ratesHz.at(-1)!);
  if (!plan) return undefined;
  const head = `**spectrum** · ${codeMarkdown(channel.name)} · ${codeMarkdown(found.settings.window)}`;
  const rows = [...planRows(found, plan), ...windowRows(found, plan)];
  return `${head}\n\n${tableMarkdown(['what', 'how much', ''], rows)}`;
}

function planRows({ settings }: ChannelSpectrum, plan: SpectrumPlan): readonly (readonly string[])[] {
  const { averages, overlap } = settings;
  const independent = formatQuantity(plan.independentAverages, 'number', 3);
  return [
    ['record', timeText(plan.recordS), `${plan.recordSamples} samples`],
    ['resolution', formatHz(plan.resolutionHz), `${plan.lines} lines`],
    ['time', timeText(plan.totalS), averages === 1 ? '1 record' : `${averages} averages, overlap ${percent(overlap)}`],
    ['random error', percent(plan.randomError), `of a power spectrum; ${independent} independent averages`],
  ];
}

function windowRows({ settings, record }: ChannelSpectrum, plan: SpectrumPlan): readonly (readonly string[])[] {
  const figures = windowFigures(settings.window);
  const hz = (bins: number): string => formatHz(bins * record.resolutionHz, 4);
  const lines = (bins: number): string => `${bins.toFixed(2)} lines`;
  return [
    ['told apart from', formatHz(plan.leastSeparationHz, 4), `${lines(figures.bandwidth6DbBins)}, 6 dB bandwidth`],
    ['noise bandwidth', hz(figures.noiseBandwidthBins), lines(figures.noiseBandwidthBins)],
    ['scalloping', `${figures.scallopingLossDb.toFixed(2)} dB`, 'lost half-way between two lines'],
    ['highest side lobe', `${figures.highestSideLobeDb.toFixed(1)} dB`, sideLobesFall(figures.sideLobeFallDbPerOctave)],
  ];
}

function sideLobesFall(dbPerOctave: number): string {
  return `falling ${dbPerOctave.toFixed(0)} dB an octave`;
}

function timeText(seconds: number): string {
  return formatQuantity(seconds, 'time', 4);
}

function percent(fraction: number): string {
  return formatQuantity(fraction, 'ratio', 3);
}
