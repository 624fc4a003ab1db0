import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { channelCount, channelNames } from '../../server/src/rig/channel-range.ts';
import { runs } from '../tools/runs.ts';
import { expectOneProblem, readRig, saidOf, textAt } from './fixture.ts';

const KEYS = '{ rate: 1 kHz, band: 1 Hz .. 100 Hz }';

function rigOf(...names: readonly string[]): string {
  return `rig: R\nchannels:\n${names.map((name) => `  ${name}: ${KEYS}\n`).join('')}`;
}

function counts(text: string): readonly (readonly [name: string, count: number])[] {
  return readRig(text).readings.map(({ channel }) => [channel.name, channel.count] as const);
}

describe('a brace range in the name of a channel', () => {
  // As brace expansion of the common shells has it (from memory): leading zeros of either end keep the longer width.
  it.each([
    ['strain-{1..3}', ['strain-1', 'strain-2', 'strain-3']],
    ['strain-{09..11}', ['strain-09', 'strain-10', 'strain-11']],
    ['strain-{9..11}', ['strain-9', 'strain-10', 'strain-11']],
    ['strain-{8..010}', ['strain-008', 'strain-009', 'strain-010']],
    ['{0..1}', ['0', '1']],
    ['{00..1}', ['00', '01']],
    ['x{5..5}y', ['x5y']],
    ['r{1..2}c{1..3}', ['r1c1', 'r1c2', 'r1c3', 'r2c1', 'r2c2', 'r2c3']],
    ['{1..2}{1..2}', ['11', '12', '21', '22']],
  ])('%s stands for its channels', (name, names) => {
    expect(channelNames(name)).toEqual(names);
    expect(channelCount(name)).toBe(names.length);
  });

  it.each(['plain', '{a..b}', '{1,2}', '{1..}', '{-1..2}', 'a{}b', '{', '{3..1}', '{1..20001}'])(
    '%s is one channel',
    (name) => {
      expect(channelNames(name)).toEqual([name]);
      expect(channelCount(name)).toBe(1);
    },
  );

  it('counts what it stands for, whatever the ranges', () => {
    const range = fc
      .tuple(fc.nat({ max: 30 }), fc.nat({ max: 12 }), fc.nat({ max: 3 }))
      .map(([low, more, width]) => `{${String(low).padStart(width, '0')}..${low + more}}`);
    fc.assert(
      fc.property(
        fc.array(fc.oneof(range, fc.constantFrom('a', '-', '7')), { minLength: 1, maxLength: 4 }),
        (parts) => {
          const name = parts.join('');
          const names = channelNames(name);
          expect(names).toHaveLength(channelCount(name));
          for (const one of names) expect(one.includes('{') && channelCount(name) > 1).toBe(false);
        },
      ),
      { numRuns: runs(300), seed: 20261201 },
    );
  });

  it('is one entry that counts as many', () => {
    expect(counts(rigOf('strain-{01..64}', 'torque'))).toEqual([
      ['strain-{01..64}', 64],
      ['torque', 1],
    ]);
    expect(saidOf(readRig(rigOf('strain-{01..64}', 'torque')))).toEqual([]);
    expect(
      counts(`{ "rig": "R", "channels": { "t{1..3}": ${'{ "rate": "1 kHz", "band": "1 Hz .. 9 Hz" }'} } }`),
    ).toEqual([['t{1..3}', 3]]);
  });
});

describe('a brace range that can not be', () => {
  it('is told at the range where it is upside down, with what may have been meant', () => {
    expectOneProblem(rigOf('strain-⟦{64..01}⟧'), 'out-of-range', { kind: 'replace', text: '{01..64}' });
    expectOneProblem(rigOf('a{1..2}b⟦{3..1}⟧'), 'out-of-range', { kind: 'replace', text: '{1..3}' });
    expect(counts(rigOf('strain-{64..01}'))).toEqual([['strain-{64..01}', 1]]);
  });

  it.each(['x{1..20001}', 'a{1..200}b{1..101}', 'x{1..99999999999999999999}', 'x{0..1}{1..99999999}{1..99999999}'])(
    '%s is told at the name where it is too many channels, and checked as one',
    (name) => {
      expectOneProblem(rigOf(`⟦${name}⟧`, 'after'), 'too-much');
      expect(counts(rigOf(name, 'after')).map(([, count]) => count)).toEqual([1, 1]);
    },
  );

  it('leaves out the channels from the limit on, every range counted out', () => {
    expect(counts(rigOf('a-{1..15000}', 'b-{1..5000}'))).toHaveLength(2);
    const past = rigOf('a-{1..15000}', 'b-{1..5001}', 'c');
    expect(counts(past).map(([name]) => name)).toEqual(['a-{1..15000}']);
    expectOneProblem(rigOf('a-{1..15000}', '⟦b-{1..5001}⟧', 'c'), 'too-much');
  });
});

describe('names that a brace range yields', () => {
  it('are taken for others', () => {
    const problem = expectOneProblem(rigOf('s-{1..8}', '⟦s-3⟧', 't'), 'duplicate-name');
    expect(problem.related.map(({ place }) => textAt(place))).toEqual(['s-{1..8}']);
    expect(counts(rigOf('s-{1..8}', 's-3', 't')).map(([name]) => name)).toEqual(['s-{1..8}', 't']);
  });

  it('may not be taken; one that has free ones is checked all the same', () => {
    const problem = expectOneProblem(rigOf('s-3', '⟦s-{1..8}⟧'), 'duplicate-name');
    expect(problem.problem.message).toContain('`s-3`');
    expect(problem.related.map(({ place }) => textAt(place))).toEqual(['s-3']);
    expect(counts(rigOf('s-3', 's-{1..8}'))).toHaveLength(2);
    const two = expectOneProblem(rigOf('s-{1..4}', '⟦s-{3..8}⟧'), 'duplicate-name');
    expect(two.problem.message).toContain('and 1 more');
  });

  it('are not read where all of them are taken', () => {
    expectOneProblem(rigOf('s-{1..8}', '⟦s-{2..3}⟧'), 'duplicate-name');
    expect(counts(rigOf('s-{1..8}', 's-{2..3}'))).toHaveLength(1);
    expectOneProblem(rigOf('s-{1..8}', '⟦s-{1..8}⟧'), 'duplicate-name');
    expectOneProblem(rigOf('s5', '⟦s{5..5}⟧'), 'duplicate-name');
  });

  it('with another width are others', () => {
    expect(saidOf(readRig(rigOf('s-{01..08}', 's-{1..8}')))).toEqual([]);
  });
});
