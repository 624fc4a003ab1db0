import { describe, expect, it } from 'vitest';
import { analogueResponse } from '../../server/src/signal/analogue.ts';
import { digitalResponse } from '../../server/src/signal/digital.ts';
import type { Response } from '../../server/src/signal/response.ts';
import {
  allowedDb,
  type EllipticTables,
  type FirTables,
  filterOf,
  type PoleTable,
  type PoleTables,
  readTables,
} from './tables.ts';

// Source: SciPy 1.17 (scipy.signal), through make-tables.py beside this file.
const analogue = readTables<PoleTables>('./analogue.json');
const digital = readTables<PoleTables & { readonly rateHz: number }>('./digital.json');
const elliptic = readTables<EllipticTables>('./elliptic.json');
const fir = readTables<FirTables>('./fir.json');

/** The worst excess over what is allowed, with its place, so that a failure says where. */
function worstOf(table: PoleTable, frequencies: readonly number[], response: Response) {
  return frequencies
    .map((hz, i) => {
      const expected = table.attenuationDb[i]!;
      const actual = response.attenuationDb(hz);
      const off = actual === expected ? 0 : Math.abs(actual - expected);
      return { hz, expected, actual, excess: off - allowedDb(table, hz, expected) };
    })
    .reduce((worst, place) => (place.excess > worst.excess || Number.isNaN(place.excess) ? place : worst));
}

describe('analogue responses against SciPy', () => {
  it('reads tables of SciPy 1.17 with every response at orders 1 to 12', () => {
    expect(analogue.madeBy.scipy).toMatch(/^1\.17\./);
    const lowPasses = analogue.tables.filter((table) => table.shape === 'low-pass');
    expect(lowPasses.length).toBe(5 * 12);
    expect(analogue.frequencies.length).toBe(200);
  });

  it.each(analogue.tables)('$response, order $order, $shape', (table) => {
    const response = analogueResponse({ ...filterOf(table, analogue), tolerance: 0 });
    expect(worstOf(table, analogue.frequencies, response)).toSatisfy((worst: { excess: number }) => worst.excess <= 0);
  });

  it.each(elliptic.tables)(
    'elliptic, order $order, ripple $rippleDb dB, stop band $stopbandDb dB, to 1e-9',
    (table) => {
      const response = analogueResponse({
        response: 'elliptic',
        order: table.order,
        rippleDb: table.rippleDb,
        stopbandDb: table.stopbandDb,
        shape: 'low-pass',
        edge: { at: 'pass-edge', lowHz: 1, highHz: 1 },
        tolerance: 0,
      });
      elliptic.frequencies.forEach((hz, i) => {
        const ratio = 10 ** ((table.attenuationDb[i]! - response.attenuationDb(hz)) / 20);
        expect(Math.abs(ratio - 1)).toBeLessThan(1e-9);
      });
    },
  );
});

describe('digital responses through the bilinear transform against SciPy', () => {
  it.each(digital.tables)('$response, order $order, $shape', (table) => {
    const response = digitalResponse({ ...filterOf(table, digital), tolerance: 0, passes: 1 }, digital.rateHz);
    expect(worstOf(table, digital.frequencies, response)).toSatisfy((worst: { excess: number }) => worst.excess <= 0);
  });

  it('doubles the attenuation of a filter run forward and backward', () => {
    const table = digital.tables.find(({ response, order }) => response === 'chebyshev' && order === 5)!;
    const response = digitalResponse({ ...filterOf(table, digital), tolerance: 0, passes: 2 }, digital.rateHz);
    digital.frequencies.forEach((hz, i) => {
      expect(Math.abs(response.attenuationDb(hz) - 2 * table.attenuationDb[i]!)).toBeLessThan(2e-3);
    });
  });
});

describe('filters without feedback against SciPy', () => {
  it.each(fir.given)('$name: freqz', ({ taps, sum, levelDb }) => {
    const response = digitalResponse({ response: 'fir', taps, tolerance: 0, passes: 1 }, 1);
    const greatestDb = Math.max(...levelDb);
    const sumDb = 20 * Math.log10(Math.abs(sum));
    // Band-pass taps, of hardly any sum, are measured from their highest point, which may lie between two rows.
    const referenceDb = sumDb < greatestDb - 6.02 ? greatestDb : sumDb;
    const slack = referenceDb === sumDb ? 1e-6 : 0.02;
    fir.frequencies.forEach((hz, i) => {
      const expected = referenceDb - levelDb[i]!;
      const actual = response.attenuationDb(hz);
      // 12 digits of each tap leave about this of a null.
      if (expected > 200) expect(actual).toBeGreaterThan(200);
      else expect(Math.abs(actual - expected)).toBeLessThan(slack + 10 ** (expected / 20 - 11));
    });
  });

  it.each(fir.kaiser)('Kaiser design for $stopbandDb dB: firwin with kaiserord', (design) => {
    const response = digitalResponse({ response: 'kaiser', ...design, tolerance: 0, passes: 1 }, 1);
    fir.frequencies.forEach((hz, i) => {
      const expected = design.attenuationDb[i]!;
      expect(Math.abs(response.attenuationDb(hz) - expected)).toBeLessThan(1e-6 + 10 ** (expected / 20 - 10));
    });
  });
});
