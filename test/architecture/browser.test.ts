import { resolve } from 'node:path';
import { build } from 'esbuild';
import { describe, expect, it } from 'vitest';

const ROOT = resolve(import.meta.dirname, '../..');

describe('the core', () => {
  it('bundles for a browser as it is, with nothing of Node in it', async () => {
    const result = await build({
      absWorkingDir: ROOT,
      entryPoints: ['server/src/workbench/workbench.ts'],
      bundle: true,
      platform: 'browser',
      format: 'esm',
      write: false,
      metafile: true,
      logLevel: 'silent',
    });
    const inputs = Object.keys(result.metafile.inputs);
    expect(inputs.some((input) => input.startsWith('server/src/signal/'))).toBe(true);
    expect(inputs.filter((input) => input.startsWith('node:'))).toEqual([]);
    expect(result.errors).toEqual([]);
  });

  it('says nothing of clocks, environment or chance', async () => {
    const { readdirSync, readFileSync } = await import('node:fs');
    const rooms = [
      'signal',
      'quantity',
      'rig',
      'chain',
      'checks',
      'remedies',
      'picture',
      'workbench',
      'report',
      'editor',
    ];
    const offending = rooms.flatMap((room) =>
      readdirSync(resolve(ROOT, 'server/src', room), { recursive: true, encoding: 'utf8' })
        .filter((file) => file.endsWith('.ts'))
        .filter((file) =>
          /\bDate\.now|new Date\b|Math\.random|performance\.|process\.|setTimeout|fetch\(/.test(
            readFileSync(resolve(ROOT, 'server/src', room, file), 'utf8'),
          ),
        )
        .map((file) => `${room}/${file}`),
    );
    expect(offending).toEqual([]);
  });
});
