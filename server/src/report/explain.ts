import { ALL_CHECKS } from '../checks/list.ts';
import { PRACTICE_NAMES, PRACTICES, practiceNamed } from '../practices/practices.ts';
import { demandText } from '../practices/words.ts';
import { REMEDIES } from '../remedies/list.ts';
import { CONTEXTS, keysOf } from '../rig/vocabulary.ts';
import { checkPage } from './reference-check.ts';
import { practicePage } from './reference-practices.ts';

/** Every name that has an explanation: checks, remedies, practices, keys. */
export function explainedNames(): readonly string[] {
  const keys = CONTEXTS.flatMap(({ name }) => keysOf(name).map(({ key }) => key));
  return [
    ...new Set([
      ...ALL_CHECKS.map(({ name }) => name),
      ...REMEDIES.map(({ name }) => name),
      ...PRACTICE_NAMES,
      ...keys,
    ]),
  ];
}

/** The explanation of a check, a practice, a remedy or a key, of both where one name is both, as Markdown that reads well in a terminal. */
export function explanationOf(name: string): string | undefined {
  const check = ALL_CHECKS.find((one) => one.name === name);
  if (check) return checkPage(check, REMEDIES);
  const practice = practiceNamed(name);
  if (practice) return practicePage(practice);
  const pages = [remedyPage(name), keyPage(name)].filter((page) => page !== undefined);
  return pages.length === 0 ? undefined : pages.join('\n');
}

function remedyPage(name: string): string | undefined {
  const remedy = REMEDIES.find((one) => one.name === name);
  if (!remedy) return undefined;
  return `# ${remedy.name}\n\n*${remedy.kind}* · ${remedy.finds}\n\n${remedy.why}\n\nAnswers ${remedy.answers.join(', ')}.\n`;
}

function keyPage(name: string): string | undefined {
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
  const practices = PRACTICES.map(
    ({ name, requirements }) => `  ${name.padEnd(22)} ${requirements.map(demandText).join('; ')}`,
  );
  const keys = CONTEXTS.map(
    ({ name, title }) =>
      `  ${title}: ${keysOf(name)
        .map(({ key }) => key)
        .join(', ')}`,
  );
  return `Checks\n${checks.join('\n')}\n\nRemedies\n${remedies.join('\n')}\n\nPractices\n${practices.join('\n')}\n\nKeys\n${keys.join('\n')}\n`;
}
