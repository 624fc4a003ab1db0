import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { editSnapshot, readSnapshot, type Snapshot } from '../../server/src/rig/snapshot.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { editsOf, step } from '../tools/random-edits.ts';
import { runs } from '../tools/runs.ts';
import { RIGS } from './snapshot-rigs.ts';

/** What a snapshot says, free of object identity. */
function described(snapshot: Snapshot): unknown {
  return {
    style: snapshot.style,
    length: snapshot.length,
    lineCount: snapshot.lineCount,
    text: snapshot.text(),
    entries: snapshot.entries.map((entry) => ({ ...entry, at: snapshot.startOf(entry) })),
    problems: snapshot.problems.map(({ problem, place }) => ({
      problem,
      range: snapshot.rangeOf(place),
      text: place.entry.text,
    })),
  };
}

describe('editing a snapshot', () => {
  it.each(RIGS)('equals a read from nothing after every edit (%s)', (_, rig) => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 12 }), (steps) => {
        let text = rig;
        let snapshot = readSnapshot(text);
        for (const one of steps) {
          const edits = editsOf(text, one);
          text = applyTextEdits(text, edits);
          snapshot = editSnapshot(snapshot, edits);
          expect(described(snapshot)).toEqual(described(readSnapshot(text)));
        }
      }),
      { seed: 20, numRuns: runs(60) },
    );
  });
});
