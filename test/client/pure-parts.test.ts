import { describe, expect, it } from 'vitest';
import { emptyMapPage, mapPage } from '../../client/src/map-page.ts';
import { decideOnDeath } from '../../client/src/restart-policy.ts';
import { isRigFile } from '../../client/src/rig-files.ts';
import { describeSample } from '../../client/src/samples.ts';
import { shownFindings } from '../../client/src/shown-findings.ts';

describe('deaths of the server', () => {
  function decisions(timesMs: readonly number[]): boolean[] {
    let deathsMs: readonly number[] = [];
    return timesMs.map((nowMs) => {
      const decision = decideOnDeath(deathsMs, nowMs);
      deathsMs = decision.deathsMs;
      return decision.restart;
    });
  }

  it('are repaired four times, and the fifth within three minutes is not', () => {
    expect(decisions([0, 1000, 2000, 3000, 4000])).toEqual([true, true, true, true, false]);
  });

  it('are forgotten after three minutes', () => {
    const minute = 60_000;
    expect(decisions([0, minute, 2 * minute, 3 * minute, 4 * minute, 5 * minute, 6 * minute])).not.toContain(false);
    expect(decisions([0, 1, 2, 3, 3 * minute])).toEqual([true, true, true, true, true]);
    expect(decisions([0, 1, 2, 3, 3 * minute - 1])).toEqual([true, true, true, true, false]);
  });
});

describe('rig files', () => {
  it('are known by their language, or by their name where the language is YAML or JSON', () => {
    expect(isRigFile({ languageId: 'rig', fileName: 'Untitled-1' })).toBe(true);
    expect(isRigFile({ languageId: 'yaml', fileName: '/a/cell2.rig.yaml' })).toBe(true);
    expect(isRigFile({ languageId: 'yaml', fileName: '/a/cell2.rig.yml' })).toBe(true);
    expect(isRigFile({ languageId: 'jsonc', fileName: '/a/cell2.rig.json' })).toBe(true);
    expect(isRigFile({ languageId: 'yaml', fileName: '/a/cell2.yaml' })).toBe(false);
    expect(isRigFile({ languageId: 'yaml', fileName: '/a.rig.yaml/b.yaml' })).toBe(false);
    expect(isRigFile({ languageId: 'plaintext', fileName: '/a/cell2.rig.yaml' })).toBe(false);
  });
});

describe('findings shown', () => {
  const findings = [0, 1, 2, 3].map((severity) => ({ severity }));

  it('are all, or down to warnings, or errors alone', () => {
    expect(shownFindings(findings, 'all')).toEqual(findings);
    expect(shownFindings(findings, 'warnings')).toEqual([{ severity: 0 }, { severity: 1 }]);
    expect(shownFindings(findings, 'errors')).toEqual([{ severity: 0 }]);
  });
});

describe('samples', () => {
  it('are told by the name of the rig and the comment that opens the file', () => {
    const text = '# A fan, hot end.\n# Its carrier folds.\n\nrig: "Fan, cell 2"\n# not this\n';
    expect(describeSample('fan.rig.yaml', text)).toEqual({
      fileName: 'fan.rig.yaml',
      title: 'Fan, cell 2',
      summary: 'A fan, hot end. Its carrier folds.',
    });
  });

  it('fall back to the file name', () => {
    expect(describeSample('fan.rig.yaml', 'channels:\r\n')).toEqual({
      fileName: 'fan.rig.yaml',
      title: 'fan.rig.yaml',
      summary: '',
    });
  });
});

describe('the page of an alias map', () => {
  const map = { title: 'fan & "duct"', svg: '<svg>µ</svg>', text: '<- folds & lands' };

  it('holds the picture byte for byte, and the same in characters, escaped', () => {
    const html = mapPage(map);
    const [, picture] = /src="data:image\/svg\+xml;base64,([^"]+)"/.exec(html) ?? [];
    expect(Buffer.from(picture!, 'base64').toString('utf8')).toBe(map.svg);
    expect(html).toContain('<pre>&lt;- folds &amp; lands</pre>');
    expect(html).toContain('alt="fan &amp; &quot;duct&quot;');
  });

  it('runs no script and fetches nothing', () => {
    for (const html of [mapPage(map), emptyMapPage('None <here>.')]) {
      expect(html).toContain("default-src 'none'; img-src data:; style-src 'unsafe-inline'");
      expect(html).not.toMatch(/<script|https?:/);
    }
    expect(emptyMapPage('None <here>.')).toContain('<p>None &lt;here&gt;.</p>');
  });
});
