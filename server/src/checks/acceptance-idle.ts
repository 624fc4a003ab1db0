import type { Acceptance } from '../rig/acceptance.ts';
import { acceptedWords } from './acceptance-words.ts';
import type { CheckPage, SaidOfRig } from './check.ts';

export const acceptanceIdle: CheckPage = {
  name: 'acceptance-idle',
  severity: 'hint',
  finds: 'An acceptance that accepts nothing: what it names is not found, or its reason is still to be written.',
  why: 'What was accepted may have been set right, and the acceptance can go. Or it names a channel or a source by a name that nobody has any more: the finding it was meant for then counts.',
  shows: `rig: Fan bearing
filters: { card: { response: butterworth, order: 6, cutoff: 20 kHz } }
channels:
  bearing: { rate: 102.4 kHz, band: 10 Hz .. 10 kHz, filter: card }
accept:
  - { finding: band-droop, on: bearing, reason: the spectra are corrected afterwards }
`,
  clean: `rig: Fan bearing
filters: { card: { response: butterworth, order: 6, cutoff: 8 kHz } }
channels:
  bearing: { rate: 102.4 kHz, band: 10 Hz .. 10 kHz, filter: card }
accept:
  - { finding: band-droop, on: bearing, reason: the spectra are corrected afterwards }
`,
  sources: ['The vocabulary of the rig file.'],
};

/** @param isPartial whether it is found on a channel with a brace range, not all of which it may take in */
export function saidOfIdle(acceptance: Acceptance, isPartial: boolean): SaidOfRig {
  return { message: messageOf(acceptance, isPartial), place: acceptance.findingPlace };
}

function messageOf(acceptance: Acceptance, isPartial: boolean): string {
  const what = acceptedWords(acceptance);
  if (acceptance.reason === '')
    return `${what} is not accepted yet: \`reason\` says nothing, and has to say why it does no harm.`;
  if (isPartial)
    return `Nothing is found that this accepts: ${what}. A channel whose name has a brace range is accepted as a whole, so \`on\` has to take in all of it.`;
  return `Nothing is found that this accepts: ${what}. It can be taken out, or names something that is called otherwise now.`;
}
