import type { TextEdit as ProtocolTextEdit, WorkspaceEdit } from 'vscode-languageserver-types';
import type { Remedy } from '../remedies/remedy.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { EditAbilities } from './client-abilities.ts';
import { protocolEdit } from './convert.ts';

/** The file that is edited, and what the client understands of an edit. */
interface Target {
  readonly uri: string;
  readonly version: number | null;
  readonly edits: EditAbilities;
}

/** Edits of one file as the protocol wants them. */
export function plainEdit(snapshot: Snapshot, target: Target, edits: readonly TextEdit[]): WorkspaceEdit {
  return editOf(
    target,
    edits.map((edit) => protocolEdit(snapshot, edit)),
  );
}

/**
 * A remedy's edits as the protocol wants them. What changes more than a setting of the acquisition (hardware, a
 * requirement, a claim) asks to be looked at before it is applied, where the client can show that.
 */
export function annotatedEdit(snapshot: Snapshot, target: Target, remedy: Remedy): WorkspaceEdit {
  if (!target.edits.annotations) return plainEdit(snapshot, target, remedy.edits);
  const needsConfirmation = remedy.kind !== 'text' && remedy.kind !== 'setting';
  const changes = remedy.edits.map((edit) => ({ ...protocolEdit(snapshot, edit), annotationId: remedy.name }));
  return {
    ...editOf(target, changes),
    changeAnnotations: { [remedy.name]: { label: remedy.title, needsConfirmation } },
  };
}

function editOf({ uri, version, edits }: Target, changes: ProtocolTextEdit[]): WorkspaceEdit {
  return edits.versions
    ? { documentChanges: [{ textDocument: { uri, version }, edits: changes }] }
    : { changes: { [uri]: changes } };
}
