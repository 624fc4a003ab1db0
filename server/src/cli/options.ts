import { type ParseArgsConfig, parseArgs } from 'node:util';
import type { Finding, Severity } from '../checks/finding.ts';
import { SEVERITIES } from '../checks/finding.ts';
import type { Paint } from '../report/paint.ts';
import { COLOURED, PLAIN } from '../report/paint.ts';
import type { CommandIo } from './io.ts';
import { HelpWanted, UsageError } from './io.ts';

type OptionTable = NonNullable<ParseArgsConfig['options']>;

/** The options that every command takes. */
export const COMMON_OPTIONS = {
  help: { type: 'boolean', short: 'h' },
  quiet: { type: 'boolean', short: 'q' },
  output: { type: 'string', short: 'o' },
  color: { type: 'string' },
} as const satisfies OptionTable;

export interface ParsedOptions {
  readonly words: readonly string[];
  flag(name: string): boolean;
  text(name: string): string | undefined;
}

/**
 * Reads a command's words by its table of options.
 *
 * @throws UsageError for an option that the table does not have, or one without its value
 * @throws HelpWanted where help is asked for
 */
export function parseOptions(argv: readonly string[], own: OptionTable): ParsedOptions {
  const { values, positionals } = parsed(argv, own);
  const given: Readonly<Record<string, unknown>> = values;
  if (given.help === true) throw new HelpWanted();
  return {
    words: positionals,
    flag: (name) => given[name] === true,
    text: (name) => {
      const value = given[name];
      return typeof value === 'string' ? value : undefined;
    },
  };
}

function parsed(argv: readonly string[], own: OptionTable): ReturnType<typeof parseArgs> {
  try {
    return parseArgs({
      args: [...argv],
      options: { ...COMMON_OPTIONS, ...own },
      allowPositionals: true,
      strict: true,
    });
  } catch (fault) {
    // What Node says after its first sentence is advice to programmers.
    throw new UsageError(fault instanceof Error ? fault.message.split(/\.\s/)[0]! : String(fault));
  }
}

/**
 * One of the values that an option has.
 *
 * @throws UsageError for any other
 */
export function choice<T extends string>(options: ParsedOptions, name: string, values: readonly T[], otherwise: T): T {
  const given = options.text(name);
  if (given === undefined) return otherwise;
  const found = values.find((value) => value === given);
  if (found === undefined) throw new UsageError(`--${name} takes ${values.join(', ')}; it was given '${given}'`);
  return found;
}

/** The severity from which a finding fails the run; `none` for never. */
export type FailOn = Severity | 'none';

export function failOn(options: ParsedOptions): FailOn {
  return choice<FailOn>(options, 'fail-on', [...SEVERITIES, 'none'], 'error');
}

/** Whether a finding is at or above the severity that fails the run; one that is accepted fails none. */
export function fails({ severity, accepted }: Finding, from: FailOn): boolean {
  return !accepted && from !== 'none' && SEVERITIES.indexOf(severity) <= SEVERITIES.indexOf(from);
}

/** Colours where they are wanted: `--color`, then `NO_COLOR`, then whether results go to a terminal. */
export function paintFor(options: ParsedOptions, io: CommandIo): Paint {
  const wanted = choice(options, 'color', ['auto', 'always', 'never'] as const, 'auto');
  if (wanted !== 'auto') return wanted === 'always' ? COLOURED : PLAIN;
  const forbidden = (io.environment.NO_COLOR ?? '') !== '' || options.text('output') !== undefined;
  return io.stdoutIsTerminal && !forbidden ? COLOURED : PLAIN;
}

/** A list given as one word with commas. */
export function listOf(text: string | undefined): readonly string[] | undefined {
  return text
    ?.split(',')
    .map((part) => part.trim())
    .filter((part) => part !== '');
}
