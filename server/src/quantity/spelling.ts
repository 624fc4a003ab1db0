/** Longer words are not compared: nobody mistypes a word of that length into another. */
const LONGEST_WORD = 64;
/** From so many letters on, the beginning of just one candidate stands for it. */
const SHORTEST_BEGINNING = 3;

/**
 * The candidate that a mistyped word most likely meant, or `undefined` where none is near.
 *
 * A difference of case alone comes first, then the fewest slips (a letter missing, added, changed, or two swapped;
 * one slip for every three letters, at most three), then the only candidate that begins with the word. The earlier
 * candidate wins a tie. Time is proportional to the number of candidates; words over 64 characters have no neighbour.
 */
export function nearest(word: string, candidates: Iterable<string>): string | undefined {
  if (word.length === 0 || word.length > LONGEST_WORD) return undefined;
  const lower = word.toLowerCase();
  const most = Math.min(3, Math.ceil(word.length / 3), word.length - 1);
  let best: string | undefined;
  let fewest = most + 1;
  let begun: string | undefined;
  let begunCount = 0;
  for (const candidate of candidates) {
    if (candidate === word) return candidate;
    if (candidate.length > LONGEST_WORD) continue;
    const other = candidate.toLowerCase();
    // Case alone counts as less than any slip, but a later candidate may still be the very word.
    const slips = other === lower ? 0 : slipsBetween(lower, other, fewest - 1);
    if (slips < fewest) {
      fewest = slips;
      best = candidate;
    }
    if (lower.length >= SHORTEST_BEGINNING && other.startsWith(lower)) {
      begun = candidate;
      begunCount += 1;
    }
  }
  return best ?? (begunCount === 1 ? begun : undefined);
}

/**
 * The slips that turn one word into the other, or `most + 1` where it takes more: edit distance with swaps of
 * neighbours (optimal string alignment). Source: Damerau, Communications of the ACM 7 (1964) 171.
 */
export function slipsBetween(one: string, other: string, most: number): number {
  if (Math.abs(one.length - other.length) > most) return most + 1;
  let beforeLast: number[] = [];
  let last = Array.from({ length: other.length + 1 }, (_, column) => column);
  for (let row = 1; row <= one.length; row += 1) {
    const current = [row];
    let lowest = row;
    for (let column = 1; column <= other.length; column += 1) {
      const same = one[row - 1] === other[column - 1];
      let slips = Math.min(last[column]! + 1, current[column - 1]! + 1, last[column - 1]! + (same ? 0 : 1));
      const swapped = row > 1 && column > 1 && one[row - 1] === other[column - 2] && one[row - 2] === other[column - 1];
      if (swapped) slips = Math.min(slips, beforeLast[column - 2]! + 1);
      current.push(slips);
      lowest = Math.min(lowest, slips);
    }
    if (lowest > most) return most + 1;
    beforeLast = last;
    last = current;
  }
  return Math.min(last[other.length]!, most + 1);
}
