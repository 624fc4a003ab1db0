import { describe, expect, it } from 'vitest';
import type { MarkupContent } from 'vscode-languageserver-types';
import type { ClientAbilities } from '../../server/src/editor/client-abilities.ts';
import { hoverAt } from '../../server/src/editor/hover.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { CHARACTERS, PICTURES, PLAIN, WITH_REFERENCE } from './clients.ts';
import { marked, markedAt } from './marked.ts';

const LIMIT = 48_000;

/** What is shown at the mark, and the words that it is shown for; `null` where nothing is. */
function hover(fixture: string, abilities: ClientAbilities = CHARACTERS): { shown: string; over: string } | null {
  const { text, position } = marked(fixture);
  const answer = hoverAt(evaluated(text), position, abilities);
  if (!answer) return null;
  const { kind, value } = answer.contents as MarkupContent;
  expect(kind).toBe(abilities.showsMarkdown ? 'markdown' : 'plaintext');
  expect(value.length).toBeLessThanOrEqual(LIMIT);
  const [start, end] = [answer.range!.start, answer.range!.end].map((at) => TextDocument.offset(text, at));
  return { shown: value, over: text.slice(start, end) };
}

const fan = (piece: string, abilities?: ClientAbilities) => hover(markedAt(EXTRACT_FAN, piece), abilities)!;

/** Two stages, and a source that is heard by list, by map and by default. */
const STEPPED = `rig: Stepped
filters:
  tidy: { response: kaiser, pass: 0.08 fs, stop: 0.1 fs, stopband: 90 dB }
sources:
  drive: { frequency: 1.2 kHz, level: 10 mV }
  pump: { frequency: 300 Hz, level: 20 mV }
defaults:
  hears: { drive: 5 mV }
channels:
  tower:
    rate: 10 kHz
    then: [{ decimate: 5, filter: tidy }]
    band: 1 Hz .. 400 Hz
    hears: [drive]
  base:
    rate: 10 kHz
    filter: none
    band: 1 Hz .. 400 Hz
    hears: { pump: 2 V }
`;
const stepped = (piece: string, abilities?: ClientAbilities) => hover(markedAt(STEPPED, piece), abilities);

