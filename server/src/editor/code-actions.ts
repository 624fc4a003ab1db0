import type { CodeAction, Diagnostic, Range as ProtocolRange, WorkspaceEdit } from 'vscode-languageserver-types';
import { CodeActionKind } from 'vscode-languageserver-types';
import type { Finding } from '../checks/finding.ts';
import type { Remedy } from '../remedies/remedy.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import { allFindings } from '../workbench/findings.ts';
import type { Workbench } from '../workbench/workbench.ts';
import { protocolEdit } from './convert.ts';

/** The kind of the action that applies every preferred remedy of a file. */
export const FIX_ALL_KIND = 'source.fixAll.ratewright';

export interface ActionRequest {
  readonly uri: string;
  readonly version: number | null;
  readonly range: ProtocolRange;
  /** The client's own diagnostics there, given back with the actions that answer them. */
  readonly diagnostics: readonly Diagnostic[];
  readonly isCancelled: () => boolean;
}

/** The proved remedies of every finding that the range touches. */
export function remedyActions(workbench: Workbench, request: ActionRequest): CodeAction[] {
  const snapshot = workbench.snapshot(request.uri);
  if (!snapshot) return [];
  const actions: CodeAction[] = [];
  for (const finding of findingsIn(workbench, request)) {
    if (request.isCancelled()) return [];
    for (const remedy of workbench.remedies(request.uri, finding, request.isCancelled)) {
      actions.push(actionOf(remedy, finding, snapshot, request));
    }
  }
  return withoutTwins(actions);
}

/** The action that applies every preferred remedy of the file, where there is any. */
export function fixAllActions(workbench: Workbench, request: ActionRequest): CodeAction[] {
  const snapshot = workbench.snapshot(request.uri);
  const result = workbench.fixAll(request.uri, new Set(['text', 'setting']), request.isCancelled);
  if (!snapshot || !result || result.edits.length === 0) return [];
  return [
    {
      title: `Fix every channel (${result.applied.length === 1 ? '1 remedy' : `${result.applied.length} remedies`})`,
      kind: FIX_ALL_KIND,
      edit: workspaceEdit(snapshot, request, result.edits),
    },
  ];
}

function findingsIn(workbench: Workbench, { uri, range }: ActionRequest): Finding[] {
  const evaluation = workbench.evaluation(uri);
  if (!evaluation) return [];
  const { snapshot } = evaluation;
  const start = snapshot.offsetAt(range.start);
  const end = snapshot.offsetAt(range.end);
  const found: Finding[] = [];
  for (const finding of allFindings(evaluation)) {
    const offset = snapshot.startOf(finding.place.entry);
    if (offset === undefined) continue;
    if (offset + finding.place.start <= end && offset + finding.place.end >= start) found.push(finding);
  }
  return found;
}

function actionOf(remedy: Remedy, finding: Finding, snapshot: Snapshot, request: ActionRequest): CodeAction {
  return {
    title: remedy.title,
    kind: CodeActionKind.QuickFix,
    isPreferred: remedy.preferred,
    diagnostics: request.diagnostics.filter((diagnostic) => diagnostic.code === finding.check),
    edit: workspaceEdit(snapshot, request, remedy.edits, remedy),
  };
}

/**
 * The edit as the protocol wants it. What changes more than a setting of the acquisition (hardware, a requirement, a
 * claim) asks to be looked at before it is applied, where the client can show that.
 */
function workspaceEdit(
  snapshot: Snapshot,
  { uri, version }: ActionRequest,
  edits: readonly TextEdit[],
  remedy?: Remedy,
): WorkspaceEdit {
  const changes = edits.map((edit) => protocolEdit(snapshot, edit));
  if (!remedy) return { documentChanges: [{ textDocument: { uri, version }, edits: changes }] };
  const label = remedy.title;
  const needsConfirmation = remedy.kind !== 'text' && remedy.kind !== 'setting';
  return {
    documentChanges: [
      { textDocument: { uri, version }, edits: changes.map((change) => ({ ...change, annotationId: remedy.name })) },
    ],
    changeAnnotations: { [remedy.name]: { label, needsConfirmation } },
  };
}

/** Two findings at one place may have the same remedy; it is offered once, for both. */
function withoutTwins(actions: readonly CodeAction[]): CodeAction[] {
  const seen = new Map<string, CodeAction>();
  for (const action of actions) {
    const key = JSON.stringify(action.edit?.documentChanges);
    const twin = seen.get(key);
    if (!twin) seen.set(key, action);
    else {
      twin.diagnostics = [...(twin.diagnostics ?? []), ...(action.diagnostics ?? [])];
      if (action.isPreferred) twin.isPreferred = true;
    }
  }
  return [...seen.values()];
}
