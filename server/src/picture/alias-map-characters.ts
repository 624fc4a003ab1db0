import { formatHz } from '../quantity/write.ts';
import type { AliasMap, Mark } from './alias-map-model.ts';
import type { MarkKind } from './arrival-words.ts';
import { placeOn } from './axis.ts';
import type { CharacterGrid } from './character-grid.ts';
import { axisName, blankGrid, COLUMNS, labelledRows, MARGIN, put, tickLine } from './character-grid.ts';

export interface CharacterOptions {
  /** Draws in ASCII alone, for terminals and files that know nothing else. */
  readonly ascii: boolean;
}

interface Signs {
  /** The fold line from whole to faded. */
  readonly line: readonly string[];
  readonly marks: Readonly<Record<MarkKind, string>>;
  readonly runs: Readonly<Record<MarkKind, string>>;
  readonly stem: string;
  readonly limit: string;
  readonly bandEdge: string;
  readonly axis: string;
  readonly side: string;
  readonly corner: string;
}

const UNICODE: Signs = {
  line: ['█', '▓', '▒', '░', '·'],
  marks: { native: 'o', harmless: '◇', spoils: '▲' },
  runs: { native: '=', harmless: '~', spoils: '▲' },
  stem: '│',
  limit: '╌',
  bandEdge: '─',
  axis: '─',
  side: '│',
  corner: '└',
};

const ASCII: Signs = {
  line: ['#', '*', '+', ':', '.'],
  marks: { native: 'o', harmless: '<', spoils: '^' },
  runs: { native: '=', harmless: '~', spoils: '^' },
  stem: '|',
  limit: '-',
  bandEdge: '-',
  axis: '-',
  side: '|',
  corner: '+',
};

const MAP_ROWS = 15;
const SPECTRUM_ROWS = 8;

/** The alias map drawn in characters, at most 78 columns wide: the same content as the picture. */
export function aliasMapCharacters(map: AliasMap, { ascii }: CharacterOptions): string {
  const signs = ascii ? ASCII : UNICODE;
  return [
    `${map.title}   record ${formatHz(map.recordRateHz)}, band ${formatHz(map.bandLowHz)} .. ${formatHz(map.bandHighHz)}`,
    '',
    ...drawMap(map, signs),
    '',
    ...drawSpectrum(map, signs),
    '',
    legend(map, signs),
  ]
    .map((line) => line.trimEnd())
    .join('\n');
}

function drawMap(map: AliasMap, signs: Signs): string[] {
  const grid = blankGrid(MAP_ROWS);
  const row = (hz: number): number =>
    Math.round(placeOn({ low: 0, high: map.nyquistHz, from: MAP_ROWS - 1, to: 0 }, hz));
  const bandRow = row(map.bandHighHz);
  for (let column = 0; column < COLUMNS; column++) grid[bandRow]![column] = column % 2 ? ' ' : signs.bandEdge;
  const widths = stretchWidths(map);
  let from = 0;
  const columns: ((hz: number) => number | undefined)[] = [];
  const ticks: { at: number; label: string }[] = [];
  for (const [index, { lowHz, highHz, line }] of map.stretches.entries()) {
    const to = from + widths[index]! - 1;
    const axis = { low: lowHz, high: highHz, from, to };
    columns.push((hz) => (hz < lowHz || hz > highHz ? undefined : Math.round(placeOn(axis, hz))));
    drawLine(grid, line.flat(), map.fadedAtDb, signs, (hz) => Math.round(placeOn(axis, hz)), row);
    ticks.push({ at: from, label: formatHz(lowHz, 3) }, { at: to, label: formatHz(highHz, 3) });
    from = to + 2;
  }
  for (const mark of [...map.marks].reverse()) drawMark(grid, mark, signs, columns, row);
  const body = labelledRows(grid, signs.side, (index) =>
    index === 0 ? formatHz(map.nyquistHz, 3) : index === MAP_ROWS - 1 ? '0 Hz' : index === bandRow ? 'band top' : '',
  );
  return [
    '   recorded',
    ...body,
    `${' '.repeat(MARGIN - 1)}${signs.corner}${signs.axis.repeat(COLUMNS)}`,
    tickLine(ticks),
    axisName('true frequency'),
  ];
}

