import type { Finding, Severity } from '../checks/finding.ts';
import type { Remedy } from '../remedies/remedy.ts';
import type { Acceptance } from '../rig/acceptance.ts';
import type { PositionRange } from '../rig/place.ts';
import type { RunStorage } from '../workbench/run-totals.ts';
import { reported } from './number.ts';

/** A file's findings, ready to be reported. */
export interface FileReport {
  readonly path: string;
  readonly channels: number;
  readonly findings: readonly ReportedFinding[];
  /** What the file's run makes of data, where it has one. */
  readonly totals?: RunStorage | undefined;
}

/** A related place of a finding that stands in another file. */
export interface PlaceElsewhere {
  readonly path: string;
  readonly range: PositionRange;
  readonly message: string;
}

export interface ReportedFinding {
  readonly finding: Finding;
  readonly range: PositionRange;
  /** Only where there are any. */
  readonly elsewhere?: readonly PlaceElsewhere[];
  /** Only where they were asked for. */
  readonly remedies?: readonly Remedy[];
}

export interface Summary {
  readonly error: number;
  readonly warning: number;
  readonly hint: number;
  readonly accepted: number;
  readonly channels: number;
  /** Of all runs together, while they record; only where there is a run. */
  readonly bytesPerSecond?: number;
  /** Of all runs together, in all; only where there is a run whose amount of data is known. */
  readonly bytes?: number;
}

/** Counts and sums over all files; what is accepted is counted apart from the rest. */
export function summaryOf(files: readonly FileReport[]): Summary {
  const totals = totalsOf(files);
  const count = (isCounted: (finding: Finding) => boolean): number =>
    files.reduce((sum, file) => sum + file.findings.filter(({ finding }) => isCounted(finding)).length, 0);
  const open = (severity: Severity): number => count((finding) => !finding.accepted && finding.severity === severity);
  return {
    error: open('error'),
    warning: open('warning'),
    hint: open('hint'),
    accepted: count(({ accepted }) => accepted === true),
    channels: files.reduce((sum, file) => sum + file.channels, 0),
    ...(totals ? { bytesPerSecond: reported(totals.bytesPerSecond) } : {}),
    ...(totals?.bytes === undefined ? {} : { bytes: reported(totals.bytes) }),
  };
}

/** What the runs of all files make of data together; `undefined` where no file has a run. */
export function totalsOf(files: readonly FileReport[]): RunStorage | undefined {
  const runs = files.flatMap(({ totals }) => totals ?? []);
  if (runs.length === 0) return undefined;
  const known = runs.flatMap(({ bytes }) => bytes ?? []);
  return {
    bytesPerSecond: sum(runs.map(({ bytesPerSecond }) => bytesPerSecond)),
    bytes: known.length > 0 ? sum(known) : undefined,
    channels: sum(runs.map(({ channels }) => channels)),
    channelsLeftOut: sum(runs.map(({ channelsLeftOut }) => channelsLeftOut)),
  };
}

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, one) => total + one, 0);
}

/** The findings of some files as JSON: stable keys, stable order, the same to the byte for the same texts. */
export function findingsJson(files: readonly FileReport[]): string {
  const report = {
    version: 1,
    files: files.map(({ path, findings }) => ({ path, findings: findings.map(findingJson) })),
    summary: summaryOf(files),
  };
  return `${JSON.stringify(report, undefined, 2)}\n`;
}

function findingJson({ finding, range, elsewhere, remedies }: ReportedFinding): object {
  return {
    name: finding.check,
    severity: finding.severity,
    ...(finding.channel === undefined ? {} : { channel: finding.channel }),
    ...(finding.thing === undefined ? {} : { thing: finding.thing }),
    ...(finding.about === undefined ? {} : { about: finding.about }),
    message: finding.message,
    range,
    ...(elsewhere === undefined ? {} : { elsewhere }),
    accepted: finding.accepted === true,
    ...(finding.acceptance ? { acceptance: acceptanceJson(finding.acceptance) } : {}),
    figures: Object.fromEntries(
      Object.entries(finding.figures).map(([name, value]) => [
        name,
        typeof value === 'number' ? reported(value) : value,
      ]),
    ),
    ...(remedies === undefined
      ? {}
      : { remedies: remedies.map(({ name, kind, title, preferred }) => ({ name, kind, title, preferred })) }),
  };
}

function acceptanceJson({ reason, by, until }: Acceptance): object {
  return { reason, ...(by === undefined ? {} : { by }), ...(until === undefined ? {} : { until: until.day }) };
}
