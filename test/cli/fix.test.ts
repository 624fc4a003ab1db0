import { execFileSync } from 'node:child_process';
import { chmodSync, lstatSync, readFileSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { REMEDY_NAMES } from '../../server/src/remedies/list.ts';
import { folderOf, ran, ranIn } from './ran.ts';
import { CLEAN, FOLDS, HINTS, MISSPELLED, SPELLED, WARNS } from './rigs.ts';

/** What `fix` makes of `FOLDS`: the one rate of the list at which the hum is out of the band and nothing else is wrong. */
const FIXED = CLEAN;

describe('fix', () => {
  it('applies the preferred remedies, says each, and ends with 0', async () => {
    const { code, stdout, stderr, files } = await ran(['fix'], { 'a.rig.yaml': FOLDS, 'in/b.rig.yaml': MISSPELLED });
    expect([code, stdout]).toEqual([0, '']);
    expect(files).toEqual({ 'a.rig.yaml': FIXED, 'in/b.rig.yaml': `${FIXED}    flatness: 1 dB\n` });
    expect(stderr).toContain('a.rig.yaml: Sample at 40 kHz: hum arrives at 17 kHz, outside the band (data x2)\n');
    expect(stderr).toMatch(/^in\/b\.rig\.yaml: .*`flatness`/m);
    for (const line of stderr.trimEnd().split('\n')) expect(line).toMatch(/^(a|in\/b)\.rig\.yaml: /);
  });

  it('done twice does nothing the second time', async () => {
    const folder = folderOf({ 'a.rig.yaml': MISSPELLED });
    await ranIn(folder, ['fix']);
    const path = join(folder, 'a.rig.yaml');
    const { ino, mtimeNs } = statSync(path, { bigint: true });
    expect(await ranIn(folder, ['fix'])).toMatchObject({ code: 0, stderr: '' });
    expect(statSync(path, { bigint: true })).toMatchObject({ ino, mtimeNs });
  });

  it('says nothing of it when quiet, and says so where there is no file', async () => {
    expect((await ran(['fix', '-q'], { 'a.rig.yaml': FOLDS })).stderr).toBe('');
    expect(await ran(['fix'])).toMatchObject({
      code: 0,
      stderr: 'ratewright: no rig files here (*.rig.yaml, *.rig.yml, *.rig.json)\n',
    });
  });

  it('ends with 1 while findings at the severity remain, and writes what it could do', async () => {
    // Without the faster rate in the list no setting helps.
    const stuck = MISSPELLED.replace(', 25 kHz, 40 kHz]', ']');
    const { code, files } = await ran(['fix'], { 'a.rig.yaml': stuck });
    expect(code).toBe(1);
    expect(files['a.rig.yaml']).toBe(stuck.replace('flatnes:', 'flatness:'));
    expect((await ran(['fix', '--fail-on', 'none'], { 'a.rig.yaml': stuck })).code).toBe(0);
    expect((await ran(['fix', '--fail-on', 'hint'], { 'a.rig.yaml': HINTS })).code).toBe(1);
    expect((await ran(['fix', '--fail-on', 'warning'], { 'a.rig.yaml': HINTS })).code).toBe(0);
  });

  it('changes hardware or what the test asks for only where that is allowed', async () => {
    // No faster rate, and a hum that folds to 20 kHz - 16.2 kHz = 3.8 kHz, just below the band's top.
    const slow = FOLDS.replace(', 25 kHz, 40 kHz]', ']').replace('17 kHz', '16.2 kHz');
    const stuck = `${slow}    undeclared: -60 dBFS\n`;
    expect((await ran(['fix'], { 'a.rig.yaml': stuck })).files['a.rig.yaml']).toBe(stuck);
    const hardware = await ran(['fix', '--allow', 'hardware'], { 'a.rig.yaml': stuck });
    expect(hardware.code).toBe(0);
    expect(hardware.files['a.rig.yaml']).not.toContain('order: 8, cutoff: 6 kHz');
    expect(hardware.files['a.rig.yaml']).toContain('band: 10 Hz .. 4 kHz');
    const requirement = await ran(['fix', '--allow=requirement'], { 'a.rig.yaml': stuck });
    expect(requirement.code).toBe(0);
    expect(requirement.files['a.rig.yaml']).toContain('order: 8, cutoff: 6 kHz');
    expect(requirement.files['a.rig.yaml']).not.toContain('band: 10 Hz .. 4 kHz');
    expect((await ran(['fix', '--allow', 'requirement, hardware'], { 'a.rig.yaml': stuck })).code).toBe(0);
  });

  it.each([
    ['claim', 'what is claimed of the rig is for a person to write'],
    ['anything', "it was given 'anything'"],
  ])('--allow %s is not understood', async (kind, said) => {
    const { code, stderr, files } = await ran(['fix', '--allow', kind], { 'a.rig.yaml': FOLDS });
    expect([code, files]).toEqual([2, { 'a.rig.yaml': FOLDS }]);
    expect(stderr).toContain(`--allow takes hardware and requirement; ${said}`);
  });

  it('--remedy applies that one and no other', async () => {
    const spelling = await ran(['fix', '--remedy', 'correct-spelling'], { 'a.rig.yaml': MISSPELLED });
    expect(spelling.files['a.rig.yaml']).toBe(SPELLED);
    expect(spelling.code).toBe(1);
    const faster = await ran(['fix', '--remedy', 'sample-faster'], { 'a.rig.yaml': FOLDS });
    expect([faster.code, faster.files['a.rig.yaml']]).toEqual([0, FIXED]);
    const unknown = await ran(['fix', '--remedy', 'magic'], { 'a.rig.yaml': FOLDS });
    expect([unknown.code, unknown.files['a.rig.yaml']]).toEqual([2, FOLDS]);
    for (const name of REMEDY_NAMES) expect(unknown.stderr).toContain(name);
  });
});

describe('the file that is fixed', () => {
  it.each([
    ['line ends of CR LF', FOLDS.replaceAll('\n', '\r\n'), FIXED.replaceAll('\n', '\r\n')],
    ['a byte order mark', `\ufeff${FOLDS}`, `\ufeff${FIXED}`],
    ['no end of the last line', FOLDS.trimEnd(), FIXED.trimEnd()],
    [
      'tabs and blanks at the ends of lines',
      FOLDS.replace('# as wired', '# as wired \t '),
      FIXED.replace('# as wired', '# as wired \t '),
    ],
  ])('keeps %s', async (_name, text, expected) => {
    const { code, files } = await ran(['fix'], { 'a.rig.yaml': text });
    expect([code, files['a.rig.yaml']]).toEqual([0, expected]);
  });

  it('is replaced as a whole: whoever has it open reads the old text, and nothing is left beside it', async () => {
    const folder = folderOf({ 'a.rig.yaml': FOLDS });
    const before = statSync(join(folder, 'a.rig.yaml')).ino;
    const { files } = await ranIn(folder, ['fix']);
    expect(files).toEqual({ 'a.rig.yaml': FIXED });
    expect(statSync(join(folder, 'a.rig.yaml')).ino).not.toBe(before);
  });

  it.each([0o600, 0o666, 0o444])('keeps its permissions, %i', async (mode) => {
    const folder = folderOf({ 'a.rig.yaml': FOLDS });
    const path = join(folder, 'a.rig.yaml');
    chmodSync(path, mode);
    await ranIn(folder, ['fix']);
    expect(readFileSync(path, 'utf8')).toBe(FIXED);
    expect(statSync(path).mode & 0o777).toBe(mode);
  });

  it('stays where a link leads to it, and the link stays', async () => {
    const folder = folderOf({ 'real/a.rig.yaml': FOLDS });
    symlinkSync('real/a.rig.yaml', join(folder, 'link.rig.yaml'));
    await ranIn(folder, ['fix', 'link.rig.yaml']);
    expect(lstatSync(join(folder, 'link.rig.yaml')).isSymbolicLink()).toBe(true);
    expect(readFileSync(join(folder, 'real/a.rig.yaml'), 'utf8')).toBe(FIXED);
  });

  it('may have the longest name that a file can have', async () => {
    const name = `${'n'.repeat(255 - '.rig.yaml'.length)}.rig.yaml`;
    expect((await ran(['fix'], { [name]: FOLDS })).files).toEqual({ [name]: FIXED });
  });
});

describe('fix -', () => {
  it('writes the text to standard output, fixed or not, and messages to standard error', async () => {
    const fixed = await ran(['fix', '-'], {}, { stdin: FOLDS });
    expect([fixed.code, fixed.stdout]).toEqual([0, FIXED]);
    expect(fixed.stderr).toMatch(/^stdin\.rig\.yaml: Sample at 40 kHz/);
    expect(await ran(['fix', '-'], {}, { stdin: WARNS })).toMatchObject({ code: 0, stdout: expect.any(String) });
    expect(await ran(['fix', '-q', '-'], {}, { stdin: CLEAN })).toMatchObject({ code: 0, stdout: CLEAN, stderr: '' });
    const named = await ran(['fix', '-', '--stdin-filename', 'x.rig.yaml'], {}, { stdin: FOLDS });
    expect(named.stderr).toMatch(/^x\.rig\.yaml: /);
  });

  it('writes it to the file of --output', async () => {
    const { stdout, files } = await ran(['fix', '-', '-o', 'out.rig.yaml'], {}, { stdin: `\ufeff${FOLDS}` });
    expect([stdout, files]).toEqual(['', { 'out.rig.yaml': `\ufeff${FIXED}` }]);
  });

  it('without it, --output is not understood: nobody can tell what should go there', async () => {
    const { code, stderr, files } = await ran(['fix', 'a.rig.yaml', '-o', 'b.rig.yaml'], { 'a.rig.yaml': FOLDS });
    expect([code, files]).toEqual([2, { 'a.rig.yaml': FOLDS }]);
    expect(stderr).toContain('--output goes with --dry-run or -');
  });
});

describe('fix --dry-run', () => {
  it('prints a unified diff, changes nothing, and ends with 1', async () => {
    const { code, stdout, stderr, files } = await ran(['fix', '--dry-run'], { 'a.rig.yaml': FOLDS });
    expect([code, stderr, files]).toEqual([1, '', { 'a.rig.yaml': FOLDS }]);
    // POSIX, diff -u: two header lines, then hunks of three lines of context.
    expect(stdout.split('\n')).toEqual([
      '--- a.rig.yaml\tas it is',
      '+++ a.rig.yaml\tfixed',
      '@@ -9,7 +9,7 @@',
      '   a:',
      '     measures: voltage',
      '     digitizer: d',
      '-    rate: 20 kHz      # as wired',
      '+    rate: 40 kHz      # as wired',
      '     filter: card',
      '     band: 10 Hz .. 4 kHz',
      '     fold-limit: -96 dBFS',
      '',
    ]);
  });

  it('ends with 0 where there is nothing to change, and with 1 where a finding remains', async () => {
    expect(await ran(['fix', '--dry-run'], { 'a.rig.yaml': CLEAN })).toMatchObject({ code: 0, stdout: '' });
    const stuck = FOLDS.replace(', 25 kHz, 40 kHz]', ']');
    expect(await ran(['fix', '--dry-run'], { 'a.rig.yaml': stuck })).toMatchObject({ code: 1, stdout: '' });
    expect((await ran(['fix', '--dry-run', '--fail-on', 'none'], { 'a.rig.yaml': FOLDS })).code).toBe(1);
  });

  it.each([
    ['several files', { 'a.rig.yaml': FOLDS, 'in/b.rig.yaml': MISSPELLED, 'c.rig.yaml': CLEAN }],
    ['line ends of CR LF', { 'a.rig.yaml': FOLDS.replaceAll('\n', '\r\n') }],
    ['a byte order mark', { 'a.rig.yaml': `\ufeff${MISSPELLED}` }],
    ['no end of the last line', { 'a.rig.yaml': MISSPELLED.trimEnd() }],
  ])('prints what patch makes the fixed files of: %s', async (_name, files) => {
    const folder = folderOf(files);
    const dry = await ranIn(folder, ['fix', '--dry-run', '-o', 'changes.diff']);
    expect(dry.code).toBe(1);
    execFileSync('patch', ['-p0', '--binary', '--silent', '-i', 'changes.diff'], { cwd: folder });
    const patched = Object.keys(files).map((path) => readFileSync(join(folder, path), 'utf8'));
    for (const [path, text] of Object.entries(files)) writeFileSync(join(folder, path), text);
    const fixed = await ranIn(folder, ['fix']);
    expect(patched).toEqual(Object.keys(files).map((path) => fixed.files[path]));
  });

  it('takes standard input too', async () => {
    const { code, stdout } = await ran(['fix', '--dry-run', '-'], {}, { stdin: FOLDS });
    expect(code).toBe(1);
    expect(stdout).toMatch(/^--- stdin\.rig\.yaml\t.*\n\+\+\+ stdin\.rig\.yaml\t/);
  });
});
