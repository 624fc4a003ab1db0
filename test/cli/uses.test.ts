import { execFileSync } from 'node:child_process';
import { mkdirSync, symlinkSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, it } from 'vitest';
import { MOST_BYTES } from '../../server/src/server-read-file.ts';
import { readUsedFile } from '../../server/src/server-used-files.ts';
import { type Files, folderOf, type Ran, ran, ranIn } from './ran.ts';
import { FOLDS } from './rigs.ts';

/** `FOLDS` in two files: the things in one, the channel in the other. */
const LIBRARY = FOLDS.slice(0, FOLDS.indexOf('channels:'));
const CELL = `rig: Cell\nuses: [../common/lib.rig.yaml]\n${FOLDS.slice(FOLDS.indexOf('channels:'))}`;
const FILES: Files = { 'cells/a.rig.yaml': CELL, 'common/lib.rig.yaml': LIBRARY };

interface Json {
  readonly files: readonly {
    readonly path: string;
    readonly findings: readonly {
      readonly name: string;
      readonly message: string;
      readonly elsewhere?: readonly { readonly path: string; readonly range: object; readonly message: string }[];
    }[];
  }[];
}

function jsonOf({ stdout }: Ran): Json {
  return JSON.parse(stdout) as Json;
}

describe('a folder whose files use each other', () => {
  it('is checked with what they use, each file by itself', async () => {
    const { files } = jsonOf(await ran(['check', '--format', 'json'], FILES));
    expect(files.map(({ path, findings }) => [path, findings.map(({ name }) => name)])).toEqual([
      ['cells/a.rig.yaml', ['fold-in-band']],
      ['common/lib.rig.yaml', []],
    ]);
  });

  it('has the places in other files reported with their paths', async () => {
    const { files } = jsonOf(await ran(['check', '--format', 'json'], FILES));
    expect(files[0]!.findings[0]!.elsewhere?.[0]).toEqual({
      path: join('common', 'lib.rig.yaml'),
      range: { start: { line: 6, character: 2 }, end: { line: 6, character: 5 } },
      message: '`hum` is declared here.',
    });
    const { stdout } = await ran(['check'], FILES);
    expect(stdout).toContain('\n    common/lib.rig.yaml:7:3  `hum` is declared here.\n');
    const folder = folderOf(FILES);
    const absolute = await ranIn(folder, ['check', join(folder, 'cells/a.rig.yaml')]);
    expect(absolute.stdout).toContain(`\n    ${join(folder, 'common/lib.rig.yaml')}:7:3  `);
  });

  it('says the same of each file whatever is checked with it', async () => {
    const files: Files = {
      ...FILES,
      'cells/b.rig.yaml': CELL,
      'common/lib.rig.yaml': `${LIBRARY}uses: [parts.rig.yaml]\n`,
      'common/parts.rig.yaml': 'rig: Parts\nfilters:\n  spare: { response: rc, order: 1, corner: 1 kHz }\n',
    };
    const together = jsonOf(await ran(['check', '--format', 'json'], files));
    for (const file of together.files)
      expect(jsonOf(await ran(['check', '--format', 'json', file.path], files)).files).toEqual([file]);
  });

  it('gives the other commands the same rig', async () => {
    expect((await ran(['map', 'cells/a.rig.yaml'], FILES)).stdout).toContain('hum');
    expect((await ran(['rates', 'cells/a.rig.yaml', 'a'], FILES)).stdout).toContain('40 kHz');
    const fixed = await ran(['fix', 'cells'], FILES);
    expect(fixed.files['cells/a.rig.yaml']).toBe(CELL.replace('rate: 20 kHz ', 'rate: 40 kHz '));
    expect(fixed.files['common/lib.rig.yaml']).toBe(LIBRARY);
    expect(fixed.code).toBe(0);
  });

  it('may be used by what comes on standard input, under its name', async () => {
    const argv = ['check', '--format', 'json', '--stdin-filename', 'cells/new.rig.yaml', '-'];
    const { files } = jsonOf(await ran(argv, FILES, { stdin: CELL }));
    expect(files[0]!.findings.map(({ name }) => name)).toEqual(['fold-in-band']);
  });
});

