import type { Finding } from '../checks/finding.ts';
import { SEVERITIES } from '../checks/finding.ts';
import { MOST_SYNTAX_FINDINGS } from '../rig/limits.ts';
import type { Place, PositionRange } from '../rig/place.ts';
import type { Evaluation } from './evaluation.ts';

/** A finding with its lines and characters in the text as it stands. */
export interface LocatedFinding {
  readonly finding: Finding;
  readonly range: PositionRange;
}

/** A place in lines and characters, of a used file where `uri` says so, else of the file itself. */
export interface LocatedPlace {
  readonly uri: string | undefined;
  readonly range: PositionRange;
}

/** Where a place stands in the texts as they are now; `undefined` for one whose text is gone. */
export function located(
  { snapshot, usedTexts }: Pick<Evaluation, 'snapshot' | 'usedTexts'>,
  place: Place,
): LocatedPlace | undefined {
  if (snapshot.startOf(place.entry) !== undefined) return { uri: undefined, range: snapshot.rangeOf(place) };
  const home = usedTexts.find((text) => text.snapshot.startOf(place.entry) !== undefined);
  return home && { uri: home.uri, range: home.snapshot.rangeOf(place) };
}

/** Every finding of an evaluation, in no particular order. */
export function allFindings(evaluation: Evaluation): readonly Finding[] {
  const all: Finding[] = [...evaluation.rigFindings];
  // Most channels of a large rig have nothing to say, and this runs after every keystroke.
  for (const { result } of evaluation.channels) {
    if (result.findings.length > 0) all.push(...result.findings);
  }
  return all.length > MOST_SYNTAX_FINDINGS ? withFewSyntaxFindings(all) : all;
}

/** A text that is no rig file at all could fill pages with what is wrong in it: past a limit, that is all that is said. */
function withFewSyntaxFindings(all: readonly Finding[]): readonly Finding[] {
  const syntax = all.filter(({ check }) => check === 'syntax');
  const left = syntax.slice(MOST_SYNTAX_FINDINGS);
  const first = left[0];
  if (!first) return all;
  const out = new Set(left);
  const summary: Finding = {
    ...first,
    check: 'too-much',
    about: 'syntax',
    message: `${syntax.length} places of this file can't be read as YAML; the first ${MOST_SYNTAX_FINDINGS} are told.`,
    figures: { found: syntax.length, told: MOST_SYNTAX_FINDINGS },
  };
  return [...all.filter((finding) => !out.has(finding)), summary];
}

/** How many channels there are, each of a brace range counted. */
export function countChannels({ channels }: Evaluation): number {
  return channels.reduce((sum, { result }) => sum + result.channel.count, 0);
}

/** Every finding with its range, ordered by position. */
export function locatedFindings(evaluation: Evaluation): readonly LocatedFinding[] {
  return inPlaces(evaluation, allFindings(evaluation));
}

/** At most `most` of an evaluation's findings, ordered by position; what is accepted is left out first, then hints, then warnings. */
export function gravestFindings(
  evaluation: Evaluation,
  all: readonly Finding[],
  most: number,
): readonly LocatedFinding[] {
  if (all.length <= most) return inPlaces(evaluation, all);
  const chosen: Finding[] = [];
  const take = (isNext: (finding: Finding) => boolean): void => {
    for (const finding of all) {
      if (chosen.length >= most) break;
      if (isNext(finding)) chosen.push(finding);
    }
  };
  for (const severity of SEVERITIES) take((finding) => !finding.accepted && finding.severity === severity);
  take(({ accepted }) => accepted === true);
  return inPlaces(evaluation, chosen);
}

function inPlaces({ snapshot }: Evaluation, findings: readonly Finding[]): readonly LocatedFinding[] {
  return findings.map((finding) => ({ finding, range: snapshot.rangeOf(finding.place) })).sort(byPosition);
}

function byPosition(a: LocatedFinding, b: LocatedFinding): number {
  return (
    a.range.start.line - b.range.start.line ||
    a.range.start.character - b.range.start.character ||
    SEVERITIES.indexOf(a.finding.severity) - SEVERITIES.indexOf(b.finding.severity) ||
    compare(a.finding.check, b.finding.check) ||
    compare(a.finding.about ?? '', b.finding.about ?? '') ||
    (a.finding.stage ?? 0) - (b.finding.stage ?? 0)
  );
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
