import type { Dimension } from './dimension.ts';
import { slipsBetween } from './spelling.ts';
import { allUnits, findUnit, tableUnit, type Unit, withoutBrackets } from './unit.ts';

/** Ways of writing a unit of the table that are never somebody's own unit. */
const OTHER_SPELLINGS: ReadonlyMap<string, string> = new Map([
  ['hz', 'Hz'],
  ['HZ', 'Hz'],
  ['sps', 'S/s'],
  ['SPS', 'S/s'],
  ['ksps', 'kS/s'],
  ['kSPS', 'kS/s'],
  ['KSPS', 'kS/s'],
  ['Msps', 'MS/s'],
  ['MSPS', 'MS/s'],
  ['GSPS', 'GS/s'],
  ['r/min', 'rpm'],
  ['rev/min', 'rpm'],
  ['sec', 's'],
  ['second', 's'],
  ['seconds', 's'],
  ['msec', 'ms'],
  ['usec', 'us'],
  ['minute', 'min'],
  ['minutes', 'min'],
  ['hr', 'h'],
  ['hour', 'h'],
  ['hours', 'h'],
  ['volt', 'V'],
  ['volts', 'V'],
  ['Vrms', 'V rms'],
  ['mVrms', 'mV rms'],
  ['Vpp', 'V p-p'],
  ['mVpp', 'mV p-p'],
  ['grms', 'g rms'],
  ['ohms', 'ohm'],
  ['\u03A9', 'ohm'],
  ['\u2126', 'ohm'],
  ['m/s^2', 'm/s2'],
  ['m/s\u00B2', 'm/s2'],
  ['m/s/s', 'm/s2'],
  ['Nm', 'N.m'],
  ['N\u00B7m', 'N.m'],
  ['\u00B5\u03B5', 'ue'],
  ['\u03BC\u03B5', 'ue'],
  ['u\u03B5', 'ue'],
  ['ustrain', 'ue'],
  ['microstrain', 'ue'],
  ['\u00B0C', 'degC'],
  ['\u2103', 'degC'],
  ['celsius', 'degC'],
  ['kelvin', 'K'],
  ['\u00B0', 'deg'],
  ['degree', 'deg'],
  ['degrees', 'deg'],
  ['percent', '%'],
  ['dBfs', 'dBFS'],
  ['dB/octave', 'dB/oct'],
  ['bits', 'bit'],
  ['byte', 'B'],
  ['bytes', 'B'],
]);

/** Shorter words that differ from a unit by case alone may well be another unit (`S`, `mT`). */
const SHORTEST_CASE_SLIP = 3;
const SHORTEST_MISSPELLING = 3;
const LONGEST_COMPOSED = 32;
const PER_ROOT_HERTZ = /\/(?:rt|sqrt|\u221A)\(?hz\)?$/i;

/**
 * What a word that is no unit of the table certainly meant: another usual spelling of a unit (`°C`, `sps`, `m/s^2`),
 * or wrong case (`khz`, `KHZ`), alone or in a density or sensitivity (`uV/°C`). The text to write instead.
 */
export function otherSpelling(word: string): string | undefined {
  const certain = OTHER_SPELLINGS.get(word);
  if (certain !== undefined) return certain;
  const slip = word.length >= SHORTEST_CASE_SLIP ? caseSlip(word)?.symbol : undefined;
  return slip ?? composedSpelling(word, otherSpelling);
}

/**
 * The unit nearest to a word that no unit is spelled like, to write instead of it; of the given dimensions where some
 * are given. Also finds what `otherSpelling` leaves alone: `MV` or `pa` by case, `dgeC` by a slip.
 */
export function suggestUnit(word: string, dimensions?: readonly Dimension[]): string | undefined {
  const fits = (symbol: string | undefined): boolean => {
    const found = symbol === undefined ? undefined : findUnit(symbol.split(' ')[0]!);
    return found !== undefined && (!dimensions || dimensions.includes(found.dimension));
  };
  const likely = [otherSpelling(word), composedSpelling(word, suggestUnit), caseSlip(word)?.symbol];
  return (
    likely.find(fits) ??
    misspelled(
      word,
      allUnits()
        .map(({ symbol }) => symbol)
        .filter(fits),
    )
  );
}

const BY_LOWER_CASE: ReadonlyMap<string, Unit> = new Map(
  [...allUnits()].reverse().map((unit) => [unit.symbol.toLowerCase(), unit]),
);

/** The unit that differs by case alone. `mHz` is not `MHz`: SI has both, and they are 10^9 apart. */
function caseSlip(word: string): Unit | undefined {
  const unit = BY_LOWER_CASE.get(word.toLowerCase());
  return unit && unit.symbol !== word && !milliForMega(word, unit.symbol) ? unit : undefined;
}

function milliForMega(word: string, symbol: string): boolean {
  return word[0] === 'm' && symbol[0] === 'M' && word.slice(1) === symbol.slice(1);
}

/** The only unit one slip away. */
function misspelled(word: string, symbols: readonly string[]): string | undefined {
  if (word.length < SHORTEST_MISSPELLING) return undefined;
  const near = symbols.filter((symbol) => symbol.length > 2 && slipsBetween(word, symbol, 1) === 1);
  return near.length === 1 ? near[0] : undefined;
}

/** Puts right the parts of a density or a sensitivity; `undefined` where there is nothing to put right. */
function composedSpelling(word: string, rightly: (part: string) => string | undefined): string | undefined {
  const slash = word.indexOf('/');
  if (slash < 1 || word.length > LONGEST_COMPOSED) return undefined;
  const root = PER_ROOT_HERTZ.exec(word);
  if (root) {
    const numerator = word.slice(0, root.index);
    const right = rightly(numerator);
    if (right === undefined && /^\/(?:rtHz|\u221AHz)$/.test(root[0])) return undefined;
    return `${right ?? numerator}/rtHz`;
  }
  const numerator = word.slice(0, slash);
  const of = tableUnit(numerator)?.symbol ?? rightly(numerator);
  if (of === undefined || tableUnit(of)?.dimension !== 'voltage') return undefined;
  const denominator = withoutBrackets(word.slice(slash + 1));
  const per = rightly(denominator);
  if (per === undefined && tableUnit(numerator)) return undefined;
  return findUnit(`${of}/(${per ?? denominator})`)?.symbol;
}
