/** What a command may touch: handed in, so that commands run in tests as they do in a terminal. */
export interface CommandIo {
  readonly cwd: string;
  readonly environment: Readonly<Record<string, string | undefined>>;
  /** Which day it is, as `2026-12-01`. */
  readonly today: string;
  readonly stdoutIsTerminal: boolean;
  readonly stderrIsTerminal: boolean;
  /** Everything on standard input, as bytes; of what is larger than any rig file, so much that it shows. */
  readStdin(): Promise<Uint8Array>;
  stdout(text: string): void;
  stderr(text: string): void;
}

/** How a command ended: 0 nothing at or above the chosen severity, 1 findings, 2 it could not do what was asked. */
export type ExitCode = 0 | 1 | 2;

/** The graver of two: 2 outranks 1. */
export function graver(a: ExitCode, b: ExitCode): ExitCode {
  return a > b ? a : b;
}

/** The words on the command line do not make sense; the message says which. */
export class UsageError extends Error {}

/** The words ask for the command's help and not for the command. */
export class HelpWanted extends Error {}
