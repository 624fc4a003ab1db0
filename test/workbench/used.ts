import { located, locatedFindings } from '../../server/src/workbench/findings.ts';
import type { FileContent, Workbench } from '../../server/src/workbench/workbench.ts';
import { strictWorkbench } from './describe-findings.ts';

export const FOLDER = 'file:///rigs/';

/** What lies on the disk, by path below {@link FOLDER}; whatever is not there is missing. */
export type Disk = Readonly<Record<string, FileContent>>;

/** A workbench that was told of one file, and then of all that it wants to know. */
export function told(path: string, disk: Disk): Workbench {
  const workbench = strictWorkbench();
  workbench.setFile(FOLDER + path, disk[path]!);
  tellWanted(workbench, disk);
  return workbench;
}

export function tellWanted(workbench: Workbench, disk: Disk): void {
  for (let wanted = workbench.filesWanted(); wanted.length > 0; wanted = workbench.filesWanted())
    for (const uri of wanted) workbench.setFile(uri, disk[uri.slice(FOLDER.length)] ?? 'missing');
}

/** `check severity thing about`, a line for each finding of a file. */
export function lines(workbench: Workbench, path: string): readonly string[] {
  return locatedFindings(workbench.evaluation(FOLDER + path)!).map(({ finding }) =>
    [finding.check, finding.severity, finding.channel ?? finding.thing, finding.about].filter(Boolean).join(' '),
  );
}

export function foundIn(path: string, disk: Disk): readonly string[] {
  return lines(told(path, disk), path);
}

/** The related places of a finding, as `file: text of the line`. */
export function relatedOf(workbench: Workbench, path: string, check: string): readonly string[] {
  const evaluation = workbench.evaluation(FOLDER + path)!;
  const { finding } = locatedFindings(evaluation).find((one) => one.finding.check === check)!;
  return finding.related.map(({ place }) => {
    const { uri = FOLDER + path, range } = located(evaluation, place)!;
    const text = workbench.snapshot(uri)!.text().split('\n')[range.start.line]!;
    return `${uri.slice(FOLDER.length)}: ${text.trim()}`;
  });
}

export const text = (content: string): FileContent => ({ text: content });

/** Folds by hand: 1 kHz - 950 Hz = 50 Hz, in the band; 1 V of ±10 V is -20 dBFS, and the filter takes less than 12 dB off. */
export const LIBRARY = `rig: Common
clocks:
  chassis: { frequency: 1 MHz }
digitizers:
  box: { clock: chassis, bits: 16, full-scale: ±10 V }
sensors:
  stud: { measures: acceleration, sensitivity: 100 mV/g }
filters:
  card: { response: rc, order: 2, corner: 500 Hz }
sources:
  drive: { frequency: 950 Hz, level: 1 V }
groups:
  tower: { within: 2 deg, up-to: 100 Hz }
`;
export const USER = `rig: Cell
uses: [common/lib.rig.yaml]
channels:
  a: { sensor: stud, digitizer: box, filter: card, rate: 1 kHz, band: 1 Hz .. 100 Hz, flatness: 3 dB }
`;
export const DISK: Disk = { 'a.rig.yaml': text(USER), 'common/lib.rig.yaml': text(LIBRARY) };
