import { arrivalsOf } from '../chain/arrivals.ts';
import { filterCurveCharacters } from '../picture/filter-curve-characters.ts';
import { decibelsOff, filterCurveModel } from '../picture/filter-curve-model.ts';
import { filterCurveSvg } from '../picture/filter-curve-svg.ts';
import type { FilterPlace } from '../picture/filter-place.ts';
import { inputRateOf } from '../picture/filter-place.ts';
import { formatHz } from '../quantity/write.ts';
import type { Filter } from '../rig/model.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import type { ClientAbilities } from './client-abilities.ts';
import { filterDelayWords } from './delay-words.ts';
import {
  codeMarkdown,
  drawingMarkdown,
  MOST_HOVER_CHARACTERS,
  pictureMarkdown,
  tableMarkdown,
} from './picture-markdown.ts';
import { filterWords } from './things.ts';

/**
 * A filter's curve and what it takes off at the frequencies that matter, as seen from the channel under the pointer,
 * or from the first channel that uses it.
 *
 * A picture comes first, since editors show no more than the top of a long hover; a drawing stands under its headline.
 */
export function filterMarkdown(
  filter: Filter,
  evaluation: Evaluation,
  channel: JudgedChannel | undefined,
  abilities: ClientAbilities,
): string {
  const words = `**${codeMarkdown(filter.name)}** · ${filterWords(filter)}`;
  const place = firstPlace(filter, channel ? [channel] : evaluation.channels);
  if (!place) return `${words}\n\nNo channel uses it.`;
  const head = `${words} · in ${codeMarkdown(place.chain.channel.name)}`;
  const delay = filterDelayWords(place);
  const rows = tableMarkdown(['at', 'what', 'takes off'], rowsOf(place));
  const table = delay === undefined ? rows : `${rows}\n\n${delay}`;
  const curve = filterCurveModel(place, arrivalsOf(place.chain));
  const picture = abilities.showsPictures
    ? pictureMarkdown(filterCurveSvg(curve, abilities.theme), `${curve.title}. ${curve.description}`)
    : '';
  const fits = picture.length <= MOST_HOVER_CHARACTERS - head.length - table.length - 100;
  if (picture !== '' && fits) return [picture, head, table].join('\n\n');
  return [head, drawingMarkdown(filterCurveCharacters(curve, { ascii: false })), table].join('\n\n');
}

function firstPlace(filter: Filter, channels: readonly JudgedChannel[]): FilterPlace | undefined {
  for (const { result } of channels) {
    const { chain } = result;
    if (!chain) continue;
    for (const [stage, filters] of [...chain.stages.map((one) => one.filters), chain.after].entries()) {
      const found = filters.find(({ use }) => use?.filter === filter);
      if (found) return { chain, filter: found, stage };
    }
  }
  return undefined;
}

/** The frequencies that matter: the band's ends, the Nyquist frequency behind the filter, and the first fold into the band. */
function rowsOf(place: FilterPlace): readonly (readonly string[])[] {
  const { chain, filter, stage } = place;
  const inputRateHz = inputRateOf(place);
  // Behind the last stage there is no sampling: the rate stays.
  const rateHz = chain.ratesHz[stage] ?? chain.ratesHz.at(-1)!;
  const points: readonly (readonly [hz: number, what: string])[] = [
    [chain.bandLowHz, "the band's bottom"],
    [chain.bandHighHz, "the band's top"],
    [rateHz / 2, 'the Nyquist frequency behind it'],
    [rateHz - chain.bandHighHz, "the first that folds onto the band's top"],
    [rateHz, 'the rate behind it'],
  ];
  return points
    .filter(([hz]) => hz >= 0 && (inputRateHz === undefined || hz <= inputRateHz / 2))
    .map(([hz, what]) => [formatHz(hz), what, decibelsOff(filter.response.attenuationDb(hz))]);
}
