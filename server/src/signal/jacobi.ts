/**
 * Jacobi elliptic functions, kept accurate as the modulus nears 1: every function takes the complementary modulus k'
 * beside k, since 1 - k^2 would lose it.
 * Source: Abramowitz and Stegun, Handbook of Mathematical Functions, chapters 16 and 17.
 */

/** A modulus and its complement, k^2 + k'^2 = 1. */
export interface Modulus {
  readonly k: number;
  readonly complement: number;
}

export interface JacobiValues {
  readonly sn: number;
  readonly cn: number;
  readonly dn: number;
}

/** Under this complement the functions are hyperbolic to within its size. */
const HYPERBOLIC = 1e-10;

/** Arithmetic-geometric mean of two positive numbers. */
export function arithmeticGeometricMean(first: number, second: number): number {
  let a = first;
  let b = second;
  for (let step = 0; step < 60 && Math.abs(a - b) > 1e-16 * a; step++) {
    const mean = (a + b) / 2;
    b = Math.sqrt(a * b);
    a = mean;
  }
  return a;
}

/** Complete elliptic integral of the first kind, K(k). */
export function quarterPeriod(modulus: Modulus): number {
  return Math.PI / (2 * arithmeticGeometricMean(1, modulus.complement));
}

/** K(k') / K(k). */
export function periodRatio(modulus: Modulus): number {
  return arithmeticGeometricMean(1, modulus.complement) / arithmeticGeometricMean(1, modulus.k);
}

/** The modulus whose periods stand in the ratio K(k') / K(k), through theta functions of the smaller nome. */
export function modulusOfPeriodRatio(ratio: number): Modulus {
  // Past this the smaller of the pair would vanish as a double and its reciprocal with it.
  const limited = Math.min(Math.max(ratio, 1 / 200), 200);
  if (limited >= 1) {
    const { small, large } = moduliOfNome(Math.exp(-Math.PI * limited));
    return { k: small, complement: large };
  }
  const { small, large } = moduliOfNome(Math.exp(-Math.PI / limited));
  return { k: large, complement: small };
}

/** (theta2 / theta3)^2 and (theta4 / theta3)^2 at 0, for a nome of at most exp(-pi): four terms are exact. */
function moduliOfNome(q: number): {
  readonly small: number;
  readonly large: number;
} {
  const theta2 = 2 * q ** 0.25 * (1 + q ** 2 + q ** 6 + q ** 12);
  const theta3 = 1 + 2 * (q + q ** 4 + q ** 9 + q ** 16);
  const theta4 = 1 + 2 * (-q + q ** 4 - q ** 9 + q ** 16);
  return { small: (theta2 / theta3) ** 2, large: (theta4 / theta3) ** 2 };
}

/** sn, cn and dn at `part` of the quarter period K, 0 <= part <= 1. */
export function jacobiAt(part: number, modulus: Modulus): JacobiValues {
  if (part <= 0.5) return lowerHalf(part, modulus);
  const { sn, cn, dn } = lowerHalf(1 - part, modulus);
  const { complement } = modulus;
  return { sn: cn / dn, cn: (complement * sn) / dn, dn: complement / dn };
}

/**
 * The part of the quarter period at which sn / cn has a value, not negative: F(atan(tangent), k) / K(k).
 * Source: Abramowitz and Stegun 17.6.
 */
export function partAtTangent(tangent: number, modulus: Modulus): number {
  let a = 1;
  let b = modulus.complement;
  let phi = Math.atan(tangent);
  let doublings = 0;
  for (; doublings < 60 && Math.abs(a - b) > 1e-16 * a; doublings++) {
    phi += Math.atan((b / a) * Math.tan(phi)) + Math.PI * Math.floor(phi / Math.PI + 0.5);
    const mean = (a + b) / 2;
    b = Math.sqrt(a * b);
    a = mean;
  }
  return Math.min(phi / (Math.PI / 2) / 2 ** doublings, 1);
}

function lowerHalf(part: number, modulus: Modulus): JacobiValues {
  const u = part * quarterPeriod(modulus);
  if (modulus.complement < HYPERBOLIC) {
    const secant = 1 / Math.cosh(u);
    return { sn: Math.tanh(u), cn: secant, dn: secant };
  }
  return descendingLanden(u, modulus);
}

/** Abramowitz and Stegun 16.4. */
function descendingLanden(u: number, modulus: Modulus): JacobiValues {
  const means: number[] = [];
  const ratios: number[] = [];
  let a = 1;
  let b = modulus.complement;
  let c = modulus.k;
  while (means.length < 40 && Math.abs(c) > 1e-17 * a) {
    const mean = (a + b) / 2;
    c = (a - b) / 2;
    b = Math.sqrt(a * b);
    a = mean;
    means.push(a);
    ratios.push(c / a);
  }
  let phi = u * a * 2 ** means.length;
  for (let n = means.length - 1; n >= 0; n--) phi = (phi + Math.asin(ratios[n]! * Math.sin(phi))) / 2;
  const cn = Math.cos(phi);
  return {
    sn: Math.sin(phi),
    cn,
    dn: Math.hypot(modulus.complement, modulus.k * cn),
  };
}
