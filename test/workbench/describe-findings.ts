import type { Evaluation } from '../../server/src/workbench/evaluation.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import { Workbench } from '../../server/src/workbench/workbench.ts';
import { TODAY } from '../tools/today.ts';

const URI = 'file:///test.rig.yaml';

/** A workbench that fails the test when a check fails. */
export function strictWorkbench(today: () => string = () => TODAY): Workbench {
  return new Workbench((message) => {
    throw new Error(message);
  }, today);
}

/** A text evaluated from nothing. */
export function evaluated(text: string): Evaluation {
  const workbench = strictWorkbench();
  workbench.setFile(URI, { text });
  return workbench.evaluation(URI)!;
}

/** Everything that is said of a file, as plain data that two evaluations can be compared by. */
export function describeFindings(evaluation: Evaluation): readonly object[] {
  return locatedFindings(evaluation).map(({ finding, range }) => {
    const { place: _, related, ...said } = finding;
    return {
      ...said,
      range,
      related: related.map(({ place, message }) => ({ message, range: evaluation.snapshot.rangeOf(place) })),
    };
  });
}

/** The findings of a text, a line each: `check severity channel about`. */
export function findingLines(text: string): readonly string[] {
  return locatedFindings(evaluated(text)).map(({ finding }) =>
    [finding.check, finding.severity, finding.channel ?? finding.thing ?? '', finding.about ?? ''].join(' ').trim(),
  );
}
