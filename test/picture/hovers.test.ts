import { describe, expect, it } from 'vitest';
import type { ClientAbilities } from '../../server/src/editor/client-abilities.ts';
import { abilitiesOf } from '../../server/src/editor/client-abilities.ts';
import { filterMarkdown } from '../../server/src/editor/hover-filter.ts';
import { mapMarkdown } from '../../server/src/editor/hover-map.ts';
import { pictureMarkdown } from '../../server/src/editor/picture-markdown.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { EVERY_FILTER } from './curves.ts';
import { viewBoxOf } from './svg-text.ts';

const CHARACTERS: ClientAbilities = { ...abilitiesOf(undefined), showsMarkdown: true };
const PICTURES: ClientAbilities = { ...CHARACTERS, showsPictures: true, theme: 'dark' };

/** The SVG that a hover begins with; fails where it begins with anything else. */
function firstPicture(markdown: string): string {
  const found = /^!\[[^\]]+\]\(data:image\/svg\+xml;base64,([A-Za-z0-9+/=]+)\)\n\n\*\*/.exec(markdown);
  expect(found).not.toBeNull();
  return Buffer.from(found![1]!, 'base64').toString('utf8');
}

/** The worked example with 1,000 more sources that fold into its band. */
const CROWDED = EXTRACT_FAN.replace(
  'sources:\n',
  `sources:\n${Array.from(
    { length: 1_000 },
    (_, index) => `  tone-${index}: { frequency: ${15_600 + index} Hz, level: 300 mV }\n`,
  ).join('')}`,
);

describe('the hover on a rate', () => {
  it('begins with a picture that is whole in the height of a hover', () => {
    const { width, height } = viewBoxOf(firstPicture(mapMarkdown(evaluated(EXTRACT_FAN).channels[0]!, PICTURES)));
    expect(width).toBeLessThanOrEqual(520);
    expect(height).toBeLessThanOrEqual(230);
  });

  it('keeps its picture, and within 48,000 characters, with 1,000 sources', () => {
    const markdown = mapMarkdown(evaluated(CROWDED).channels[0]!, PICTURES);
    firstPicture(markdown);
    expect(markdown.length).toBeLessThan(48_000);
  });

  it('begins with the headline where the map is drawn in characters', () => {
    const markdown = mapMarkdown(evaluated(EXTRACT_FAN).channels[0]!, CHARACTERS);
    expect(markdown).toMatch(/^\*\*`bearing-drive-end`\*\* .*\n\n```text\nAlias map/);
  });
});

describe('the hover on a filter', () => {
  it('begins with its curve, above what it takes off where it matters', () => {
    const evaluation = evaluated(EXTRACT_FAN);
    const card = evaluation.environment.filters.get('card')!;
    const markdown = filterMarkdown(card, evaluation, undefined, PICTURES);
    expect(firstPicture(markdown)).toContain('<title>card in bearing-drive-end</title>');
    expect(markdown).toMatch(/^!\[card in bearing-drive-end\. The filter takes at most 11\.9 dB off the band/);
    expect(markdown).toContain("| 15.6 kHz | the first that folds onto the band's top | 34.8 dB |");
  });

  it('is drawn in characters for clients that show no pictures', () => {
    const evaluation = evaluated(EXTRACT_FAN);
    const markdown = filterMarkdown(
      evaluation.environment.filters.get('card')!,
      evaluation,
      evaluation.channels[0],
      CHARACTERS,
    );
    expect(markdown).toMatch(/^\*\*`card`\*\* · butterworth, order 6 · in `bearing-drive-end`\n\n```text\ncard in/);
    expect(markdown).not.toContain('data:image');
    expect(markdown).toContain('| 12.8 kHz | the Nyquist frequency behind it | 24.5 dB |');
  });

  it('stays within 48,000 characters for every filter, and with 1,000 sources', () => {
    for (const text of [EVERY_FILTER, CROWDED]) {
      const evaluation = evaluated(text);
      for (const filter of evaluation.environment.filters.values()) {
        for (const abilities of [PICTURES, CHARACTERS]) {
          expect(filterMarkdown(filter, evaluation, undefined, abilities).length).toBeLessThan(48_000);
        }
      }
    }
  });

  it('says where no channel uses the filter', () => {
    const evaluation = evaluated(EXTRACT_FAN);
    const unused = evaluation.environment.filters.get('tidy')!;
    expect(filterMarkdown(unused, evaluation, undefined, PICTURES)).toContain('No channel uses it.');
  });
});

describe('a picture in Markdown', () => {
  it('has an alternative that no name can break out of', () => {
    const markdown = pictureMarkdown('<svg/>', 'a]b `c` <i> *d* \\ e\nf');
    expect(markdown).toBe('![a\\]b \\`c\\` \\<i\\> \\*d\\* \\\\ e f](data:image/svg+xml;base64,PHN2Zy8+)');
  });
});
