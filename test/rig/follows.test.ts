import { describe, expect, it } from 'vitest';
import { readChannel, stillHolds } from '../../server/src/rig/channel-reading.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import { editSnapshot, readSnapshot } from '../../server/src/rig/snapshot.ts';
import { CHECK_NAMES, channelRig, readRig, saidOf, textAt } from './fixture.ts';

/** The practices of the first channel, each with the text that names it. */
function followed(text: string): readonly string[] {
  const rig = readRig(text);
  expect(saidOf(rig)).toEqual([]);
  return rig.readings[0]!.channel.follows.map(({ practice, place }) => `${practice.name} at ${textAt(place)}`);
}

describe('what a channel follows', () => {
  it.each([
    ['follows: shock-peaks', ['shock-peaks at shock-peaks']],
    ['follows: "shock-peaks"', ['shock-peaks at shock-peaks']],
    ['follows: [shock-peaks, spectrum-work]', ['shock-peaks at shock-peaks', 'spectrum-work at spectrum-work']],
    ['follows: [shock-peaks, "shock-peaks"]', ['shock-peaks at shock-peaks']],
    ['follows: []', []],
    ['follows: none', []],
    ['note: nothing', []],
  ])('is read from `%s`', (keys, names) => {
    expect(followed(channelRig(keys))).toEqual(names);
  });

  it('may come from the defaults, from another channel, or from the top of the file', () => {
    const from = (text: string) => readRig(text).readings[1]?.channel.follows[0]?.inherited?.from;
    const channels = 'channels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz, follows: shock-peaks }\n';
    expect(from(`rig: R\n${channels}  b: { <<: *a }\n`)).toBe('merge');
    expect(from(`rig: R\n${channels}  b: *a\n`)).toBe('alias');
    const plain = channels.replace(', follows: shock-peaks', '').concat('  b: { rate: 1 kHz, band: 1..2 Hz }\n');
    expect(from(`rig: R\ndefaults: { follows: shock-peaks }\n${plain}`)).toBe('defaults');
    expect(from(`rig: R\nfollows: shock-peaks\n${plain}`)).toBe('defaults');
    expect(from(`rig: R\nnote: &it shock-peaks\nfollows: *it\n${plain}`)).toBe('defaults');
    expect(from(`rig: R\n${plain}`)).toBeUndefined();
  });

  it('takes along the supply where its periods count', () => {
    const mains = (follows: string) =>
      readRig(channelRig(`follows: ${follows}`, 'mains: 60 Hz\n')).readings[0]!.channel.follows[0]?.mains?.name;
    expect(mains('supply-harmonics-40')).toBe('mains');
    expect(mains('shock-peaks')).toBeUndefined();
  });
});

describe('what the whole file follows', () => {
  const TEXT =
    'rig: R\nfollows: supply-harmonics-40\nmains: 50 Hz\nclocks:\n  slow: { frequency: 1 MHz }\nchannels:\n  a: { rate: 8 kHz, band: 1 Hz .. 2 kHz }\n';

  /** Whether the channel's reading holds after an edit of the text, and what is read of it anew. */
  function edited(old: string, text: string) {
    const before = readSnapshot(TEXT);
    const start = TEXT.indexOf(old);
    const environment = readEnvironment(before, CHECK_NAMES);
    const reading = readChannel(environment.channelEntries[0]!, environment);
    const changed = editSnapshot(before, [{ start, end: start + old.length, text }]);
    const next = readEnvironment(changed, CHECK_NAMES, environment);
    const entry = next.channelEntries[0]!;
    return { holds: stillHolds(reading, next), again: readChannel(entry, next).channel.follows };
  }

  it('has no channel read again when something else changes', () => {
    expect(edited('1 MHz', '2 MHz').holds).toBe(true);
  });

  it('has them read again when it changes, or the supply does', () => {
    const other = edited('supply-harmonics-40', 'shock-peaks');
    expect([other.holds, other.again.map(({ practice }) => practice.name)]).toEqual([false, ['shock-peaks']]);
    const supply = edited('50 Hz', '60 Hz');
    expect([
      supply.holds,
      supply.again[0]?.mains?.type === 'tone' && supply.again[0].mains.frequency.value.lowHz,
    ]).toEqual([false, 60]);
    const gone = edited('follows: supply-harmonics-40\n', '');
    expect([gone.holds, gone.again]).toEqual([false, []]);
  });
});
