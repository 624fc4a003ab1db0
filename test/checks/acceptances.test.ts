import { describe, expect, it } from 'vitest';
import type { Finding } from '../../server/src/checks/finding.ts';
import { identityOf } from '../../server/src/checks/finding.ts';
import { summaryOf } from '../../server/src/report/findings-json.ts';
import { allFindings, locatedFindings } from '../../server/src/workbench/findings.ts';
import { worstChannel } from '../../server/src/workbench/worst-channel.ts';
import { TODAY } from '../tools/today.ts';
import { describeFindings, evaluated, strictWorkbench } from '../workbench/describe-findings.ts';
import { findingsOf, found, only, underlined } from './judged.ts';

const URI = 'file:///accepted.rig.yaml';

/** Two sources fold into the band of each channel. */
function rig(accept: string, channels = ['one', 'two']): string {
  return `rig: Test
digitizers: { d: { full-scale: ±1 V } }
sources:
  fan: { frequency: 950 Hz, level: 1 V }
  pump: { frequency: 1030 Hz, level: 1 V }
channels:
${channels.map((name) => `  ${name}: { digitizer: d, rate: 1000 Hz, band: 10 Hz .. 100 Hz }\n`).join('')}accept:
${accept}`;
}

/** The findings that are accepted, as `channel about`. */
function accepted(text: string): readonly string[] {
  return findingsOf(text)
    .filter((finding) => finding.accepted)
    .map(({ channel, thing, about }) => [channel ?? thing, about].filter(Boolean).join(' '))
    .sort();
}

describe('what is accepted', () => {
  it.each([
    ['{ finding: fold-in-band, on: one, about: fan, reason: r }', ['one fan']],
    ['{ finding: fold-in-band, on: one, reason: r }', ['one fan', 'one pump']],
    ['{ finding: fold-in-band, about: pump, reason: r }', ['one pump', 'two pump']],
    ['{ finding: fold-in-band, on: "*o*", about: pump, reason: r }', ['one pump', 'two pump']],
    ['{ finding: fold-in-band, reason: r }', ['one fan', 'one pump', 'two fan', 'two pump']],
    ['{ finding: band-droop, on: one, reason: r }', []],
    ['{ finding: fold-in-band, on: three, reason: r }', []],
    ['{ finding: fold-in-band, on: one, about: fans, reason: r }', []],
  ])('by %s', (item, expected) => {
    expect(accepted(rig(`  - ${item}\n`))).toEqual(expected);
  });

  it('stays the finding that it is, with who, why and until when', () => {
    const item = '  - { finding: fold-in-band, on: one, about: fan, reason: known, by: lead, until: 2027-01-01 }\n';
    const before = found(rig(''), 'fold-in-band')[0]!;
    const after = found(rig(item), 'fold-in-band')[0]!;
    expect(identityOf(after)).toBe(identityOf(before));
    expect(after).toMatchObject({ severity: 'error', message: before.message, figures: before.figures });
    expect(after.acceptance).toMatchObject({ reason: 'known', by: 'lead' });
    expect(before).not.toHaveProperty('accepted');
  });

  it('may be about no channel: `about` is then the thing', () => {
    const text = `${rig('  - { finding: unused-name, about: tidy, reason: for later }\n')}filters: { tidy: { response: rc, order: 1, corner: 1 kHz }, other: { response: rc, order: 1, corner: 1 kHz } }\n`;
    expect(accepted(text)).toEqual(['filters/tidy']);
    expect(accepted(text.replace('about: tidy', 'about: filters/tidy'))).toEqual(['filters/tidy']);
    expect(accepted(text.replace('about: tidy', 'on: one'))).toEqual([]);
  });

  it('counts through its last day', () => {
    const until = (day: string): string => rig(`  - { finding: fold-in-band, on: one, reason: r, until: ${day} }\n`);
    expect(accepted(until(TODAY))).toHaveLength(2);
    expect(accepted(until('2026-11-30'))).toEqual([]);
  });

  it('does not count, and is told, where no reason is given', () => {
    for (const reason of ['""', '" "']) {
      const text = rig(`  - { finding: fold-in-band, on: one, reason: ${reason} }\n`);
      expect(accepted(text)).toEqual([]);
      expect(only(text, 'acceptance-idle').message).toContain('reason');
    }
  });

  it('on a brace range is all of it or none', () => {
    const text = (on: string): string =>
      rig(`  - { finding: fold-in-band, on: "${on}", about: fan, reason: r }\n`, ['s-{01..64}']);
    for (const on of ['s-{01..64}', 's-*', 's-{00..99}']) expect(accepted(text(on)), on).toEqual(['s-{01..64} fan']);
    for (const on of ['s-{01..08}', 's-01', 's-0*']) {
      expect(accepted(text(on)), on).toEqual([]);
      expect(only(text(on), 'acceptance-idle').message).toContain('brace range');
    }
  });

  it('is counted apart, and weighs nothing', () => {
    const all = '  - { finding: fold-in-band, on: one, reason: r }\n';
    const counted = (text: string): object => {
      const findings = locatedFindings(evaluated(text));
      return summaryOf([{ path: 'a', channels: 2, findings }]);
    };
    const none = { warning: 0, hint: 0, channels: 2 };
    expect(counted(rig(''))).toEqual({ ...none, error: 4, accepted: 0 });
    expect(counted(rig(all))).toEqual({ ...none, error: 2, accepted: 2 });
    expect(worstChannel(evaluated(rig('')))!.result.channel.name).toBe('one');
    expect(worstChannel(evaluated(rig(all)))!.result.channel.name).toBe('two');
  });
});

