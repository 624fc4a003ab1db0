import { describe, expect, it } from 'vitest';
import { THEMES, withTheme } from '../../server/src/editor/client-abilities.ts';
import type { MapView } from '../../server/src/editor/map-view.ts';
import { mapAt } from '../../server/src/editor/map-view.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { CHARACTERS, client, PICTURES } from './clients.ts';
import { marked, markedAt } from './marked.ts';

const RIG = `rig: Two channels
sources:
  pump: { frequency: 900 Hz, level: 1 V }
defaults: { band: 1 Hz .. 400 Hz }
channels:
  good: { rate: 10 kHz, hears: none }
  bad: { rate: 1 kHz }
  unknown: { rate: what }
`;

/** What a view beside the file shows when the cursor stands at the mark. */
function view(piece: string, abilities = CHARACTERS): MapView | null {
  const { text, position } = marked(markedAt(RIG, piece));
  return mapAt(evaluated(text), position, abilities);
}

describe('the map beside the file', () => {
  it('is that of the channel under the cursor', () => {
    const good = view('good: { ra▮te')!;
    expect(good.title).toBe('good');
    expect(good.svg).toMatch(/^<svg .*good.*<\/svg>\s*$/s);
    expect(good.text).toContain('Alias map of good');
    expect(view('ba▮d: {')!.title).toBe('bad');
  });

  it('is that of the worst channel where the cursor stands on none', () => {
    // 900 Hz is recorded at 1000 - 900 = 100 Hz, in the band of `bad`.
    expect(view('▮rig: Two')!.title).toBe('bad');
    expect(view('sources:▮')!.title).toBe('bad');
  });

  it('is none where nothing is known of the channel, or of any', () => {
    expect(view('unkno▮wn')).toBeNull();
    expect(mapAt(evaluated('rig: x\n'), { line: 0, character: 0 }, CHARACTERS)).toBeNull();
  });

  it('is drawn for the theme of the client, and another one once that changes', () => {
    const svgs = THEMES.map((theme) => view('go▮od', withTheme(PICTURES, theme))!.svg);
    expect(new Set(svgs).size).toBe(THEMES.length);
    expect(view('go▮od', PICTURES)!.svg).toBe(svgs[THEMES.indexOf('dark')]);
  });

  it('brings a background of its own for a client that names no theme that there is', () => {
    const neutral = view('go▮od')!.svg;
    for (const theme of ['sepia', 7, undefined, null]) {
      expect(view('go▮od', withTheme(PICTURES, theme))!.svg).toBe(neutral);
      expect(view('go▮od', client({}, { theme }))!.svg).toBe(neutral);
    }
    for (const options of [undefined, null, 'dark', []]) expect(client({}, options).theme).toBe('neutral');
  });
});
