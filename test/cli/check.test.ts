import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CHECK_NAMES } from '../../server/src/checks/list.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { folderOf, ran, ranIn } from './ran.ts';
import { CLEAN, FOLDS, HINTS, WARNS } from './rigs.ts';

interface CheckJson {
  readonly version: number;
  readonly files: readonly {
    readonly path: string;
    readonly findings: readonly {
      readonly name: string;
      readonly severity: string;
      readonly range: { readonly start: { readonly line: number; readonly character: number } };
      readonly figures: Readonly<Record<string, unknown>>;
      readonly remedies?: readonly { readonly name: string; readonly preferred: boolean }[];
    }[];
  }[];
  readonly summary: Readonly<Record<string, number>>;
}

function parsed(stdout: string): CheckJson {
  return JSON.parse(stdout) as CheckJson;
}

describe('what check says', () => {
  it('is place, severity, check and channel, then the message, then the count', async () => {
    const { code, stdout, stderr } = await ran(['check', 'a.rig.yaml'], { 'a.rig.yaml': FOLDS });
    expect(code).toBe(1);
    expect(stderr).toBe('');
    expect(stdout.split('\n')).toEqual([
      'a.rig.yaml:12:11  error  fold-in-band  (a)',
      '    `hum` will be recorded at 3 kHz, inside the band, though it is at 17 kHz. There it is -92.37',
      '    dBFS, 3.63 dB over the fold limit of -96 dBFS.',
      '',
      '1 channel in 1 file checked: 1 error, no warnings, no hints.',
      '',
    ]);
  });

  it('is without the count when quiet, and nothing at all of a rig that is clean', async () => {
    const files = { 'a.rig.yaml': FOLDS, 'b.rig.yaml': CLEAN };
    const loud = await ran(['check', '-q', 'a.rig.yaml'], files);
    expect(loud.stdout).not.toContain('checked');
    expect(loud.stdout).toContain('fold-in-band');
    expect((await ran(['check', '--quiet', 'b.rig.yaml'], files)).stdout).toBe('');
  });

  it('counts over all files', async () => {
    const files = { 'a.rig.yaml': FOLDS, 'b.rig.yaml': WARNS, 'c.rig.yaml': HINTS, 'd.rig.yaml': FOLDS };
    const { stdout } = await ran(['check'], files);
    expect(stdout).toContain('\n4 channels in 4 files checked: 2 errors, 1 warning, 1 hint.\n');
  });

  it('is the same to the byte, run after run and format by format', async () => {
    const folder = folderOf({ 'a.rig.yaml': EXTRACT_FAN, 'b.rig.yaml': FOLDS, 'c.rig.json': '{ "rig": 1 }' });
    for (const format of ['text', 'json']) {
      const argv = ['check', '--format', format, '--remedies'];
      const first = await ranIn(folder, argv);
      expect(await ranIn(folder, argv)).toEqual(first);
      expect(first.stdout.length).toBeGreaterThan(1_000);
    }
  });

  it('goes to the file of --output, which is written whole and leaves nothing beside it', async () => {
    const argv = ['check', '--format', 'json', 'a.rig.yaml'];
    const direct = await ran(argv, { 'a.rig.yaml': FOLDS });
    const filed = await ran([...argv, '-o', 'out.json'], { 'a.rig.yaml': FOLDS, 'out.json': 'older' });
    expect(filed.code).toBe(1);
    expect(filed.stdout).toBe('');
    expect(filed.files).toEqual({ 'a.rig.yaml': FOLDS, 'out.json': direct.stdout });
    expect((await ran([...argv, '--output=-'], { 'a.rig.yaml': FOLDS })).stdout).toBe(direct.stdout);
  });
});

describe('the exit code of check', () => {
  const severities = ['error', 'warning', 'hint', 'none'] as const;
  const rigs = { error: FOLDS, warning: WARNS, hint: HINTS, none: CLEAN };

  it.each(severities)('is 1 for a rig whose gravest finding is %s, from that severity on', async (gravest) => {
    const folder = folderOf({ 'a.rig.yaml': rigs[gravest] });
    for (const from of severities) {
      const { code } = await ranIn(folder, ['check', '--fail-on', from]);
      const isReached = gravest !== 'none' && severities.indexOf(gravest) <= severities.indexOf(from);
      expect([from, code]).toEqual([from, isReached && from !== 'none' ? 1 : 0]);
    }
  });

  it('is by errors where nothing is said', async () => {
    expect((await ran(['check'], { 'a.rig.yaml': FOLDS })).code).toBe(1);
    expect((await ran(['check'], { 'a.rig.yaml': WARNS })).code).toBe(0);
  });

  it('is 2 when a file could not be read, though others have findings; those are told all the same', async () => {
    const { code, stdout, stderr } = await ran(['check', 'gone.rig.yaml', 'a.rig.yaml'], { 'a.rig.yaml': FOLDS });
    expect(code).toBe(2);
    expect(stderr).toBe('ratewright: gone.rig.yaml does not exist\n');
    expect(stdout).toContain('fold-in-band');
  });

  it('is 2 when the results could not be written', async () => {
    const files = { 'a.rig.yaml': CLEAN, 'folder/': '' };
    const toFolder = await ran(['check', '-o', 'folder'], files);
    expect([toFolder.code, toFolder.stderr]).toEqual([2, 'ratewright: folder is a folder\n']);
    const nowhere = await ran(['check', '-o', 'gone/out.txt'], files);
    expect(nowhere.code).toBe(2);
    expect(nowhere.stderr).toBe("ratewright: gone/out.txt can't be written: its folder does not exist\n");
  });

  it('is 0 where there is no rig file, and that is said', async () => {
    const { code, stderr } = await ran(['check'], { 'notes.yaml': 'a: 1\n' });
    expect(code).toBe(0);
    expect(stderr).toBe('ratewright: no rig files here (*.rig.yaml, *.rig.yml, *.rig.json)\n');
  });
});

