import { beforeAll, describe, expect, it } from 'vitest';
import type { IGrammar } from 'vscode-textmate';
import { VOCABULARY } from '../../server/src/rig/vocabulary.ts';
import { grammarKeys, keysInGrammar, withKeys } from '../tools/grammar-keys.ts';
import { grammarText, loadGrammar, tokensOf } from './tokens.ts';

let grammar: IGrammar;
beforeAll(async () => {
  grammar = await loadGrammar();
});

const COLON = ':|punctuation.separator.key-value';
const COMMA = ',|punctuation.separator';
const OPEN_MAP = '{|punctuation.definition.map.begin';
const CLOSE_MAP = '}|punctuation.definition.map.end';
const OPEN_LIST = '[|punctuation.definition.list.begin';
const CLOSE_LIST = ']|punctuation.definition.list.end';
const ITEM = '-|punctuation.definition.item';

const section = (text: string) => `${text}|keyword.other.section`;
const key = (text: string) => `${text}|variable.other.property`;
const name = (text: string) => `${text}|entity.name.type`;
const reference = (text: string) => `${text}|support.class.name`;
const number = (text: string) => `${text}|constant.numeric`;
const unit = (text: string) => `${text}|keyword.other.unit`;
const choice = (text: string) => `${text}|variable.other.enummember`;
const plain = (text: string) => `${text}|string.unquoted`;
const constant = (text: string) => `${text}|constant.language`;
const RANGE = '..|keyword.operator.range';

/** The tokens of a value under a channel's key. */
function valueTokens(text: string): string[] {
  const tokens = tokensOf(grammar, `    rate: ${text}`);
  expect(tokens.slice(0, 2)).toEqual([key('rate'), COLON]);
  return tokens.slice(2);
}

describe('quantities', () => {
  it.each<[string, string[]]>([
    ['25.6 kHz', [number('25.6'), unit('kHz')]],
    ['25.6kHz', [number('25.6'), unit('kHz')]],
    ['25600', [number('25600')]],
    ['1e3', [number('1e3')]],
    ['-2.5e-3 V', [number('-2.5e-3'), unit('V')]],
    ['.5 fs', [number('.5'), unit('fs')]],
    ['-80 dBFS', [number('-80'), unit('dBFS')]],
    ['0.1 %', [number('0.1'), unit('%')]],
    ['10 µV/√Hz', [number('10'), unit('µV/√Hz')]],
    ['10 uV/rtHz', [number('10'), unit('uV/rtHz')]],
    ['9.81 m/s2', [number('9.81'), unit('m/s2')]],
    ['4 N.m', [number('4'), unit('N.m')]],
    ['6 dB/oct', [number('6'), unit('dB/oct')]],
    ['2 g peak', [number('2'), unit('g'), 'peak|storage.modifier.amplitude']],
    ['1.4 g rms', [number('1.4'), unit('g'), 'rms|storage.modifier.amplitude']],
    ['4 g p-p', [number('4'), unit('g'), 'p-p|storage.modifier.amplitude']],
    ['±10 V', ['±|keyword.operator.symmetric', number('10'), unit('V')]],
    ['+/-10 V', ['+/-|keyword.operator.symmetric', number('10'), unit('V')]],
    ['5 Hz .. 10 kHz', [number('5'), unit('Hz'), RANGE, number('10'), unit('kHz')]],
    ['600..3000 rpm', [number('600'), RANGE, number('3000'), unit('rpm')]],
    ['1..128', [number('1'), RANGE, number('128')]],
    ['5 N.m..6 N.m', [number('5'), unit('N.m'), RANGE, number('6'), unit('N.m')]],
    ['25.6 kHz # as bought', [number('25.6'), unit('kHz'), '# as bought|comment.line.number-sign']],
    ['"25.6 kHz"', quoted('double', '"', [number('25.6'), unit('kHz')])],
    ["'±10 V'", quoted('single', "'", ['±|keyword.operator.symmetric', number('10'), unit('V')])],
  ])('%s', (text, expected) => {
    expect(valueTokens(text)).toEqual(expected);
  });

  it('are not seen in words', () => {
    expect(valueTokens('cell 2')).toEqual([plain('cell 2')]);
    expect(valueTokens('2nd cell of three')).toEqual([plain('2nd cell of three')]);
    expect(valueTokens('2026-02-01 and later')).toEqual([plain('2026-02-01 and later')]);
    expect(valueTokens('"cell 2 g"')).toEqual([
      '"|string.quoted.double',
      'cell 2 g|string.quoted.double',
      '"|string.quoted.double',
    ]);
  });
});

