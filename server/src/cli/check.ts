import { isAbsolute, relative } from 'node:path';
import type { Finding } from '../checks/finding.ts';
import { CHECK_NAMES } from '../checks/list.ts';
import { nearest } from '../quantity/spelling.ts';
import type { FileReport, PlaceElsewhere, ReportedFinding } from '../report/findings-json.ts';
import { findingsJson, summaryOf, totalsOf } from '../report/findings-json.ts';
import { findingsText, summaryText } from '../report/findings-text.ts';
import { pathOf } from '../server-used-files.ts';
import { countChannels, located, locatedFindings } from '../workbench/findings.ts';
import { runTotals } from '../workbench/run-totals.ts';
import type { Workbench } from '../workbench/workbench.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import { findFiles, NO_FILES } from './find-files.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { graver, UsageError } from './io.ts';
import { newWorkbench, type OpenedRig, openRig } from './open-rig.ts';
import type { ParsedOptions } from './options.ts';
import { choice, failOn, fails, listOf, paintFor, parseOptions } from './options.ts';
import { progressOver } from './progress.ts';

const OPTIONS = {
  format: { type: 'string' },
  'fail-on': { type: 'string' },
  only: { type: 'string' },
  remedies: { type: 'boolean' },
  'stdin-filename': { type: 'string' },
} as const;

export const check: Command = {
  name: 'check',
  summary: 'check rig files and say what will spoil the data',
  help: `Usage: ratewright check [PATH...]

Checks rig files. A PATH is a file, a folder (searched for *.rig.yaml, *.rig.yml
and *.rig.json, honouring .gitignore) or - for standard input; without one, the
folder here.

  --format text|json        how results are written (text)
  --fail-on error|warning|hint|none
                            the least severity that exits with 1 (error)
  --only NAME,...           only these checks
  --remedies                search the remedies of every finding and list them
  --stdin-filename NAME     what to call standard input (stdin.rig.yaml)
  -o, --output FILE         write results to FILE
  -q, --quiet               no summary and no progress
  --color auto|always|never

Exit: 0 nothing at or above the severity, 1 findings, 2 something could not be read.
`,
  run: runCheck,
};

async function runCheck(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, OPTIONS);
  const format = choice(options, 'format', ['text', 'json'] as const, 'text');
  const from = failOn(options);
  const only = checkNames(listOf(options.text('only')));
  const paint = paintFor(options, io);
  const paths = options.words.length === 0 ? ['.'] : options.words;
  const found = findFiles(
    paths.filter((path) => path !== '-'),
    io.cwd,
  );
  for (const { path, reason } of found.faults) io.stderr(`ratewright: ${path} ${reason}\n`);
  let exit: ExitCode = found.faults.length > 0 ? 2 : 0;

  const files = [...(paths.includes('-') ? ['-'] : []), ...found.files];
  if (files.length === 0 && exit === 0) io.stderr(`ratewright: ${NO_FILES}\n`);
  const progress = progressOver(files.length, options.flag('quiet'), io);
  const reports: FileReport[] = [];
  // One for all: what several files use is read once.
  const workbench = newWorkbench(io);
  for (const [index, path] of files.entries()) {
    const rig = await openRig(workbench, path, io, options.text('stdin-filename') ?? 'stdin.rig.yaml', paths);
    progress.step(index + 1);
    if ('fault' in rig) {
      progress.clear();
      io.stderr(`ratewright: ${rig.path} ${rig.fault}\n`);
      exit = 2;
      continue;
    }
    reports.push(reportOf(rig, workbench, only, options, io));
    workbench.closeFile(rig.uri);
  }
  progress.clear();

  if (reports.some(({ findings }) => findings.some(({ finding }) => fails(finding, from)))) exit = graver(exit, 1);
  if (format === 'json') return graver(exit, deliver(findingsJson(reports), options, io));
  const text = reports.map((report) => findingsText(report, paint)).join('');
  const summary = options.flag('quiet')
    ? ''
    : summaryText(reports.length, summaryOf(reports), paint, totalsOf(reports));
  return graver(exit, deliver(text + summary, options, io));
}

function reportOf(
  rig: Exclude<OpenedRig, { readonly fault: string }>,
  workbench: Workbench,
  only: ReadonlySet<string> | undefined,
  options: ParsedOptions,
  io: CommandIo,
): FileReport {
  const findings = locatedFindings(rig.evaluation)
    .filter(({ finding }) => !only || only.has(finding.check))
    .map((found): ReportedFinding => {
      const elsewhere = placesElsewhere(found.finding, rig, io);
      const remedies = options.flag('remedies') && workbench.remedies(rig.uri, found.finding, () => false);
      return { ...found, ...(elsewhere.length > 0 ? { elsewhere } : {}), ...(remedies ? { remedies } : {}) };
    });
  return {
    path: rig.path,
    channels: countChannels(rig.evaluation),
    findings,
    totals: runTotals(rig.evaluation),
  };
}

/** The related places of a finding that stand in used files; their paths are relative where that of the rig is. */
function placesElsewhere(
  { related }: Finding,
  { evaluation, path }: Exclude<OpenedRig, { readonly fault: string }>,
  { cwd }: CommandIo,
): readonly PlaceElsewhere[] {
  return related.flatMap(({ place, message }) => {
    const found = located(evaluation, place);
    const full = found?.uri === undefined ? undefined : pathOf(found.uri);
    if (!found || full === undefined) return [];
    return [{ path: isAbsolute(path) ? full : relative(cwd, full), range: found.range, message }];
  });
}

function checkNames(names: readonly string[] | undefined): ReadonlySet<string> | undefined {
  if (names?.length === 0) throw new UsageError('--only takes the names of checks, with commas between them');
  for (const name of names ?? []) {
    if (CHECK_NAMES.includes(name)) continue;
    const near = nearest(name, CHECK_NAMES);
    throw new UsageError(`there is no check '${name}'${near === undefined ? '' : `; the nearest is '${near}'`}`);
  }
  return names && new Set(names);
}