describe('what is said of an acceptance', () => {
  const idle = (text: string): readonly string[] =>
    found(text, 'acceptance-idle').map((finding) => String(finding.about));

  it('is nothing where it accepts something, also beside another that does', () => {
    const both =
      '  - { finding: fold-in-band, on: "*", reason: r }\n  - { finding: fold-in-band, on: one, reason: r }\n';
    expect(found(rig(both), 'acceptance-idle')).toEqual([]);
    expect(found(rig(both), 'acceptance-expired')).toEqual([]);
  });

  it('stands at the name of the check, or at the day that has passed', () => {
    const text = rig(
      '  - { finding: band-droop, on: one, reason: r }\n  - { finding: fold-in-band, on: two, reason: r, until: 2020-02-29 }\n',
    );
    expect(underlined(only(text, 'acceptance-idle'))).toBe('band-droop');
    expect(underlined(only(text, 'acceptance-expired'))).toBe('2020-02-29');
    expect(only(text, 'acceptance-expired').severity).toBe('warning');
    expect(only(text, 'acceptance-idle').severity).toBe('hint');
  });

  it('is that it is idle, where it has expired and nothing is found either', () => {
    const text = rig('  - { finding: band-droop, on: one, reason: r, until: 2020-02-29 }\n');
    expect(idle(text)).toEqual(['band-droop on one']);
    expect(found(text, 'acceptance-expired')).toEqual([]);
  });

  it('is told apart where two are the same', () => {
    const item = '  - { finding: band-droop, on: one, about: fan, reason: r }\n';
    expect(idle(rig(item + item))).toEqual(['band-droop on one about fan', 'band-droop on one about fan (2)']);
  });

  it('can not be accepted itself', () => {
    const text = rig('  - { finding: acceptance-idle, reason: r }\n');
    expect(accepted(text)).toEqual([]);
    expect(idle(text)).toEqual(['acceptance-idle']);
  });
});

describe('after an edit', () => {
  const ITEM = '  - { finding: fold-in-band, on: one, reason: r }\n';

  /** Types one text over another. */
  function type(workbench: ReturnType<typeof strictWorkbench>, old: string, text: string): void {
    const snapshot = workbench.snapshot(URI)!;
    const start = snapshot.text().indexOf(old);
    const range = { start: snapshot.positionAt(start), end: snapshot.positionAt(start + old.length) };
    workbench.editFile(URI, [{ range, text }]);
  }

  it('of the day, the same text is judged anew', () => {
    let day = '2026-06-01';
    const workbench = strictWorkbench(() => day);
    workbench.setFile(URI, { text: rig(ITEM.replace('r }', 'r, until: 2026-06-01 }')) });
    const counted = (): number => allFindings(workbench.evaluation(URI)!).filter((finding) => finding.accepted).length;
    expect(counted()).toBe(2);
    day = '2026-06-02';
    expect(counted()).toBe(0);
  });

  it('of `accept`, only the channels that it is about are other objects', () => {
    const workbench = strictWorkbench();
    workbench.setFile(URI, { text: rig(ITEM) });
    const before = workbench.evaluation(URI)!;
    type(workbench, 'reason: r', 'reason: s');
    const after = workbench.evaluation(URI)!;
    expect(after.channels[0]).not.toBe(before.channels[0]);
    expect(after.channels[0]!.reading).toBe(before.channels[0]!.reading);
    expect(after.channels[1]).toBe(before.channels[1]);
    type(workbench, ITEM.replace('reason: r', 'reason: s'), '');
    expect(describeFindings(workbench.evaluation(URI)!)).toEqual(describeFindings(evaluated(rig(''))));
  });

  it('of one channel, the others keep what is accepted of them', () => {
    const workbench = strictWorkbench();
    workbench.setFile(URI, { text: rig(ITEM) });
    const before = workbench.evaluation(URI)!;
    type(workbench, 'two: { ', 'two: {  ');
    const after = workbench.evaluation(URI)!;
    expect(after.channels[0]).toBe(before.channels[0]);
    expect(after.accepting).toBe(before.accepting);
    const isAccepted = ({ accepted: is }: Finding): boolean => is === true;
    expect(after.channels.map(({ result }) => result.findings.filter(isAccepted).length)).toEqual([2, 0]);
  });
});