function quoted(kind: 'double' | 'single', mark: string, inner: readonly string[]): string[] {
  const scope = `string.quoted.${kind}`;
  const within = inner.map((token) => token.replace('|', `|${scope} `));
  return [`${mark}|${scope}`, ...within, `${mark}|${scope}`];
}

describe('keys and names in block style', () => {
  it('tells sections, entries and their keys apart', () => {
    expect(tokensOf(grammar, 'channels:\n  bearing-drive-end:\n    rate: 25.6 kHz')).toEqual([
      ...[section('channels'), COLON],
      ...[name('bearing-drive-end'), COLON],
      ...[key('rate'), COLON, number('25.6'), unit('kHz')],
    ]);
  });

  it('reads names with spaces, hashes, colons and brace ranges', () => {
    expect(tokensOf(grammar, '  left wing 2:')).toEqual([name('left wing 2'), COLON]);
    expect(tokensOf(grammar, '  a#1:b:')).toEqual([name('a#1:b'), COLON]);
    expect(tokensOf(grammar, '  strain-{01..64}:')).toEqual([name('strain-{01..64}'), COLON]);
  });

  it('does not take a longer key for a shorter one', () => {
    expect(tokensOf(grammar, '    rates: 1..4')).toEqual([key('rates'), COLON, number('1'), RANGE, number('4')]);
    expect(tokensOf(grammar, '    step-size: 1')).toEqual([name('step-size'), COLON, number('1')]);
    expect(tokensOf(grammar, '    sidebands-fall: 6 dB')).toEqual([
      key('sidebands-fall'),
      COLON,
      number('6'),
      unit('dB'),
    ]);
  });

  it('marks the use of a name', () => {
    expect(tokensOf(grammar, '    sensor: stud-mounted')).toEqual([key('sensor'), COLON, reference('stud-mounted')]);
    expect(tokensOf(grammar, '    filter: none')).toEqual([key('filter'), COLON, constant('none')]);
    expect(tokensOf(grammar, '    hears: all # of it')).toEqual([
      key('hears'),
      COLON,
      constant('all'),
      '# of it|comment.line.number-sign',
    ]);
    expect(tokensOf(grammar, '    filter:\n      - card\n      - tidy')).toEqual([
      ...[key('filter'), COLON],
      ...[ITEM, reference('card')],
      ...[ITEM, reference('tidy')],
    ]);
  });

  it('marks a choice among fixed words', () => {
    expect(tokensOf(grammar, '    sampling: baseband')).toEqual([key('sampling'), COLON, choice('baseband')]);
    expect(tokensOf(grammar, '    measures: sound-pressure # SPL')).toEqual([
      ...[key('measures'), COLON, choice('sound-pressure'), '# SPL|comment.line.number-sign'],
    ]);
  });

  it('reads steps as items', () => {
    expect(tokensOf(grammar, '    then:\n      - decimate: 5\n        filter: tidy')).toEqual([
      ...[key('then'), COLON],
      ...[ITEM, key('decimate'), COLON, number('5')],
      ...[key('filter'), COLON, reference('tidy')],
    ]);
  });

  it('reads a text over several lines as text, and what follows as keys', () => {
    expect(tokensOf(grammar, '    note: |\n      rate: 2 Hz\n\n      # kept\n    rate: 1 Hz')).toEqual([
      ...[key('note'), COLON, '||keyword.control.block-text'],
      'rate: 2 Hz|string.unquoted.block',
      '# kept|string.unquoted.block',
      ...[key('rate'), COLON, number('1'), unit('Hz')],
    ]);
  });
});

