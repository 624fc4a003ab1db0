import { arrivalsOf } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { aliasMapCharacters } from '../picture/alias-map-characters.ts';
import { aliasMapModel } from '../picture/alias-map-model.ts';
import { aliasMapSvg } from '../picture/alias-map-svg.ts';
import { formatHz } from '../quantity/write.ts';
import type { JudgedChannel } from '../workbench/evaluation.ts';
import { windowsText } from '../workbench/rate-words.ts';
import type { ClientAbilities } from './client-abilities.ts';
import { chainDelayWords } from './delay-words.ts';
import { noiseMarkdown } from './hover-noise.ts';
import {
  codeMarkdown,
  drawingMarkdown,
  MOST_HOVER_CHARACTERS,
  pictureMarkdown,
  tableMarkdown,
} from './picture-markdown.ts';

const MOST_ROWS = 12;

/**
 * The alias map of a channel and what arrives, as Markdown; why there is none, where its chain can't be known.
 *
 * A picture comes first, since editors show no more than the top of a long hover; a drawing stands under its headline.
 */
export function mapMarkdown(judged: JudgedChannel, abilities: ClientAbilities): string {
  const { chain, channel, findings } = judged.result;
  const name = codeMarkdown(channel.name);
  if (!chain) return `${name} has no alias map yet: ${findings[0]?.message ?? 'its rate or its band is missing.'}`;
  const arrivals = arrivalsOf(chain);
  const head = headline(chain, judged);
  const below = [windowsText(chain), delaySentence(chain), arrivalsTable(chain, arrivals), noiseMarkdown(chain)];
  const table = below.filter((part) => part !== undefined).join('\n\n');
  const room = MOST_HOVER_CHARACTERS - head.length - table.length - 100;
  const model = aliasMapModel(chain, arrivals);
  const picture = abilities.showsPictures
    ? pictureMarkdown(aliasMapSvg(model, { theme: abilities.theme, size: 'compact' }), model.description)
    : '';
  if (picture !== '' && picture.length <= room) return [picture, head, table].join('\n\n');
  return [head, drawingMarkdown(aliasMapCharacters(model, { ascii: false })), table].join('\n\n');
}

function headline(chain: Chain, judged: JudgedChannel): string {
  const last = chain.stages.at(-1)!;
  const counts = judged.result.findings.length;
  const verdict = counts === 0 ? 'clean' : counts === 1 ? '1 finding' : `${counts} findings`;
  return `**${codeMarkdown(chain.channel.name)}** · Nyquist frequency ${formatHz(last.nyquistHz)} · ${bandText(chain)} · margin ${chain.margin.toFixed(2)} · ${verdict}`;
}

function delaySentence(chain: Chain): string | undefined {
  const words = chainDelayWords(chain);
  return words && `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;
}

function bandText({ isBandpass, bandHighHz, recordedBand }: Chain): string {
  if (!isBandpass) return `band to ${formatHz(bandHighHz)}`;
  const { lowHz, highHz, mirrored } = recordedBand;
  return `band recorded at ${formatHz(lowHz)} .. ${formatHz(highHz)}${mirrored ? ', upside down' : ''}`;
}

function arrivalsTable(chain: Chain, arrivals: readonly Arrival[]): string {
  if (arrivals.length === 0) return nothingArrives(chain);
  const unit = chain.levelUnit === 'dbfs' ? 'dBFS' : 'dB';
  const ordered = [...arrivals].sort(byWeight);
  const rows = ordered
    .slice(0, MOST_ROWS)
    .map((arrival) => [
      `${codeMarkdown(arrival.source.name)} ${arrival.component}`,
      spanText(arrival.trueLowHz, arrival.trueHighHz),
      arrival.foldsAtStage === null ? 'as it is' : `folds at stage ${arrival.foldsAtStage}`,
      spanText(arrival.recordedLowHz, arrival.recordedHighHz),
      `${arrival.level.toFixed(1)}${arrival.levelKnown ? '' : ' (assumed)'}`,
      againstLimit(arrival, chain),
    ]);
  const table = tableMarkdown(
    ['arrives', 'true', 'how', 'recorded', unit, `limit ${chain.foldLimit.toFixed(1)}`],
    rows,
  );
  return ordered.length > MOST_ROWS
    ? `${table}\n\n${ordered.length - MOST_ROWS} more, all quieter or outside the band.`
    : table;
}

function nothingArrives({ channel }: Chain): string {
  return channel.heard.length === 0
    ? 'Nothing is declared that this channel hears.'
    : 'Nothing but noise is declared that this channel hears.';
}

function againstLimit(arrival: Arrival, chain: Chain): string {
  if (!arrival.inBand) return 'outside the band';
  if (!arrival.folded) return 'in the band, where it belongs';
  const over = arrival.level - chain.foldLimit;
  return over > 0 ? `**${over.toFixed(1)} dB over**` : `${(-over).toFixed(1)} dB under`;
}

/** What spoils the band first, then what folds into it, then what is in it, then by level. */
function byWeight(a: Arrival, b: Arrival): number {
  return (
    Number(b.overLimit) - Number(a.overLimit) ||
    Number(b.folded && b.inBand) - Number(a.folded && a.inBand) ||
    Number(b.inBand) - Number(a.inBand) ||
    b.level - a.level ||
    a.trueLowHz - b.trueLowHz
  );
}

export function spanText(lowHz: number, highHz: number): string {
  return lowHz === highHz ? formatHz(lowHz) : `${formatHz(lowHz)} .. ${formatHz(highHz)}`;
}
