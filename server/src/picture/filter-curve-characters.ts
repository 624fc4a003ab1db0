import { formatHz } from '../quantity/write.ts';
import type { CharacterOptions } from './alias-map-characters.ts';
import type { Axis } from './axis.ts';
import { logarithmicTicks, placeOn } from './axis.ts';
import type { CharacterGrid } from './character-grid.ts';
import { axisName, blankGrid, COLUMNS, labelledRows, MARGIN, put, tickLine } from './character-grid.ts';
import type { CurveMark } from './filter-curve-marks.ts';
import type { FilterCurve } from './filter-curve-model.ts';
import { decibelsOff } from './filter-curve-model.ts';
import type { HzRange } from './filter-place.ts';

interface Signs {
  readonly line: string;
  readonly unpromised: string;
  readonly worst: string;
  readonly axis: string;
  readonly side: string;
  readonly corner: string;
  readonly band: string;
  readonly folds: string;
}

const UNICODE: Signs = {
  line: '█',
  unpromised: '░',
  worst: '·',
  axis: '─',
  side: '│',
  corner: '└',
  band: '━',
  folds: '×',
};
const ASCII: Signs = {
  line: '#',
  unpromised: ':',
  worst: '.',
  axis: '-',
  side: '|',
  corner: '+',
  band: '=',
  folds: 'x',
};

const WIDTH = 78;
const ROWS = 13;
const MOST_TICKS = 8;
/** The marks' signs on the curve, which the key under it explains. */
const LETTERS = 'abcdefghijklmnopqrstuvw';

/** A filter's curve drawn in characters, at most 78 columns wide: the same content as the picture. */
export function filterCurveCharacters(curve: FilterCurve, { ascii }: CharacterOptions): string {
  const signs = ascii ? ASCII : UNICODE;
  const drawn = [curve.title, '', '   dB off', ...drawing(curve, signs), '', ...key(curve, signs)]
    .map((line) => line.trimEnd())
    .join('\n');
  return ascii ? drawn.replaceAll('×', 'x') : drawn;
}

interface Places {
  readonly column: (hz: number) => number;
  readonly row: (attenuationDb: number) => number;
}

function drawing(curve: FilterCurve, signs: Signs): readonly string[] {
  const across: Axis = { low: Math.log10(curve.lowHz), high: Math.log10(curve.highHz), from: 0, to: COLUMNS - 1 };
  const down: Axis = { low: curve.leastDb, high: curve.mostDb, from: 0, to: ROWS - 1 };
  const places: Places = {
    column: (hz) => Math.round(placeOn(across, Math.log10(hz))),
    row: (attenuationDb) => Math.round(placeOn(down, attenuationDb)),
  };
  const grid = blankGrid(ROWS);
  drawWorst(grid, curve, places, signs);
  drawCurve(grid, curve, places, signs);
  for (const [index, { hz, attenuationDb }] of curve.marks.entries()) {
    putBeside(grid, places.row(attenuationDb), places.column(hz), letterOf(index));
  }
  const zero = places.row(0);
  return [
    ...labelledRows(grid, signs.side, (row) =>
      row === ROWS - 1 ? String(curve.mostDb) : row === zero ? '0' : row === 0 ? String(curve.leastDb) : '',
    ),
    `${' '.repeat(MARGIN - 1)}${signs.corner}${axisLine(curve, places, signs)}`,
    tickLine(
      logarithmicTicks(curve.lowHz, curve.highHz, MOST_TICKS).map(({ value, label }) => ({
        at: places.column(value),
        label,
      })),
    ),
    axisName("frequency at the filter's input"),
  ];
}

/** Sets a letter where it belongs, or beside the letters that stand there already. */
function putBeside(grid: CharacterGrid, row: number, column: number, letter: string): void {
  const isFree = (at: number): boolean => !LETTERS.includes(grid[row]![at] ?? LETTERS);
  const right = Array.from({ length: COLUMNS - column }, (_, step) => column + step).find(isFree);
  const left = Array.from({ length: column }, (_, step) => column - 1 - step).find(isFree);
  put(grid, row, right ?? left ?? column, letter);
}

