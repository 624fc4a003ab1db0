// Writes the vocabulary's keys into the grammar: `node test/tools/grammar-keys.mjs`, after a row was added or changed.
import { readFileSync, writeFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../..');
const grammar = join(root, 'syntaxes/rig.tmLanguage.json');

const { outputFiles } = await build({
  stdin: {
    contents: `
      export { VOCABULARY } from './server/src/rig/vocabulary.ts';
      export { grammarKeys, withKeys } from './test/tools/grammar-keys.ts';`,
    resolveDir: root,
  },
  bundle: true,
  write: false,
  platform: 'node',
  format: 'esm',
});
const { VOCABULARY, grammarKeys, withKeys } = await import(
  `data:text/javascript;base64,${Buffer.from(outputFiles[0].text).toString('base64')}`
);
writeFileSync(grammar, withKeys(readFileSync(grammar, 'utf8'), grammarKeys(VOCABULARY)));
