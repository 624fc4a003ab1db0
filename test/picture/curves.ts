import type { Arrival, Chain } from '../../server/src/chain/model.ts';
import type { FilterCurve } from '../../server/src/picture/filter-curve-model.ts';
import { filterCurveModel } from '../../server/src/picture/filter-curve-model.ts';
import type { FilterPlace } from '../../server/src/picture/filter-place.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import { mapsOf } from './maps.ts';

export interface DrawnFilter {
  readonly name: string;
  readonly place: FilterPlace;
  readonly chain: Chain;
  readonly arrivals: readonly Arrival[];
  readonly curve: FilterCurve;
}

/** The curve of every filter of every channel of a rig, as it stands there. */
export function curvesOf(text: string): readonly DrawnFilter[] {
  return mapsOf(text).flatMap(({ name, chain, arrivals }) =>
    [...chain.stages.map(({ filters }) => filters), chain.after].flatMap((filters, stage) =>
      filters.map((filter): DrawnFilter => {
        const place = { chain, filter, stage };
        const curve = filterCurveModel(place, arrivals);
        return { name: `${filter.use?.filter?.name || filter.role} in ${name}`, place, chain, arrivals, curve };
      }),
    ),
  );
}

/** A rig with a filter of every kind, each in a channel of its own. */
export const EVERY_FILTER = `rig: A filter of every kind
clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..1024, tolerance: 25 ppm }
digitizers:
  card: { clock: chassis, prescale: 256, bits: 24, full-scale: ±10 V }
  free: { bits: 16, full-scale: ±10 V }
filters:
  promised: { response: mask, pass: 10 kHz, stop: 15 kHz, stopband: 90 dB, ripple: 0.5 dB, tolerance: 3 % }
  steep: { response: elliptic, order: 7, pass-edge: 10 kHz, ripple: 0.1 dB, stopband: 80 dB, tolerance: 5 % }
  flat-stop: { response: inverse-chebyshev, order: 6, stop-edge: 15 kHz, stopband: 60 dB }
  rippled: { response: chebyshev, order: 5, pass-edge: 10 kHz, ripple: 1 dB }
  measured: { response: points, points: [[100 Hz, 0 dB], [1 kHz, -1.5 dB], [10 kHz, 3 dB], [20 kHz, 40 dB]] }
  middle: { response: butterworth, order: 4, shape: band-pass, cutoff: 100 Hz .. 1 kHz }
  coupling: { response: butterworth, order: 2, shape: high-pass, cutoff: 5 Hz }
  one-pole: { response: rc, order: 1, corner: 12 kHz, tolerance: 20 % }
  narrow: { response: bessel, order: 3, shape: band-pass, cutoff: 68 kHz .. 73 kHz }
  integrator: { response: aperture, time: 20 us }
  long: { response: kaiser, pass: 0.2 fs, stop: 0.201 fs, stopband: 100 dB }
  halving: { response: half-band, pass: 0.2 fs, stopband: 80 dB }
  comb: { response: cic, order: 3 }
  boxcar: { response: moving-average, length: 8 }
  taps: { response: fir, taps: [0.25, 0.5, 0.25], passes: 2 }
sources:
  inverter: { carrier: 16 kHz, modulation: 50 Hz, sidebands: 2, level: 400 mV, sidebands-fall: 6 dB }
  supply: { frequency: 120 kHz, level: 50 mV, harmonics: 3 }
  hum: { frequency: 50 Hz, level: 50 mV, harmonics: 3 }
channels:
  a: { digitizer: card, rate: 25.6 kHz, filter: promised, band: 10 Hz .. 10 kHz }
  b: { digitizer: card, rate: 25.6 kHz, filter: steep, band: 10 Hz .. 10 kHz }
  c: { digitizer: card, rate: 25.6 kHz, filter: measured, band: 10 Hz .. 10 kHz }
  d: { digitizer: card, rate: 25.6 kHz, filter: middle, band: 100 Hz .. 1 kHz }
  e: { digitizer: card, rate: 25.6 kHz, filter: [coupling, one-pole], band: 10 Hz .. 10 kHz }
  f: { digitizer: card, rate: 51.2 kHz, band: 0 Hz .. 8 kHz, then: [{ decimate: 2, filter: long }] }
  g: { digitizer: card, rate: 51.2 kHz, band: 0 Hz .. 500 Hz, then: [{ decimate: 16, filter: comb }, { filter: boxcar }] }
  h: { digitizer: free, rate: 20 kHz, filter: narrow, band: 70.5 kHz .. 72.5 kHz }
  i: { digitizer: card, rate: 51.2 kHz, filter: flat-stop, band: 0 Hz .. 8 kHz, then: [{ decimate: 2, filter: halving }] }
  j: { digitizer: card, rate: 25.6 kHz, filter: [rippled, integrator], band: 0 Hz .. 10 kHz, then: [{ filter: taps }] }
`;

/** Every filter of the samples, of the worked example and of the rig above. */
export const CURVES: readonly DrawnFilter[] = [EVERY_FILTER, EXTRACT_FAN, ...SAMPLES.map(({ text }) => text)].flatMap(
  curvesOf,
);
