import fc from 'fast-check';
import type {
  AnalogueFilter,
  CurveFilter,
  DigitalFilter,
  FilterEdge,
  FilterShape,
  PoleFilter,
  StepFilter,
} from '../../server/src/signal/filter-spec.ts';

/** Filters as a rig might have them, around 1 kHz; digital ones for an input rate of 10 kHz. */

export const DIGITAL_RATE_HZ = 10_000;

const order = fc.integer({ min: 1, max: 12 });
const shape = fc.constantFrom<FilterShape>('low-pass', 'high-pass', 'band-pass');
const rippleDb = fc.double({ min: 0.01, max: 2.5, noNaN: true });
const stopbandDb = fc.double({ min: 20, max: 120, noNaN: true });
const tolerance = fc.constantFrom(0, 0, 0.01, 0.05, 0.3);

function edge(at: FilterEdge['at']): fc.Arbitrary<FilterEdge> {
  return fc
    .tuple(fc.double({ min: 50, max: 2000, noNaN: true }), fc.double({ min: 1.1, max: 2, noNaN: true }))
    .map(([lowHz, ratio]) => ({ at, lowHz, highHz: lowHz * ratio }));
}

export const poleFilter: fc.Arbitrary<PoleFilter> = fc.oneof(
  fc.record({
    response: fc.constantFrom('butterworth', 'bessel'),
    order,
    shape,
    edge: edge('cutoff'),
  }),
  fc.record({
    response: fc.constant('chebyshev'),
    order,
    rippleDb,
    shape,
    edge: fc.oneof(edge('cutoff'), edge('pass-edge')),
  }),
  fc.record({
    response: fc.constant('inverse-chebyshev'),
    order,
    stopbandDb,
    shape,
    edge: fc.oneof(edge('cutoff'), edge('stop-edge')),
  }),
  fc.record({
    response: fc.constant('elliptic'),
    order,
    rippleDb,
    stopbandDb,
    shape,
    edge: fc.oneof(edge('cutoff'), edge('pass-edge'), edge('stop-edge')),
  }),
  fc.record({
    response: fc.constant('rc'),
    order,
    shape,
    given: fc.constantFrom('corner', 'cutoff'),
    cornerHz: edge('cutoff').map(({ lowHz, highHz }) => ({ lowHz, highHz })),
  }),
) as fc.Arbitrary<PoleFilter>;

export const curveFilter: fc.Arbitrary<CurveFilter> = fc.oneof(
  fc.record({
    response: fc.constant('mask' as const),
    passHz: fc.double({ min: 100, max: 1000, noNaN: true }),
    stopHz: fc.double({ min: 1000, max: 3000, noNaN: true }),
    stopbandDb,
    rippleDb,
  }),
  fc.record({
    response: fc.constant('points' as const),
    points: fc
      .array(fc.tuple(fc.double({ min: 0, max: 5000, noNaN: true }), fc.double({ min: -6, max: 100, noNaN: true })), {
        maxLength: 6,
      })
      .map((points) => points.sort(([first], [second]) => first - second)),
  }),
  fc.record({
    response: fc.constant('aperture' as const),
    timeS: fc.double({ min: 1e-4, max: 0.02, noNaN: true }),
  }),
);

export const stepFilter: fc.Arbitrary<StepFilter> = fc.oneof(
  fc.record({
    response: fc.constant('fir' as const),
    taps: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), {
      maxLength: 40,
    }),
  }),
  fc.record({
    response: fc.constant('kaiser' as const),
    passHz: fc.double({ min: 300, max: 1500, noNaN: true }),
    stopHz: fc.double({ min: 1800, max: 4000, noNaN: true }),
    stopbandDb,
  }),
  fc.record({
    response: fc.constant('half-band' as const),
    passHz: fc.double({ min: 300, max: 2200, noNaN: true }),
    stopbandDb,
  }),
  fc.record({
    response: fc.constant('moving-average' as const),
    length: fc.integer({ min: 1, max: 30 }),
  }),
  fc.record({
    response: fc.constant('cic' as const),
    order: fc.integer({ min: 1, max: 6 }),
    delay: fc.integer({ min: 1, max: 2 }),
    decimation: fc.integer({ min: 2, max: 32 }),
  }),
);

export const analogueFilter: fc.Arbitrary<AnalogueFilter> = fc
  .tuple(fc.oneof(poleFilter, curveFilter), tolerance)
  .map(([filter, relative]) => ({ ...filter, tolerance: relative }));

export const digitalFilter: fc.Arbitrary<DigitalFilter> = fc
  .tuple(fc.oneof(poleFilter, curveFilter, stepFilter), tolerance, fc.constantFrom(1, 2))
  .map(([filter, relative, passes]) => ({ ...filter, tolerance: relative, passes }) as DigitalFilter);

/** A closed interval within `mostHz`; one in five is a point. */
export function interval(mostHz: number): fc.Arbitrary<readonly [number, number]> {
  const hz = fc.oneof(fc.double({ min: 0, max: mostHz, noNaN: true }), fc.integer({ min: 0, max: mostHz }));
  return fc
    .tuple(hz, hz, fc.integer({ min: 0, max: 4 }))
    .map(([first, second, kind]) =>
      kind === 0 ? ([first, first] as const) : ([Math.min(first, second), Math.max(first, second)] as const),
    );
}

/** So many places over an interval, both ends among them. */
export function across([low, high]: readonly [number, number], count: number): readonly number[] {
  return Array.from({ length: count }, (_, i) => (i === count - 1 ? high : low + ((high - low) * i) / (count - 1)));
}
