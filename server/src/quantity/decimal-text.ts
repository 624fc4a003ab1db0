/** Between these powers of ten a number is written plainly, without an exponent. */
const LEAST_PLAIN_EXPONENT = -7;
const GREATEST_PLAIN_EXPONENT = 15;
/** A double never needs more. */
const MOST_DIGITS = 17;

/** `value` with at most so many significant digits (1 .. 17), without trailing zeros: `25.6`, `0.0002`, `1.5e20`. */
export function toDigits(value: number, digits: number): string {
  if (!Number.isFinite(value)) return String(value);
  const [mantissa = '0', power = '0'] = Math.abs(value)
    .toExponential(digits - 1)
    .split('e');
  const significant = mantissa.replace('.', '').replace(/0+$/, '') || '0';
  const sign = value < 0 ? '-' : '';
  return sign + placePoint(significant, Number(power));
}

/** The shortest decimal within the relative tolerance of `value`. */
export function shortestWithin(value: number, tolerance: number): string {
  for (let digits = 1; digits < MOST_DIGITS; digits += 1) {
    const text = toDigits(value, digits);
    if (Math.abs(Number(text) - value) <= tolerance * Math.abs(value)) return text;
  }
  return toDigits(value, MOST_DIGITS);
}

/** The digits `d1 d2 d3 ...` as the number d1.d2d3... x 10^power. */
function placePoint(digits: string, power: number): string {
  if (power < LEAST_PLAIN_EXPONENT || power > GREATEST_PLAIN_EXPONENT) {
    return `${withPoint(digits, 1)}e${power}`;
  }
  if (power < 0) return `0.${'0'.repeat(-power - 1)}${digits}`;
  return withPoint(digits.padEnd(power + 1, '0'), power + 1);
}

function withPoint(digits: string, before: number): string {
  return digits.length > before ? `${digits.slice(0, before)}.${digits.slice(before)}` : digits;
}
