import type { Arrival, Chain } from '../chain/model.ts';
import { aliasMapCharacters } from '../picture/alias-map-characters.ts';
import { aliasMapModel } from '../picture/alias-map-model.ts';
import { formatHz } from '../quantity/write.ts';
import type { Paint } from './paint.ts';
import { printable, printableLines } from './printable.ts';

export interface MapTextOptions {
  readonly ascii: boolean;
  readonly paint: Paint;
}

const MOST_ROWS = 40;

/** The alias map drawn in characters, and the table of what arrives: the loudest in the band first. */
export function mapText(chain: Chain, arrivals: readonly Arrival[], { ascii, paint }: MapTextOptions): string {
  const drawing = aliasMapCharacters(aliasMapModel(chain, arrivals), { ascii });
  return `${printableLines(drawing)}\n\n${arrivalsTable(chain, arrivals, paint)}`;
}

function arrivalsTable(chain: Chain, arrivals: readonly Arrival[], paint: Paint): string {
  if (arrivals.length === 0) {
    const what = chain.channel.heard.length === 0 ? 'Nothing' : 'Nothing but noise';
    return `${what} is declared that this channel hears.\n`;
  }
  const unit = chain.levelUnit === 'dbfs' ? 'dBFS' : 'dB';
  const ordered = [...arrivals].sort(byWeight);
  const rows = ordered.slice(0, MOST_ROWS).map((arrival) => ({
    arrival,
    cells: [
      printable(arrival.source.name),
      arrival.component,
      spanText(arrival.trueLowHz, arrival.trueHighHz),
      spanText(arrival.recordedLowHz, arrival.recordedHighHz),
      `${levelText(arrival.level)}${arrival.levelKnown ? '' : '?'}`,
      verdictOf(arrival),
    ],
  }));
  const heads = ['source', 'component', 'true', 'recorded', unit, ''];
  const widths = heads.map((head, column) => Math.max(head.length, ...rows.map(({ cells }) => cells[column]!.length)));
  const line = (cells: readonly string[]): string =>
    cells
      .map((cell, column) => (column === 4 ? cell.padStart(widths[column]!) : cell.padEnd(widths[column]!)))
      .join('  ')
      .trimEnd();
  const body = rows.map(({ arrival, cells }) =>
    arrival.overLimit ? paint(line(cells), 'error') : arrival.inBand ? line(cells) : paint(line(cells), 'quiet'),
  );
  const more = ordered.length > MOST_ROWS ? `\n${ordered.length - MOST_ROWS} more; --format json lists every one.` : '';
  const assumed = arrivals.some(({ levelKnown }) => !levelKnown)
    ? '\n? no level is declared: full scale is assumed.'
    : '';
  return `${paint(line(heads), 'quiet')}\n${body.join('\n')}${more}${assumed}\n`;
}

/** What spoils the band first, then what is in it, then by level. */
function byWeight(a: Arrival, b: Arrival): number {
  return (
    Number(b.overLimit) - Number(a.overLimit) ||
    Number(b.inBand) - Number(a.inBand) ||
    b.level - a.level ||
    a.trueLowHz - b.trueLowHz
  );
}

/** A tenth of a decibel; what rounds to nothing has no sign. */
function levelText(level: number): string {
  return level.toFixed(1).replace(/^-(?=0\.0$)/, '');
}

function spanText(lowHz: number, highHz: number): string {
  return lowHz === highHz ? formatHz(lowHz) : `${formatHz(lowHz)} .. ${formatHz(highHz)}`;
}

function verdictOf(arrival: Arrival): string {
  if (arrival.overLimit) return `folds at stage ${arrival.foldsAtStage}, over the limit`;
  const where = arrival.inBand ? 'in the band' : 'outside the band';
  return arrival.folded ? `folds at stage ${arrival.foldsAtStage}, ${where}` : where;
}
