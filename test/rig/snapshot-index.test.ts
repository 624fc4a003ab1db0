import { describe, expect, it } from 'vitest';
import { editSnapshot, readSnapshot, type Snapshot } from '../../server/src/rig/snapshot.ts';

/** The starts of all entries, after edits that each replace one text by another. */
function startsAfter(text: string, edits: readonly (readonly [old: string, text: string])[]): void {
  let snapshot: Snapshot = readSnapshot(text);
  for (const [old, by] of edits) {
    const start = snapshot.text().indexOf(old);
    snapshot = editSnapshot(snapshot, [{ start, end: start + old.length, text: by }]);
    const fromNothing = readSnapshot(snapshot.text());
    const starts = (one: Snapshot): readonly unknown[] => one.entries.map((entry) => one.startOf(entry));
    expect(starts(snapshot)).toEqual(starts(fromNothing));
  }
}

describe('the places of entries', () => {
  it('are known after something is written behind the last, and then ahead of the first', () => {
    startsAfter('rig: R\nmains: 50 Hz\n', [
      ['50 Hz\n', '50 Hz\nrun: { duration: 1 h }\n'],
      ['rig: R', 'rig: Rig'],
      ['rig: Rig\n', ''],
      ['run', 'runs'],
    ]);
  });

  it('are known after an empty file has been filled', () => {
    startsAfter('', [
      ['', 'rig: R\nchannels:\n  a: { rate: 1 kHz }\n  b: { rate: 1 kHz }\n'],
      ['rig: R', '# first\nrig: R'],
      ['  a: { rate: 1 kHz }\n', ''],
    ]);
  });
});
