import type { DocumentSelector } from 'vscode-languageclient/node';

/** Rig files by name, wherever they lie. */
export const RIG_FILE_PATTERN = '**/*.rig.{yaml,yml,json}';

/** A rig file that the user left in another language is still a rig file, by its name. */
const OTHER_LANGUAGES = ['yaml', 'json', 'jsonc'];

/** What the server is told of: rig files on disk, and new ones that have not been saved. */
export const rigFiles: DocumentSelector = [
  { scheme: 'file', language: 'rig' },
  { scheme: 'untitled', language: 'rig' },
  ...OTHER_LANGUAGES.map((language) => ({ scheme: 'file', language, pattern: RIG_FILE_PATTERN })),
];

const RIG_FILE_NAME = /\.rig\.(yaml|yml|json)$/;

/** Whether a document is one that {@link rigFiles} selects. */
export function isRigFile(document: { readonly languageId: string; readonly fileName: string }): boolean {
  return (
    document.languageId === 'rig' ||
    (OTHER_LANGUAGES.includes(document.languageId) && RIG_FILE_NAME.test(document.fileName))
  );
}
