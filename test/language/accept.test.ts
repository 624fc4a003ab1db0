import { describe, expect, it } from 'vitest';
import { DiagnosticSeverity } from 'vscode-languageserver-types';
import { completionsAt } from '../../server/src/editor/completion.ts';
import { diagnosticsOf } from '../../server/src/editor/diagnostics.ts';
import { hoverAt } from '../../server/src/editor/hover.ts';
import { NO_LINKS } from '../../server/src/editor/reference-links.ts';
import { MOST_FINDINGS_SENT } from '../../server/src/rig/limits.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { WITH_REFERENCE } from './clients.ts';

const ACCEPT = `accept:
  - finding: fold-in-band
    on: bearing-drive-end
    about: inverter
    reason: taken out afterwards
    by: the test lead
  - { finding: unused-name, about: tidy, reason: for later }
`;

/** The offers at the place that is marked. */
function labels(marked: string): readonly string[] {
  const text = marked.replace('▮', '');
  const evaluation = evaluated(text);
  const position = evaluation.snapshot.positionAt(marked.indexOf('▮'));
  return completionsAt(evaluation, position)!.items.map(({ label }) => label);
}

describe('what is accepted', () => {
  const told = diagnosticsOf('file:///a', evaluated(EXTRACT_FAN + ACCEPT), NO_LINKS);

  it('is shown faintly where it stands, with who and why, and not as if it were of no use', () => {
    const fold = told.find(({ code }) => code === 'fold-in-band')!;
    expect(fold.severity).toBe(DiagnosticSeverity.Hint);
    expect(fold.tags).toBeUndefined();
    expect(fold.message).toMatch(/^`inverter` will be recorded .*\nAccepted by the test lead: taken out afterwards$/s);
    expect(told.find(({ code }) => code === 'unused-name')!.tags).toBeUndefined();
    expect(told.find(({ code }) => code === 'band-droop')!.severity).toBe(DiagnosticSeverity.Warning);
  });

  it('is the first to be left out where there is too much', () => {
    const channels = Array.from(
      { length: MOST_FINDINGS_SENT + 5 },
      (_, index) => `  c${index}: { rate: 1 kHz, band: 1 Hz .. 9 Hz, undeclared: -90 dBFS, flatnes: 1 dB }\n`,
    ).join('');
    const text = `rig: R\nchannels:\n${channels}accept: [{ finding: unknown-key, on: "c*5", reason: known }]\n`;
    const sent = diagnosticsOf('file:///a', evaluated(text), NO_LINKS);
    // 100 of 1,005 are accepted; one place is for the number of those left out.
    expect(sent).toHaveLength(MOST_FINDINGS_SENT);
    const accepted = sent.filter(({ message }) => String(message).includes('Accepted'));
    expect(sent.filter(({ severity }) => severity === DiagnosticSeverity.Warning)).toHaveLength(905);
    expect(accepted).toHaveLength(MOST_FINDINGS_SENT - 1 - 905);
  });
});

describe('inside `accept`', () => {
  it('checks, channels and what a finding may be about are offered', () => {
    expect(labels(`${EXTRACT_FAN}accept:\n  - finding: ▮`)).toContain('fold-in-band');
    expect(labels(`${EXTRACT_FAN}accept: [{ finding: ▮ }]\n`)).toContain('acceptance-idle');
    expect(labels(`${EXTRACT_FAN}accept:\n  - on: ▮`)).toEqual(['bearing-drive-end']);
    const about = labels(`${EXTRACT_FAN}accept:\n  - about: ▮`);
    expect(about).toEqual(expect.arrayContaining(['inverter', 'blade-pass', 'mains', 'front-end']));
    expect(labels(`${EXTRACT_FAN}accept:\n  - finding: clips\n    ▮`)).toEqual([
      'on',
      'about',
      'reason',
      'by',
      'until',
    ]);
  });

  it('a brace range is offered as the channel is called', () => {
    const text = 'rig: R\nchannels:\n  s-{01..64}: { rate: 1 kHz, band: 1 Hz .. 9 Hz }\naccept:\n  - on: ▮';
    expect(labels(text)).toEqual(['s-{01..64}']);
  });

  it('a check and a source tell what they are', () => {
    const text = EXTRACT_FAN + ACCEPT;
    const evaluation = evaluated(text);
    const shown = (word: string): string => {
      const offset = text.indexOf(word, text.indexOf('accept:')) + word.length - 2;
      return JSON.stringify(hoverAt(evaluation, evaluation.snapshot.positionAt(offset), WITH_REFERENCE)?.contents);
    };
    expect(shown('finding: fold-in-band')).toContain('checks/fold-in-band.md');
    expect(shown('about: inverter')).toContain('carrier at 16 kHz');
  });
});
