import { formatHz } from '../quantity/write.ts';
import type { JudgedChannel } from '../workbench/evaluation.ts';
import { verdictText, windowsText } from '../workbench/rate-words.ts';
import type { RateVerdict } from '../workbench/rates.ts';
import type { Paint } from './paint.ts';
import { printable } from './printable.ts';

/** A table of rates with margin and verdict; today's rate is marked. */
export function ratesText(judged: JudgedChannel, rates: readonly RateVerdict[], paint: Paint): string {
  const rows = rates.map((rate) => ({
    mark: rate.isToday ? '>' : ' ',
    rate: formatHz(rate.rateHz),
    margin: rate.margin.toFixed(2),
    verdict: verdictText(rate),
    rated: rate,
  }));
  const rateWidth = Math.max(...rows.map(({ rate }) => rate.length), 'rate'.length);
  const marginWidth = Math.max(...rows.map(({ margin }) => margin.length), 'margin'.length);
  const head = `  ${'rate'.padStart(rateWidth)}  ${'margin'.padStart(marginWidth)}  verdict`;
  const lines = rows.map(({ mark, rate, margin, verdict, rated }) => {
    const ink = rated.errors > 0 ? 'error' : rated.warnings > 0 ? 'warning' : 'strong';
    return `${mark} ${rate.padStart(rateWidth)}  ${margin.padStart(marginWidth)}  ${paint(verdict, ink)}`;
  });
  const windows = judged.result.chain && windowsText(judged.result.chain);
  const about = windows === undefined ? '' : `${windows}\n\n`;
  return `${printable(judged.result.channel.name)}\n\n${about}${paint(head, 'quiet')}\n${lines.join('\n')}\n`;
}