describe('a hover on a channel', () => {
  // Worked by hand: 25.6 - 16 = 9.6 kHz; 400 mV on 10 V is 20 lg 0.04 = -27.96 dB; a Butterworth low-pass takes off
  // 10 lg (1 + (16 / 8)^12) = 36.12 dB (Oppenheim & Schafer, Discrete-Time Signal Processing, appendix on Butterworth
  // filters, from memory), which leaves -64.08 dBFS, 15.9 dB over -80.
  const row = '| `inverter` carrier | 16 kHz | folds at stage 1 | 9.6 kHz | -64.1 | **15.9 dB over** |';

  it.each([
    ['its rate', 'rate: 25▮.6 kHz', '25.6 kHz'],
    ['the first character of its rate', 'rate: ▮25.6 kHz', '25.6 kHz'],
    ['the last character of its rate', 'rate: 25.6 kHz▮', '25.6 kHz'],
    ['its name', 'bearing-▮drive-end', 'bearing-drive-end'],
  ])('over %s tells what arrives, from where, how high and against which limit', (_what, piece, over) => {
    const found = fan(piece);
    expect(found.over).toBe(over);
    expect(found.shown).toMatch(
      /^\*\*`bearing-drive-end`\*\* · Nyquist frequency 12\.8 kHz · band to 10 kHz · margin 1\.28/,
    );
    expect(found.shown).toContain(row);
    expect(found.shown).toContain('| limit -80.0 |');
  });

  it('over a decimation or a source in `hears` shows the same map', () => {
    const map = stepped('rate: 10 kHz▮\n    then')!;
    // 10 kHz / 5 = 2 kHz; 1.2 kHz is then recorded at 2 - 1.2 = 0.8 kHz.
    expect(map.shown).toContain('Nyquist frequency 1 kHz');
    expect(map.shown).toMatch(/\| `drive` \S+ \| 1\.2 kHz \| folds at stage 2 \| 800 Hz \|/);
    expect(stepped('decimate: ▮5')).toEqual({ shown: map.shown, over: '5' });
    expect(stepped('hears: [dr▮ive]')).toEqual({ shown: map.shown, over: 'drive' });
    expect(stepped('hears: { pu▮mp: 2 V }')!.shown).toMatch(/^\*\*`base`\*\*/);
    expect(stepped('hears: { pump: ▮2 V }')!.over).toBe('2 V');
  });

  it('draws the map in characters for a client that shows no pictures', () => {
    expect(fan('rate: ▮25.6').shown).toContain('```text\nAlias map of bearing-drive-end');
    expect(fan('rate: ▮25.6').shown).not.toContain('data:');
  });

  it('brings the map as a picture to one that does, ahead of everything else', () => {
    const { shown } = fan('rate: ▮25.6', PICTURES);
    const [, data] = /^!\[(?:[^\]\\]|\\.)+\]\(data:image\/svg\+xml;base64,([A-Za-z0-9+/]+={0,2})\)\n\n/.exec(shown)!;
    expect(Buffer.from(data!, 'base64').toString('utf8')).toMatch(/^<svg .*<\/svg>\s*$/s);
    expect(shown).toContain(row);
    expect(shown).not.toContain('```');
  });

  it('is text for a client that shows no Markdown: no markup, the columns kept', () => {
    const { shown } = fan('rate: ▮25.6', PLAIN);
    expect(shown).toMatch(/^bearing-drive-end · Nyquist frequency 12\.8 kHz/);
    expect(shown).toContain('inverter carrier   16 kHz   folds at stage 1   9.6 kHz   -64.1   15.9 dB over');
    expect(shown).not.toMatch(/\*\*|`|---\|/);
    const pictured = fan('rate: ▮25.6', { ...PICTURES, showsMarkdown: false }).shown;
    expect(pictured).not.toContain('data:');
    expect(pictured).not.toMatch(/\\/);
  });

  it('stays under 48 kB, however much a channel hears', () => {
    const sources = Array.from({ length: 600 }, (_, index) => {
      const name = `source-number-${index}-with-a-long-name`;
      return `  ${name}: { carrier: ${50 + index * 0.37} kHz, modulation: 90 Hz, sidebands: 3, level: ${index + 1} mV }\n`;
    });
    const text = `rig: Crowded\nsources:\n${sources.join('')}channels:\n  a: { rate: ▮25.6 kHz, band: 10 Hz .. 10 kHz }\n`;
    for (const abilities of [PICTURES, CHARACTERS]) {
      const { shown } = hover(text, abilities)!;
      expect(Buffer.byteLength(shown)).toBeLessThan(LIMIT);
      expect(shown).toMatch(/\d+ more, all quieter or outside the band\./);
    }
  });

  it('stays under it whatever the names, too', () => {
    const { shown } = hover(
      `channels:\n  ${'a'.repeat(60_000)}:\n    rate: ▮1 kHz\n    band: 1 Hz .. 400 Hz\n`,
      PICTURES,
    )!;
    expect(shown.length).toBeLessThan(LIMIT);
  });

  it('says why there is no map where there is none', () => {
    expect(hover('rig: x\nchannels:\n  a:\n    rate: ▮1 kHz\n')!.shown).toMatch(/^`a` has no alias map yet: /);
  });
});

describe('a hover on a filter', () => {
  it.each([
    ['its name', 'ca▮rd: {', 'card'],
    ['where a channel names it', 'filter: c▮ard', 'card'],
  ])('over %s tells what it takes off where it matters', (_what, piece, over) => {
    const found = fan(piece);
    expect(found.over).toBe(over);
    expect(found.shown).toMatch(/^\*\*`card`\*\* · butterworth, order 6 · in `bearing-drive-end`/);
    // 10 lg (1 + (10 / 8)^12) = 11.9 dB; 10 lg (1 + (25.6 / 8)^12) = 60.6 dB.
    expect(found.shown).toMatch(/\| 10 kHz \| .*the band's top \| 11\.9 dB \|/);
    expect(found.shown).toMatch(/\| 25\.6 kHz \| .* \| 60\.6 dB \|/);
  });

  it('over one in a digital step shows it at that step', () => {
    expect(stepped('filter: ti▮dy')!.shown).toMatch(/^\*\*`tidy`\*\* · kaiser · in `tower`/);
  });

  it('over one that nobody uses says so', () => {
    expect(fan('ti▮dy: {').shown).toBe('**`tidy`** · kaiser\n\nNo channel uses it.');
  });

  it('over the word `none`, or a response, tells what the word means', () => {
    expect(stepped('filter: n▮one')).toEqual({ shown: '**`none`**\n\nNone.', over: 'none' });
    expect(fan('response: butter▮worth').shown).toMatch(/^\*\*`butterworth`\*\*\n\n/);
  });
});

describe('a hover on a source', () => {
  it.each(['in▮verter: {', 'inverter▮: {'])('over its name (%s) tells where it lands', (piece) => {
    const found = fan(piece);
    expect(found.over).toBe('inverter');
    expect(found.shown).toBe(
      [
        '**`inverter`** · carrier at 16 kHz · enters at the wiring',
        '',
        '| channel | component | true | recorded | level |  |',
        '|---|---|---|---|---|---|',
        '| `bearing-drive-end` | carrier | 16 kHz | 9.6 kHz | -64.1 dBFS | **15.9 dB over** |',
      ].join('\n'),
    );
  });

  it('over `mains` knows it as the source that it is', () => {
    const { shown } = fan('mai▮ns: 50 Hz');
    expect(shown).toMatch(/^\*\*`mains`\*\* · tone at 50 Hz/);
    // 1 % of tolerance, and no level: full scale is assumed.
    expect(shown).toContain('| 49.5 Hz .. 50.5 Hz | 49.5 Hz .. 50.5 Hz | 0.0 dBFS (assumed) | in the band |');
  });

  it('in the `hears` of the defaults, which belong to no channel, tells the same', () => {
    expect(stepped('hears: { dr▮ive: 5 mV }')!.shown).toMatch(/^\*\*`drive`\*\* · tone at 1\.2 kHz/);
    const listed = STEPPED.replace('hears: { drive: 5 mV }', 'hears: [▮pump]');
    expect(hover(listed)!.shown).toMatch(/^\*\*`pump`\*\* · tone at 300 Hz/);
  });

  it('has the worst channel first: over the limit, folded under it, in the band, outside', () => {
    const text = `rig: Four ways to land
mains: { frequency: 50 Hz, tolerance: 0 % }
sources:
  fan: { order: 1, speed: 3000 rpm, harmonics: 2 }
  hum: { frequency: 1 kHz, level: 1 g }
defaults: { measures: acceleration, sensitivity: 100 mV/g, hears: [hum] }
channels:
  outside: { rate: 10 kHz, band: 1 Hz .. 400 Hz }
  inside: { rate: 10 kHz, band: 1 Hz .. 2 kHz }
  under: { rate: 1.1 kHz, band: 1 Hz .. 400 Hz, fold-limit: 2 g }
  over: { rate: 1.1 kHz, band: 1 Hz .. 400 Hz, fold-limit: 0.1 g }
  deaf: { rate: 1.1 kHz, band: 1 Hz .. 400 Hz, hears: none }
`;
    const { shown } = hover(markedAt(text, 'h▮um: {'))!;
    const rows = shown.split('\n').filter((line) => /^\| `/.test(line));
    // 1.1 - 1.0 = 0.1 kHz; 1 g against 0.1 g is 20 dB.
    expect(rows.map((row) => row.replace(/ \| \S+ \| 1 kHz/, ''))).toEqual([
      expect.stringMatching(/^\| `over` \| 100 Hz \| .* \| \*\*20\.0 dB over\*\* \|$/),
      expect.stringMatching(/^\| `under` \| 100 Hz \| .* \| in the band, under the limit \|$/),
      expect.stringMatching(/^\| `inside` \| 1 kHz \| .* \| in the band \|$/),
      expect.stringMatching(/^\| `outside` \| 1 kHz \| .* \| outside the band \|$/),
    ]);
    expect(hover(markedAt(text, 'f▮an: {'))!.shown).toBe(
      '**`fan`** · order 1 of a shaft, 2 harmonics · enters at the wiring\n\nNo channel hears it.',
    );
  });

  it('counts the channels past the sixteenth', () => {
    const channels = Array.from({ length: 20 }, (_, index) => `  c-${index}: { rate: 1 kHz, band: 1 Hz .. 400 Hz }\n`);
    const { shown } = hover(`sources:\n  h▮um: { frequency: 100 Hz .. 120 Hz }\nchannels:\n${channels.join('')}`)!;
    expect(shown).toContain('tone 100 Hz .. 120 Hz');
    expect(shown.match(/\| `c-/g)).toHaveLength(16);
    expect(shown).toMatch(/\n\n4 more channels hear it\.$/);
  });
});

describe('a hover on a word of the vocabulary', () => {
  it('over a key tells what it means, with an example and what holds without it', () => {
    expect(fan('fi▮lter: card')).toEqual({
      over: 'filter',
      shown: [
        '**filter**',
        "The analogue filters ahead of the digitizer's own, in order: a name, a list, one written in place, or `none`.",
        'Example: `filter: card`',
        "Left out: none besides the digitizer's.",
      ].join('\n\n'),
    });
    expect(fan('r▮ate: 25.6').shown).toContain('Required.');
    expect(fan('chan▮nels:').shown).toContain('The channels, in the order in which they are scanned.');
    expect(fan('presc▮ale: 256').over).toBe('prescale');
  });

  it('over a name in `checks` tells what the check finds and why it matters', () => {
    const { shown, over } = hover('checks:\n  band-▮droop: hint\n')!;
    expect(over).toBe('band-droop');
    expect(shown).toMatch(/^\*\*band-droop\*\* · warning\n\n\S.+\n\n\S.+$/s);
    expect(hover('checks: { fold-▮in-band: off }')!.shown).toMatch(/^\*\*fold-in-band\*\* · error/);
    expect(hover('checks:\n  band-droop: h▮int\n')!.shown).toMatch(/^\*\*`hint`\*\*/);
    expect(hover('checks:\n  band-dr▮op: off\n')).toBeNull();
  });

  it.each([
    ['a channel', 'channels:\n  a:\n    follows: hand-arm-▮vibration\n'],
    ['the list of a channel', 'channels:\n  a: { follows: [shock-peaks, hand-▮arm-vibration] }\n'],
    ['the top of the file', 'follows: hand-arm-vibrat▮ion\n'],
    ['the defaults', 'defaults:\n  follows: hand-arm-vibrat▮ion\n'],
  ])('over the name of a practice in %s shows its row, its source and what is left out', (_where, fixture) => {
    const { shown, over } = hover(fixture)!;
    expect(over).toBe('hand-arm-vibration');
    expect(shown).toMatch(
      /^\*\*hand-arm-vibration\*\*\n\nVibration that .+\.\n\nIt asks for:\n\n- a band from 8 Hz to 1 kHz /,
    );
    expect(shown).toMatch(/\nSource: ISO 8041-1, .+ \(2017\); from memory\. The standard's own text decides\.\n/);
    expect(shown).toMatch(/\nLeft out, and so not checked:\n\n- the weightings/);
  });

  it('over a practice that there is not shows nothing', () => {
    expect(hover('follows: hand-ar▮m\n')).toBeNull();
  });

  it('over one in `accept` does too, with its page where there is one', () => {
    const accept = 'accept:\n  - finding: band-dr▮oop\n    reason: corrected afterwards\n';
    expect(hover(accept)!.shown).toMatch(/^\*\*band-droop\*\* · warning/);
    expect(hover(accept, WITH_REFERENCE)!.shown).toMatch(
      /^\*\*\[band-droop\]\(file:\/\/\/reference\/checks\/band-droop\.md\)\*\* · warning/,
    );
    expect(hover(accept, { ...WITH_REFERENCE, showsMarkdown: false })!.shown).toMatch(/^band-droop · warning/);
  });

  it.each([
    ['a clock’s own name', 'chass▮is: {'],
    ['a name it says nothing of', 'digitizer: front-▮end'],
    ['free text', 'rig: Extract ▮fan'],
    ['the gap between a key and its value', 'sensor: ▮ stud-mounted'],
  ])('over %s shows nothing', (_what, piece) => {
    expect(hover(markedAt(EXTRACT_FAN.replace('sensor: stud', 'sensor:  stud'), piece))).toBeNull();
  });

  it('shows nothing where there is nothing', () => {
    expect(hover('▮')).toBeNull();
    expect(hover('rig: x\n# a comm▮ent\n')).toBeNull();
    expect(hover('channels:\n  - ▮a\n')).toBeNull();
    expect(hover('defaults: &d { rate: 1 kHz }\nchannels:\n  a: *▮d\n')).toBeNull();
  });
});

describe('places in a hover', () => {
  it('count as the protocol does behind signs of two units', () => {
    const text = 'channels:\n  "pump 🛠🛠": { note: "🛠", rate: 2▮ kHz, band: 1 Hz .. 400 Hz }\n';
    expect(hover(text)!.over).toBe('2 kHz');
    expect(hover(text)!.shown).toMatch(/^\*\*`pump 🛠🛠`\*\*/);
    expect(hover(text.replace('▮', '').replace('p 🛠', 'p▮ 🛠'))!.over).toBe('"pump 🛠🛠"');
  });

  it('count as it does in lines that end with two signs', () => {
    const text = markedAt(EXTRACT_FAN, 'rate: 25▮.6 kHz').replaceAll('\n', '\r\n');
    expect(hover(text)!.over).toBe('25.6 kHz');
  });

  it('are found in JSON', () => {
    const text = '{ "channels": { "a": { "rate": "2▮5.6 kHz", "band": "10 Hz .. 10 kHz" } } }';
    expect(hover(text)!.over).toBe('"25.6 kHz"');
    expect(hover(text)!.shown).toContain('Nyquist frequency 12.8 kHz');
  });
});
