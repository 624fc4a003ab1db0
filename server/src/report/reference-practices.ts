import type { Practice } from '../practices/model.ts';
import { practiceMarkdown } from '../practices/words.ts';

/** The reference page of one practice, as `explain` shows it. */
export function practicePage(practice: Practice): string {
  return `# ${practice.name}\n\n${practiceMarkdown(practice)}\n`;
}

/** The reference page of all practices, made from their table. */
export function practicesPage(practices: readonly Practice[]): string {
  const sections = practices.map((practice) => `## ${practice.name}\n\n${practiceMarkdown(practice)}\n`);
  return `# Practices

A channel, \`defaults\` or the rig may say \`follows: NAME\`, or a list of names: what each of them asks for is then
checked by [\`practice-unmet\`](checks/practice-unmet.md).

No figure here was looked up: all are from memory, and one that was not sure is left out. Meeting every one of them is
not yet following the standard: its own text decides, and it asks for more.

${sections.join('\n')}`;
}
