import fc from 'fast-check';
import type { Chain } from '../../server/src/chain/model.ts';
import { foldHz } from '../../server/src/signal/folding.ts';

const analogueFilter = fc.oneof(
  fc
    .tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 100, max: 900 }))
    .map(([order, cutoff]) => `{ response: butterworth, order: ${order}, cutoff: ${cutoff} Hz, tolerance: 3 % }`),
  fc
    .tuple(fc.integer({ min: 2, max: 6 }), fc.integer({ min: 100, max: 400 }))
    .map(
      ([order, edge]) =>
        `{ response: elliptic, order: ${order}, ripple: 0.5 dB, stopband: 50 dB, pass-edge: ${edge} Hz }`,
    ),
  fc.constantFrom(
    '{ response: aperture, time: 1.3 ms }',
    '{ response: mask, pass: 200 Hz, stop: 700 Hz, stopband: 70 dB }',
  ),
);
/** Up to two decimations, filtered or not. */
export const decimations = fc.array(
  fc
    .tuple(
      fc.integer({ min: 2, max: 5 }),
      fc.constantFrom(
        '',
        ', filter: { response: moving-average, length: 4 }',
        ', filter: { response: kaiser, pass: 0.1 fs, stop: 0.2 fs, stopband: 60 dB }',
      ),
    )
    .map(([factor, filter]) => `{ decimate: ${factor}${filter} }`),
  { maxLength: 2 },
);

/** Up to two filters ahead of a converter at 1000 Hz. */
export const analogueFilters = fc.array(analogueFilter, { maxLength: 2 });

/** What is left of a true frequency, by following it through the stages one after the other; `undefined` off the band. */
export function followed(chain: Chain, trueHz: number): { readonly level: number; readonly stage: number } | undefined {
  let hz = trueHz;
  let attenuationDb = 0;
  let stage = 0;
  for (const [index, { filters, rateHz }] of chain.stages.entries()) {
    for (const { response } of filters) attenuationDb += response.leastDb(hz, hz);
    const next = foldHz(hz, rateHz);
    if (stage === 0 && next !== hz) stage = index + 1;
    hz = next;
  }
  for (const { response } of chain.after) attenuationDb += response.leastDb(hz, hz);
  if (stage === 0 || hz < chain.bandLowHz || hz > chain.bandHighHz) return undefined;
  return { level: -attenuationDb, stage };
}