describe('a used file that can not be read', () => {
  /** What is said at the item, of a rig in `cells` that uses `../common/lib.rig.yaml`. */
  async function saidIn(folder: string, argv: readonly string[] = ['check', '--format', 'json', 'cells/a.rig.yaml']) {
    const { files } = jsonOf(await ranIn(folder, argv));
    return files[0]!.findings.map(({ name, message }) => [name, message.split('. ')[0]]);
  }
  const only = (): string => folderOf({ 'cells/a.rig.yaml': CELL, 'common/': '' });
  const LIB = '`../common/lib.rig.yaml`';

  it('is missing, or is a folder', async () => {
    const folder = only();
    expect(await saidIn(folder)).toEqual([['unknown-name', `${LIB} does not exist`]]);
    mkdirSync(join(folder, 'common/lib.rig.yaml'));
    expect(await saidIn(folder)).toEqual([['unknown-name', `${LIB} is a folder`]]);
  });

  it('is a link that leads to itself, or a pipe that nobody writes to', async () => {
    const loop = only();
    symlinkSync('lib.rig.yaml', join(loop, 'common/lib.rig.yaml'));
    expect(await saidIn(loop)).toEqual([['unknown-name', `${LIB} is a link that leads to itself`]]);
    const pipe = only();
    execFileSync('mkfifo', [join(pipe, 'common/lib.rig.yaml')]);
    expect(await saidIn(pipe)).toEqual([['unknown-name', `${LIB} is not a regular file`]]);
  });

  it('holds a gigabyte, more than is read, or no text', async () => {
    const large = only();
    const path = join(large, 'common/lib.rig.yaml');
    writeFileSync(path, '');
    truncateSync(path, 1e9);
    expect(readUsedFile(pathToFileURL(path).href, { paths: [large], outside: '' })).toBe('too-large');
    // What is left of it is still too much, and small enough for this test's tools.
    truncateSync(path, MOST_BYTES + 1);
    expect(await saidIn(large)).toEqual([['too-much', `${LIB} is larger than the 4,194,304 characters that are read`]]);
    const binary = only();
    writeFileSync(join(binary, 'common/lib.rig.yaml'), Buffer.from([0xff, 0xfe, 0]));
    expect((await saidIn(binary))[0]![0]).toBe('unknown-name');
  });

  it('lies outside of what is checked: it is not read, nor by a link', async () => {
    const outside = `${LIB} is not read, because it lies outside the folder here and those that are given`;
    const folder = folderOf(FILES);
    const inside = (argv: readonly string[]) =>
      ranIn(folder, ['check', '--format', 'json', ...argv], { inside: 'cells' });
    const said = async (argv: readonly string[]) =>
      jsonOf(await inside(argv)).files[0]!.findings.map(({ message }) => message.split('. ')[0]);
    expect(await said(['a.rig.yaml'])).toEqual([outside]);
    // With the folder that holds both it is.
    expect(await said(['a.rig.yaml', '..'])).not.toContain(outside);
    const linked = only();
    symlinkSync(join(folder, 'common/lib.rig.yaml'), join(linked, 'common/lib.rig.yaml'));
    expect(await saidIn(linked)).toEqual([['unknown-name', outside]]);
    const device = folderOf({ 'a.rig.yaml': 'rig: R\nuses: [/dev/zero]\n' });
    expect((await saidIn(device, ['check', '--format', 'json', 'a.rig.yaml']))[0]![1]).toMatch(
      /^`\/dev\/zero` is not read/,
    );
  });

  it('comes by ever more links that lead back: it ends, and is said', async () => {
    const folder = folderOf({ 'a.rig.yaml': 'rig: R\nuses: [one/a.rig.yaml, two/a.rig.yaml]\n' });
    for (const name of ['one', 'two']) symlinkSync('.', join(folder, name));
    const said = await saidIn(folder, ['check', '--format', 'json', 'a.rig.yaml']);
    expect(said.length).toBeGreaterThan(0);
    expect(said.every(([name]) => name === 'too-much' || name === 'unknown-name')).toBe(true);
  }, 60_000);
});
