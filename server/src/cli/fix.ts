import { resolve } from 'node:path';
import type { FixAllResult } from '../remedies/fix-all.ts';
import { REMEDY_NAMES } from '../remedies/list.ts';
import type { RemedyKind } from '../remedies/remedy.ts';
import { printable } from '../report/printable.ts';
import { applyTextEdits } from '../rig/text-edit.ts';
import { reasonOf } from '../server-read-file.ts';
import { allFindings } from '../workbench/findings.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import { findFiles, NO_FILES } from './find-files.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { graver, UsageError } from './io.ts';
import { newWorkbench, openRig } from './open-rig.ts';
import type { FailOn } from './options.ts';
import { failOn, fails, listOf, parseOptions } from './options.ts';
import { unifiedDiff } from './unified-diff.ts';
import { replaceFile } from './write-file.ts';

const OPTIONS = {
  allow: { type: 'string' },
  remedy: { type: 'string' },
  'dry-run': { type: 'boolean' },
  'fail-on': { type: 'string' },
  'stdin-filename': { type: 'string' },
} as const;

export const fix: Command = {
  name: 'fix',
  summary: 'apply the remedies that change the text or a setting',
  help: `Usage: ratewright fix [PATH...]

Applies, wherever there is one, the preferred remedy: proved in memory to take its
finding away and to bring no other. Only corrections of the text and settings of
the acquisition are applied unless more is allowed.

  --allow hardware,requirement
                            also apply remedies that ask for another filter or
                            sensor, or that narrow what the test asks for
  --remedy NAME             only this remedy
  --dry-run                 print a unified diff, change nothing, and exit with 1
                            if anything would change
  --fail-on error|warning|hint|none
                            the least severity left over that exits with 1 (error)
  --stdin-filename NAME     what to call standard input (stdin.rig.yaml)
  -o, --output FILE         write to FILE what would go to standard output: the diff,
                            or the text that came from standard input
  -q, --quiet               say nothing of what was applied

With - the text comes from standard input and goes to standard output. Files are
replaced as a whole or not at all.
`,
  run: runFix,
};

const NOTHING: FixAllResult = { edits: [], applied: [] };

interface FixSettings {
  readonly kinds: ReadonlySet<RemedyKind>;
  readonly remedy: string | undefined;
  readonly dryRun: boolean;
  readonly from: FailOn;
  readonly isQuiet: boolean;
  readonly stdinName: string;
  /** The words of the command line: the folders among them hold files that may be used. */
  readonly given: readonly string[];
}

interface Fixed {
  readonly exit: ExitCode;
  /** What goes to standard output, if anything. */
  readonly result?: string;
}

async function runFix(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, OPTIONS);
  const settings: FixSettings = {
    kinds: new Set<RemedyKind>(['text', 'setting', ...allowed(listOf(options.text('allow')) ?? [])]),
    remedy: remedyName(options.text('remedy')),
    dryRun: options.flag('dry-run'),
    from: failOn(options),
    isQuiet: options.flag('quiet'),
    stdinName: options.text('stdin-filename') ?? 'stdin.rig.yaml',
    given: options.words,
  };
  const paths = options.words.length === 0 ? ['.'] : options.words;
  if (options.text('output') !== undefined && !settings.dryRun && !paths.includes('-'))
    throw new UsageError('--output goes with --dry-run or -; without them each file is replaced where it is');
  const found = findFiles(
    paths.filter((path) => path !== '-'),
    io.cwd,
  );
  for (const { path, reason } of found.faults) io.stderr(`ratewright: ${path} ${reason}\n`);
  let exit: ExitCode = found.faults.length > 0 ? 2 : 0;
  const files = [...(paths.includes('-') ? ['-'] : []), ...found.files];
  if (files.length === 0 && exit === 0) io.stderr(`ratewright: ${NO_FILES}\n`);
  const results: string[] = [];
  for (const path of files) {
    const fixed = await fixFile(path, settings, io);
    exit = graver(exit, fixed.exit);
    if (fixed.result !== undefined) results.push(fixed.result);
  }
  if (results.length === 0 && !settings.dryRun) return exit;
  return graver(exit, deliver(results.join(''), options, io));
}

async function fixFile(path: string, settings: FixSettings, io: CommandIo): Promise<Fixed> {
  const workbench = newWorkbench(io);
  const rig = await openRig(workbench, path, io, settings.stdinName, settings.given);
  if ('fault' in rig) {
    io.stderr(`ratewright: ${rig.path} ${rig.fault}\n`);
    return { exit: 2 };
  }
  const { edits, applied } = workbench.fixAll(rig.uri, settings.kinds, () => false, settings.remedy) ?? NOTHING;
  const fixed = applyTextEdits(rig.text, edits);
  const isChanged = fixed !== rig.text;
  if (settings.dryRun) {
    if (!isChanged) return { exit: leftOver(workbench, rig.uri, settings.from) };
    return { exit: 1, result: unifiedDiff(rig.path, rig.text, edits, rig.byteOrderMark) };
  }
  const written = path !== '-' && isChanged ? writeFixed(path, rig.byteOrderMark + fixed, io) : 0;
  if (written === 0 && !settings.isQuiet) {
    for (const remedy of applied) io.stderr(`${rig.path}: ${printable(remedy.title)}\n`);
  }
  workbench.openFile(rig.uri, fixed);
  const exit = graver(written, leftOver(workbench, rig.uri, settings.from));
  return path === '-' ? { exit, result: rig.byteOrderMark + fixed } : { exit };
}

function writeFixed(path: string, text: string, io: CommandIo): ExitCode {
  try {
    replaceFile(resolve(io.cwd, path), text);
    return 0;
  } catch (fault) {
    io.stderr(`ratewright: ${path} ${reasonOf(fault, 'written')}\n`);
    return 2;
  }
}

function leftOver(workbench: ReturnType<typeof newWorkbench>, uri: string, from: FailOn): ExitCode {
  const evaluation = workbench.evaluation(uri);
  const left = evaluation && [...allFindings(evaluation)].some((finding) => fails(finding, from));
  return left ? 1 : 0;
}

function allowed(kinds: readonly string[]): readonly RemedyKind[] {
  return kinds.map((kind) => {
    if (kind === 'hardware' || kind === 'requirement') return kind;
    throw new UsageError(
      kind === 'claim'
        ? '--allow takes hardware and requirement; what is claimed of the rig is for a person to write'
        : `--allow takes hardware and requirement; it was given '${kind}'`,
    );
  });
}

function remedyName(name: string | undefined): string | undefined {
  if (name !== undefined && !REMEDY_NAMES.includes(name)) {
    throw new UsageError(`there is no remedy '${name}'; there are ${REMEDY_NAMES.join(', ')}`);
  }
  return name;
}
