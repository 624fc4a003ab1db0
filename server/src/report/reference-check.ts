import type { CheckPage } from '../checks/list.ts';
import type { RemedyPage } from '../remedies/list.ts';

/** A check's reference page. */
export function checkPage(check: CheckPage, remedies: readonly RemedyPage[]): string {
  const answers = remedies.filter(({ answers }) => answers.includes(check.name));
  return [
    `# ${check.name}`,
    `*${check.severity}* · ${check.finds}`,
    check.why,
    ...(check.shows === '' ? [] : [`## An example that shows it\n\n${fenced(check.shows)}`]),
    ...(check.clean === '' ? [] : [`## One that just does not\n\n${fenced(check.clean)}`]),
    ...(answers.length === 0
      ? []
      : [`## Remedies\n\n${answers.map(({ name, finds }) => `- \`${name}\`: ${finds}`).join('\n')}`]),
    `## Severity\n\nA rig file may change it, or leave the check out:\n\n${fenced(`checks:\n  ${check.name}: hint   # off, hint, warning or error`)}`,
    ...(check.sources.length === 0 ? [] : [`## Sources\n\n${check.sources.map((source) => `- ${source}`).join('\n')}`]),
  ]
    .map((part) => `${part.trim()}\n`)
    .join('\n');
}

function fenced(text: string): string {
  return `\`\`\`yaml\n${text.trim()}\n\`\`\``;
}
