import type { Acceptance } from '../rig/acceptance.ts';

/** Who accepted a finding, for how long, and why: `Accepted by the test lead until 2027-03-31: corrected afterwards`. */
export function acceptanceWords({ by, until, reason }: Acceptance): string {
  const who = by === undefined || by.trim() === '' ? '' : ` by ${by.trim()}`;
  const end = until === undefined ? '' : ` until ${until.day}`;
  return `Accepted${who}${end}: ${reason}`;
}

/** What an acceptance is about, as a phrase: `` `band-droop` on `tower-top` about `inverter` ``. */
export function acceptedWords({ finding, on, about }: Acceptance): string {
  const where = on === undefined ? '' : ` on \`${on.text}\``;
  return `\`${finding}\`${where}${about === undefined ? '' : ` about \`${about}\``}`;
}
