import { describe, expect, it } from 'vitest';
import { reasonOf } from '../../server/src/server-read-file.ts';
import { ran } from './ran.ts';
import { CLEAN, FOLDS } from './rigs.ts';

const COMMANDS = ['check', 'fix', 'map', 'rates', 'explain', 'serve'];
const ESCAPE = '\u001b[';

describe('the command line itself', () => {
  it.each(['-V', '--version'])('%s says the version', async (option) => {
    expect(await ran([option])).toMatchObject({ code: 0, stdout: 'ratewright 0.0.0\n', stderr: '' });
  });

  it.each(['-h', '--help', 'help'])('%s lists every command, a line each', async (option) => {
    const { code, stdout, stderr } = await ran([option]);
    expect([code, stderr]).toEqual([0, '']);
    for (const command of COMMANDS) expect(stdout).toMatch(new RegExp(`^ {2}${command} +\\S`, 'm'));
  });

  it('without a command says how it is used, and ends with 2', async () => {
    const { code, stdout, stderr } = await ran([]);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toMatch(/^Usage: ratewright COMMAND/);
  });

  it('knows no other command, and names the nearest', async () => {
    expect(await ran(['chekc'])).toMatchObject({
      code: 2,
      stdout: '',
      stderr: "ratewright: there is no command 'chekc'; the nearest is 'check'\n",
    });
    expect((await ran(['xyzzyxyzzy'])).stderr).toBe("ratewright: there is no command 'xyzzyxyzzy'\n");
  });
});

describe.each(COMMANDS)('%s', (command) => {
  it('has help, which lines of eighty-odd characters hold', async () => {
    const { code, stdout, stderr } = await ran([command, '--help']);
    expect([code, stderr]).toEqual([0, '']);
    expect(stdout).toMatch(new RegExp(`^Usage: ratewright ${command}\\b`));
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(88);
    expect((await ran(['help', command])).stdout).toBe(stdout);
    expect((await ran([command, '-qh'])).stdout).toBe(stdout);
  });

  it('has no other option, and takes no value less', async () => {
    const unknown = await ran([command, '--frobnicate']);
    expect(unknown).toMatchObject({ code: 2, stdout: '' });
    expect(unknown.stderr).toBe(
      `ratewright ${command}: Unknown option '--frobnicate'\nTry 'ratewright ${command} --help'.\n`,
    );
    const missing = await ran([command, '--output']);
    expect(missing).toMatchObject({ code: 2, stdout: '' });
    expect(missing.stderr).toMatch(/'-o, --output <value>' argument missing\nTry /);
    const dash = await ran([command, '-o', '--quiet']);
    expect([dash.code, dash.stderr.split('\n')]).toEqual([
      2,
      [expect.stringContaining("'-o"), `Try 'ratewright ${command} --help'.`, ''],
    ]);
  });
});

describe('values of options', () => {
  it.each([
    [['check', '--format', 'xml'], "check: --format takes text, json; it was given 'xml'"],
    [['check', '--fail-on', 'info'], "check: --fail-on takes error, warning, hint, none; it was given 'info'"],
    [['check', '--color', 'yes', 'gone.rig.yaml'], "check: --color takes auto, always, never; it was given 'yes'"],
    [['fix', '--fail-on', 'all'], "fix: --fail-on takes error, warning, hint, none; it was given 'all'"],
    [['map', 'a', '--format', 'png'], "map: --format takes text, svg, json; it was given 'png'"],
    [['map', 'a', '--color', 'x', '--format', 'svg'], "map: --color takes auto, always, never; it was given 'x'"],
    [
      ['map', 'a', '--theme', 'x'],
      "map: --theme takes neutral, light, dark, high-contrast, high-contrast-light; it was given 'x'",
    ],
    [['map'], 'map: map takes a FILE and, if it is not to choose, a CHANNEL'],
    [['map', 'a', 'b', 'c'], 'map: map takes a FILE and, if it is not to choose, a CHANNEL'],
    [['rates', 'a'], 'rates: rates takes a FILE and a CHANNEL'],
    [['rates', 'a', 'b', 'c'], 'rates: rates takes a FILE and a CHANNEL'],
    [['explain', 'a', 'b'], 'explain: explain takes one NAME'],
    [['serve', 'now'], 'serve: serve takes no words besides --stdio'],
  ])('%j is not understood, and nothing is done', async (argv, said) => {
    const { code, stdout, stderr } = await ran(argv);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toBe(`ratewright ${said}\nTry 'ratewright ${argv[0]} --help'.\n`);
  });

  it('a device is written to, and not replaced', async () => {
    const { code, stdout, stderr } = await ran(['explain', '-o', '/dev/null']);
    expect([code, stdout, stderr]).toEqual([0, '', '']);
  });
});

