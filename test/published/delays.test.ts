import { describe, expect, it } from 'vitest';
import type { FilterEdge, FilterShape, PoleFilter } from '../../server/src/signal/filter-spec.ts';
import { analoguePhase, digitalPhase } from '../../server/src/signal/group-delay.ts';
import type { PhaseResponse } from '../../server/src/signal/phase-response.ts';
import { readTables } from './tables.ts';

interface DelayTable {
  readonly response: 'butterworth' | 'bessel' | 'chebyshev' | 'inverse-chebyshev' | 'elliptic' | 'rc';
  readonly order: number;
  readonly shape: FilterShape;
  readonly edge: { readonly at: FilterEdge['at'] | 'corner'; readonly lowHz: number; readonly highHz: number };
  readonly delayS: readonly number[];
  readonly phaseRad: readonly number[];
}

interface TapTable {
  readonly name: string;
  readonly taps: readonly number[];
  readonly levels: readonly number[];
  readonly delayS: readonly number[];
  readonly phaseRad: readonly number[];
}

interface Tables<Table> {
  readonly frequencies: readonly number[];
  readonly tables: readonly Table[];
}

// Source: SciPy 1.17.1 (scipy.signal), through make-delay-tables.py beside this file.
const { madeBy, rippleDb, stopbandDb, analogue, digital, taps } = readTables<{
  readonly madeBy: { readonly scipy: string };
  readonly rippleDb: number;
  readonly stopbandDb: number;
  readonly analogue: Tables<DelayTable>;
  readonly digital: Tables<DelayTable>;
  readonly taps: Tables<TapTable>;
}>('./delays.json');

function filterOf({ response, order, shape, edge: { at, lowHz, highHz } }: DelayTable): PoleFilter {
  if (response === 'rc') return { response, order, shape, cornerHz: { lowHz, highHz } };
  if (at === 'corner') throw new Error('only single poles have corners');
  return { response, order, shape, edge: { at, lowHz, highHz }, rippleDb, stopbandDb };
}

/** How far two angles are apart, whole turns aside. */
function apart(first: number, second: number): number {
  const turns = (first - second) / (2 * Math.PI);
  return Math.abs(turns - Math.round(turns)) * 2 * Math.PI;
}

function expectDelays({ delayS, phaseRad }: DelayTable, frequencies: readonly number[], actual: PhaseResponse): void {
  frequencies.forEach((hz, i) => {
    expect(Math.abs(actual.groupDelayS(hz) / delayS[i]! - 1), `delay at ${hz}`).toBeLessThan(1e-6);
    expect(apart(actual.phaseRad(hz), phaseRad[i]!), `phase at ${hz}`).toBeLessThan(1e-6);
  });
}

describe('group delay and phase against SciPy', () => {
  it('reads tables of SciPy 1.17.1 with every response at orders 1 to 12 in every shape', () => {
    expect(madeBy.scipy).toBe('1.17.1');
    expect(analogue.tables.length).toBe(6 * 12 * 3 + 2);
    expect(digital.tables.length).toBe(6 * 12 * 3);
    for (const { frequencies } of [analogue, digital, taps]) expect(frequencies.length).toBe(40);
  });

  it.each(analogue.tables)('analogue $response, order $order, $shape', (table) => {
    expectDelays(table, analogue.frequencies, analoguePhase({ ...filterOf(table), tolerance: 0 })!);
  });

  it.each(digital.tables)('digital $response, order $order, $shape', (table) => {
    expectDelays(table, digital.frequencies, digitalPhase({ ...filterOf(table), tolerance: 0, passes: 1 }, 1)!);
  });

  it.each(taps.tables)('taps: $name', (table) => {
    const actual = digitalPhase({ response: 'fir', taps: table.taps, tolerance: 0, passes: 1 }, 1)!;
    const size = table.taps.reduce((sum, tap) => sum + Math.abs(tap), 0);
    taps.frequencies.forEach((hz, i) => {
      // A delay is a quotient by |H|, whose digits go with it near a zero; 11 digits of each tap are in the table.
      const slack = 1e-6 + (1e-10 * size) / table.levels[i]!;
      expect(Math.abs(actual.groupDelayS(hz) - table.delayS[i]!), `delay at ${hz}`).toBeLessThan(
        slack * table.taps.length,
      );
      expect(apart(actual.phaseRad(hz), table.phaseRad[i]!), `phase at ${hz}`).toBeLessThan(slack);
    });
  });

  it.each([
    ['mean of 7', { response: 'moving-average', length: 7 }],
    ['three means of 7', { response: 'cic', order: 3, delay: 1, decimation: 7 }],
    ['Kaiser low-pass of 39', { response: 'kaiser', passHz: 0.2, stopHz: 0.3, stopbandDb: 60 }],
  ] as const)('%s by its own name', (name, filter) => {
    const table = taps.tables.find((candidate) => candidate.name === name)!;
    const actual = digitalPhase({ ...filter, tolerance: 0, passes: 1 }, 1)!;
    taps.frequencies.forEach((hz, i) => {
      expect(Math.abs(actual.groupDelayS(hz) - table.delayS[i]!)).toBeLessThan(1e-6 * table.taps.length);
      // Where only rounding is left of the level the angle has no meaning.
      if (table.levels[i]! > 1e-5) expect(apart(actual.phaseRad(hz), table.phaseRad[i]!)).toBeLessThan(1e-5);
    });
  });
});

describe('group delay and phase from handbooks', () => {
  const edge = { at: 'cutoff', lowHz: 1, highHz: 1 } as const;

  // Source: Zverev, Handbook of Filter Synthesis, and Thomson 1949: the Bessel filter of order n with a delay of 1 at
  // 0 Hz has its 3 dB point at w = 1, 1.36, 1.76, 2.11, 2.43, 2.70 for n = 1 .. 6; from memory.
  it.each([
    [1, 1.0],
    [2, 1.36],
    [3, 1.76],
    [4, 2.11],
    [5, 2.43],
    [6, 2.7],
  ])('Bessel of order %d delays by %f / (2 pi cutoff), flat to within 1e-3 over a fifth of the cutoff', (order, w) => {
    const { groupDelayS } = analoguePhase({ response: 'bessel', order, shape: 'low-pass', edge, tolerance: 0 })!;
    expect(Math.abs(2 * Math.PI * groupDelayS(0) - w)).toBeLessThan(0.006);
    if (order > 2) expect(Math.abs(groupDelayS(0.2) / groupDelayS(0) - 1)).toBeLessThan(1e-3);
  });

  // Source: the same, Butterworth: delay at 0 Hz the sum of 1, 1.414, 2, 2.613, 3.236, 3.864; 45 degrees for each pole
  // at the cutoff.
  it.each([
    [1, 1],
    [2, Math.SQRT2],
    [3, 2],
    [4, 2.613],
    [5, 3.236],
    [6, 3.864],
  ])('Butterworth of order %d delays by %f / (2 pi cutoff) at 0 Hz and turns by 45 degrees a pole', (order, w) => {
    const phase = analoguePhase({ response: 'butterworth', order, shape: 'low-pass', edge, tolerance: 0 })!;
    expect(Math.abs(2 * Math.PI * phase.groupDelayS(0) - w)).toBeLessThan(0.001);
    expect(phase.phaseRad(1)).toBeCloseTo((-order * Math.PI) / 4, 9);
  });
});
