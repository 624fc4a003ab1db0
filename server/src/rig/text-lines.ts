import { CARRIAGE_RETURN, LINE_FEED } from './characters.ts';
import type { Position } from './place.ts';

/** Where each line of a text starts; `\n`, `\r\n` and `\r` end a line, as the language-server protocol has it. */
export function lineStarts(text: string): readonly number[] {
  const starts = [0];
  for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
  if (!text.includes('\r')) return starts;
  return lineStartsWithReturns(text);
}

function lineStartsWithReturns(text: string): readonly number[] {
  const starts = [0];
  for (let at = 0; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === LINE_FEED) starts.push(at + 1);
    else if (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) !== LINE_FEED) starts.push(at + 1);
  }
  return starts;
}

/** The number of line ends in a text. */
export function countLineEnds(text: string): number {
  if (text.includes('\r')) return lineStartsWithReturns(text).length - 1;
  let count = 0;
  for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) count++;
  return count;
}

/** The index of the last element that is not above `value`; -1 where all are. */
export function lastNotAbove(sorted: ArrayLike<number>, value: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (sorted[middle]! <= value) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}

/** The position of an offset that lies within the text. */
export function positionIn(starts: readonly number[], offset: number): Position {
  const line = lastNotAbove(starts, offset);
  return { line, character: offset - starts[line]! };
}
