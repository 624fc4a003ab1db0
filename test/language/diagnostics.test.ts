import { describe, expect, it } from 'vitest';
import type { Diagnostic } from 'vscode-languageserver-types';
import { DiagnosticSeverity, DiagnosticTag } from 'vscode-languageserver-types';
import { diagnosticsOf } from '../../server/src/editor/diagnostics.ts';
import { linksIn, NO_LINKS } from '../../server/src/editor/reference-links.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { WITH_REFERENCE } from './clients.ts';

const URI = 'file:///found.rig.yaml';

/** What an editor is told of a text. */
function told(text: string, links = NO_LINKS): readonly Diagnostic[] {
  return diagnosticsOf(URI, evaluated(text), links);
}

function named(text: string, code: string, links = NO_LINKS): Diagnostic {
  const found = told(text, links).filter((one) => one.code === code);
  expect(found).toHaveLength(1);
  return found[0]!;
}

/** The words that a diagnostic stands under. */
function under(text: string, { range }: Pick<Diagnostic, 'range'>): string {
  return text.slice(TextDocument.offset(text, range.start), TextDocument.offset(text, range.end));
}

describe('a diagnostic', () => {
  it('stands under the value at fault, with the check for its code', () => {
    const fold = named(EXTRACT_FAN, 'fold-in-band');
    expect(under(EXTRACT_FAN, fold)).toBe('25.6 kHz');
    expect(fold.source).toBe('ratewright');
    // 25.6 kHz - 16 kHz.
    expect(fold.message).toMatch(/^`inverter` will be recorded at 9\.6 kHz/);
    expect(fold.codeDescription).toBeUndefined();
  });

  it('links to the page of its check', () => {
    const href = 'file:///reference/checks/fold-in-band.md';
    expect(named(EXTRACT_FAN, 'fold-in-band', linksIn('file:///reference')).codeDescription).toEqual({ href });
    expect(named(EXTRACT_FAN, 'fold-in-band', WITH_REFERENCE.links).codeDescription).toEqual({ href });
  });

  it('tells the places that matter', () => {
    const related = named(EXTRACT_FAN, 'fold-in-band').relatedInformation!;
    expect(related.map(({ location, message }) => [location.uri, under(EXTRACT_FAN, location), message])).toEqual([
      [URI, 'inverter', '`inverter` is declared here.'],
      [URI, 'card', '`card` stands before this sampling.'],
    ]);
    expect(named(EXTRACT_FAN, 'unused-name').relatedInformation).toBeUndefined();
  });

  it.each([
    ['error', DiagnosticSeverity.Error],
    ['warning', DiagnosticSeverity.Warning],
    ['hint', DiagnosticSeverity.Information],
  ])('of a finding that the file makes of severity %s is sent as severity %i', (severity, expected) => {
    const text = `${EXTRACT_FAN}checks: { band-droop: ${severity} }\n`;
    expect(named(text, 'band-droop').severity).toBe(expected);
    expect(named(text, 'band-droop').tags).toBeUndefined();
  });

  it('of a name that nobody uses is greyed out, unless the file makes it graver', () => {
    const unused = named(EXTRACT_FAN, 'unused-name');
    expect(under(EXTRACT_FAN, unused)).toBe('tidy');
    expect(unused.severity).toBe(DiagnosticSeverity.Hint);
    expect(unused.tags).toEqual([DiagnosticTag.Unnecessary]);
    const graver = named(`${EXTRACT_FAN}checks: { unused-name: error }\n`, 'unused-name');
    expect(graver.severity).toBe(DiagnosticSeverity.Error);
    expect(graver.tags).toEqual([DiagnosticTag.Unnecessary]);
  });

  it('is not sent of a check that is off', () => {
    const text = `${EXTRACT_FAN}checks: { band-droop: off }\n`;
    expect(told(text).map(({ code }) => code)).not.toContain('band-droop');
  });

  it('stands where the protocol counts it, behind signs of two units and in lines that end with two signs', () => {
    const emoji = 'rig: 🛠\nchannels:\n  "🛠🛠": { note: "🛠", rate: 25.6 kHz, band: 10 Hz .. 20 kHz }\n';
    expect(under(emoji, named(emoji, 'band-over-nyquist'))).toBe('25.6 kHz');
    const windows = EXTRACT_FAN.replaceAll('\n', '\r\n');
    expect(under(windows, named(windows, 'fold-in-band'))).toBe('25.6 kHz');
  });
});

describe('the diagnostics of a file', () => {
  it('are in the order of their places', () => {
    const starts = told(EXTRACT_FAN).map(({ range }) => range.start.line);
    expect(starts).toEqual([...starts].sort((a, b) => a - b));
    expect(starts.length).toBeGreaterThan(3);
  });

  it('are none where there is nothing to say', () => {
    expect(told('rig: x\n')).toEqual([]);
  });

  /** So many hints, then so many warnings, then so many errors. */
  function crowded(hints: number, warnings: number, errors: number): string {
    const times = (count: number, line: (index: number) => string): string =>
      Array.from({ length: count }, (_, index) => line(index)).join('');
    return `rig: Crowded
filters:
${times(hints, (index) => `  idle-${index}: { response: rc, order: 1, corner: 1 kHz }\n`)}defaults: { band: 1 Hz .. 100 Hz, hears: none, undeclared: -160 dBFS }
channels:
${times(warnings, (index) => `  odd-${index}: { rate: 1 kHz, flatnes: 1 dB }\n`)}${times(errors, (index) => `  bad-${index}: { rate: 1 kHz, digitizer: nobody }\n`)}`;
  }

  it('are all sent up to a thousand', () => {
    const text = crowded(990, 5, 5);
    expect(allFindings(evaluated(text))).toHaveLength(1_000);
    expect(told(text)).toHaveLength(1_000);
    expect(told(text).at(-1)!.message).not.toMatch(/not shown here/);
  });

  it('past a thousand are the errors first, and the last says how many are left out', () => {
    const text = crowded(700, 400, 20);
    const diagnostics = told(text);
    expect(diagnostics).toHaveLength(1_000);
    const count = (severity: DiagnosticSeverity): number =>
      diagnostics.slice(0, -1).filter((one) => one.severity === severity).length;
    expect(count(DiagnosticSeverity.Error)).toBe(20);
    expect(count(DiagnosticSeverity.Warning)).toBe(400);
    expect(count(DiagnosticSeverity.Hint)).toBe(579);
    expect(diagnostics.at(-1)).toEqual({
      range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
      severity: DiagnosticSeverity.Information,
      source: 'ratewright',
      message: '121 more findings are not shown here. `ratewright check` lists all 1120.',
    });
  });
});
