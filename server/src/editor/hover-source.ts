import { arrivalsOf } from '../chain/arrivals.ts';
import type { Arrival } from '../chain/model.ts';
import type { Source } from '../rig/model.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { spanText } from './hover-map.ts';
import { noiseSourceMarkdown } from './hover-noise.ts';
import { codeMarkdown, tableMarkdown } from './picture-markdown.ts';
import { sourceWords } from './things.ts';

/** A hover is read, not scrolled: channels beyond these are counted. */
const MOST_CHANNELS = 16;
/** Channels whose arrivals are computed for one hover. */
const MOST_COMPUTED = 2_000;

interface Landing {
  readonly channel: string;
  readonly worst: Arrival;
  readonly unit: string;
  readonly excess: number;
}

/** Where a source lands in every channel that hears it, the worst first. */
export function sourceMarkdown(source: Source, evaluation: Evaluation): string {
  const head = `**${codeMarkdown(source.name)}** · ${sourceWords(source)} · enters at the ${source.enters}`;
  if (source.type === 'broadband') return `${head}\n\n${noiseSourceMarkdown(source, evaluation)}`;
  const hearing = evaluation.channels.filter(
    ({ result }) => result.chain && result.channel.heard.some((heard) => heard.source === source),
  );
  const landings = hearing.slice(0, MOST_COMPUTED).flatMap(({ result }): Landing[] => {
    const chain = result.chain!;
    const worst = arrivalsOf(chain)
      .filter((arrival) => arrival.source === source)
      .reduce<Arrival | undefined>(
        (gravest, arrival) => (gravest && !isGraver(arrival, gravest) ? gravest : arrival),
        undefined,
      );
    const unit = chain.levelUnit === 'dbfs' ? 'dBFS' : 'dB';
    return worst ? [{ channel: result.channel.name, worst, unit, excess: worst.level - chain.foldLimit }] : [];
  });
  if (landings.length === 0) return `${head}\n\nNo channel hears it.`;
  landings.sort((a, b) => (isGraver(a.worst, b.worst) ? -1 : isGraver(b.worst, a.worst) ? 1 : 0));
  const rows = landings
    .slice(0, MOST_CHANNELS)
    .map(({ channel, worst, unit, excess }) => [
      codeMarkdown(channel),
      worst.component,
      spanText(worst.trueLowHz, worst.trueHighHz),
      spanText(worst.recordedLowHz, worst.recordedHighHz),
      `${levelText(worst.level)} ${unit}${worst.levelKnown ? '' : ' (assumed)'}`,
      worst.overLimit
        ? `**${excess.toFixed(1)} dB over**`
        : worst.inBand
          ? worst.folded
            ? 'in the band, under the limit'
            : 'in the band'
          : 'outside the band',
    ]);
  const table = tableMarkdown(['channel', 'component', 'true', 'recorded', 'level', ''], rows);
  const more = hearing.length - Math.min(hearing.length, MOST_CHANNELS);
  return `${head}\n\n${table}${more > 0 ? `\n\n${more} more channels hear it.` : ''}`;
}

/** A level that rounds to nothing has no sign. */
function levelText(level: number): string {
  return level.toFixed(1).replace(/^-(?=0\.0$)/, '');
}

/** Over the limit before under it, folded into the band before anything else, then the louder. */
function isGraver(a: Arrival, b: Arrival): boolean {
  const rank = (arrival: Arrival): number =>
    Number(arrival.overLimit) * 4 + Number(arrival.folded && arrival.inBand) * 2 + Number(arrival.inBand);
  return rank(a) !== rank(b) ? rank(a) > rank(b) : a.level > b.level;
}
