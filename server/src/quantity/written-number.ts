/** A number as it stands in the text. */
export interface WrittenNumber {
  /** As written, before the unit. Never `-0`; infinite where it is too large for a double. */
  readonly value: number;
  readonly text: string;
  /** Digits after the point. */
  readonly decimals: number;
  /** Of `1.5e6`, the 6: the last digit's weight is 10^(exponent - decimals). */
  readonly exponent: number;
  /** All digits as one whole number, sign included; `undefined` past 15 significant ones, where a double would round. */
  readonly digits: number | undefined;
  /** Offsets in the scalar's text. */
  readonly start: number;
  readonly end: number;
}

const PLUS = 43;
const MINUS = 45;
const POINT = 46;
const ZERO = 48;
const TRUE_MINUS = 0x2212;
/** Whole numbers of so many digits are exact in a double. */
const EXACT_DIGITS = 15;
/** Keeps the exponent itself finite; any double over- or underflows long before. */
const EXPONENT_LIMIT = 99_999;
/** 10^22 is the last power of ten that a double holds exactly. */
const LAST_EXACT_POWER = 22;
/** 10^-22 .. 10^22. */
const POWERS: readonly number[] = Array.from({ length: 2 * LAST_EXACT_POWER + 1 }, (_, index) =>
  Number(`1e${index - LAST_EXACT_POWER}`),
);

/** 10^power, correctly rounded. */
export function powerOfTen(power: number): number {
  return isNear(power) ? POWERS[power + LAST_EXACT_POWER]! : Number(`1e${power}`);
}

function isNear(power: number): boolean {
  return power >= -LAST_EXACT_POWER && power <= LAST_EXACT_POWER;
}

export function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

/** `value` x 10^power, rounded once where 10^|power| is exact. */
export function shiftedByTens(value: number, power: number): number {
  if (power < 0) return value / powerOfTen(-power);
  return power === 0 ? value : value * powerOfTen(power);
}

/**
 * Scans the number that starts at `start`: a sign (`+`, `-` or U+2212), digits with at most one point, an exponent.
 * `5.` and `.5` are numbers; a point that begins `..` belongs to the range, not to the number.
 */
export function scanNumber(text: string, start: number): WrittenNumber | undefined {
  let at = start;
  const sign = text.charCodeAt(at);
  const negative = sign === MINUS || sign === TRUE_MINUS;
  if (negative || sign === PLUS) at += 1;

  let digits = 0;
  let significant = 0;
  let count = 0;
  let decimals = 0;
  let pointSeen = false;
  for (; ; at += 1) {
    const code = text.charCodeAt(at);
    if (isDigit(code)) {
      digits = digits * 10 + (code - ZERO);
      if (digits > 0) significant += 1;
      count += 1;
      if (pointSeen) decimals += 1;
    } else if (code === POINT && !pointSeen && text.charCodeAt(at + 1) !== POINT) {
      pointSeen = true;
    } else {
      break;
    }
  }
  if (count === 0) return undefined;

  const exponentEnd = scanExponent(text, at);
  const exponent = exponentEnd === at ? 0 : readExponent(text.slice(at + 1, exponentEnd));
  const exact = significant <= EXACT_DIGITS ? (negative ? -digits : digits) + 0 : undefined;
  const written = text.slice(start, exponentEnd);
  const value = timesTens(written, exact, exponent - decimals, exponent);
  return { value, text: written, decimals, exponent, digits: exact, start, end: exponentEnd };
}

/** The end of an exponent that starts at `at`, or `at`. */
function scanExponent(text: string, at: number): number {
  const letter = text.charCodeAt(at);
  if (letter !== 101 /* e */ && letter !== 69 /* E */) return at;
  const sign = text.charCodeAt(at + 1);
  const first = sign === PLUS || sign === MINUS || sign === TRUE_MINUS ? at + 2 : at + 1;
  let end = first;
  while (isDigit(text.charCodeAt(end))) end += 1;
  return end === first ? at : end;
}

function readExponent(text: string): number {
  const exponent = Number(text.replace('\u2212', '-'));
  return Math.max(-EXPONENT_LIMIT, Math.min(EXPONENT_LIMIT, exponent)) + 0;
}

/**
 * The written number times 10^tens, as near as a double can be (`8.2` times a thousand is 8200, not
 * 8199.999999999999): the power of ten is joined with the written one before anything is rounded.
 */
export function valueTimesTens(number: WrittenNumber, tens: number): number {
  const { text, digits, decimals, exponent } = number;
  return timesTens(text, digits, exponent - decimals + tens, exponent + tens);
}

/** The digits times 10^power; where that would round twice, the text without its own exponent times 10^textPower. */
function timesTens(text: string, digits: number | undefined, power: number, textPower: number): number {
  if (digits !== undefined && isNear(power)) return shiftedByTens(digits, power);
  const unsigned = text.replace(/^[-+\u2212]/, '').replace(/[eE].*$/, '');
  const magnitude = Number(`${unsigned}e${textPower}`);
  return (/^[-\u2212]/.test(text) ? -magnitude : magnitude) + 0;
}
