// Bundles the three programs of the package into dist/: the client, the language server and the command line; and writes
// the reference pages beside them.
// Libraries are bundled too, as CommonJS: an ESM bundle of the server dies with "Dynamic require".
import { chmodSync, mkdirSync, readFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';
import { writeReference } from './reference.mjs';

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../..');

const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));

const programs = [
  { entry: 'client/src/extension.ts', output: 'dist/client.cjs', external: ['vscode'] },
  { entry: 'server/src/server-main.ts', output: 'dist/server.cjs', external: [] },
  { entry: 'server/src/cli/main.ts', output: 'dist/cli.cjs', external: [], executable: true },
];

async function bundle({ entry, output, external, executable = false }) {
  await build({
    absWorkingDir: root,
    entryPoints: [entry],
    outfile: output,
    bundle: true,
    platform: 'node',
    format: 'cjs',
    target: 'node20',
    minify: true,
    sourcemap: false,
    legalComments: 'none',
    logLevel: 'warning',
    external,
    define: { RATEWRIGHT_VERSION: JSON.stringify(version) },
    // vscode-jsonrpc's package "main" fields point at UMD files that hide their requires from the bundler.
    mainFields: ['module', 'main'],
    banner: executable ? { js: '#!/usr/bin/env node' } : {},
  });
  if (executable) chmodSync(join(root, output), 0o755);
}

mkdirSync(join(root, 'dist'), { recursive: true });
await Promise.all([...programs.map(bundle), writeReference(root, join(root, 'dist/reference'))]);
