/** A grid of characters, addressed from the top left. */
export type CharacterGrid = string[][];

/** Columns of a drawing, beside a margin that holds the labels of the upright axis: 75 in all. */
export const COLUMNS = 64;
export const MARGIN = 11;

export function blankGrid(rows: number): CharacterGrid {
  return Array.from({ length: rows }, () => Array.from({ length: COLUMNS }, () => ' '));
}

/** Sets one cell; nothing where there is none. */
export function put(grid: CharacterGrid, row: number, column: number, sign: string): void {
  const cells = grid[row];
  if (cells && column >= 0 && column < COLUMNS) cells[column] = sign;
}

/** The grid's rows behind their labels and the upright axis. */
export function labelledRows(grid: CharacterGrid, side: string, labelOf: (row: number) => string): readonly string[] {
  return grid.map((cells, row) => `${labelOf(row).padStart(MARGIN - 2)} ${side}${cells.join('')}`);
}

/** Labels under an axis; one that would run into the one before it is left out. */
export function tickLine(ticks: readonly { readonly at: number; readonly label: string }[]): string {
  let line = '';
  for (const { at, label } of [...ticks].sort((a, b) => a.at - b.at)) {
    const start = Math.min(
      MARGIN + COLUMNS - label.length,
      Math.max(MARGIN, MARGIN + at - Math.floor(label.length / 2)),
    );
    if (line.length > 0 && line.length + 1 > start) continue;
    line = line.padEnd(start) + label;
  }
  return line;
}

/** The name of an axis, under its labels. */
export function axisName(name: string): string {
  return `${' '.repeat(MARGIN)}${name}`;
}
