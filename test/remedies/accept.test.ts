import { describe, expect, it } from 'vitest';
import type { Remedy } from '../../server/src/remedies/remedy.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated, findingLines, strictWorkbench } from '../workbench/describe-findings.ts';
import { afterwards, offered } from './offered.ts';

const HEAD = `rig: Test
digitizers: { d: { full-scale: ±1 V } }
sources: { hum: { frequency: 950 Hz, level: 1 V } }
`;
const CHANNEL = '{ digitizer: d, rate: 1000 Hz, band: 10 Hz .. 100 Hz }';
const CHANNELS = `channels:
  a: ${CHANNEL}
`;
const ITEM = '{ finding: fold-in-band, on: a, about: hum, reason: "" }';

function acceptance(text: string): Remedy | undefined {
  return offered(text, 'fold-in-band').find(({ name }) => name === 'accept');
}

/** The text after the remedy, with its reason written. */
function filledIn(text: string, reason: string): string {
  const remedy = acceptance(text)!;
  const { start, end } = remedy.fillIn!;
  return applyTextEdits(afterwards(text, remedy), [{ start, end, text: reason }]);
}

describe('accepting a finding', () => {
  it('is offered last, as a claim that says so', () => {
    const remedies = offered(EXTRACT_FAN, 'fold-in-band');
    expect(remedies.at(-1)).toMatchObject({ name: 'accept', kind: 'claim', preferred: false });
    expect(remedies.at(-1)!.title).toBe(
      'Accept: fold-in-band of inverter on bearing-drive-end (the reason is to be written)',
    );
  });

  // Each writes as the file does.
  it.each([
    ['into a file without the key', HEAD + CHANNELS, `${HEAD}${CHANNELS}\naccept:\n  - ${ITEM}\n`],
    ['behind a key without a value', `${HEAD}accept:\n${CHANNELS}`, `${HEAD}accept:\n  - ${ITEM}\n${CHANNELS}`],
    ['into an empty list', `${HEAD}accept: []\n${CHANNELS}`, `${HEAD}accept: [${ITEM}]\n${CHANNELS}`],
    [
      'behind a list in brackets',
      `${HEAD}accept: [{ finding: clips, reason: x }] # few\n${CHANNELS}`,
      `${HEAD}accept: [{ finding: clips, reason: x }, ${ITEM}] # few\n${CHANNELS}`,
    ],
    [
      'behind a list in brackets with lines of its own',
      `${HEAD}accept: [\n  { finding: clips, reason: x }\n]\n${CHANNELS}`,
      `${HEAD}accept: [\n  { finding: clips, reason: x },\n  ${ITEM}\n]\n${CHANNELS}`,
    ],
    [
      'behind a list of dashes, at its margin',
      `${HEAD}accept:\n- finding: clips\n  reason: x # known\n\n${CHANNELS}`,
      `${HEAD}accept:\n- finding: clips\n  reason: x # known\n- ${ITEM}\n\n${CHANNELS}`,
    ],
  ])('goes %s', (_, text, expected) => {
    expect(afterwards(text, acceptance(text)!)).toBe(expected);
    const windows = text.replaceAll('\n', '\r\n');
    expect(afterwards(windows, acceptance(windows)!)).toBe(expected.replaceAll('\n', '\r\n'));
  });

  it('goes into JSON', () => {
    const json = `{ "rig": "Test", "digitizers": { "d": { "full-scale": "±1 V" } },
  "sources": { "hum": { "frequency": "950 Hz", "level": "1 V" } },
  "channels": { "a": { "digitizer": "d", "rate": "1000 Hz", "band": "10 Hz .. 100 Hz" } } }`;
    const after = filledIn(json, 'known');
    expect(JSON.parse(after).accept).toEqual([{ finding: 'fold-in-band', on: 'a', about: 'hum', reason: 'known' }]);
    expect(allFindings(evaluated(after)).map(({ accepted }) => accepted)).toEqual([true]);
  });

  it('accepts nothing until its reason is written, and then this finding alone', () => {
    const text = `${HEAD}${CHANNELS}  s-{1..4}: ${CHANNEL}\n`;
    const open = evaluated(afterwards(text, acceptance(text)!));
    expect(allFindings(open).filter(({ accepted }) => accepted)).toEqual([]);
    const done = evaluated(filledIn(text, 'known'));
    const channels = allFindings(done).filter(({ accepted }) => accepted);
    expect(channels.map(({ channel }) => channel)).toEqual(['a']);
    expect(findingLines(filledIn(text, 'known')).filter((line) => line.startsWith('acceptance'))).toEqual([]);
  });

  it('takes in all of a brace range', () => {
    const text = `${HEAD}channels:\n  s-{01..64}: ${CHANNEL}\n`;
    expect(afterwards(text, acceptance(text)!)).toContain('on: "s-{01..64}"');
    expect(allFindings(evaluated(filledIn(text, 'known'))).map(({ accepted }) => accepted)).toEqual([true]);
  });

  it('is not offered for hints, for what is no channel, for the text, or where an acceptance is there', () => {
    const rig = `${HEAD}filters: { f: { response: rc, order: 1, corner: 1 s } }\n${CHANNELS}`;
    for (const check of ['unused-name', 'unit-mismatch'])
      expect(offered(rig, check).filter(({ name }) => name === 'accept')).toEqual([]);
    expect(acceptance(`checks: { fold-in-band: hint }\n${HEAD}${CHANNELS}`)).toBeUndefined();
    for (const item of ['on: a, reason: x', 'reason: ""', 'reason: x, until: 2020-01-01'])
      expect(acceptance(`${HEAD}accept: [{ finding: fold-in-band, ${item} }]\n${CHANNELS}`), item).toBeUndefined();
    expect(acceptance(`${HEAD}accept: none\n${CHANNELS}`)).toBeUndefined();
  });
});

describe('fixing everything', () => {
  it('leaves what is accepted alone, and never accepts anything', () => {
    const fixedEdits = (text: string): number => {
      const workbench = strictWorkbench();
      workbench.setFile('file:///f', { text });
      return workbench.fixAll('file:///f', new Set(['text', 'setting', 'claim']), () => false)!.edits.length;
    };
    const text = `${HEAD}${CHANNELS}`
      .replace('d: {', 'd: { rates: [1000 Hz, 4000 Hz],')
      .replace('band:', 'undeclared: -90 dBFS, band:');
    expect(fixedEdits(text)).toBeGreaterThan(0);
    expect(fixedEdits(`${text}accept: [{ finding: fold-in-band, reason: known }]\n`)).toBe(0);
    expect(fixedEdits(text.replace(', 4000 Hz', ''))).toBe(0);
  });
});
