import { type Curve, type Turn, turningCurve } from './curve.ts';
import { attenuationOfLnPower, HALF_POWER_DB, lnPowerOfAttenuation } from './decibel.ts';
import { jacobiAt, type Modulus, modulusOfPeriodRatio, periodRatio } from './jacobi.ts';

/** What the reader refuses anyway, kept within what the functions can hold. */
const LEAST_RIPPLE_DB = 1e-9;
const GREATEST_STOPBAND_DB = 2000;

/** |1 - x^2| past which a factor has reached its limit, and x^2 might overflow. */
const FAR = 1e30;

/** The Cauer rational function, factored: one entry a pair of zeros. */
interface CauerFunction {
  readonly lnPower: number;
  readonly isOdd: boolean;
  readonly modulus: Modulus;
  /** Per pair of zeros at z: 1 - z^2, 1 - k^2 z^2 and k^2 z^2. */
  readonly zeroGaps: Float64Array;
  readonly poleGaps: Float64Array;
  readonly poleScales: Float64Array;
}

/** An elliptic prototype and where it stands relative to its pass edge. */
export interface EllipticPrototype {
  /** x = 1 at the pass edge. */
  readonly curve: Curve;
  /** Where it is 3.0103 dB down; the pass edge where the ripple is no less. */
  readonly cutoff: number;
  readonly stopEdge: number;
}

/**
 * Elliptic (Cauer): A = 10 log10(1 + e^2 R(x)^2), R of value 1 at the pass edge, of at least
 * sqrt((10^(stopband / 10) - 1) / (10^(ripple / 10) - 1)) from the stop edge on.
 *
 * R(cd(u K)) = cd(order u K1); the moduli follow from the degree equation order K' / K = K1' / K1.
 * Source: Cauer 1931; Antoniou, Digital Filters, the chapter on elliptic approximations.
 */
export function ellipticPrototype(order: number, rippleDb: number, stopbandDb: number): EllipticPrototype {
  const { ripple, stopband } = heldLevels(rippleDb, stopbandDb);
  const cauer = cauerFunction(order, ripple, stopband);
  const curve = turningCurve((x) => attenuationAt(cauer, x), turnsOf(order, ripple, stopband, cauer.modulus));
  const stopEdge = 1 / cauer.modulus.k;
  return { curve, cutoff: cutoffOf(curve, ripple, stopEdge), stopEdge };
}

interface EllipticModuli {
  /** ln e^2. */
  readonly lnPower: number;
  /** Of R along its values, k1. */
  readonly selectivity: Modulus;
  /** Of R along the frequency, k: its reciprocal is the stop edge. */
  readonly modulus: Modulus;
}

/** The moduli that the degree equation ties together. */
export function ellipticModuli(order: number, rippleDb: number, stopbandDb: number): EllipticModuli {
  const { ripple, stopband } = heldLevels(rippleDb, stopbandDb);
  const lnPower = lnPowerOfAttenuation(ripple);
  const lnSelectivity = lnPower - lnPowerOfAttenuation(stopband);
  const selectivity = { k: Math.exp(lnSelectivity / 2), complement: Math.sqrt(-Math.expm1(lnSelectivity)) };
  return { lnPower, selectivity, modulus: modulusOfPeriodRatio(periodRatio(selectivity) / order) };
}

function heldLevels(rippleDb: number, stopbandDb: number): { readonly ripple: number; readonly stopband: number } {
  const ripple = Math.max(rippleDb, LEAST_RIPPLE_DB);
  return { ripple, stopband: Math.min(Math.max(stopbandDb, ripple * (1 + 1e-6)), GREATEST_STOPBAND_DB) };
}

function cauerFunction(order: number, ripple: number, stopband: number): CauerFunction {
  const { lnPower, modulus } = ellipticModuli(order, ripple, stopband);
  const pairs = Math.floor(order / 2);
  const zeroGaps = new Float64Array(pairs);
  const poleGaps = new Float64Array(pairs);
  const poleScales = new Float64Array(pairs);
  for (let i = 0; i < pairs; i++) {
    // z = cd((2i + 1) K / order), counted from the other end of the quarter period, where cd is sn.
    const { sn, cn, dn } = jacobiAt((order - 2 * i - 1) / order, modulus);
    zeroGaps[i] = cn * cn;
    poleGaps[i] = dn * dn;
    poleScales[i] = (modulus.k * sn) ** 2;
  }
  return {
    lnPower,
    isOdd: order % 2 === 1,
    modulus,
    zeroGaps,
    poleGaps,
    poleScales,
  };
}

/**
 * Each factor (x^2 - z^2) / (1 - k^2 z^2 x^2), scaled to 1 at x = 1, is written with 1 - x^2, 1 - z^2 and 1 - k^2 z^2,
 * which stay exact where a steep filter crowds its zeros and poles against the edge.
 */
function attenuationAt(cauer: CauerFunction, x: number): number {
  const gap = Math.max((1 - x) * (1 + x), -FAR);
  let product = 1;
  for (let i = 0; i < cauer.zeroGaps.length; i++) {
    const zeroGap = cauer.zeroGaps[i]!;
    const poleGap = cauer.poleGaps[i]!;
    product *= ((zeroGap - gap) / (poleGap + cauer.poleScales[i]! * gap)) * (poleGap / zeroGap);
  }
  const lnValue = Math.log(Math.abs(product)) + (cauer.isOdd ? Math.log(x) : 0);
  return attenuationOfLnPower(cauer.lnPower + 2 * lnValue);
}

/** Zeros and ripple peaks of the pass band, then peaks and nulls of the stop band, ascending. */
function turnsOf(order: number, ripple: number, stopband: number, modulus: Modulus): readonly Turn[] {
  const passBand: Turn[] = [];
  const stopBand: Turn[] = [];
  for (let i = 1; i < order; i++) {
    const isZero = i % 2 === (order - 1) % 2;
    const { sn } = jacobiAt(i / order, modulus);
    passBand.push({ x: sn, db: isZero ? 0 : ripple });
    stopBand.push({
      x: 1 / (modulus.k * sn),
      db: isZero ? Infinity : stopband,
    });
  }
  return [...passBand, ...stopBand.reverse()];
}

/** Between pass edge and stop edge the curve only rises. */
function cutoffOf(curve: Curve, ripple: number, stopEdge: number): number {
  if (ripple >= HALF_POWER_DB) return 1;
  let low = 1;
  let high = stopEdge;
  for (let step = 0; step < 100; step++) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (curve.at(middle) < HALF_POWER_DB) low = middle;
    else high = middle;
  }
  return high;
}