/** The line is drawn column by column, so that it has no gaps however steep it is. */
function drawLine(
  grid: CharacterGrid,
  points: readonly { readonly trueHz: number; readonly recordedHz: number; readonly attenuationDb: number }[],
  fadedAtDb: number,
  signs: Signs,
  column: (hz: number) => number,
  row: (hz: number) => number,
): void {
  for (let index = 1; index < points.length; index++) {
    const a = points[index - 1]!;
    const b = points[index]!;
    const steps = Math.max(
      1,
      Math.abs(column(b.trueHz) - column(a.trueHz)),
      Math.abs(row(b.recordedHz) - row(a.recordedHz)),
    );
    for (let step = 0; step <= steps; step++) {
      const part = step / steps;
      const attenuation = a.attenuationDb + (b.attenuationDb - a.attenuationDb) * part;
      const shade = Number.isNaN(attenuation)
        ? signs.line.length - 1
        : Math.round((Math.max(0, attenuation) / fadedAtDb) * (signs.line.length - 1));
      const sign = signs.line[Math.min(signs.line.length - 1, shade)]!;
      put(
        grid,
        row(a.recordedHz + (b.recordedHz - a.recordedHz) * part),
        column(a.trueHz + (b.trueHz - a.trueHz) * part),
        sign,
      );
    }
  }
}

function drawMark(
  grid: CharacterGrid,
  { kind, from, to }: Mark,
  signs: Signs,
  columns: readonly ((hz: number) => number | undefined)[],
  row: (hz: number) => number,
): void {
  const middle = (from.trueHz + to.trueHz) / 2;
  const column = columns.find((at) => at(middle) !== undefined);
  if (!column) return;
  const a = column(from.trueHz) ?? column(middle)!;
  const b = column(to.trueHz) ?? column(middle)!;
  const steps = Math.abs(b - a);
  for (let step = 0; step <= steps; step++) {
    const part = steps === 0 ? 0 : step / steps;
    put(
      grid,
      row(from.recordedHz + (to.recordedHz - from.recordedHz) * part),
      Math.round(a + (b - a) * part),
      signs.runs[kind],
    );
  }
  put(grid, row((from.recordedHz + to.recordedHz) / 2), Math.round((a + b) / 2), signs.marks[kind]);
}

function drawSpectrum(map: AliasMap, signs: Signs): string[] {
  const grid = blankGrid(SPECTRUM_ROWS);
  const column = (hz: number): number =>
    Math.round(placeOn({ low: 0, high: map.nyquistHz, from: 0, to: COLUMNS - 1 }, hz));
  const row = (level: number): number =>
    Math.round(placeOn({ low: map.levelLow, high: map.levelHigh, from: SPECTRUM_ROWS - 1, to: 0 }, level));
  const limitRow = row(map.foldLimit);
  for (let at = column(map.bandLowHz); at <= column(map.bandHighHz); at++) put(grid, limitRow, at, signs.limit);
  for (const mark of [...map.marks].reverse()) {
    if (mark.level < map.levelLow) continue;
    const top = row(mark.level);
    for (let at = column(mark.recordedLowHz); at <= column(mark.recordedHighHz); at++)
      put(grid, top, at, signs.runs[mark.kind]);
    const middle = column((mark.recordedLowHz + mark.recordedHighHz) / 2);
    for (let down = top + 1; down < SPECTRUM_ROWS; down++) put(grid, down, middle, signs.stem);
    put(grid, top, middle, signs.marks[mark.kind]);
  }
  const body = labelledRows(grid, signs.side, (index) => {
    if (index === limitRow) return `limit ${map.foldLimit.toFixed(0)}`;
    return index === 0 ? String(map.levelHigh) : index === SPECTRUM_ROWS - 1 ? String(map.levelLow) : '';
  });
  const ticks = [
    { at: 0, label: '0 Hz' },
    { at: column(map.bandHighHz), label: formatHz(map.bandHighHz, 3) },
    { at: COLUMNS - 1, label: formatHz(map.nyquistHz, 3) },
  ];
  return [
    `   ${map.levelUnit}`,
    ...body,
    `${' '.repeat(MARGIN - 1)}${signs.corner}${signs.axis.repeat(COLUMNS)}`,
    tickLine(ticks),
    axisName('recorded frequency'),
  ];
}

function legend(map: AliasMap, { marks }: Signs): string {
  const words: Readonly<Record<MarkKind, string>> = {
    spoils: 'folded, spoils the band',
    harmless: 'folded, harmless',
    native: 'as it is',
  };
  const kinds = (['spoils', 'harmless', 'native'] as const).filter((kind) =>
    map.marks.some((mark) => mark.kind === kind),
  );
  const more = map.leftOut > 0 ? [`${map.leftOut} more are not drawn`] : [];
  return `${' '.repeat(MARGIN)}${[...kinds.map((kind) => `${marks[kind]} ${words[kind]}`), ...more].join('   ')}`;
}

function stretchWidths({ stretches }: AliasMap): readonly number[] {
  const room = COLUMNS - (stretches.length - 1);
  const parts = stretches.map((_, index) => (index === 0 && stretches.length > 1 ? 1.4 : 1));
  const total = parts.reduce((sum, part) => sum + part, 0);
  return parts.map((part) => Math.floor((room * part) / total));
}
