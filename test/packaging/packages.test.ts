import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startClient } from '../protocol/client.ts';
import { EXTRACT_FAN, EXTRACT_FAN_PATH } from '../tools/samples.ts';

const ROOT = resolve(import.meta.dirname, '../..');
const folder = mkdtempSync(join(tmpdir(), 'ratewright-packages-'));
const MANIFEST = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8')) as {
  readonly version: string;
  readonly bin: Readonly<Record<string, string>>;
  readonly contributes: { readonly grammars: readonly { readonly path: string }[] };
};

function run(command: string, args: readonly string[], cwd: string): string {
  return execFileSync(command, [...args], { cwd, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] });
}

/** Packs and unpacks both archives once; their contents are built by `npm test` beforehand. */
beforeAll(() => {
  run(
    'npx',
    [
      'vsce',
      'package',
      '--no-dependencies',
      '--allow-missing-repository',
      '--no-rewrite-relative-links',
      '--out',
      join(folder, 'r.vsix'),
    ],
    ROOT,
  );
  run('python3', ['-c', `import zipfile; zipfile.ZipFile('r.vsix').extractall('vsix')`], folder);
  run('npm', ['pack', '--ignore-scripts', '--pack-destination', folder], ROOT);
  const archive = readdirSync(folder).find((name) => name.endsWith('.tgz'))!;
  run('tar', ['-xzf', archive], folder);
}, 180_000);

afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe.each([
  ['the .vsix', 'vsix/extension'],
  ['the npm archive', 'package'],
])('%s', (_name, inside) => {
  const at = (path: string): string => join(folder, inside, path);

  it('holds what it needs and nothing of the workshop', () => {
    for (const path of [
      'dist/client.cjs',
      'dist/server.cjs',
      'dist/cli.cjs',
      'dist/reference/README.md',
      'client/samples',
      'syntaxes',
      'package.json',
    ]) {
      expect(existsSync(at(path)), path).toBe(true);
    }
    for (const { path } of MANIFEST.contributes.grammars) expect(existsSync(at(path))).toBe(true);
    for (const path of ['server', 'test', 'node_modules', 'client/src', '.ci'])
      expect(existsSync(at(path)), path).toBe(false);
  });

  it('runs the command line from its bin', () => {
    const output = run(
      process.execPath,
      [at(MANIFEST.bin.ratewright!), 'check', EXTRACT_FAN_PATH, '--fail-on', 'none'],
      folder,
    );
    expect(output).toContain('fold-in-band');
    expect(run(process.execPath, [at(MANIFEST.bin.ratewright!), '--version'], folder)).toBe(
      `ratewright ${MANIFEST.version}\n`,
    );
  });

  it('starts the server, which answers', async () => {
    const client = await startClient({ pull: true, spawn: [process.execPath, at('dist/server.cjs'), '--stdio'] });
    const uri = pathToFileURL(join(folder, 'x.rig.yaml')).href;
    client.open(uri, EXTRACT_FAN);
    expect((await client.pull(uri)).map(({ code }) => code)).toContain('fold-in-band');
    await client.stop();
  });

  it('has a reference page for every check, which links nowhere outside itself', () => {
    const pages = readdirSync(at('dist/reference/checks'));
    expect(pages).toContain('fold-in-band.md');
    for (const page of pages) {
      const text = readFileSync(at(`dist/reference/checks/${page}`), 'utf8');
      for (const [, target = ''] of text.matchAll(/\]\(([^)#]+)/g)) {
        expect(existsSync(join(at('dist/reference/checks'), target)), `${page} -> ${target}`).toBe(true);
      }
    }
  });
});

it('the .vsix is at most 1 MB', () => {
  expect(statSync(join(folder, 'r.vsix')).size).toBeLessThan(1_000_000);
});
