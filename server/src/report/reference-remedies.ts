import type { RemedyPage } from '../remedies/list.ts';
import type { RemedyKind } from '../remedies/remedy.ts';

const KINDS: readonly { readonly kind: RemedyKind; readonly meaning: string }[] = [
  { kind: 'text', meaning: 'corrects the text. `fix` and `Fix every channel` apply it.' },
  {
    kind: 'setting',
    meaning:
      'changes a setting of the acquisition: a rate, a digital step, a listed range. `fix` and `Fix every channel` apply it.',
  },
  {
    kind: 'hardware',
    meaning:
      'is true only if the rig is changed: another analogue filter or sensor. Applied only when asked for by kind.',
  },
  {
    kind: 'requirement',
    meaning: 'is right only if the test allows: a narrower band, another limit. Applied only when asked for by kind.',
  },
  { kind: 'claim', meaning: 'says something of the rig that somebody has to know. Never applied but by hand.' },
];

/** The reference page of remedies. */
export function remediesPage(remedies: readonly RemedyPage[]): string {
  const sections = KINDS.map(({ kind, meaning }) => {
    const rows = remedies
      .filter((remedy) => remedy.kind === kind)
      .map(
        ({ name, finds, why, answers }) =>
          `### ${name}\n\n${finds}\n\n${why}\n\nAnswers ${answers.map((check) => `\`${check}\``).join(', ')}.\n`,
      );
    return `## ${kind}\n\nA remedy of this kind ${meaning}\n\n${rows.join('\n')}`;
  });
  return `# Remedies

A remedy is an edit that has been proved before it is offered: the edited text is checked again in memory, and it is
offered only if its finding is gone, no error or warning has come, and nothing that stays has grown worse. An edit of
the description is not an edit of the rig: hence the kinds.

${sections.join('\n')}`;
}
