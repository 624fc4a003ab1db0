import { expect } from 'vitest';
import type { Finding } from '../../server/src/checks/finding.ts';
import type { Evaluation } from '../../server/src/workbench/evaluation.ts';
import { located, locatedFindings } from '../../server/src/workbench/findings.ts';
import { SAMPLES } from '../tools/samples.ts';
import { evaluated } from './describe-findings.ts';

/** How much longer than all samples together anything may take: generous, for it is a run-away that is looked for. */
export const MOST_WORK = 100;

/** Keys of a channel of which nothing is said. */
export const OK = 'rate: 1 kHz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS';

/** A channel with two faults of its own: wherever it stands, both have to be told. */
export const LAST = '  last: { rate: 1 kHz, band: 0 Hz .. 2 kHz, undeclared: -90 dBFS, hears: none, rati: 1 }\n';

/** A rig of these sections, of a channel `a` with these keys, and of the channel `last`. */
export function rig(keys: string, sections = ''): string {
  return `rig: R\n${sections}channels:\n  a: { ${keys} }\n${LAST}`;
}

/** A rig whose channel `a` has what it needs and these keys. */
export function rigWith(keys: string, sections = ''): string {
  return rig(keys === '' ? OK : `${OK}, ${keys}`, sections);
}

/** A list of so many items as one writes it. */
export function listOf(count: number, item: (index: number) => string): string {
  return `[${Array.from({ length: count }, (_, index) => item(index)).join(', ')}]`;
}

/** What is wrong with an evaluation of any text at all; nothing ought to be. */
export function faultsOf(evaluation: Evaluation, text: string): readonly string[] {
  const lines = text.split(/\r\n|\r|\n/);
  return locatedFindings(evaluation).flatMap(({ finding, range: { start, end } }) => {
    const { check, message, related, figures, excess } = finding;
    const isInside =
      (start.line < end.line || (start.line === end.line && start.character <= end.character)) &&
      end.line < lines.length &&
      end.character <= lines[end.line]!.length;
    const relatedInside = related.every(({ place }) => located(evaluation, place));
    const finite = Object.values(figures).every((figure) => typeof figure === 'string' || Number.isFinite(figure));
    return [
      ...(isInside && relatedInside ? [] : [`${check} stands outside the text: ${message}`]),
      ...(finite && !Number.isNaN(excess) ? [] : [`${check} has figures that are none: ${message}`]),
      ...[message, ...related.map((other) => other.message)]
        .filter((said) => !/\.$/.test(said) || /NaN|Infinity|undefined|\[object/.test(withoutQuotes(said)))
        .map((said) => `${check} is no plain sentence: ${said}`),
    ];
  });
}

/** What the file itself says is told as it stands, whatever it is. */
function withoutQuotes(message: string): string {
  return message.replace(/`[^`]*`/g, '');
}

/** What is said besides the two faults of `last`, which have to be: `check underlined`. */
export function told(text: string): readonly string[] {
  const { lines, evaluation, work } = read(text);
  expect(work).toBeLessThan(MOST_WORK);
  expect(faultsOf(evaluation, text)).toEqual([]);
  expect(lines).toEqual(expect.arrayContaining(['band-over-nyquist 1 kHz', 'unknown-key rati']));
  return lines.filter((line) => line !== 'band-over-nyquist 1 kHz' && line !== 'unknown-key rati');
}

/** Everything that is said of a text, and the work it took as a multiple of reading the samples. */
export function read(text: string): {
  readonly evaluation: Evaluation;
  readonly lines: readonly string[];
  readonly work: number;
} {
  const start = process.cpuUsage();
  const evaluation = evaluated(text);
  const found = locatedFindings(evaluation);
  const { user, system } = process.cpuUsage(start);
  return { evaluation, lines: found.map(({ finding }) => line(finding)), work: (user + system) / samplesCost() };
}

function line({ check, place }: Finding): string {
  const underlined = place.entry.text.slice(place.start, place.end);
  return `${check} ${underlined.length > 60 ? `${underlined.slice(0, 60)}...` : underlined}`.trimEnd();
}

let costOfSamples: number | undefined;

/** Microseconds of computing that the samples take together, the least of three times. */
function samplesCost(): number {
  costOfSamples ??= Math.min(
    ...[1, 2, 3].map(() => {
      const start = process.cpuUsage();
      for (const { text } of SAMPLES) evaluated(text);
      const { user, system } = process.cpuUsage(start);
      return user + system;
    }),
  );
  return costOfSamples;
}
