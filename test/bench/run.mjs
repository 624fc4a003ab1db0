// `npm run bench`: bundles the benchmarks as they stand and runs them in a process of their own.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'esbuild';

const folder = mkdtempSync(join(tmpdir(), 'ratewright-bench-'));
try {
  const outfile = join(folder, 'bench.cjs');
  await build({
    entryPoints: ['test/bench/main.ts'],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'cjs',
    target: 'node20',
    mainFields: ['module', 'main'],
    logLevel: 'warning',
  });
  const result = spawnSync(process.execPath, ['--expose-gc', outfile, ...process.argv.slice(2)], { stdio: 'inherit' });
  process.exitCode = result.status ?? 1;
} finally {
  rmSync(folder, { recursive: true, force: true });
}
