import type { CodeAction, Diagnostic, Range as ProtocolRange } from 'vscode-languageserver-types';
import { CodeActionKind } from 'vscode-languageserver-types';
import type { Remedy } from '../remedies/remedy.ts';
import type { Position } from '../rig/place.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import type { LocatedFinding } from '../workbench/findings.ts';
import { allFindings, gravestFindings } from '../workbench/findings.ts';
import type { Workbench } from '../workbench/workbench.ts';
import type { EditAbilities } from './client-abilities.ts';
import { annotatedEdit, plainEdit } from './workspace-edit.ts';

/** The kind of the action that applies every preferred remedy of a file. */
export const FIX_ALL_KIND = 'source.fixAll.ratewright';

export interface ActionRequest {
  readonly uri: string;
  readonly version: number | null;
  readonly range: ProtocolRange;
  /** The client's own diagnostics there, given back with the actions that answer them. */
  readonly diagnostics: readonly Diagnostic[];
  readonly edits: EditAbilities;
  readonly isCancelled: () => boolean;
}

/** Findings whose remedies are proved for one request: somebody who selects a whole file waits for no more than these. */
const MOST_FINDINGS_ANSWERED = 24;

/** The proved remedies of the findings that the range touches, the gravest where they are many. */
export function remedyActions(workbench: Workbench, request: ActionRequest): CodeAction[] {
  const evaluation = workbench.evaluation(request.uri);
  if (!evaluation) return [];
  // Two findings at one place may have the same remedy; it is offered once, for both.
  const actions = new Map<string, CodeAction>();
  for (const located of findingsIn(evaluation, request)) {
    for (const remedy of workbench.remedies(request.uri, located.finding, request.isCancelled)) {
      if (request.isCancelled()) return [];
      const key = JSON.stringify([remedy.name, remedy.edits]);
      const action = actionOf(remedy, located, evaluation.snapshot, request);
      actions.set(key, withTwin(action, actions.get(key)));
    }
  }
  return [...actions.values()];
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
      edit: plainEdit(snapshot, request, result.edits),
    },
  ];
}

function findingsIn(evaluation: Evaluation, { range }: ActionRequest): readonly LocatedFinding[] {
  const { snapshot } = evaluation;
  const start = snapshot.offsetAt(range.start);
  const end = snapshot.offsetAt(range.end);
  const touched = allFindings(evaluation).filter(({ place }) => {
    const offset = snapshot.startOf(place.entry);
    return offset !== undefined && offset + place.start <= end && offset + place.end >= start;
  });
  return gravestFindings(evaluation, touched, MOST_FINDINGS_ANSWERED);
}

function actionOf(remedy: Remedy, located: LocatedFinding, snapshot: Snapshot, request: ActionRequest): CodeAction {
  return {
    title: remedy.title,
    kind: CodeActionKind.QuickFix,
    isPreferred: remedy.preferred,
    diagnostics: request.diagnostics.filter((diagnostic) => isOf(diagnostic, located)),
    edit: annotatedEdit(snapshot, request, remedy),
  };
}

function isOf({ code, range }: Diagnostic, { finding, range: found }: LocatedFinding): boolean {
  return code === finding.check && isSame(range.start, found.start) && isSame(range.end, found.end);
}

function isSame(a: Position, b: Position): boolean {
  return a.line === b.line && a.character === b.character;
}

function withTwin(action: CodeAction, twin: CodeAction | undefined): CodeAction {
  if (!twin) return action;
  const diagnostics = [...new Set([...(twin.diagnostics ?? []), ...(action.diagnostics ?? [])])];
  return { ...twin, diagnostics, isPreferred: twin.isPreferred === true || action.isPreferred === true };
}