/** Column by column from row to row, so that the line has no gaps however steep it is; off the scale it ends. */
function drawCurve(grid: CharacterGrid, curve: FilterCurve, { column, row }: Places, signs: Signs): void {
  const { line, unpromised, mostDb } = curve;
  for (const [index, { hz, attenuationDb }] of line.entries()) {
    const before = line[index - 1];
    const top = Math.min(attenuationDb, before?.attenuationDb ?? attenuationDb);
    if (top > mostDb) continue;
    const bottom = Math.max(attenuationDb, before?.attenuationDb ?? attenuationDb);
    const isPromised = !unpromised || hz <= unpromised.lowHz || hz > unpromised.highHz;
    const from = row(attenuationDb) === row(top) ? row(top) : row(top) + 1;
    for (let down = from; down <= row(bottom); down++) {
      put(grid, down, column(hz), isPromised ? signs.line : signs.unpromised);
    }
  }
}

function drawWorst(grid: CharacterGrid, { worst, mostDb }: FilterCurve, { column, row }: Places, signs: Signs): void {
  for (const { hz, leastDb, greatestDb } of worst) {
    for (const attenuationDb of [leastDb, greatestDb]) {
      if (attenuationDb <= mostDb) put(grid, row(attenuationDb), column(hz), signs.worst);
    }
  }
}

/** The axis, with the band and what folds into it. */
function axisLine({ band, folds, lowHz, highHz }: FilterCurve, { column }: Places, signs: Signs): string {
  const cells = Array.from({ length: COLUMNS }, () => signs.axis);
  const mark = (ranges: readonly HzRange[], sign: string): void => {
    for (const range of ranges) {
      if (range.highHz < lowHz || range.lowHz > highHz) continue;
      for (let at = column(range.lowHz); at <= column(range.highHz); at++) cells[at] = sign;
    }
  };
  mark(folds, signs.folds);
  mark(band, signs.band);
  return cells.join('');
}

/** What the letters and the signs stand for. */
function key(curve: FilterCurve, signs: Signs): readonly string[] {
  const { band, folds, marks, unpromised, worst, leftOut } = curve;
  const bands = band.map(({ lowHz, highHz }) => `${formatHz(lowHz)} .. ${formatHz(highHz)}`);
  const words = [
    ...bands.map((range, index) => (index === 0 ? `${signs.band} band ${range}` : range)),
    ...(folds.length > 0 ? [`${signs.folds} folds into the band`] : []),
    ...(unpromised ? [`${signs.unpromised} nothing is promised`] : []),
    ...(worst.length > 0 ? [`${signs.worst} worst of its tolerance`] : []),
  ];
  const indent = ' '.repeat(MARGIN);
  return [
    ...wrapped(words, WIDTH - MARGIN).map((line) => indent + line),
    ...marks.flatMap((mark, index) =>
      wrapped(markTexts(mark), WIDTH - MARGIN - 2).map(
        (line, at) => `${indent}${at === 0 ? letterOf(index) : ' '} ${line}`,
      ),
    ),
    ...(leftOut > 0 ? [`${indent}${leftOut} more are not marked`] : []),
  ];
}

function markTexts({ kind, longName, hzText, meaning, attenuationDb }: CurveMark): readonly string[] {
  const text = `${longName} ${hzText}: ${decibelsOff(attenuationDb)}`;
  return kind === 'nyquist' || kind === 'first-fold' ? [text] : [text, meaning];
}

function letterOf(index: number): string {
  return LETTERS[index % LETTERS.length]!;
}

/** Words side by side in lines of so many characters. */
function wrapped(words: readonly string[], width: number): readonly string[] {
  const lines: string[] = [];
  for (const word of words) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 3 + word.length <= width) lines[lines.length - 1] = `${last}   ${word}`;
    else lines.push(word);
  }
  return lines;
}
