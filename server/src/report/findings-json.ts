import type { Finding, Severity } from '../checks/finding.ts';
import type { Remedy } from '../remedies/remedy.ts';
import type { PositionRange } from '../rig/place.ts';
import { reported } from './number.ts';

/** A file's findings, ready to be reported. */
export interface FileReport {
  readonly path: string;
  readonly channels: number;
  readonly findings: readonly ReportedFinding[];
}

export interface ReportedFinding {
  readonly finding: Finding;
  readonly range: PositionRange;
  /** Only where they were asked for. */
  readonly remedies?: readonly Remedy[];
}

export interface Summary {
  readonly error: number;
  readonly warning: number;
  readonly hint: number;
  readonly accepted: number;
  readonly channels: number;
}

/** Counts over all files. */
export function summaryOf(files: readonly FileReport[]): Summary {
  const count = (severity: Severity): number =>
    files.reduce((sum, file) => sum + file.findings.filter(({ finding }) => finding.severity === severity).length, 0);
  return {
    error: count('error'),
    warning: count('warning'),
    hint: count('hint'),
    accepted: 0,
    channels: files.reduce((sum, file) => sum + file.channels, 0),
  };
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

function findingJson({ finding, range, remedies }: ReportedFinding): object {
  return {
    name: finding.check,
    severity: finding.severity,
    ...(finding.channel === undefined ? {} : { channel: finding.channel }),
    ...(finding.thing === undefined ? {} : { thing: finding.thing }),
    ...(finding.about === undefined ? {} : { about: finding.about }),
    message: finding.message,
    range,
    accepted: false,
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