describe('--only', () => {
  it('leaves the checks that are named, in what is said, what is counted and the exit code', async () => {
    const files = { 'a.rig.yaml': EXTRACT_FAN };
    const some = await ran(['check', '--only', 'band-droop, unused-name', '--format', 'json'], files);
    expect(parsed(some.stdout).files[0]!.findings.map(({ name }) => name)).toEqual(['unused-name', 'band-droop']);
    expect(parsed(some.stdout).summary).toEqual({ error: 0, warning: 1, hint: 1, accepted: 0, channels: 1 });
    expect(some.code).toBe(0);
    expect((await ran(['check', '--only', 'fold-in-band'], files)).code).toBe(1);
  });

  it('takes every check that there is', async () => {
    const { code } = await ran(['check', '--only', CHECK_NAMES.join(',')], { 'a.rig.yaml': CLEAN });
    expect(code).toBe(0);
  });

  it('takes no name that is none: a misspelling must not look like a clean rig', async () => {
    const misspelled = await ran(['check', '--only', 'fold-in-bnd'], { 'a.rig.yaml': FOLDS });
    expect(misspelled.code).toBe(2);
    expect(misspelled.stderr).toContain("there is no check 'fold-in-bnd'; the nearest is 'fold-in-band'\n");
    const strange = await ran(['check', '--only', 'xyzzyxyzzyxyzzy'], { 'a.rig.yaml': FOLDS });
    expect(strange.stderr).toContain("there is no check 'xyzzyxyzzyxyzzy'\n");
    expect((await ran(['check', '--only', ' , '], { 'a.rig.yaml': FOLDS })).code).toBe(2);
  });
});

describe('check --format json', () => {
  it('has what is recorded in its summary where there is a run, as the text has it below', async () => {
    // 16 bits at 20 kHz are 40 kB a second, 2.4 MB a minute.
    const files = { 'a.rig.yaml': `${FOLDS}run: { duration: 60 s }\n` };
    const { stdout } = await ran(['check', '--format', 'json'], files);
    expect(parsed(stdout).summary).toMatchObject({ channels: 1, bytesPerSecond: 40_000, bytes: 2_400_000 });
    expect((await ran(['check'], files)).stdout).toMatch(/\nRecorded: 40 kB\/s, 2\.4 MB in all\.\n$/);
  });

  it('has the shape that programs rely on, with the figures worked out by hand', async () => {
    const { stdout } = await ran(['check', '--format', 'json'], { 'a.rig.yaml': FOLDS });
    const json = parsed(stdout);
    const { level, limit } = { level: -20 - 10 * Math.log10(1 + (17 / 6) ** 16), limit: -96 };
    expect(json).toEqual({
      version: 1,
      files: [
        {
          path: 'a.rig.yaml',
          findings: [
            {
              name: 'fold-in-band',
              severity: 'error',
              channel: 'a',
              about: 'hum',
              message: expect.stringMatching(/^`hum` will be recorded at 3 kHz/) as string,
              range: { start: { line: 11, character: 10 }, end: { line: 11, character: 16 } },
              accepted: false,
              figures: expect.objectContaining({ recordedHz: 3_000, limitDbfs: limit, stage: 1 }) as object,
            },
          ],
        },
      ],
      summary: { error: 1, warning: 0, hint: 0, accepted: 0, channels: 1 },
    });
    expect(json.files[0]!.findings[0]!.figures.levelDbfs).toBeCloseTo(level, 6);
    expect(Object.keys(json.files[0]!.findings[0]!)).toEqual([
      'name',
      'severity',
      'channel',
      'about',
      'message',
      'range',
      'accepted',
      'figures',
    ]);
  });

  it('is in order of file, then position', async () => {
    const { stdout } = await ran(['check', '--format', 'json', 'z.rig.yaml', '.'], {
      'z.rig.yaml': FOLDS,
      'b.rig.yaml': EXTRACT_FAN,
    });
    const { files } = parsed(stdout);
    expect(files.map(({ path }) => path)).toEqual(['z.rig.yaml', 'b.rig.yaml']);
    const lines = files[1]!.findings.map(({ range }) => range.start.line);
    expect(lines).toEqual([...lines].sort((a, b) => a - b));
    expect(files[1]!.findings.map(({ name }) => name)).toEqual([
      'unused-name',
      'fold-in-band',
      'band-droop',
      'resonance-in-band',
    ]);
  });

  it('has no number of more than twelve digits', async () => {
    const { stdout } = await ran(['check', '--format', 'json'], { 'a.rig.yaml': EXTRACT_FAN });
    const numbers = stdout.match(/: -?\d[\d.e+-]*/g)!.map((text) => text.slice(2));
    expect(numbers.length).toBeGreaterThan(10);
    for (const number of numbers) expect(number.replace(/^-?0?\.?0*|e.*$|[.-]/g, '').length).toBeLessThanOrEqual(12);
  });

  it('names a thing that is no channel, and has no channel for it', async () => {
    const { stdout } = await ran(['check', '--format', 'json'], { 'a.rig.yaml': HINTS });
    const [finding] = parsed(stdout).files[0]!.findings;
    expect(finding).toMatchObject({ name: 'unused-name', severity: 'hint', thing: 'filters/spare' });
    expect(finding).not.toHaveProperty('channel');
  });

  it('counts characters in UTF-16 units, as the protocol does', async () => {
    const line = '  hum: { frequency: 17 kHz, level: 1 V, "🎚": 1, xyzzyxyzzy: 2 }';
    const text = CLEAN.replace('  hum: { frequency: 17 kHz, level: 1 V }', line);
    const { stdout } = await ran(['check', '--format', 'json', '--only', 'unknown-key'], { 'a.rig.yaml': text });
    const starts = parsed(stdout).files[0]!.findings.map(({ range }) => range.start);
    expect(starts.at(-1)).toEqual({ line: 6, character: 49 });
    expect([...line.slice(0, 49)]).toHaveLength(48);
    expect(line.slice(49)).toMatch(/^xyzzyxyzzy:/);
  });

  it('is empty, and valid, where there is nothing to check', async () => {
    expect(parsed((await ran(['check', '--format', 'json'])).stdout)).toEqual({
      version: 1,
      files: [],
      summary: { error: 0, warning: 0, hint: 0, accepted: 0, channels: 0 },
    });
  });
});

