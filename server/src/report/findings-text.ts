import { acceptanceWords } from '../checks/acceptance-words.ts';
import type { PositionRange } from '../rig/place.ts';
import { type RunStorage, totalsText } from '../workbench/run-totals.ts';
import type { FileReport, ReportedFinding, Summary } from './findings-json.ts';
import type { Paint } from './paint.ts';
import { printable } from './printable.ts';

/**
 * The findings of one file as text: place, severity and check on a line, then what will happen to the data, then the
 * places in other files that matter, then the remedies where they were asked for, the preferred one with a star. What
 * is accepted says so, by whom and why. Lines and characters count from 1 here, as editors show them.
 */
export function findingsText(file: FileReport, paint: Paint): string {
  return file.findings.map((reported) => findingText(file.path, reported, paint)).join('');
}

function findingText(path: string, { finding, range, elsewhere, remedies }: ReportedFinding, paint: Paint): string {
  const place = placeText(path, range);
  const subject = finding.channel ?? finding.thing;
  const head = [
    paint(place, 'strong'),
    finding.accepted ? paint(`accepted ${finding.severity}`, 'quiet') : paint(finding.severity, finding.severity),
    finding.check,
    ...(subject === undefined || subject === '' ? [] : [paint(`(${printable(subject)})`, 'quiet')]),
  ].join('  ');
  const said = [finding.message, ...(finding.acceptance ? [acceptanceWords(finding.acceptance)] : [])];
  const lines = [head, ...said.flatMap((text) => wrapped(text, 96)).map((line) => `    ${line}`)];
  for (const other of elsewhere ?? [])
    lines.push(`    ${placeText(other.path, other.range)}  ${printable(other.message)}`);
  for (const remedy of remedies ?? []) {
    lines.push(
      ...wrapped(remedy.title, 92).map(
        (line, index) => `    ${index === 0 ? (remedy.preferred ? '* ' : '- ') : '  '}${line}`,
      ),
    );
  }
  return `${lines.join('\n')}\n\n`;
}

function placeText(path: string, { start }: PositionRange): string {
  return `${printable(path)}:${start.line + 1}:${start.character + 1}`;
}

/**
 * What was checked, and how much was found, in one line; in a second what is recorded.
 *
 * @param totals of all files that have a run
 */
export function summaryText(
  files: number,
  { error, warning, hint, accepted, channels }: Summary,
  paint: Paint,
  totals?: RunStorage,
): string {
  const part = (count: number, one: string, ink: 'error' | 'warning' | 'hint'): string =>
    count === 0 ? `no ${one}s` : paint(counted(count, one), ink);
  const recorded = totals ? `Recorded: ${totalsText(totals)}.\n` : '';
  const checked = `${counted(channels, 'channel')} in ${counted(files, 'file')} checked`;
  const found = [part(error, 'error', 'error'), part(warning, 'warning', 'warning'), part(hint, 'hint', 'hint')];
  if (accepted > 0) found.push(`${accepted} accepted`);
  return `${checked}: ${found.join(', ')}.\n${recorded}`;
}

function counted(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`;
}

/** Breaks a text at spaces into lines of at most `width` characters; a longer word has a line of its own. */
function wrapped(text: string, width: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(/\s+/).map(printable)) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= width) lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines;
}
