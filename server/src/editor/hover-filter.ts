import type { Chain, StageFilter } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import type { Filter } from '../rig/model.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import type { ClientAbilities } from './client-abilities.ts';
import { codeMarkdown, tableMarkdown } from './picture-markdown.ts';
import { filterWords } from './things.ts';

/** A filter as it stands in one channel's chain. */
interface PlacedFilter {
  readonly chain: Chain;
  readonly filter: StageFilter;
  /** Half the rate of what the filter is given; `undefined` ahead of the converter. */
  readonly inputNyquistHz: number | undefined;
  /** The rate behind the filter, and so where its band folds from. */
  readonly rateHz: number;
}

/**
 * A filter's curve and what it takes off at the frequencies that matter, as seen from the channel under the pointer,
 * or from the first channel that uses it.
 */
export function filterMarkdown(
  filter: Filter,
  evaluation: Evaluation,
  channel: JudgedChannel | undefined,
  _abilities: ClientAbilities,
): string {
  const head = `**${codeMarkdown(filter.name)}** · ${filterWords(filter)}`;
  const placed = firstPlaced(filter, channel ? [channel] : evaluation.channels);
  if (!placed) return `${head}\n\nNo channel uses it.`;
  const table = tableMarkdown(['at', 'what', 'takes off'], rowsOf(placed));
  return `${head} · in ${codeMarkdown(placed.chain.channel.name)}\n\n${table}`;
}

function firstPlaced(filter: Filter, channels: readonly JudgedChannel[]): PlacedFilter | undefined {
  for (const { result } of channels) {
    const { chain } = result;
    if (!chain) continue;
    for (const stage of chain.stages) {
      const found = stage.filters.find(({ use }) => use?.filter === filter);
      if (!found) continue;
      const inputNyquistHz = stage.inputRateHz === undefined ? undefined : stage.inputRateHz / 2;
      return { chain, filter: found, inputNyquistHz, rateHz: stage.rateHz };
    }
    const after = chain.after.find(({ use }) => use?.filter === filter);
    const rateHz = chain.stages.at(-1)!.rateHz;
    if (after) return { chain, filter: after, inputNyquistHz: rateHz / 2, rateHz };
  }
  return undefined;
}

/** The frequencies that matter: the band's ends, the Nyquist frequency behind the filter, and the first fold into the band. */
function rowsOf({ chain, filter, inputNyquistHz, rateHz }: PlacedFilter): readonly (readonly string[])[] {
  const points: readonly (readonly [hz: number, what: string])[] = [
    [chain.bandLowHz, "the band's bottom"],
    [chain.bandHighHz, "the band's top"],
    [rateHz / 2, 'the Nyquist frequency behind it'],
    [rateHz - chain.bandHighHz, "the first that folds onto the band's top"],
    [rateHz, 'the rate behind it'],
  ];
  return points
    .filter(([hz]) => hz >= 0 && (inputNyquistHz === undefined || hz <= inputNyquistHz))
    .map(([hz, what]) => [formatHz(hz), what, decibels(filter.response.attenuationDb(hz))]);
}

function decibels(attenuationDb: number): string {
  return Number.isFinite(attenuationDb) ? `${attenuationDb.toFixed(1)} dB` : 'everything';
}
