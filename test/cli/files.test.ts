import { execFileSync } from 'node:child_process';
import { mkdirSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { readStream } from '../../server/src/cli/read-stdin.ts';
import { MOST_CHARACTERS } from '../../server/src/rig/limits.ts';
import { folderOf, ran, ranIn, type Surroundings } from './ran.ts';
import { CLEAN, FOLDS } from './rigs.ts';

/** The files that `check` looks into, as it names them. */
async function checked(folder: string, paths: readonly string[], around?: Surroundings): Promise<readonly string[]> {
  const { stdout } = await ranIn(folder, ['check', '--format', 'json', '--', ...paths], around);
  return (JSON.parse(stdout) as { files: { path: string }[] }).files.map(({ path }) => path);
}

describe('what can not be read is said, ends with 2, and keeps nothing else from being done', () => {
  it.each<[string, string, string | Uint8Array]>([
    ['a file that is not there', 'gone.rig.yaml does not exist', ''],
    ['a path below a file', 'good.rig.yaml/x does not exist', ''],
    ['bytes that are no UTF-8', 'bad.rig.yaml is not UTF-8 text: the bytes from 5 on are no character', 'rig: \xc3('],
    [
      'a character that breaks off',
      'bad.rig.yaml is not UTF-8 text: the bytes from 1 on are no character',
      'r\xe2\x82',
    ],
    ['UTF-16', 'bad.rig.yaml is not UTF-8 text: the bytes from 0 on are no character', '\xff\xfer\0i\0'],
    ['a surrogate in UTF-8', 'bad.rig.yaml is not UTF-8 text: the bytes from 0 on are no character', '\xed\xa0\x80'],
    [
      'more than can be a rig file',
      'bad.rig.yaml is larger than the 4,194,304 characters that are read',
      new Uint8Array(3 * MOST_CHARACTERS + 1),
    ],
  ])('%s', async (_name, said, content) => {
    const path = said.split(' ')[0]!;
    const bytes = typeof content === 'string' ? Buffer.from(content, 'latin1') : content;
    const files = { 'good.rig.yaml': FOLDS, ...(path === 'bad.rig.yaml' ? { [path]: bytes } : {}) };
    const checked = await ran(['check', path, 'good.rig.yaml'], files);
    expect([checked.code, checked.stderr]).toEqual([2, `ratewright: ${said}\n`]);
    expect(checked.stdout).toContain('good.rig.yaml:12:11  error  fold-in-band');
    const fixed = await ran(['fix', '-q', path, 'good.rig.yaml'], files);
    expect([fixed.code, fixed.stderr]).toEqual([2, `ratewright: ${said}\n`]);
    expect(fixed.files['good.rig.yaml']).toContain('rate: 40 kHz');
    for (const argv of [
      ['map', path],
      ['rates', path, 'a'],
    ]) {
      const { code, stdout, stderr } = await ran(argv, files);
      expect([code, stdout, stderr]).toEqual([2, '', `ratewright: ${said}\n`]);
    }
  });

  it('a link that leads to itself', async () => {
    const folder = folderOf({ 'good.rig.yaml': CLEAN });
    symlinkSync('loop.rig.yaml', join(folder, 'loop.rig.yaml'));
    for (const argv of [['check'], ['check', 'loop.rig.yaml'], ['fix', 'loop.rig.yaml'], ['map', 'loop.rig.yaml']]) {
      const { code, stderr } = await ranIn(folder, argv);
      expect([code, stderr]).toEqual([2, 'ratewright: loop.rig.yaml is a link that leads to itself\n']);
    }
  });

  it('a folder where a file is due', async () => {
    const { code, stderr } = await ran(['map', 'folder'], { 'folder/': '' });
    expect([code, stderr]).toEqual([2, 'ratewright: folder is a folder\n']);
  });

  it('a pipe that nobody writes to: nothing waits for it', async () => {
    const folder = folderOf({});
    execFileSync('mkfifo', [join(folder, 'pipe.rig.yaml')]);
    for (const argv of [['check'], ['fix'], ['map', 'pipe.rig.yaml']]) {
      const { code, stderr } = await ranIn(folder, argv);
      expect([code, stderr]).toEqual([2, 'ratewright: pipe.rig.yaml is not a regular file\n']);
    }
  });

  it('what is longer than what is read, but no longer than a file may be, is read as far as that', async () => {
    const text = `${CLEAN}# ${'x'.repeat(MOST_CHARACTERS)}\n`;
    const { code, stdout } = await ran(['check', '--only', 'too-much'], { 'a.rig.yaml': text });
    expect(code).toBe(1);
    expect(stdout).toContain('The file has more than 4,194,304 characters');
  });
});

describe('the files that are checked', () => {
  it('are the rig files of a folder and below it, in order, without what never holds rigs', async () => {
    const folder = folderOf({
      'b.rig.yaml': CLEAN,
      'a.rig.yml': CLEAN,
      'c.rig.json': CLEAN,
      'notes.yaml': CLEAN,
      'rig.yaml': CLEAN,
      'inside/d.rig.yaml': CLEAN,
      'folder.rig.yaml/e.rig.yaml': CLEAN,
      'node_modules/f.rig.yaml': CLEAN,
      '.git/g.rig.yaml': CLEAN,
    });
    const below = ['a.rig.yml', 'b.rig.yaml', 'c.rig.json', 'folder.rig.yaml/e.rig.yaml', 'inside/d.rig.yaml'];
    expect(await checked(folder, [])).toEqual(below);
    expect(await checked(folder, ['.'])).toEqual(below);
    expect(await checked(folder, [folder])).toEqual(below.map((path) => join(folder, path)));
    expect(await checked(folder, ['..'], { inside: 'inside' })).toEqual(below.map((path) => join('..', path)));
  });

  it('are those that are given, whatever their names and whatever is ignored, each once', async () => {
    const folder = folderOf({ 'notes.txt': CLEAN, 'a.rig.yaml': CLEAN, '-x.rig.yaml': CLEAN, '.gitignore': '*' });
    expect(await checked(folder, ['notes.txt', 'a.rig.yaml', './a.rig.yaml', join(folder, 'a.rig.yaml')])).toEqual([
      'notes.txt',
      'a.rig.yaml',
    ]);
    expect(await checked(folder, ['-x.rig.yaml'])).toEqual(['-x.rig.yaml']);
  });

  it('are found once though links lead round in a circle', async () => {
    const folder = folderOf({ 'inside/a.rig.yaml': CLEAN });
    symlinkSync('..', join(folder, 'inside/up'));
    symlinkSync('nowhere', join(folder, 'dangling'));
    expect(await checked(folder, [])).toEqual(['inside/a.rig.yaml']);
  });

  it('leave out a link that leads nowhere only by saying so', async () => {
    const folder = folderOf({ 'a.rig.yaml': CLEAN });
    symlinkSync('nowhere', join(folder, 'b.rig.yaml'));
    const { code, stderr } = await ranIn(folder, ['check']);
    expect([code, stderr]).toEqual([2, 'ratewright: b.rig.yaml does not exist\n']);
  });
});

describe('.gitignore', () => {
  const rules: readonly (readonly [string, Readonly<Record<string, string>>])[] = [
    ['a name anywhere', { '.gitignore': 'b.rig.yaml\n' }],
    ['a name here', { '.gitignore': '/a.rig.yaml\n' }],
    ['a folder', { '.gitignore': 'one/\n' }],
    ['a folder in a folder', { '.gitignore': 'one/two/\n# note\n\n' }],
    ['all but one', { '.gitignore': '*.rig.yaml\n!b.rig.yaml\n' }],
    ['taken back in a folder below', { '.gitignore': '*.rig.yaml\n', 'one/.gitignore': '!a.rig.yaml\n' }],
    ['added in a folder below', { '.gitignore': '/a.rig.yaml\n', 'one/two/.gitignore': '*\n' }],
    ['a folder ignored whole can not be taken back from within', { '.gitignore': 'one/\n', 'one/.gitignore': '!*\n' }],
    ['stars', { '.gitignore': '**/two/?.rig.yaml\n' }],
    ['case', { '.gitignore': 'A.rig.yaml\nONE/\n' }],
  ];
  const tree = Object.fromEntries(
    ['', 'one/', 'one/two/', 'other/'].flatMap((folder) => ['a', 'b'].map((name) => [`${folder}${name}.rig.yaml`, ''])),
  );

  /** What Git itself (gitignore(5)) would track, as paths from `inside`. */
  function tracked(folder: string, inside: string): readonly string[] {
    const options = ['ls-files', '--others', '--exclude-standard', '*.rig.yaml'];
    const environment = { ...process.env, GIT_CONFIG_GLOBAL: '/dev/null', GIT_CONFIG_SYSTEM: '/dev/null' };
    return execFileSync('git', options, { cwd: join(folder, inside), encoding: 'utf8', env: environment })
      .split('\n')
      .filter((line) => line !== '');
  }

  it.each(rules)('is honoured as Git honours it: %s', async (_name, ignoring) => {
    const folder = folderOf({ ...tree, ...ignoring });
    execFileSync('git', ['init', '--quiet', '.'], { cwd: folder });
    const expected = tracked(folder, '.');
    expect([...(await checked(folder, []))].sort()).toEqual([...expected].sort());
    expect([...(await checked(folder, [], { inside: 'other' }))].sort()).toEqual([...tracked(folder, 'other')].sort());
  });

  it('is honoured without a repository too, in the folder and below', async () => {
    const folder = folderOf({ ...tree, '.gitignore': 'one/\n', 'other/.gitignore': 'a.rig.yaml\n' });
    expect(await checked(folder, [])).toEqual(['a.rig.yaml', 'b.rig.yaml', 'other/b.rig.yaml']);
  });

  it('does not keep a folder that is ignored, but given by name, from being searched', async () => {
    const folder = folderOf({ ...tree, '.gitignore': 'one/\n' });
    mkdirSync(join(folder, '.git'));
    expect(await checked(folder, ['one/two'])).toEqual(['one/two/a.rig.yaml', 'one/two/b.rig.yaml']);
    expect(await checked(folder, ['other'])).toEqual(['other/a.rig.yaml', 'other/b.rig.yaml']);
  });

  it('that can not be read is none', async () => {
    const folder = folderOf({ 'a.rig.yaml': CLEAN, '.gitignore/': '' });
    expect(await checked(folder, [])).toEqual(['a.rig.yaml']);
  });
});

describe('standard input', () => {
  it('is a file like others, named as it is told to be', async () => {
    const unnamed = await ran(['check', '-'], {}, { stdin: FOLDS });
    expect([unnamed.code, unnamed.stdout.split(':')[0]]).toEqual([1, 'stdin.rig.yaml']);
    const named = await ran(['check', '--stdin-filename', 'cell/2.rig.yaml', '-'], {}, { stdin: FOLDS });
    expect(named.stdout).toMatch(/^cell\/2\.rig\.yaml:12:11 /);
    for (const argv of [
      ['map', '-'],
      ['rates', '-', 'a'],
    ]) {
      expect((await ran(argv, {}, { stdin: FOLDS })).code).toBe(0);
    }
  });

  it('comes first, beside files', async () => {
    const { stdout } = await ran(['check', 'a.rig.yaml', '-'], { 'a.rig.yaml': FOLDS }, { stdin: FOLDS });
    expect(stdout.match(/^\S+\.rig\.yaml/gm)).toEqual(['stdin.rig.yaml', 'a.rig.yaml']);
  });

  it('that can not be read ends with 2', async () => {
    const wrong = await ran(['check', '-'], {}, { stdin: Buffer.from([0x72, 0xff]) });
    expect([wrong.code, wrong.stderr]).toEqual([
      2,
      'ratewright: stdin.rig.yaml is not UTF-8 text: the bytes from 1 on are no character\n',
    ]);
    const failing = await ran(['fix', '-'], {}, { stdin: Object.assign(new Error('EIO: i/o error'), { code: 'EIO' }) });
    expect([failing.code, failing.stdout, failing.stderr]).toEqual([
      2,
      '',
      "ratewright: stdin.rig.yaml can't be read: EIO: i/o error\n",
    ]);
    const large = await ran(['check', '-'], {}, { stdin: new Uint8Array(3 * MOST_CHARACTERS + 1) });
    expect([large.code, large.stderr]).toEqual([
      2,
      'ratewright: stdin.rig.yaml is larger than the 4,194,304 characters that are read\n',
    ]);
  });

  it('is read to its end, or as far as a rig file can reach', async () => {
    const whole = await readStream(Readable.from([Buffer.from('rig: '), Buffer.from('é'), Buffer.from('\n')]));
    expect(Buffer.from(whole).toString('utf8')).toBe('rig: é\n');
    const endless = (function* () {
      for (;;) yield Buffer.alloc(1 << 20, 'y');
    })();
    const taken = await readStream(Readable.from(endless));
    expect(taken.length).toBeGreaterThan(3 * MOST_CHARACTERS);
    expect(taken.length).toBeLessThanOrEqual(3 * MOST_CHARACTERS + (1 << 20));
  });
});
