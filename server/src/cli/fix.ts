import { resolve } from 'node:path';
import { createTwoFilesPatch } from 'diff';
import { REMEDY_NAMES } from '../remedies/list.ts';
import type { RemedyKind } from '../remedies/remedy.ts';
import { applyTextEdits } from '../rig/text-edit.ts';
import { allFindings } from '../workbench/findings.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import { findFiles } from './find-files.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { graver, UsageError } from './io.ts';
import { newWorkbench, openRig } from './open-rig.ts';
import type { FailOn, ParsedOptions } from './options.ts';
import { failOn, fails, listOf, parseOptions } from './options.ts';
import { reasonOf } from './read-file.ts';
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
  -q, --quiet               say nothing of what was applied

With - the text comes from standard input and goes to standard output. Files are
replaced as a whole or not at all.
`,
  run: runFix,
};

interface FixSettings {
  readonly kinds: ReadonlySet<RemedyKind>;
  readonly remedy: string | undefined;
  readonly dryRun: boolean;
  readonly from: FailOn;
}

async function runFix(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, OPTIONS);
  const settings: FixSettings = {
    kinds: new Set<RemedyKind>(['text', 'setting', ...allowed(listOf(options.text('allow')) ?? [])]),
    remedy: remedyName(options.text('remedy')),
    dryRun: options.flag('dry-run'),
    from: failOn(options),
  };
  const paths = options.words.length === 0 ? ['.'] : options.words;
  const found = findFiles(
    paths.filter((path) => path !== '-'),
    io.cwd,
  );
  for (const { path, reason } of found.faults) io.stderr(`ratewright: ${path} ${reason}\n`);
  let exit: ExitCode = found.faults.length > 0 ? 2 : 0;
  for (const path of [...(paths.includes('-') ? ['-'] : []), ...found.files]) {
    exit = graver(exit, await fixFile(path, settings, options, io));
  }
  return exit;
}

async function fixFile(path: string, settings: FixSettings, options: ParsedOptions, io: CommandIo): Promise<ExitCode> {
  const workbench = newWorkbench(io);
  const rig = await openRig(workbench, path, io, options.text('stdin-filename') ?? 'stdin.rig.yaml');
  if ('fault' in rig) {
    io.stderr(`ratewright: ${rig.path} ${rig.fault}\n`);
    return 2;
  }
  const result = workbench.fixAll(rig.uri, settings.kinds, () => false, settings.remedy);
  const fixed = result ? applyTextEdits(rig.text, result.edits) : rig.text;
  const applied = result?.applied ?? [];
  if (!options.flag('quiet') && !settings.dryRun) {
    for (const remedy of applied) io.stderr(`${rig.path}: ${remedy.title}\n`);
  }
  if (settings.dryRun) {
    if (fixed === rig.text) return leftOver(workbench, rig.uri, settings.from);
    return graver(
      deliver(createTwoFilesPatch(rig.path, rig.path, rig.text, fixed, 'as it is', 'fixed'), options, io),
      1,
    );
  }
  const written = path === '-' ? deliver(fixed, options, io) : fixed === rig.text ? 0 : writeFixed(path, fixed, io);
  workbench.setFile(rig.uri, { text: fixed });
  return graver(written, leftOver(workbench, rig.uri, settings.from));
}

function writeFixed(path: string, text: string, io: CommandIo): ExitCode {
  try {
    replaceFile(resolve(io.cwd, path), text);
    return 0;
  } catch (fault) {
    io.stderr(`ratewright: ${path} could not be written: ${reasonOf(fault)}\n`);
    return 2;
  }
}

function leftOver(workbench: ReturnType<typeof newWorkbench>, uri: string, from: FailOn): ExitCode {
  const evaluation = workbench.evaluation(uri);
  const left = evaluation && [...allFindings(evaluation)].some((finding) => fails(finding.severity, from));
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
