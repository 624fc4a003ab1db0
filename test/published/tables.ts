import { readFileSync } from 'node:fs';
import type { FilterEdge, FilterShape, PoleFilter } from '../../server/src/signal/filter-spec.ts';

/** The tables that make-tables.py writes beside this file. */

export interface PoleTable {
  readonly response: 'butterworth' | 'bessel' | 'chebyshev' | 'inverse-chebyshev' | 'elliptic';
  readonly order: number;
  readonly shape: FilterShape;
  readonly edge: FilterEdge;
  readonly notchesHz: readonly number[];
  readonly attenuationDb: readonly number[];
}

export interface PoleTables {
  readonly madeBy: { readonly scipy: string };
  readonly rippleDb: number;
  readonly stopbandDb: number;
  readonly frequencies: readonly number[];
  readonly tables: readonly PoleTable[];
}

export interface EllipticTables {
  readonly frequencies: readonly number[];
  readonly tables: readonly {
    readonly order: number;
    readonly rippleDb: number;
    readonly stopbandDb: number;
    readonly attenuationDb: readonly number[];
  }[];
}

export interface FirTables {
  readonly frequencies: readonly number[];
  readonly given: readonly {
    readonly name: string;
    readonly taps: readonly number[];
    readonly sum: number;
    readonly levelDb: readonly number[];
  }[];
  readonly kaiser: readonly {
    readonly stopbandDb: number;
    readonly passHz: number;
    readonly stopHz: number;
    readonly beta: number;
    readonly taps: readonly number[];
    readonly attenuationDb: readonly number[];
  }[];
}

export function readTables<Tables>(name: string): Tables {
  return JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8')) as Tables;
}

export function filterOf(table: PoleTable, { rippleDb, stopbandDb }: PoleTables): PoleFilter {
  return { ...table, rippleDb, stopbandDb };
}

/** How far a value may be from the table's: 1e-6 dB, 1e-3 dB above 200 dB or within 0.1 % of a notch. */
export function allowedDb(table: PoleTable, frequencyHz: number, attenuationDb: number): number {
  const isByNotch = table.notchesHz.some((notchHz) => Math.abs(frequencyHz / notchHz - 1) < 1e-3);
  return attenuationDb > 200 || isByNotch ? 1e-3 : 1e-6;
}
