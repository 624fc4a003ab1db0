import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const text = readFileSync(new URL('../../syntaxes/rig.language-configuration.json', import.meta.url), 'utf8');

interface LanguageConfiguration {
  readonly comments: { readonly lineComment: string };
  readonly brackets: readonly (readonly [string, string])[];
  readonly folding: { readonly offSide: boolean };
  readonly wordPattern: string;
  readonly onEnterRules: readonly [{ readonly beforeText: string; readonly action: { readonly indent: string } }];
}

const configuration: LanguageConfiguration = JSON.parse(text);

describe('words', () => {
  const words = (line: string) => line.match(new RegExp(configuration.wordPattern, 'g'));

  it('keep their hyphens, points and micro signs', () => {
    expect(words('  bearing-drive-end: { rate: 25.6 kHz, noise: 10 µV/√Hz }')).toEqual([
      ...['bearing-drive-end', 'rate', '25.6', 'kHz', 'noise', '10', 'µV/√Hz'],
    ]);
  });

  it('end at quotes, brackets and the marks of anchors', () => {
    expect(words(`["a", 'b', *base, &base]`)).toEqual(['a', 'b', 'base', 'base']);
  });
});

describe('a new line', () => {
  const indents = (line: string) => new RegExp(configuration.onEnterRules[0].beforeText).test(line);

  it.each(['channels:', '  bearing-drive-end:', '  a: &base', '    then: # steps', '  - filter:', '  left wing 2:'])(
    'is indented after `%s`',
    (line) => {
      expect(configuration.onEnterRules[0].action.indent).toBe('indent');
      expect(indents(line)).toBe(true);
    },
  );

  it.each(['rig: cell 2', '    rate: 25.6 kHz', '# channels:', '  - card', '', '  b: *base'])(
    'stays where it is after `%s`',
    (line) => {
      expect(indents(line)).toBe(false);
    },
  );
});

it('comments with a hash, folds by indentation and pairs the brackets of flow style', () => {
  expect(configuration.comments.lineComment).toBe('#');
  expect(configuration.folding.offSide).toBe(true);
  expect(configuration.brackets).toEqual([
    ['{', '}'],
    ['[', ']'],
  ]);
});
