import fc from 'fast-check';
import {
  butterworthDesign,
  chebyshevDesign,
  kaiserDesign,
  passingConstant,
  type RunnableFilter,
  repeatedMean,
  runningMean,
} from './run-filters.ts';

/** Samples in the record that is transformed. */
export const RECORD = 1024;

/** A filter ahead of the converter: what a rig file says of it, and what it takes off a tone. */
export interface AnaloguePart {
  readonly text: string;
  readonly attenuationDb: (hz: number) => number;
}

/** A digital step: what a rig file says of it, and the filter to be run. */
export interface DigitalPart {
  readonly text: string;
  readonly filter: RunnableFilter | undefined;
  readonly factor: number;
}

/** A tone on a bin of the record. */
export interface Tone {
  /** Multiple of the record's line spacing. */
  readonly bin: number;
  readonly peak: number;
  readonly phase: number;
  readonly atSensor: boolean;
}

export interface RandomChain {
  readonly spacingHz: number;
  /** Of the converter, or of a modulator, over the record's. */
  readonly decimation: number;
  /** 1 for a converter without a modulator. */
  readonly oversampling: number;
  readonly decimationFilter: DigitalPart | undefined;
  readonly analogue: readonly AnaloguePart[];
  readonly steps: readonly DigitalPart[];
  readonly tones: readonly Tone[];
  readonly resonance: number;
}

/** Hundredths, so that what is written is what is meant. */
function hundredths(low: number, high: number): fc.Arbitrary<number> {
  return fc.integer({ min: Math.round(low * 100), max: Math.round(high * 100) }).map((n) => n / 100);
}

/** Full scale is 1 V; the sensor gives 0.1 V for each m/s2. */
export const SENSITIVITY = 0.1;

const digitalFilter = (factor: number, fraction: number): fc.Arbitrary<Omit<DigitalPart, 'factor'>> =>
  fc.oneof(
    fc.record({ order: fc.integer({ min: 1, max: 6 }), cutoff: hundredths(0.08, 0.4) }).map(({ order, cutoff }) => ({
      text: `{ response: butterworth, order: ${order}, cutoff: ${cutoff * fraction} fs }`,
      filter: butterworthDesign(order, cutoff),
    })),
    fc
      .record({ order: fc.integer({ min: 1, max: 5 }), ripple: hundredths(0.1, 2), edge: hundredths(0.1, 0.4) })
      .map(({ order, ripple, edge }) => ({
        text: `{ response: chebyshev, order: ${order}, ripple: ${ripple} dB, pass-edge: ${edge * fraction} fs }`,
        filter: chebyshevDesign(order, ripple, edge),
      })),
    fc
      .record({
        pass: hundredths(0.05, 0.2),
        width: hundredths(0.05, 0.2),
        stopband: fc.integer({ min: 30, max: 100 }),
      })
      .map(({ pass, width, stopband }) => {
        const stop = Math.round((pass + width) * 100) / 100;
        return {
          text: `{ response: kaiser, pass: ${pass * fraction} fs, stop: ${stop * fraction} fs, stopband: ${stopband} dB }`,
          filter: kaiserDesign(pass, stop, stopband),
        };
      }),
    fc.integer({ min: 2, max: 12 }).map((length) => ({
      text: `{ response: moving-average, length: ${length} }`,
      filter: runningMean(length),
    })),
    fc.array(hundredths(0.05, 1), { minLength: 1, maxLength: 12 }).map((taps) => ({
      text: `{ response: fir, taps: [${taps.join(', ')}] }`,
      filter: passingConstant(taps),
    })),
    ...(factor > 1
      ? [
          fc
            .record({ order: fc.integer({ min: 1, max: 4 }), delay: fc.integer({ min: 1, max: 2 }) })
            .map(({ order, delay }) => ({
              text: `{ response: cic, order: ${order}, delay: ${delay} }`,
              filter: repeatedMean(factor * delay, order),
            })),
        ]
      : []),
  );

const step: fc.Arbitrary<DigitalPart> = fc
  .record({ factor: fc.integer({ min: 1, max: 5 }), isFiltered: fc.boolean() })
  .chain(({ factor, isFiltered }) => {
    if (factor > 1 && !isFiltered) {
      return fc.constant({ text: `{ decimate: ${factor} }`, filter: undefined, factor });
    }
    return digitalFilter(factor, 1).map(({ text, filter }) => ({
      text: factor > 1 ? `{ decimate: ${factor}, filter: ${text} }` : `{ filter: ${text} }`,
      filter,
      factor,
    }));
  });

