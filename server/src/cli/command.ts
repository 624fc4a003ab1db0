import { statSync, writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { reasonOf } from '../server-read-file.ts';
import type { CommandIo, ExitCode } from './io.ts';
import type { ParsedOptions } from './options.ts';
import { replaceFile } from './write-file.ts';

/** One command of the command line. */
export interface Command {
  readonly name: string;
  /** One line for the list of commands. */
  readonly summary: string;
  /** The whole help text. */
  readonly help: string;
  /** @throws UsageError where its words do not make sense */
  readonly run: (argv: readonly string[], io: CommandIo) => Promise<ExitCode>;
}

/** Puts results where they are wanted: the file of `--output`, or standard output. */
export function deliver(result: string, options: ParsedOptions, io: CommandIo): ExitCode {
  const output = options.text('output');
  if (output === undefined || output === '-') {
    io.stdout(result);
    return 0;
  }
  const path = resolve(io.cwd, output);
  try {
    if (canBeReplaced(path)) replaceFile(path, result);
    else writeFileSync(path, result);
    return 0;
  } catch (fault) {
    io.stderr(`ratewright: ${output} ${reasonOf(fault, 'written')}\n`);
    return 2;
  }
}

/** What is no regular file (a pipe, `/dev/null`, `/dev/stdout`) can't be replaced, only written to. */
function canBeReplaced(path: string): boolean {
  const status = statSync(path, { throwIfNoEntry: false });
  return !path.startsWith('/dev/') && (status === undefined || status.isFile());
}
