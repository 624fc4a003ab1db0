import { type SpawnSyncReturns, spawnSync } from 'node:child_process';
import { join, resolve } from 'node:path';
import { build } from 'esbuild';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { folderOf } from './ran.ts';
import { CLEAN, FOLDS } from './rigs.ts';

const SOURCE = resolve(import.meta.dirname, '../../server/src/cli/main.ts');

describe('the program', () => {
  let program = '';

  beforeAll(async () => {
    program = join(folderOf({}), 'ratewright.cjs');
    // As test/tools/build.mjs bundles it.
    await build({
      entryPoints: [SOURCE],
      outfile: program,
      bundle: true,
      platform: 'node',
      format: 'cjs',
      target: 'node20',
      logLevel: 'warning',
      define: { RATEWRIGHT_VERSION: '"1.2.3"' },
      mainFields: ['module', 'main'],
    });
  });

  /** Runs a line of shell in a folder with a rig that folds and one that is clean; `$R` is the program. */
  function shell(line: string, input?: string): SpawnSyncReturns<string> {
    return spawnSync('bash', ['-o', 'pipefail', '-c', line], {
      cwd: folderOf({ 'a.rig.yaml': FOLDS, 'b.rig.yaml': CLEAN }),
      env: { ...process.env, R: `${process.execPath} ${program}` },
      encoding: 'utf8',
      timeout: 30_000,
      ...(input === undefined ? {} : { input }),
    });
  }

  it.each([
    ['$R check b.rig.yaml', 0],
    ['$R check', 1],
    ['$R check a.rig.yaml gone.rig.yaml', 2],
    ['$R', 2],
    ['$R --version', 0],
    ['$R fix a.rig.yaml && $R check', 0],
    ['$R check - < a.rig.yaml', 1],
    ['$R check - < .', 2],
    ['$R check - < /dev/null', 1],
  ])('%s ends with %i', (line, status) => {
    const ran = shell(line);
    expect([ran.status, ran.stderr.includes('    at ')]).toEqual([status, false]);
  });

  it('says the version that it was built with', () => {
    expect(shell('$R --version').stdout).toBe('ratewright 1.2.3\n');
  });

  it('reads what a pipe brings, in the parts that it brings it in', () => {
    const { status, stdout } = shell('(head -c 40; sleep 0.1; cat) | $R fix -q -', FOLDS);
    expect([status, stdout]).toEqual([0, CLEAN]);
  });

  it('takes no more of a pipe without end than it can use', () => {
    const { stderr } = shell('(yes || true) 2>/dev/null | $R check -');
    expect(stderr).toContain('ratewright: stdin.rig.yaml is larger than the 4,194,304 characters that are read\n');
  });

  it('ends quietly when its results are read no further', () => {
    expect(shell('$R explain | head -1')).toMatchObject({ status: 0, stdout: 'Checks\n', stderr: '' });
  });

  it('does its work though nobody reads its messages', () => {
    const { status, stdout } = shell('{ sleep 0.1; $R check gone.rig.yaml a.rig.yaml -o out; } 2>&1 | true; cat out');
    expect([status, stdout]).toEqual([0, expect.stringContaining('fold-in-band')]);
  });

  it('says so when its results can not be written', () => {
    const { status, stderr } = shell('$R explain > /dev/full');
    expect([status, stderr]).toEqual([
      2,
      expect.stringMatching(/^ratewright: standard output can't be written: ENOSPC/),
    ]);
  });

  it('writes into a pipe that --output names, and does not put a file in its place', () => {
    const { stdout } = shell('mkfifo p; cat p & $R explain -o p; wait; test -p p && echo still a pipe');
    expect(stdout).toMatch(/^Checks\n[\s\S]*\nstill a pipe\n$/);
  });

  it('is not held up by a large result', () => {
    const { stdout } = shell('for n in $(seq 300); do cp a.rig.yaml c$n.rig.yaml; done; $R check --format json | cat');
    expect((JSON.parse(stdout) as { files: unknown[] }).files).toHaveLength(302);
  });
});

describe('the program in this process', () => {
  const ofOthers = [process.stdout, process.stderr].map((stream) => [stream, stream.listeners('error')] as const);

  afterEach(() => {
    vi.restoreAllMocks();
    vi.unstubAllGlobals();
    vi.doUnmock('../../server/src/cli/run.ts');
    vi.resetModules();
    process.exitCode = undefined;
    for (const [stream, listeners] of ofOthers) {
      for (const listener of stream.listeners('error')) {
        if (!listeners.includes(listener)) stream.off('error', listener as () => void);
      }
    }
  });

  /** Starts the program as Node does, and waits for its exit code. */
  async function started(argv: readonly string[]): Promise<{ stdout: string; stderr: string; code: unknown }> {
    const written = { stdout: '', stderr: '' };
    for (const name of ['stdout', 'stderr'] as const) {
      vi.spyOn(process[name], 'write').mockImplementation((text) => {
        written[name] += String(text);
        return true;
      });
    }
    vi.stubGlobal('RATEWRIGHT_VERSION', '4.5.6');
    vi.spyOn(process, 'argv', 'get').mockReturnValue(['node', 'ratewright', ...argv]);
    await import('../../server/src/cli/main.ts');
    await vi.waitFor(() => expect(process.exitCode).toBeDefined());
    const code = process.exitCode;
    vi.restoreAllMocks();
    return { ...written, code };
  }

  it('hands on its words, its version and its exit code', async () => {
    expect(await started(['-V'])).toEqual({ stdout: 'ratewright 4.5.6\n', stderr: '', code: 0 });
  });

  it('hands on messages', async () => {
    expect(await started(['chekc'])).toMatchObject({ stdout: '', code: 2 });
  });

  it('a fault of its own ends with 2, which is no finding, and is told', async () => {
    vi.resetModules();
    vi.doMock('../../server/src/cli/run.ts', () => ({ run: () => Promise.reject(new Error('broken on purpose')) }));
    const { code, stderr } = await started([]);
    expect([code, stderr.split('\n')[0]]).toEqual([2, 'ratewright: a fault of the program: Error: broken on purpose']);
  });

  it('a closed pipe ends it with 0, another fault of standard output with 2, none of standard error at all', async () => {
    await started(['-V']);
    const exit = vi.spyOn(process, 'exit').mockReturnValue(undefined as never);
    const said = vi.spyOn(process.stderr, 'write').mockReturnValue(true);
    const own = (stream: NodeJS.WriteStream, index: number): ((fault: Error) => void) =>
      stream.listeners('error').find((one) => !ofOthers[index]![1].includes(one)) as (fault: Error) => void;
    own(process.stdout, 0)(Object.assign(new Error('closed'), { code: 'EPIPE' }));
    expect([exit.mock.calls, said.mock.calls]).toEqual([[[0]], []]);
    own(process.stdout, 0)(Object.assign(new Error('full'), { code: 'ENOSPC' }));
    expect(exit).toHaveBeenLastCalledWith(2);
    expect(said).toHaveBeenCalledWith("ratewright: standard output can't be written: full\n");
    own(process.stderr, 1)(new Error('closed'));
    expect(exit).toHaveBeenCalledTimes(2);
  });
});
