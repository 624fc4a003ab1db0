import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chainOf } from '../../server/src/chain/chain.ts';
import { phaseApartAt } from '../../server/src/chain/phase-apart.ts';
import { spectrumOf } from '../../server/src/signal/spectrum-fft.ts';
import { found } from '../checks/judged.ts';
import { readRig } from '../rig/fixture.ts';
import { runs } from '../tools/runs.ts';
import { butterworthDesign, kaiserDesign, type RunnableFilter, run, runningMean } from './run-filters.ts';

const RECORD = 1024;
/** Samples that are thrown away while the filters settle. */
const SETTLING = 1024;
const RATE_HZ = 10_240;
const SPACING_HZ = RATE_HZ / RECORD;

/** What a channel is made of: poles ahead of the converter, a digital step behind it, its turn in the scan. */
interface Path {
  readonly cornersHz: readonly number[];
  readonly step: Step;
}

type Step =
  | { readonly kind: 'none' }
  | { readonly kind: 'mean'; readonly length: number }
  | { readonly kind: 'kaiser'; readonly pass: number }
  | { readonly kind: 'butterworth'; readonly order: number; readonly cutoff: number };

const step: fc.Arbitrary<Step> = fc.oneof(
  fc.constant<Step>({ kind: 'none' }),
  fc.record({ kind: fc.constant('mean' as const), length: fc.integer({ min: 2, max: 6 }) }),
  fc.record({ kind: fc.constant('kaiser' as const), pass: fc.constantFrom(0.1, 0.15, 0.2) }),
  fc.record({
    kind: fc.constant('butterworth' as const),
    order: fc.integer({ min: 1, max: 6 }),
    cutoff: fc.constantFrom(0.15, 0.2, 0.25),
  }),
);

const path: fc.Arbitrary<Path> = fc.record({
  cornersHz: fc.array(fc.integer({ min: 500, max: 5000 }), { maxLength: 2 }),
  step,
});

function stepText(one: Step): string {
  switch (one.kind) {
    case 'none':
      return '';
    case 'mean':
      return `, then: [{ filter: { response: moving-average, length: ${one.length} } }]`;
    case 'kaiser':
      return `, then: [{ filter: { response: kaiser, pass: ${one.pass} fs, stop: ${one.pass + 0.1} fs, stopband: 60 dB } }]`;
    case 'butterworth':
      return `, then: [{ filter: { response: butterworth, order: ${one.order}, cutoff: ${one.cutoff} fs } }]`;
  }
}

function runnable(one: Step): RunnableFilter | undefined {
  switch (one.kind) {
    case 'none':
      return undefined;
    case 'mean':
      return runningMean(one.length);
    case 'kaiser':
      return kaiserDesign(one.pass, one.pass + 0.1, 60);
    case 'butterworth':
      return butterworthDesign(one.order, one.cutoff);
  }
}

function channelText({ cornersHz, step: one }: Path): string {
  const filters = cornersHz.map((hz) => `{ response: rc, order: 1, corner: ${hz} Hz }`).join(', ');
  return `{ filter: [${filters}]${stepText(one)} }`;
}

function rigText(first: Path, second: Path, intervalNs: number, bin: number): string {
  return `rig: Rehearsed
digitizers: { d: { sampling: scanned, scan-interval: ${intervalNs} ns } }
groups: { g: { within: 1e-9 deg, up-to: ${bin * SPACING_HZ} Hz } }
defaults: { digitizer: d, rate: ${RATE_HZ} Hz, band: 0 Hz .. 1 kHz, undeclared: -90 dBFS, group: g }
channels:
  first: ${channelText(first)}
  second: ${channelText(second)}
`;
}

/**
 * The phase in degrees of a tone on a bin, sampled so much later and run through the channel: a pole at fc turns it back
 * by atan(f / fc). Source: any textbook of circuits.
 */
function recordedPhase({ cornersHz, step: one }: Path, bin: number, delayS: number): number {
  const hz = bin * SPACING_HZ;
  const behind = cornersHz.reduce((sum, corner) => sum + Math.atan(hz / corner), 0);
  const samples = Float64Array.from({ length: RECORD + SETTLING }, (_, n) =>
    Math.cos(2 * Math.PI * (((bin * n) % RECORD) / RECORD + hz * delayS) - behind),
  );
  const filter = runnable(one);
  const { re, im } = spectrumOf((filter ? run(filter, samples) : samples).slice(-RECORD));
  return (Math.atan2(im[bin]!, re[bin]!) * 180) / Math.PI;
}

/** To -180 .. 180 degrees: whole turns can't be seen in a record. */
function wrapped(degrees: number): number {
  return degrees - 360 * Math.round(degrees / 360);
}

describe('two channels of a group, rehearsed', () => {
  it('are as far apart as the chain and the turn in the scan say, and as the checks tell', () => {
    let told = 0;
    fc.assert(
      fc.property(
        path,
        path,
        fc.integer({ min: 1, max: 40_000 }),
        fc.integer({ min: 2, max: 100 }),
        (first, second, intervalNs, bin) => {
          const hz = bin * SPACING_HZ;
          const text = rigText(first, second, intervalNs, bin);
          const delayS = intervalNs * 1e-9;
          const measured = recordedPhase(second, bin, delayS) - recordedPhase(first, bin, 0);
          const [one, other] = readRig(text).readings.map(({ channel }) => chainOf(channel)!);
          const chainDeg = (phaseApartAt(other!, one!, hz)! * 180) / Math.PI;
          const [skew] = found(text, 'scan-skew');
          expect(skew!.figures['phaseDeg']).toBeCloseTo(360 * hz * delayS, 6);
          expect(wrapped(measured - chainDeg - Number(skew!.figures['phaseDeg']))).toBeCloseTo(0, 5);
          const [mismatch] = found(text, 'phase-mismatch');
          if (!mismatch) expect(chainDeg).toBeCloseTo(0, 5);
          else {
            // It may be greatest below the top.
            expect(Math.abs(Number(mismatch.figures['phaseDeg']))).toBeGreaterThan(Math.abs(chainDeg) - 1e-6);
            told++;
          }
        },
      ),
      { seed: 20261201, numRuns: runs(200) },
    );
    expect(told).toBeGreaterThan(runs(200) / 2);
  }, 600_000);

  it('shows 3.6 degrees at 1 kHz for 10 us', () => {
    const plain: Path = { cornersHz: [], step: { kind: 'none' } };
    expect(recordedPhase(plain, 100, 10e-6) - recordedPhase(plain, 100, 0)).toBeCloseTo(3.6, 9);
  });
});