describe('--remedies', () => {
  it('lists the proved remedies in JSON, one of them preferred, and only when asked for', async () => {
    const files = { 'a.rig.yaml': FOLDS };
    const { stdout } = await ran(['check', '--format', 'json', '--remedies'], files);
    const remedies = parsed(stdout).files[0]!.findings[0]!.remedies!;
    expect(remedies[0]).toEqual({
      name: 'sample-faster',
      kind: 'setting',
      title: expect.stringContaining('40 kHz') as string,
      preferred: true,
    });
    expect(remedies.filter(({ preferred }) => preferred)).toHaveLength(1);
    expect((await ran(['check', '--format', 'json'], files)).stdout).not.toContain('remedies');
  });

  it('lists them below the message, the preferred one with a star', async () => {
    const { stdout } = await ran(['check', '--remedies'], { 'a.rig.yaml': FOLDS });
    expect(stdout).toContain('\n    * Sample at 40 kHz: hum arrives at 17 kHz, outside the band (data x2)\n');
    expect(stdout).toMatch(/\n {4}- If the rig is changed: /);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(100);
  });
});

describe('progress', () => {
  const many = Object.fromEntries(Array.from({ length: 9 }, (_, index) => [`r${index}.rig.yaml`, CLEAN]));

  it('is shown on a terminal for many files, and wiped away at the end', async () => {
    const { stderr } = await ran(['check'], many, { isTerminal: true });
    const steps = stderr.split('\r');
    expect(steps[1]).toMatch(/^=+\.+ 1 of 9 files$/);
    expect(steps.at(-2)).toBe(`${'='.repeat(24)} 9 of 9 files`);
    expect(steps.at(-1)).toBe('\u001b[K');
  });

  it('is not shown to a file, for few files, or when quiet', async () => {
    expect((await ran(['check'], many)).stderr).toBe('');
    expect((await ran(['check', '-q'], many, { isTerminal: true })).stderr).toBe('');
    expect((await ran(['check'], { 'a.rig.yaml': CLEAN }, { isTerminal: true })).stderr).toBe('');
  });

  it('makes way for what has to be said of a file', async () => {
    const { stderr } = await ran(['check'], { ...many, 'r3.rig.yaml': Buffer.from([0xff]) }, { isTerminal: true });
    expect(stderr).toContain('\r\u001b[Kratewright: r3.rig.yaml is not UTF-8 text');
  });
});

it('leaves every file as it is', async () => {
  const folder = folderOf({ 'a.rig.yaml': FOLDS });
  await ranIn(folder, ['check', '--remedies']);
  expect(readFileSync(join(folder, 'a.rig.yaml'), 'utf8')).toBe(FOLDS);
});
