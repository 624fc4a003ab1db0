import { LEAST_DB } from './chebyshev.ts';
import { lnPowerOfAttenuation } from './decibel.ts';
import { ellipticModuli } from './elliptic.ts';
import { jacobiAt, partAtTangent } from './jacobi.ts';
import type { Pole, PolesAndZeros } from './prototype-phase.ts';

/** Poles and zeros of the low-pass prototypes, x = 1 where the formula of each has its edge. */

/** On the unit circle, at equal angles. */
export function butterworthPoles(order: number): PolesAndZeros {
  const poles = anglesOf(order).map((angle) => ({ decay: Math.sin(angle), position: Math.cos(angle) }));
  return { poles, zeros: [] };
}

/** `order` times the same. */
export function singlePoles(order: number): PolesAndZeros {
  return { poles: new Array<Pole>(order).fill({ decay: 1, position: 0 }), zeros: [] };
}

/** On an ellipse: where T(x) = ±j / e. Source: Antoniou, Digital Filters, the chapter on Chebyshev approximations. */
export function chebyshevPoles(order: number, rippleDb: number): PolesAndZeros {
  return { poles: onEllipse(order, -lnPowerOfAttenuation(Math.max(rippleDb, LEAST_DB)) / 2), zeros: [] };
}

/** The reciprocals of Chebyshev's poles, and of the zeros of his polynomial. */
export function inverseChebyshevPoles(order: number, stopbandDb: number): PolesAndZeros {
  const poles = onEllipse(order, lnPowerOfAttenuation(Math.max(stopbandDb, LEAST_DB)) / 2).map(reciprocal);
  const zeros = anglesOf(order)
    .slice(0, Math.floor(order / 2))
    .map((angle) => 1 / Math.cos(angle));
  return { poles, zeros };
}

/**
 * At j sn(a + j b), with a going through the zeros of R, and b where R is ±j / e. In units of the quarter period of
 * the complementary modulus, b is the same part for the moduli of both sides of the degree equation.
 * Source: Cauer 1931; Antoniou, Digital Filters; sn of a complex argument, Abramowitz and Stegun 16.21.
 */
export function ellipticPoles(order: number, rippleDb: number, stopbandDb: number): PolesAndZeros {
  const { lnPower, selectivity, modulus } = ellipticModuli(order, rippleDb, stopbandDb);
  const part = partAtTangent(Math.exp(-lnPower / 2), { k: selectivity.complement, complement: selectivity.k });
  const across = jacobiAt(part, { k: modulus.complement, complement: modulus.k });
  const poles: Pole[] = [];
  const zeros: number[] = [];
  for (let i = 0; i < order; i++) {
    const place = order - 1 - 2 * i;
    const { sn, cn, dn } = jacobiAt(Math.abs(place) / order, modulus);
    const size = across.cn ** 2 + (modulus.k * sn * across.sn) ** 2;
    poles.push({
      decay: (cn * dn * across.sn * across.cn) / size,
      position: (Math.sign(place) * sn * across.dn) / size,
    });
    if (place > 0) zeros.push(1 / (modulus.k * sn));
  }
  return { poles, zeros };
}

function anglesOf(order: number): readonly number[] {
  return Array.from({ length: order }, (_, k) => (Math.PI * (2 * k + 1)) / (2 * order));
}

/** @param lnReach the natural logarithm of what the polynomial reaches, with a factor of ±j, at the poles */
function onEllipse(order: number, lnReach: number): readonly Pole[] {
  // Past this e^lnReach is near the greatest double, and the arsinh is its logarithm.
  const reach = (lnReach > 300 ? lnReach + Math.LN2 : Math.asinh(Math.exp(lnReach))) / order;
  return anglesOf(order).map((angle) => ({
    decay: Math.sinh(reach) * Math.sin(angle),
    position: Math.cosh(reach) * Math.cos(angle),
  }));
}

function reciprocal({ decay, position }: Pole): Pole {
  const square = decay * decay + position * position;
  return { decay: decay / square, position: -position / square };
}
