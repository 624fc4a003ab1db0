import { describe, expect, it } from 'vitest';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import { type Disk, FOLDER, lines, text, told } from '../workbench/used.ts';

const RIG = `${FOLDER}a.rig.yaml`;

/** A rig in two files whose channels all fold, by a digitizer, a filter and a source of the library. */
const LIBRARY = `rig: Common
digitizers:
  box: { rates: [1 kHz, 2 kHz, 4 kHz], bits: 16, full-scale: ±1 V, ranges: [±1 V, ±2 V] }
filters:
  card: { response: butterworth, order: 2, cutoff: 300 Hz }
  card-order-4: { response: rc, order: 1, corner: 1 kHz }
sources:
  drive: { frequency: 950 Hz, level: 100 mV }
`;
const channel = (name: string): string =>
  `  ${name}: { measures: voltage, digitizer: box, filter: card, rate: 1 kHz, band: 1 Hz .. 100 Hz, peak: 0.9 V, undeclared: -80 dBFS }\n`;
const CELL = `rig: Cell\nuses: [lib.rig.yaml]\nchannels:\n${channel('a')}${channel('b')}`;
const DISK: Disk = { 'a.rig.yaml': text(CELL), 'lib.rig.yaml': text(LIBRARY) };

/** Every remedy of every finding of one check, with the text that it leads to. */
function offered(check: string, cell = CELL) {
  const workbench = told('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(cell) });
  return locatedFindings(workbench.evaluation(RIG)!)
    .filter(({ finding }) => finding.check === check)
    .flatMap(({ finding }) => workbench.remedies(RIG, finding, () => false))
    .map(({ title, name, edits }) => ({ title, name, after: applyTextEdits(cell, edits) }));
}

describe('remedies of a rig that uses another file', () => {
  it('edit the rig alone, and are proved with the used file as it is', () => {
    const folds = offered('fold-in-band');
    expect(folds.map(({ name }) => name)).toEqual(expect.arrayContaining(['sample-faster', 'steeper-filter']));
    for (const { name, after } of folds) {
      // What is accepted stays.
      if (name === 'accept') continue;
      const found = lines(told('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(after) }), 'a.rig.yaml');
      expect(found.filter((line) => line.startsWith('fold-in-band'))).toHaveLength(1);
      expect(found.join()).not.toMatch(/duplicate-name|unknown-name/);
    }
  });

  it('write a new filter for one of the used file, by a name that hides none of it', () => {
    const filters = offered('fold-in-band').filter(({ name }) => name === 'steeper-filter');
    expect(filters.length).toBeGreaterThan(0);
    for (const { after } of filters) expect(after).toMatch(/^filters:\n {2}card-order-\d+(-\d)?: /m);
    // Also where the channel is the only one that names it.
    const alone = offered('fold-in-band', CELL.replace(channel('b'), ''));
    expect(alone.map(({ name }) => name)).toContain('steeper-filter');
  });

  it('offer nothing for all channels where what they share stands in the used file', () => {
    const shared = offered('headroom-thin').concat(offered('fold-in-band'));
    expect(shared.map(({ name }) => name)).toContain('choose-range');
    expect(shared.filter(({ title }) => title.includes('for all'))).toEqual([]);
    const own = `rig: Cell\n${LIBRARY.slice(LIBRARY.indexOf('digitizers'))}${CELL.slice(CELL.indexOf('channels'))}`;
    expect(offered('headroom-thin', own).some(({ title }) => title.includes('for all 2 channels'))).toBe(true);
  });
});
