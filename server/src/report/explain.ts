import { ALL_CHECKS } from '../checks/list.ts';
import { REMEDIES } from '../remedies/list.ts';
import { CONTEXTS, keysOf } from '../rig/vocabulary.ts';
import { checkPage } from './reference-check.ts';

/** Every name that has an explanation: checks, remedies, keys. */
export function explainedNames(): readonly string[] {
  const keys = CONTEXTS.flatMap(({ name }) => keysOf(name).map(({ key }) => key));
  return [...new Set([...ALL_CHECKS.map(({ name }) => name), ...REMEDIES.map(({ name }) => name), ...keys])];
}

/** The explanation of a check, a remedy or a key, as Markdown that reads well in a terminal. */
export function explanationOf(name: string): string | undefined {
  const check = ALL_CHECKS.find((one) => one.name === name);
  if (check) return checkPage(check, REMEDIES);
  const remedy = REMEDIES.find((one) => one.name === name);
  if (remedy) {
    return `# ${remedy.name}\n\n*${remedy.kind}* · ${remedy.finds}\n\n${remedy.why}\n\nAnswers ${remedy.answers.join(', ')}.\n`;
  }
  const places = CONTEXTS.flatMap((context) =>
    keysOf(context.name)
      .filter(({ key }) => key === name)
      .map((row) => ({ context, row })),
  );
  if (places.length === 0) return undefined;
  const sections = places.map(({ context, row }) => {
    const facts = [
      `example: ${row.key}: ${row.example}`.trim(),
      ...(row.required ? ['required'] : []),
      ...(row.default === undefined ? [] : [`left out: ${row.default}`]),
      ...(row.computed ? [] : ['known, but not computed by this version']),
    ];
    return `## ${context.title}\n\n${row.doc}\n\n${facts.map((fact) => `- ${fact}`).join('\n')}\n`;
  });
  return `# ${name}\n\n${sections.join('\n')}`;
}

/** Everything that can be explained, a line each. */
export function listOfNames(): string {
  const checks = ALL_CHECKS.map(({ name, severity, finds }) => `  ${name.padEnd(22)} ${severity.padEnd(8)} ${finds}`);
  const remedies = REMEDIES.map(({ name, kind, finds }) => `  ${name.padEnd(22)} ${kind.padEnd(12)} ${finds}`);
  const keys = CONTEXTS.map(
    ({ name, title }) =>
      `  ${title}: ${keysOf(name)
        .map(({ key }) => key)
        .join(', ')}`,
  );
  return `Checks\n${checks.join('\n')}\n\nRemedies\n${remedies.join('\n')}\n\nKeys\n${keys.join('\n')}\n`;
}
