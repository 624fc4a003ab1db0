import { acceptancesOf, acceptingOn } from '../checks/accepting.ts';
import { CHANNEL_CHECKS, RIG_CHECKS } from '../checks/list.ts';
import { addItem } from './add-item.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import type { Search } from './search.ts';
import type { NewValue } from './written-value.ts';

export const accept: RemedyDefinition = {
  name: 'accept',
  kind: 'claim',
  titleBegins: 'Accept: ',
  finds: 'An item of `accept` for the finding on this channel, whose reason is left to be written.',
  why: 'Some findings are known and do no harm to this test. An acceptance says so where everybody reads it, with the reason, and with who says it and until when: the finding stays in every report, marked as accepted, and no longer fails a check.',
  answers: [...RIG_CHECKS, ...CHANNEL_CHECKS].map(({ name }) => name),
  search: searchAcceptance,
};

/** Empty text, between whose quotes the reason goes: until then nothing is accepted. */
const NO_REASON = '""';

function searchAcceptance({ context }: Search): readonly Proposal[] {
  const { finding, snapshot, environment } = context;
  const { check, channel, about, severity } = finding;
  if (channel === undefined || severity === 'hint' || finding.accepted) return [];
  // One whose reason is still to be written, or that has expired, is there to be set right.
  if (acceptancesOf(finding, acceptingOn(environment.acceptances, '')).length > 0) return [];
  const item = new Map<string, NewValue>([
    ['finding', check],
    ['on', channel],
    ...(about === undefined ? [] : [['about', about] as const]),
    ['reason', ''],
  ]);
  const edits = addItem(snapshot, 'accept', item);
  const edit = edits?.[0];
  if (!edits || !edit) return [];
  const start = edit.start + edit.text.lastIndexOf(NO_REASON) + 1;
  return [
    {
      does: `${check}${about === undefined ? '' : ` of ${about}`} on ${channel} (the reason is to be written)`,
      outcome: '',
      edits,
      fillIn: { start, end: start },
    },
  ];
}
