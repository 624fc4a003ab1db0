import type { Range as ProtocolRange, TextEdit as ProtocolTextEdit } from 'vscode-languageserver-types';
import { DiagnosticSeverity } from 'vscode-languageserver-types';
import type { Severity } from '../checks/finding.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';

/** How the protocol ranks a finding; a hint is shown as information, so that it is seen in lists. */
export function protocolSeverity(severity: Severity): DiagnosticSeverity {
  switch (severity) {
    case 'error':
      return DiagnosticSeverity.Error;
    case 'warning':
      return DiagnosticSeverity.Warning;
    case 'hint':
      return DiagnosticSeverity.Information;
  }
}

/** The lines and characters of a stretch of the whole text. */
export function protocolRange(snapshot: Snapshot, start: number, end: number): ProtocolRange {
  return { start: snapshot.positionAt(start), end: snapshot.positionAt(end) };
}

/** An edit of the whole text, in lines and characters. */
export function protocolEdit(snapshot: Snapshot, edit: TextEdit): ProtocolTextEdit {
  return { range: protocolRange(snapshot, edit.start, edit.end), newText: edit.text };
}