describe('flow style', () => {
  it('reads maps within maps, over lines', () => {
    expect(tokensOf(grammar, '  card: { response: butterworth,\n    order: 6 } # six')).toEqual([
      ...[name('card'), COLON, OPEN_MAP, key('response'), COLON, choice('butterworth'), COMMA],
      ...[key('order'), COLON, number('6'), CLOSE_MAP, '# six|comment.line.number-sign'],
    ]);
  });

  it('reads lists of names and of pairs', () => {
    expect(tokensOf(grammar, '    hears: [inverter, mains]')).toEqual([
      ...[key('hears'), COLON, OPEN_LIST, reference('inverter'), COMMA, reference('mains'), CLOSE_LIST],
    ]);
    expect(tokensOf(grammar, '    undeclared: [[1 kHz, -20 dBFS]]')).toEqual([
      ...[key('undeclared'), COLON, OPEN_LIST, OPEN_LIST, number('1'), unit('kHz'), COMMA],
      ...[number('-20'), unit('dBFS'), CLOSE_LIST, CLOSE_LIST],
    ]);
  });

  it('reads JSON', () => {
    expect(tokensOf(grammar, '{"channels":{"a":{"rate":25600,"wanted":true}}}')).toEqual([
      ...[OPEN_MAP, key('"channels"'), COLON, OPEN_MAP, name('"a"'), COLON],
      ...[OPEN_MAP, key('"rate"'), COLON, number('25600'), COMMA],
      ...[key('"wanted"'), COLON, 'true|constant.language.boolean', CLOSE_MAP, CLOSE_MAP, CLOSE_MAP],
    ]);
  });
});

describe('the rest of YAML', () => {
  it('comments', () => {
    expect(tokensOf(grammar, '# all of it\nrig: A#1 # cell')).toEqual([
      '# all of it|comment.line.number-sign',
      ...[section('rig'), COLON, plain('A#1'), '# cell|comment.line.number-sign'],
    ]);
  });

  it('anchors, aliases and merge keys', () => {
    expect(tokensOf(grammar, '  a: &base\n    <<: *base\n  b: *base')).toEqual([
      ...[name('a'), COLON, '&|punctuation.definition.anchor', 'base|entity.name.tag.anchor'],
      ...['<<|keyword.operator.merge', COLON, '*|punctuation.definition.alias', 'base|variable.other.alias'],
      ...[name('b'), COLON, '*|punctuation.definition.alias', 'base|variable.other.alias'],
    ]);
  });

  it('booleans, but not words that begin like one', () => {
    expect(tokensOf(grammar, '    wanted: true')).toEqual([key('wanted'), COLON, 'true|constant.language.boolean']);
    expect(tokensOf(grammar, '    note: true enough')).toEqual([key('note'), COLON, plain('true enough')]);
  });

  it('strings with escapes, and strings that are never closed', () => {
    expect(tokensOf(grammar, '    note: "a\\n"')).toEqual([
      ...[key('note'), COLON, '"|string.quoted.double', 'a|string.quoted.double'],
      ...['\\n|string.quoted.double constant.character.escape', '"|string.quoted.double'],
    ]);
    expect(tokensOf(grammar, "    note: 'it''s'")).toContain("''|string.quoted.single constant.character.escape");
  });

  it('document marks', () => {
    expect(tokensOf(grammar, '---\nrig: A\n...')).toEqual([
      '---|entity.other.document.begin',
      ...[section('rig'), COLON, plain('A')],
      '...|entity.other.document.end',
    ]);
  });
});

describe('the list of keys', () => {
  it('is that of the vocabulary wherever the grammar holds it; `node test/tools/grammar-keys.mjs` writes it', () => {
    const { all, references, choices } = grammarKeys(VOCABULARY);
    expect(keysInGrammar(grammarText)).toEqual({ all: [all, all, all, all], references, choices });
  });

  it('leaves the rest of the grammar as it is when it is written', () => {
    expect(withKeys(grammarText, grammarKeys(VOCABULARY))).toBe(grammarText);
  });
});