describe('colours', () => {
  const files = { 'a.rig.yaml': FOLDS };
  const coloured = async (argv: readonly string[], around: Parameters<typeof ran>[2]): Promise<boolean> =>
    (await ran(argv, files, around)).stdout.includes(ESCAPE);

  it.each([['check'], ['map', 'a.rig.yaml'], ['rates', 'a.rig.yaml', 'a']])('of %s', async (...argv) => {
    const terminal = { isTerminal: true };
    expect(await coloured(argv, {})).toBe(false);
    expect(await coloured(argv, terminal)).toBe(true);
    expect(await coloured([...argv, '--color', 'auto'], terminal)).toBe(true);
    expect(await coloured([...argv, '--color', 'never'], terminal)).toBe(false);
    expect(await coloured([...argv, '--color', 'always'], {})).toBe(true);
    // no-color.org: present and not empty, whatever its value; a word on the command line outranks it.
    expect(await coloured(argv, { ...terminal, environment: { NO_COLOR: '1' } })).toBe(false);
    expect(await coloured(argv, { ...terminal, environment: { NO_COLOR: '' } })).toBe(true);
    expect(await coloured([...argv, '--color=always'], { environment: { NO_COLOR: '1' } })).toBe(true);
  });

  it('do not go into a file unless they are asked for', async () => {
    const plain = await ran(['check', '-o', 'out'], files, { isTerminal: true });
    expect(plain.files.out).not.toContain(ESCAPE);
    const painted = await ran(['check', '-o', 'out', '--color', 'always'], files);
    expect(painted.files.out).toContain(ESCAPE);
  });

  it('take nothing from the text and add nothing else to it', async () => {
    const plain = await ran(['check'], files);
    const painted = await ran(['check', '--color', 'always'], files);
    // ECMA-48, 8.3.117: CSI, parameters, and the final byte `m`.
    expect(
      painted.stdout
        .split(ESCAPE)
        .map((part, index) => (index === 0 ? part : part.replace(/^[\d;]*m/, '')))
        .join(''),
    ).toBe(plain.stdout);
  });

  it('are never in JSON', async () => {
    const { stdout } = await ran(['check', '--format', 'json', '--color', 'always'], { 'a.rig.yaml': CLEAN });
    expect(stdout).not.toContain('\u001b');
  });
});

describe('what the operating system says, in words', () => {
  const fault = (code: string): Error => Object.assign(new Error(`${code}: as it said`), { code });

  it.each([
    ['ENOENT', 'does not exist', "can't be written: its folder does not exist"],
    ['EACCES', 'may not be read', 'may not be written'],
    ['EPERM', 'may not be read', 'may not be written'],
    ['ELOOP', 'is a link that leads to itself', 'is a link that leads to itself'],
    ['EISDIR', 'is a folder', 'is a folder'],
    ['ENOSPC', "can't be read: ENOSPC: as it said", "can't be written: ENOSPC: as it said"],
  ])('%s', (code, read, written) => {
    expect([reasonOf(fault(code)), reasonOf(fault(code), 'written')]).toEqual([read, written]);
  });

  it('also where it is no error of its', () => {
    expect(reasonOf('thrown')).toBe("can't be read");
    expect(reasonOf(new Error('other'))).toBe("can't be read: other");
  });
});
