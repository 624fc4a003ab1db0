import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { afterAll } from 'vitest';
import type { CommandIo, ExitCode } from '../../server/src/cli/io.ts';
import { run } from '../../server/src/cli/run.ts';
import { TODAY } from '../tools/today.ts';

/** Files by their path below the folder; a folder that holds nothing is a path that ends with `/`. */
export type Files = Readonly<Record<string, string | Uint8Array>>;

export interface Ran {
  readonly code: ExitCode;
  readonly stdout: string;
  readonly stderr: string;
  /** Every regular file below the folder afterwards, by its path, as UTF-8. */
  readonly files: Readonly<Record<string, string>>;
}

export interface Surroundings {
  readonly stdin?: string | Uint8Array | Error;
  readonly environment?: Readonly<Record<string, string>>;
  /** Both standard output and standard error are a terminal. */
  readonly isTerminal?: boolean;
  /** A folder below the one with the files, to run in. */
  readonly inside?: string;
}

const made: string[] = [];

afterAll(() => {
  for (const folder of made) rmSync(folder, { recursive: true, force: true });
});

/** A new temporary folder that holds the files; it goes away with the test file. */
export function folderOf(files: Files): string {
  const folder = mkdtempSync(join(tmpdir(), 'ratewright-cli-'));
  made.push(folder);
  for (const [path, content] of Object.entries(files)) {
    if (path.endsWith('/')) mkdirSync(join(folder, path), { recursive: true });
    else {
      mkdirSync(dirname(join(folder, path)), { recursive: true });
      writeFileSync(join(folder, path), content);
    }
  }
  return folder;
}

/** Runs the command line in a folder, as `ratewright ARGV` would there. */
export async function ranIn(folder: string, argv: readonly string[], around: Surroundings = {}): Promise<Ran> {
  let stdout = '';
  let stderr = '';
  const { stdin = '', environment = {}, isTerminal = false, inside = '.' } = around;
  const io: CommandIo = {
    cwd: join(folder, inside),
    environment,
    today: TODAY,
    stdoutIsTerminal: isTerminal,
    stderrIsTerminal: isTerminal,
    readStdin: async () => {
      if (stdin instanceof Error) throw stdin;
      return typeof stdin === 'string' ? Buffer.from(stdin) : stdin;
    },
    stdout: (text) => {
      stdout += text;
    },
    stderr: (text) => {
      stderr += text;
    },
  };
  const code = await run(argv, io, '0.0.0');
  return { code, stdout, stderr, files: filesBelow(folder) };
}

/** Runs the command line in a new folder that holds the files. */
export function ran(argv: readonly string[], files: Files = {}, around: Surroundings = {}): Promise<Ran> {
  return ranIn(folderOf(files), argv, around);
}

function filesBelow(folder: string): Record<string, string> {
  const paths = readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((item) => item.isFile())
    .map((item) => join(item.parentPath, item.name));
  return Object.fromEntries(
    paths.map((path) => [path.slice(folder.length + 1), readFileSync(path, 'utf8')] as const).sort(byPath),
  );
}

function byPath([a]: readonly [string, string], [b]: readonly [string, string]): number {
  return a < b ? -1 : 1;
}
