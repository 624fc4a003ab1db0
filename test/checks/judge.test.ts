import { describe, expect, it } from 'vitest';
import type { Guard } from '../../server/src/checks/channel-result.ts';
import { identityOf } from '../../server/src/checks/finding.ts';
import { judgeChannel, judgeModel, judgingRig } from '../../server/src/checks/judge.ts';
import { CHECK_NAMES } from '../../server/src/checks/list.ts';
import { type ChannelSummary, partOf } from '../../server/src/checks/roster.ts';
import { readChannel } from '../../server/src/rig/channel-reading.ts';
import { type Environment, readEnvironment } from '../../server/src/rig/environment.ts';
import type { NameUses } from '../../server/src/rig/name-uses.ts';
import { editSnapshot, readSnapshot } from '../../server/src/rig/snapshot.ts';
import { findingsOf, finished, found, NO_GUARD, names, only, underlined } from './judged.ts';

const RIG = `rig: Test
digitizers: { d: { full-scale: ±1 V } }
sources: { s: { frequency: 950 Hz, level: 1 V } }
channels:
  one: { digitizer: d, rate: 1000 Hz, band: 10 Hz .. 100 Hz, ratio: 3, flatness: 1 }
`;

describe('a channel', () => {
  it('has its findings in order of severity, then position', () => {
    expect(names(findingsOf(RIG))).toEqual(['fold-in-band s', 'unknown-key ratio', 'unit-missing flatness']);
  });

  it('that is not complete is told why, and nothing else', () => {
    expect(names(findingsOf(RIG.replace('rate: 1000 Hz, ', '')))).toEqual([
      'missing-key rate',
      'unknown-key ratio',
      'unit-missing flatness',
    ]);
  });

  it('made up by a search is judged like one that was read', () => {
    const environment = readEnvironment(readSnapshot(RIG.replace(', ratio: 3, flatness: 1', '')), CHECK_NAMES);
    const reading = readChannel(environment.channelEntries[0]!, environment);
    const read = judgeChannel(reading, environment.severities, NO_GUARD);
    const made = judgeModel(reading.channel, environment.severities, NO_GUARD);
    expect(made.findings).toEqual(read.findings);
    expect(made.chain?.margin).toBe(5);
  });

  it('costs only the check that throws', () => {
    const broken: string[] = [];
    const guard: Guard = (name, run, otherwise) => {
      if (name !== 'fold-in-band') return run();
      broken.push(name);
      return otherwise;
    };
    const environment = readEnvironment(readSnapshot(RIG), CHECK_NAMES);
    const result = judgeChannel(
      readChannel(environment.channelEntries[0]!, environment),
      environment.severities,
      guard,
    );
    expect(names(result.findings)).toEqual(['unknown-key ratio', 'unit-missing flatness']);
    expect(broken).toEqual(['fold-in-band']);
  });
});

describe('the rest of the document', () => {
  it('tells things by their section and name', () => {
    const text = `${RIG}filters:\n  f: { response: butterworth, order: 4, cutoff: 1 s }\nclocks: { c: { } }\n`;
    const things = findingsOf(text).filter(({ channel }) => channel === undefined);
    expect(things.map(({ check, thing }) => `${check} ${thing}`)).toContain('unit-mismatch filters/f');
    expect(things.map(({ check, thing }) => `${check} ${thing}`)).toContain('unused-name filters/f');
    expect(things.map(({ check, thing }) => `${check} ${thing}`)).toContain('unused-name clocks/c');
  });

  it('says what is wrong with inherited text once, where it stands', () => {
    const text = `rig: Test\ndefaults: { rate: 1000, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS }\nchannels:\n  a: { note: x }\n  b: { note: y }\n`;
    const finding = only(text, 'unit-missing');
    expect(finding.channel).toBeUndefined();
    expect(finding.thing).toBe('defaults');
    expect(underlined(finding)).toBe('1000');
  });

  it('knows names that channels, things and defaults use', () => {
    const text = `rig: Test
clocks: { c: { frequency: 1 MHz } }
digitizers: { d: { clock: c, full-scale: ±1 V, filter: f } }
filters: { f: { response: rc, order: 1, corner: 1 kHz }, g: { response: rc, order: 1, corner: 1 kHz }, h: { response: rc, order: 1, corner: 1 kHz } }
sensors: { s: { measures: acceleration }, t: { measures: acceleration } }
sources: { heard: { frequency: 2 Hz }, silent: { frequency: 2 Hz } }
defaults: { digitizer: d, filter: g, hears: [heard], undeclared: -90 dBFS }
channels:
  a: { rate: 1000 Hz, band: 1 Hz .. 10 Hz, sensor: s }
`;
    expect(found(text, 'unused-name').map(({ thing }) => thing)).toEqual(['sensors/t', 'filters/h', 'sources/silent']);
    expect(found(text.replace('hears: [heard], ', ''), 'unused-name').map(({ thing }) => thing)).toEqual([
      'sensors/t',
      'filters/h',
    ]);
  });

  it('gives findings that would be the same a number each', () => {
    const channel = '{ rate: 1000 Hz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS }';
    const text = `rig: Test\nchannels:\n  a: ${channel}\n  a: ${channel}\n  a: ${channel}\n`;
    const findings = found(text, 'duplicate-name');
    expect(findings).toHaveLength(2);
    expect(new Set(findings.map(identityOf)).size).toBe(2);
  });
});

describe('counting what is named', () => {
  /** As the workbench does it: what an edit has left alone is the same object as before. */
  function judged(environment: Environment, before?: ReturnType<typeof readAll>, uses?: NameUses) {
    const channels = readAll(environment, before);
    return { channels, ...finished(judgingRig(environment, channels, NO_GUARD, uses)) };
  }
  function readAll(environment: Environment, before?: readonly ChannelSummary[]): readonly ChannelSummary[] {
    return environment.channelEntries.map((entry) => {
      const old = before?.find(({ reading }) => reading.entry === entry);
      if (old) return old;
      const reading = readChannel(entry, environment);
      const result = judgeChannel(reading, environment.severities, NO_GUARD);
      return { reading, result, part: partOf(reading, result) };
    });
  }

  it('gives after each edit what counting all would give', () => {
    const channel = (name: string, filter: string): string =>
      `  ${name}: { rate: 1000 Hz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS, filter: ${filter} }\n`;
    const head =
      'rig: Test\nfilters:\n  f: { response: rc, order: 1, corner: 1 kHz }\n  g: { response: rc, order: 1, corner: 1 kHz }\nchannels:\n';
    const texts = [
      channel('a', 'f') + channel('b', 'g') + channel('c', 'f'),
      channel('a', 'f') + channel('b', 'f') + channel('c', 'f'),
      channel('a', 'f') + channel('c', 'f'),
      channel('a', 'g') + channel('c', 'f'),
      channel('a', 'g') + channel('c', 'g'),
      channel('c', 'g'),
      '',
      channel('a', 'f') + channel('x', 'g') + channel('c', 'f'),
    ];
    let snapshot = readSnapshot(head + texts[0]);
    let environment = readEnvironment(snapshot, CHECK_NAMES);
    let state = judged(environment);
    for (const text of texts) {
      snapshot = editSnapshot(snapshot, [{ start: head.length, end: snapshot.length, text }]);
      environment = readEnvironment(snapshot, CHECK_NAMES, environment);
      state = judged(environment, state.channels, state.uses);
      const unused = state.findings.filter(({ check }) => check === 'unused-name').map(({ thing }) => thing);
      const fromNothing = found(head + text, 'unused-name').map(({ thing }) => thing);
      expect(unused).toEqual(fromNothing);
    }
  });
});