/** Formulas from handbooks of filter design: Butterworth 1930, buffered single poles, the average over a time. */
function analoguePart(rateHz: number): fc.Arbitrary<AnaloguePart> {
  return fc.oneof(
    fc.record({ order: fc.integer({ min: 1, max: 8 }), part: hundredths(0.2, 1) }).map(({ order, part }) => {
      const cutoff = Math.round(rateHz * part);
      return {
        text: `{ response: butterworth, order: ${order}, cutoff: ${cutoff} Hz }`,
        attenuationDb: (hz: number) => 10 * Math.log10(1 + (hz / cutoff) ** (2 * order)),
      };
    }),
    fc.record({ order: fc.integer({ min: 1, max: 4 }), part: hundredths(0.2, 1) }).map(({ order, part }) => {
      const corner = Math.round(rateHz * part);
      return {
        text: `{ response: rc, order: ${order}, corner: ${corner} Hz }`,
        attenuationDb: (hz: number) => 10 * order * Math.log10(1 + (hz / corner) ** 2),
      };
    }),
    hundredths(0.1, 0.9).map((part) => {
      const time = Number((part / rateHz).toPrecision(6));
      return {
        text: `{ response: aperture, time: ${time * 1e6} us }`,
        attenuationDb: (hz: number) => {
          const x = Math.PI * hz * time;
          return x === 0 ? 0 : -20 * Math.log10(Math.abs(Math.sin(x) / x));
        },
      };
    }),
  );
}

/** Random chains: a converter or a modulator, up to three steps, and tones from 0 to four times the first rate. */
export const randomChain: fc.Arbitrary<RandomChain> = fc
  .record({
    spacingHz: fc.integer({ min: 1, max: 9 }),
    oversampling: fc.constantFrom<number[]>(1, 1, 1, 4, 8),
    steps: fc.array(step, { maxLength: 3 }),
  })
  .chain(({ spacingHz, oversampling, steps }) => {
    const decimation = steps.reduce<number>((product, { factor }) => product * factor, oversampling);
    const firstRateHz = spacingHz * RECORD * decimation;
    return fc.record({
      spacingHz: fc.constant(spacingHz),
      oversampling: fc.constant(oversampling),
      decimation: fc.constant(decimation),
      steps: fc.constant(steps),
      decimationFilter:
        oversampling === 1
          ? fc.constant(undefined)
          : digitalFilter(oversampling, oversampling).map((part) => ({ ...part, factor: oversampling })),
      analogue: fc.array(analoguePart(firstRateHz), { maxLength: 2 }),
      tones: fc.array(
        fc.record({
          bin: fc.integer({ min: 1, max: 4 * RECORD * decimation }),
          peak: hundredths(0.05, 0.95),
          phase: hundredths(0, 6.28),
          atSensor: fc.boolean(),
        }),
        { minLength: 1, maxLength: 6 },
      ),
      resonance: fc.integer({ min: firstRateHz, max: 4 * firstRateHz }),
    });
  });

/** The rig file of a random chain: one channel that hears its tones. */
export function textOf(chain: RandomChain): string {
  const { spacingHz, oversampling, decimation, decimationFilter, analogue, steps, tones, resonance } = chain;
  const rateHz = (spacingHz * RECORD * decimation) / oversampling;
  const sources = tones.map(({ bin, peak, atSensor }, index) => {
    const level = atSensor ? `${peak / SENSITIVITY} m/s2` : `${peak} V`;
    return `  tone-${index}: { frequency: ${bin * spacingHz} Hz, level: ${level} }\n`;
  });
  return [
    'rig: Rehearsed\n',
    'digitizers:\n',
    '  card:\n    full-scale: ±1 V\n',
    oversampling > 1 ? `    modulator: ${oversampling} fs\n` : '',
    decimationFilter ? `    decimation-filter: ${decimationFilter.text}\n` : '',
    'sources:\n',
    ...sources,
    'channels:\n',
    '  channel:\n',
    `    sensor: { measures: acceleration, sensitivity: ${SENSITIVITY * 1000} mV/(m/s2), resonance: ${resonance} Hz, q: 5 }\n`,
    '    digitizer: card\n',
    `    rate: ${rateHz} Hz\n`,
    `    filter: [${analogue.map(({ text }) => text).join(', ')}]\n`,
    `    then: [${steps.map(({ text }) => text).join(', ')}]\n`,
    `    band: 0 Hz .. ${(spacingHz * RECORD) / 4} Hz\n`,
  ].join('');
}
