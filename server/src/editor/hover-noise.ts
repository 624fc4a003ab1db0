import type { Chain } from '../chain/model.ts';
import { type NoiseBudget, noiseBudgetOf } from '../chain/noise.ts';
import type { NoiseOrigin } from '../chain/noise-inputs.ts';
import { originText } from '../checks/noise-wording.ts';
import type { BroadbandSource } from '../rig/model.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { codeMarkdown, tableMarkdown } from './picture-markdown.ts';

/** A hover is read, not scrolled. */
const MOST_SOURCES = 8;
const MOST_CHANNELS = 16;
/** Channels whose noise is computed for one hover. */
const MOST_COMPUTED = 200;

/** The noise in a channel's band, contribution by contribution; `undefined` where the channel declares none. */
export function noiseMarkdown(chain: Chain): string | undefined {
  const noise = noiseBudgetOf(chain);
  if (!noise) return undefined;
  const shown = noise.contributions.filter(({ origin }, index) => origin.kind !== 'source' || index < MOST_SOURCES);
  const rows = shown.map(({ origin, nativeDb, foldedDb }) => [
    originMarkdown(origin),
    levelText(nativeDb),
    foldedText(foldedDb),
  ]);
  const total = ['**all of it**', levelText(noise.nativeDb), totalFoldedText(noise, chain)];
  const unit = chain.levelUnit === 'dbfs' ? 'dBFS rms' : 'dB rms';
  const table = tableMarkdown(['noise in the band', `native, ${unit}`, `folded, ${unit}`], [...rows, total]);
  const more = noise.contributions.length - shown.length;
  return more > 0 ? `${table}\n\n${more} more sources of noise are in the sum.` : table;
}

/** What a broadband source leaves in the band of every channel that hears it, the worst first. */
export function noiseSourceMarkdown(source: BroadbandSource, { channels }: Evaluation): string {
  const hearing = channels.filter(
    ({ result }) => result.chain && result.channel.heard.some((heard) => heard.source === source),
  );
  const shares = hearing.slice(0, MOST_COMPUTED).flatMap(({ result }) => {
    const chain = result.chain!;
    const share = noiseBudgetOf(chain)?.contributions.find(
      ({ origin }) => origin.kind === 'source' && origin.source === source,
    );
    return share ? [{ chain, nativeDb: share.nativeDb, foldedDb: share.foldedDb ?? -Infinity }] : [];
  });
  if (hearing.length === 0) return 'No channel hears it.';
  if (shares.length === 0) return 'How high it is recorded is not known in any channel that hears it.';
  const excessOf = ({ foldedDb, chain }: (typeof shares)[number]): number => foldedDb - chain.foldLimit;
  shares.sort((a, b) => (excessOf(a) === excessOf(b) ? 0 : excessOf(b) - excessOf(a)));
  const rows = shares
    .slice(0, MOST_CHANNELS)
    .map(({ chain, nativeDb, foldedDb }) => [
      codeMarkdown(chain.channel.name),
      levelText(nativeDb),
      levelText(foldedDb),
      `${levelText(chain.foldLimit)} ${chain.levelUnit === 'dbfs' ? 'dBFS' : 'dB'}`,
    ]);
  const table = tableMarkdown(['channel', 'native, rms', 'folded, rms', 'limit'], rows);
  const more = hearing.length - rows.length;
  return more > 0 ? `${table}\n\n${more} more channels hear it.` : table;
}

function originMarkdown(origin: NoiseOrigin): string {
  return origin.kind === 'source' ? codeMarkdown(originText(origin)) : originText(origin);
}

function totalFoldedText({ contributions, foldedDb }: NoiseBudget, { foldLimit }: Chain): string {
  if (contributions.some((one) => one.foldedDb === undefined)) return foldedText(undefined);
  const over = foldedDb - foldLimit;
  return over > 0 ? `**${levelText(foldedDb)}, ${over.toFixed(1)} dB over the limit**` : levelText(foldedDb);
}

function foldedText(foldedDb: number | undefined): string {
  return foldedDb === undefined ? 'no bound: no filter ends it' : levelText(foldedDb);
}

/** A level that rounds to nothing has no sign, and what is not there has no level. */
function levelText(level: number): string {
  if (!Number.isFinite(level)) return '-';
  return level.toFixed(1).replace(/^-(?=0\.0$)/, '');
}
