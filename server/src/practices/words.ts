import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Practice, Requirement, SupplyCycles } from './model.ts';

/** What a requirement demands, as it stands behind "it asks for": `a rate of at least 10 kHz`. */
export function demandText(requirement: Requirement): string {
  switch (requirement.kind) {
    case 'rate':
      return `a rate of at least ${formatHz(requirement.leastHz)}`;
    case 'rate-over-band':
      return `a rate of at least ${requirement.least} times the top of the band`;
    case 'band':
      return requirement.lowHz === undefined
        ? `a band up to ${formatHz(requirement.highHz)}`
        : `a band from ${formatHz(requirement.lowHz)} to ${formatHz(requirement.highHz)}`;
    case 'pass':
      return `filters that take off no more than ${formatQuantity(requirement.mostDb, 'decibel')} from ${formatHz(requirement.lowHz)} to ${formatHz(requirement.highHz)}`;
    case 'fold':
      return `at least ${formatQuantity(requirement.leastDb, 'decibel')} taken off whatever folds into the band`;
    case 'order':
      return `a band that holds the harmonic ${requirement.order} of the supply`;
    case 'record':
      return `a record of ${requirement.of.map(cyclesText).join(' or ')}`;
    case 'window':
      return `the window \`${requirement.window}\``;
  }
}

/** `10 cycles of 50 Hz (200 ms)`. */
export function cyclesText({ supplyHz, cycles }: SupplyCycles): string {
  return `${cycles} cycles of ${formatHz(supplyHz)} (${formatQuantity(cycles / supplyHz, 'time')})`;
}

/** Where a practice comes from, as a phrase: `ISO 20816-1 (2016), from memory`. */
export function sourceText({ authority }: Practice): string {
  if (authority.kind === 'common-practice') return 'common practice, from memory, without a published source';
  const documents = authority.documents.map(({ designation, edition }) => `${designation} (${edition})`);
  return `${documents.join(' and ')}, ${authority.read}`;
}

/** The same with what its documents are about. */
export function sourceWithSubjects(practice: Practice): string {
  const { authority } = practice;
  if (authority.kind === 'common-practice') return sourceText(practice);
  const documents = authority.documents.map(
    ({ designation, subject, edition }) => `${designation}, ${subject} (${edition})`,
  );
  return `${documents.join('; ')}; ${authority.read}`;
}

/** Whose word counts in the end, as a sentence. */
export function decidesText({ authority }: Practice): string {
  return authority.kind === 'published' ? "The standard's own text decides." : "The test's own procedure decides.";
}

/** Everything that a row holds, as Markdown without a heading. */
export function practiceMarkdown(practice: Practice): string {
  const { title, requirements, authority, leftOut } = practice;
  return [
    `${title}.`,
    `It asks for:\n\n${requirements.map((one) => `- ${demandText(one)} (\`${one.name}\`)`).join('\n')}`,
    `Source: ${sourceWithSubjects(practice)}. ${decidesText(practice)}`,
    ...(authority.kind === 'common-practice' ? [`Why: ${authority.reason}.`] : []),
    `Left out, and so not checked:\n\n${leftOut.map((one) => `- ${one}`).join('\n')}`,
  ].join('\n\n');
}
