import { ALL_CHECKS } from '../checks/list.ts';
import { PRACTICES } from '../practices/practices.ts';
import { REMEDIES } from '../remedies/list.ts';
import { CONTEXTS, keysOf } from '../rig/vocabulary.ts';
import { checkPage } from './reference-check.ts';
import { keysPage } from './reference-keys.ts';
import { practicesPage } from './reference-practices.ts';
import { remediesPage } from './reference-remedies.ts';

/** A page of the reference: a path below the reference's folder, and its Markdown. */
export interface ReferencePage {
  readonly path: string;
  readonly text: string;
}

/** Every page of the reference, made from the tables that the program itself works by. */
export function referencePages(): readonly ReferencePage[] {
  return [
    { path: 'README.md', text: indexPage() },
    { path: 'keys.md', text: keysPage(CONTEXTS.map((context) => ({ context, rows: keysOf(context.name) }))) },
    { path: 'remedies.md', text: remediesPage(REMEDIES) },
    { path: 'practices.md', text: practicesPage(PRACTICES) },
    ...ALL_CHECKS.map((check) => ({ path: `checks/${check.name}.md`, text: checkPage(check, REMEDIES) })),
  ];
}

function indexPage(): string {
  const rows = ALL_CHECKS.map(
    ({ name, severity, finds }) => `| [\`${name}\`](checks/${name}.md) | ${severity} | ${finds} |`,
  );
  return `# Ratewright reference

- [Keys of the rig file](keys.md)
- [Remedies](remedies.md)
- [Practices](practices.md)

## Checks

| check | severity | finds |
|---|---|---|
${rows.join('\n')}
`;
}
