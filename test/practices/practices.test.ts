import { describe, expect, it } from 'vitest';
import { PRACTICE_NAMES, PRACTICES, practiceNamed } from '../../server/src/practices/practices.ts';
import {
  decidesText,
  demandText,
  practiceMarkdown,
  sourceText,
  sourceWithSubjects,
} from '../../server/src/practices/words.ts';

describe('the table of practices', () => {
  it('has each name once, as it can be written in a rig file', () => {
    expect(new Set(PRACTICE_NAMES).size).toBe(PRACTICES.length);
    for (const name of PRACTICE_NAMES) expect(name).toMatch(/^[a-z]+(-[a-z0-9]+)*$/);
    for (const practice of PRACTICES) expect(practiceNamed(practice.name)).toBe(practice);
    expect(practiceNamed('none')).toBeUndefined();
    expect(practiceNamed('constructor')).toBeUndefined();
  });

  it.each(PRACTICES)('asks for something in $name, each requirement told from the others', ({ requirements }) => {
    expect(requirements.length).toBeGreaterThan(0);
    expect(new Set(requirements.map(({ name }) => name)).size).toBe(requirements.length);
    expect(new Set(requirements.map(demandText)).size).toBe(requirements.length);
  });

  it.each(PRACTICES)('says of $name where it stands written, that it is from memory, and what it leaves out', (row) => {
    const { authority, leftOut } = row;
    // Nothing could be looked up for any of them.
    expect(sourceText(row)).toContain('from memory');
    if (authority.kind === 'published') {
      expect(authority.documents.length).toBeGreaterThan(0);
      for (const { designation, subject, edition } of authority.documents) {
        expect(designation).toMatch(/^(SAE J|ISO |IEC )[\d-]+$/);
        expect(edition).toMatch(/^(19|20)\d\d\b/);
        expect(sourceText(row)).toContain(`${designation} (${edition})`);
        expect(sourceWithSubjects(row)).toContain(`${designation}, ${subject} (${edition})`);
      }
      expect(decidesText(row)).toBe("The standard's own text decides.");
    }
    expect(leftOut.length).toBeGreaterThan(0);
    for (const text of [row.title, ...leftOut]) expect(text).toMatch(/[^.]$/);
    const markdown = practiceMarkdown(row);
    for (const text of [
      row.title,
      sourceWithSubjects(row),
      decidesText(row),
      ...leftOut,
      ...row.requirements.map(demandText),
    ])
      expect(markdown).toContain(text);
  });

  it('is worded with the numbers and their units', () => {
    const demands = (name: string) => practiceNamed(name)!.requirements.map(demandText);
    expect(demands('impact-class-600')).toEqual([
      'a rate of at least 6 kHz',
      'a band up to 600 Hz',
      'filters that take off no more than 1 dB from 0.1 Hz to 600 Hz',
      'filters that take off no more than 4 dB from 600 Hz to 1 kHz',
    ]);
    expect(demands('supply-harmonics-40')).toEqual([
      'a band that holds the harmonic 40 of the supply',
      'a record of 10 cycles of 50 Hz (200 ms) or 12 cycles of 60 Hz (200 ms)',
      'the window `rectangle`',
    ]);
    expect(demands('whole-body-vibration')).toEqual(['a band from 0.5 Hz to 80 Hz']);
    expect(demands('spectrum-work-80-db')).toEqual([
      'a rate of at least 2.56 times the top of the band',
      'at least 80 dB taken off whatever folds into the band',
    ]);
  });
});
