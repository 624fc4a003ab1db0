// Writes the reference pages, made from the tables that the program works by, into a folder.
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'esbuild';

/** Replaces the folder `output` by the pages of the checkout `root`. */
export async function writeReference(root, output) {
  const work = mkdtempSync(join(tmpdir(), 'ratewright-reference-'));
  try {
    const bundle = join(work, 'reference.cjs');
    await build({
      absWorkingDir: root,
      entryPoints: ['server/src/report/reference.ts'],
      outfile: bundle,
      bundle: true,
      platform: 'node',
      format: 'cjs',
      target: 'node20',
      mainFields: ['module', 'main'],
      logLevel: 'warning',
    });
    const { referencePages } = (await import(pathToFileURL(bundle).href)).default;
    rmSync(output, { recursive: true, force: true });
    for (const { path, text } of referencePages()) {
      mkdirSync(dirname(join(output, path)), { recursive: true });
      writeFileSync(join(output, path), text);
    }
  } finally {
    rmSync(work, { recursive: true, force: true });
  }
}
