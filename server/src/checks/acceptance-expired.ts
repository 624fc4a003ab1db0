import type { Acceptance, LastDay } from '../rig/acceptance.ts';
import { acceptedWords } from './acceptance-words.ts';
import type { CheckPage, SaidOfRig } from './check.ts';

export const acceptanceExpired: CheckPage = {
  name: 'acceptance-expired',
  severity: 'warning',
  finds: 'An acceptance whose last day has passed, while what it accepted is still found.',
  why: 'Something is accepted for a test, or until a part has come. Once that day has passed the finding counts again: somebody has to look at it anew, and either set it right or accept it for longer.',
  shows: `rig: Fan bearing
filters: { card: { response: butterworth, order: 6, cutoff: 8 kHz } }
channels:
  bearing: { rate: 51.2 kHz, band: 10 Hz .. 10 kHz, filter: card }
accept:
  - { finding: band-droop, on: bearing, reason: the spectra are corrected afterwards, by: test lead, until: 2024-06-30 }
`,
  clean: `rig: Fan bearing
filters: { card: { response: butterworth, order: 6, cutoff: 8 kHz } }
channels:
  bearing: { rate: 51.2 kHz, band: 10 Hz .. 10 kHz, filter: card }
accept:
  - { finding: band-droop, on: bearing, reason: the spectra are corrected afterwards, by: test lead, until: 2999-06-30 }
`,
  sources: ['Common practice of reviews: what is accepted is accepted for a time.'],
};

/** @param until its last day, which has passed */
export function saidOfExpired(acceptance: Acceptance, until: LastDay): SaidOfRig {
  return {
    message: `${acceptedWords(acceptance)} counts again: it was accepted until ${until.day}.`,
    place: until.place,
    related: [{ place: acceptance.findingPlace, message: 'What was accepted stands here.' }],
    figures: { until: until.day },
  };
}
