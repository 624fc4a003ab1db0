import type { ContextRow, KeyRow } from '../rig/vocabulary.ts';

/** The reference page of the rig file's keys, by the place they stand in. */
export function keysPage(
  contexts: readonly { readonly context: ContextRow; readonly rows: readonly KeyRow[] }[],
): string {
  const sections = contexts.map(({ context, rows }) => {
    const entries = rows.map(
      (row) =>
        `### ${row.key}\n\n${row.doc}${row.computed ? '' : ' This version knows the key but does not compute it yet.'}\n\n${facts(row)}\n`,
    );
    return `## ${context.title}\n\n${context.doc}\n\n${entries.join('\n')}`;
  });
  return `# Keys of the rig file\n\n${sections.join('\n')}`;
}

function facts(row: KeyRow): string {
  return [
    `- example: \`${`${row.key}: ${row.example}`.trim()}\``,
    ...(row.required ? ['- required'] : []),
    ...(row.default === undefined ? [] : [`- left out: ${row.default}`]),
  ].join('\n');
}
