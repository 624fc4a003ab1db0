import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Acceptance } from '../../server/src/rig/acceptance.ts';
import { channelNames } from '../../server/src/rig/channel-range.ts';
import { MOST_ACCEPTANCES, MOST_PATTERN_CHARACTERS } from '../../server/src/rig/limits.ts';
import { coversChannel, namePattern } from '../../server/src/rig/name-matching.ts';
import { runs } from '../tools/runs.ts';
import { expectOneProblem, readRig, saidOf } from './fixture.ts';

function acceptRig(items: string): string {
  return `rig: R\naccept:\n${items}`;
}

function acceptances(text: string): readonly Acceptance[] {
  return readRig(text).environment.acceptances;
}

describe('an item of `accept`', () => {
  it('is read in block style, in braces and in JSON', () => {
    const block = acceptRig(
      '  - finding: band-droop\n    on: "s-{1..3}"\n    about: x\n    reason: known\n    by: test lead\n    until: 2027-03-31\n',
    );
    const [one] = acceptances(block);
    expect(one).toMatchObject({ finding: 'band-droop', about: 'x', reason: 'known', by: 'test lead' });
    expect(one!.on!.text).toBe('s-{1..3}');
    expect(one!.until!.day).toBe('2027-03-31');
    expect(saidOf(readRig(block))).toEqual([]);
    const json = '{ "rig": "R", "accept": [{ "finding": "thin-margin", "reason": "known" }] }';
    expect(acceptances(json)).toMatchObject([
      { finding: 'thin-margin', on: undefined, about: undefined, by: undefined, until: undefined },
    ]);
  });

  it('may come from an anchor or a merge key', () => {
    const text = acceptRig(
      '  - &one { finding: band-droop, reason: known }\n  - { <<: *one, on: a }\n  - { <<: *one, on: b, reason: "" }\n',
    );
    expect(acceptances(text).map(({ on, reason }) => [on?.text, reason])).toEqual([
      [undefined, 'known'],
      ['a', 'known'],
      ['b', ''],
    ]);
  });

  it.each([
    ['  - { finding: ⟦band-drop⟧, reason: x }\n', 'unknown-name'],
    ['  - ⟦{⟧ finding: band-droop }\n', 'missing-key'],
    ['  - ⟦{⟧ reason: x }\n', 'missing-key'],
    ['  - ⟦band-droop⟧\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: ⟦[x]⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, ⟦raeson⟧: y, reason: x }\n', 'unknown-key'],
    ['  - { finding: band-droop, reason: x, until: ⟦31.3.2027⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: x, until: ⟦2027-02-29⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: x, until: ⟦2027-13-01⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: x, until: ⟦2027-04-31⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: x, until: ⟦2100-02-29⟧ }\n', 'wrong-kind'],
    ['  - { finding: band-droop, reason: x, on: "s-⟦{3..1}⟧" }\n', 'out-of-range'],
  ])('says what is wrong with %s', (item, name) => {
    expectOneProblem(acceptRig(item), name);
  });

  it.each(['2028-02-29', '2000-02-29', '2027-12-31', '2027-01-01'])('counts until %s', (day) => {
    expect(saidOf(readRig(acceptRig(`  - { finding: band-droop, reason: x, until: ${day} }\n`)))).toEqual([]);
  });

  it('offers the nearest check, and a range the right way up', () => {
    expectOneProblem(acceptRig('  - { finding: ⟦band-drop⟧, reason: x }\n'), 'unknown-name', {
      kind: 'replace',
      text: 'band-droop',
    });
    expectOneProblem(acceptRig('  - { finding: band-droop, reason: x, on: "s-⟦{3..1}⟧" }\n'), 'out-of-range', {
      kind: 'replace',
      text: '{1..3}',
    });
  });

  it('accepts nothing without a check that exists; the rest of the list is read', () => {
    const text = acceptRig(
      '  - { reason: x }\n  - { finding: nonsense, reason: x }\n  - { finding: band-droop, reason: x }\n',
    );
    expect(acceptances(text)).toHaveLength(1);
    expect(acceptances('rig: R\naccept: { finding: band-droop }\n')).toEqual([]);
    expect(acceptances('rig: R\naccept:\n')).toEqual([]);
    expect(acceptances('rig: R\naccept: []\n')).toEqual([]);
  });

  it('past the limit is not read', () => {
    const item = '  - { finding: band-droop, reason: x }\n';
    expect(saidOf(readRig(acceptRig(item.repeat(MOST_ACCEPTANCES))))).toEqual([]);
    const past = readRig(acceptRig(item.repeat(MOST_ACCEPTANCES + 2)));
    expect(saidOf(past)).toEqual(['too-much: { finding: band-droop, reason: x }']);
    expect(past.environment.acceptances).toHaveLength(MOST_ACCEPTANCES);
  });
});

describe('a pattern of names', () => {
  it.each([
    ['tower', 'tower', true],
    ['tower', 'towers', false],
    ['*', 'anything', true],
    ['*', '', true],
    ['s-*', 's-', true],
    ['s-*', 't-1', false],
    ['*-top', 'tower-top', true],
    ['*-top', 'tower-top-2', false],
    ['a*b*c', 'abbc', true],
    ['a**c', 'ac', true],
    ['s-{01..08}', 's-03', true],
    ['s-{01..08}', 's-3', false],
    ['s-{01..08}', 's-09', false],
    ['s-{1..12}', 's-12', true],
    ['s-{1..12}', 's-012', false],
    ['{1..2}{1..12}', '112', true],
    ['{1..2}{1..12}', '213', false],
    ['*-{1..3}x', '9-2x', true],
    ['s-{1..99999999999999999999}', 's-123', true],
    ['s-{3..1}', 's-2', false],
    ['a.c', 'abc', false],
    ['(a+)+$', 'aaaa', false],
  ])('%s and %s: %s', (pattern, name, expected) => {
    expect(coversChannel(namePattern(pattern), name)).toBe(expected);
  });

  it('takes in a channel with a brace range where it takes in all of it', () => {
    const covers = (pattern: string): boolean => coversChannel(namePattern(pattern), 's-{01..16}');
    expect(
      ['s-{01..16}', 's-*', '*', 's-{00..99}', 's-{01..1}*', '*6', 's-{01..15}', 's-{1..16}', 's-03'].map(covers),
    ).toEqual([true, true, true, true, false, false, false, false, false]);
  });

  it('matches what a list of all that it stands for holds', () => {
    const piece = fc.constantFrom('a', '1', '2', '0', '{1..3}', '{09..12}', '{0..10}', '-');
    const name = fc.stringMatching(/^[a012-]{0,6}$/);
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 4 }), name, (pieces, one) => {
        const pattern = pieces.join('');
        expect(coversChannel(namePattern(pattern), one)).toBe(channelNames(pattern).includes(one));
        const anywhere = channelNames(pattern).some((part) => one.includes(part));
        expect(coversChannel(namePattern(`*${pattern}*`), one)).toBe(anywhere);
      }),
      { numRuns: runs(1000), seed: 20261201 },
    );
  });

  it('takes no time worth speaking of, whatever the pattern', () => {
    const nasty = namePattern(`${'*a'.repeat(MOST_PATTERN_CHARACTERS / 2 - 1)}b`);
    expect(coversChannel(nasty, 'a'.repeat(MOST_PATTERN_CHARACTERS))).toBe(false);
    const long = 'a*'.repeat(MOST_PATTERN_CHARACTERS);
    expect(coversChannel(namePattern(long), 'aa')).toBe(false);
    expect(coversChannel(namePattern(long), long)).toBe(true);
  });
});
