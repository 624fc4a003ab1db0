import { describe, expect, it } from 'vitest';
import { CHANNEL_CHECKS, RIG_CHECKS } from '../../server/src/checks/list.ts';
import { MOST_CHARACTERS } from '../../server/src/rig/limits.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import type { FileContent } from '../../server/src/workbench/workbench.ts';
import { SAMPLES } from '../tools/samples.ts';
import { strictWorkbench } from './describe-findings.ts';
import { DISK, type Disk, FOLDER, foundIn, LIBRARY, lines, relatedOf, text, told, USER } from './used.ts';

describe('a file that uses another', () => {
  it('names its things, and hears its sources', () => {
    expect(foundIn('a.rig.yaml', DISK)).toEqual(['fold-in-band error a drive']);
    // A channel of two pins: what the library names is what the file itself would.
    const joined = USER.replace('uses: [common/lib.rig.yaml]\n', LIBRARY.slice(LIBRARY.indexOf('clocks')));
    expect(foundIn('a.rig.yaml', { 'a.rig.yaml': text(joined.replace(/groups:\n.*\n/, '')) })).toEqual([
      'fold-in-band error a drive',
    ]);
  });

  it('relates the places in the other file', () => {
    const workbench = told('a.rig.yaml', DISK);
    expect(relatedOf(workbench, 'a.rig.yaml', 'fold-in-band')).toEqual([
      'common/lib.rig.yaml: drive: { frequency: 950 Hz, level: 1 V }',
      'common/lib.rig.yaml: card: { response: rc, order: 2, corner: 500 Hz }',
    ]);
    // Lines of the other file that move are found where they are now.
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, text(`# moved\n\n${LIBRARY}`));
    expect(relatedOf(workbench, 'a.rig.yaml', 'fold-in-band')[0]).toMatch(/: drive:/);
  });

  it('stands on the channel where a value comes from the other file', () => {
    const workbench = told('a.rig.yaml', {
      ...DISK,
      'a.rig.yaml': text(USER.replace('card,', 'card, peak: 12 V,').replace('sensor: stud', 'measures: voltage')),
    });
    const evaluation = workbench.evaluation(`${FOLDER}a.rig.yaml`)!;
    const { range } = locatedFindings(evaluation).find(({ finding }) => finding.check === 'clips')!;
    expect(range.start.line).toBe(3);
    expect(relatedOf(workbench, 'a.rig.yaml', 'clips')).toEqual([
      'common/lib.rig.yaml: box: { clock: chassis, bits: 16, full-scale: ±10 V }',
    ]);
  });

  it('joins named things alone', () => {
    const library = `${LIBRARY}mains: 50 Hz\ndefaults: { flatness: 1 mdB, fold-limit: -200 dBFS }
checks: { fold-in-band: off }\nchannels:\n  b: { rate: 10 Hz, band: 1 Hz .. 2 Hz, hears: none }\n`;
    expect(foundIn('a.rig.yaml', { ...DISK, 'common/lib.rig.yaml': text(library) })).toEqual([
      'fold-in-band error a drive',
    ]);
    const { environment } = told('a.rig.yaml', DISK).evaluation(`${FOLDER}a.rig.yaml`)!;
    expect([...environment.sources.keys()]).toEqual(['drive']);
  });

  it('has what the other file uses in its turn, relative to that one', () => {
    const disk: Disk = {
      'a.rig.yaml': text(USER.replace('common/lib', 'common/all')),
      'common/all.rig.yaml': text('rig: All\nuses: [./parts/../lib.rig.yaml]\n'),
      'common/lib.rig.yaml': text(LIBRARY),
    };
    expect(foundIn('a.rig.yaml', disk)).toEqual(['fold-in-band error a drive']);
  });

  it('may write its paths by anchors and aliases, in JSON, and with characters that URIs escape', () => {
    const odd = 'common/größe (1) #2 100%.rig.yaml';
    const uri = 'common/gr%C3%B6%C3%9Fe%20%281%29%20%232%20100%25.rig.yaml';
    expect(
      foundIn('a.rig.yaml', {
        'a.rig.yaml': text(USER.replace('common/lib.rig.yaml', `"${odd}"`)),
        [uri]: text(LIBRARY),
      }),
    ).toEqual(['fold-in-band error a drive']);
    const aliased = USER.replace('uses: [common/lib.rig.yaml]', 'x-lib: &lib common/lib.rig.yaml\nuses: [*lib]');
    expect(foundIn('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(aliased) })).toContain('fold-in-band error a drive');
    const json = `{ "rig": "Cell", "uses": ["common/lib.rig.yaml"], "channels": { "a": { "sensor": "stud",
      "digitizer": "box", "filter": "card", "rate": "1 kHz", "band": "1 Hz .. 100 Hz", "flatness": "3 dB" } } }`;
    expect(foundIn('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(json) })).toEqual(['fold-in-band error a drive']);
  });

  it('is told of names that are in neither, with the nearest of both', () => {
    const workbench = told('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(USER.replace('filter: card', 'filter: crad')) });
    const { finding } = locatedFindings(workbench.evaluation(`${FOLDER}a.rig.yaml`)!)[0]!;
    expect(finding).toMatchObject({ check: 'unknown-name', cure: { kind: 'replace', text: 'card' } });
  });

  it('says nothing of things that it does not name, and neither does a library', () => {
    const library = text(`${LIBRARY}  spare: { within: 1 deg, up-to: 1 Hz }\n`);
    const disk = { ...DISK, 'common/lib.rig.yaml': library };
    expect(foundIn('a.rig.yaml', disk).join()).not.toContain('unused-name');
    expect(foundIn('common/lib.rig.yaml', disk)).toEqual([]);
  });

  it('counts channels that leave a source of the other file out at the item that brings it', () => {
    const user = USER.replace('sensor: stud', 'measures: voltage');
    const workbench = told('a.rig.yaml', {
      'a.rig.yaml': text(user),
      'common/lib.rig.yaml': text(LIBRARY.replace('level: 1 V', 'level: 1 g')),
    });
    expect(lines(workbench, 'a.rig.yaml')).toContain('level-unplaced hint sources/drive');
    expect(relatedOf(workbench, 'a.rig.yaml', 'level-unplaced')).toEqual([
      'common/lib.rig.yaml: drive: { frequency: 950 Hz, level: 1 g }',
    ]);
  });
});

describe('a name that stands in more than one file', () => {
  const local = `${USER}filters:\n  card: { response: rc, order: 6, corner: 150 Hz }\n`;

  it('is that of the file itself, with a hint that names both places', () => {
    const workbench = told('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(local) });
    // Six poles at 150 Hz take 10 log10(1 + (950 / 150)^2) x 6 = 97 dB off: nothing folds any longer.
    expect(lines(workbench, 'a.rig.yaml').filter((line) => !line.startsWith('band-droop'))).toEqual([
      'duplicate-name hint filters/card card',
    ]);
    expect(relatedOf(workbench, 'a.rig.yaml', 'duplicate-name')).toEqual([
      'common/lib.rig.yaml: card: { response: rc, order: 2, corner: 500 Hz }',
    ]);
  });

  it('hides a source of the other file, also as the key `mains`', () => {
    const disk: Disk = {
      'a.rig.yaml': text(USER.replace('channels:', 'mains: 50 Hz\nchannels:')),
      'common/lib.rig.yaml': text(LIBRARY.replace('drive:', 'mains:')),
    };
    // What is left to say is of what nobody declares.
    expect(foundIn('a.rig.yaml', disk)).toEqual(['duplicate-name hint mains mains', 'filter-short warning a']);
  });

  it('means the thing of its own file in a used file', () => {
    const clock = `${USER}clocks:\n  chassis: { frequency: 1 Hz }\n`;
    const { environment } = told('a.rig.yaml', { ...DISK, 'a.rig.yaml': text(clock) }).evaluation(
      `${FOLDER}a.rig.yaml`,
    )!;
    expect(environment.clocks.get('chassis')?.frequencyHz?.value).toBe(1);
    expect(environment.digitizers.get('box')?.clock?.thing?.frequencyHz?.value).toBe(1e6);
  });

  it('is that of the first of several used files, with one hint for each later file', () => {
    const uses = 'uses: [common/lib.rig.yaml, b.rig.yaml]';
    const disk: Disk = {
      ...DISK,
      'a.rig.yaml': text(USER.replace('uses: [common/lib.rig.yaml]', uses)),
      'b.rig.yaml': text(
        'rig: B\nfilters:\n  card: { response: rc, order: 1, corner: 1 Hz }\nsensors:\n  stud: { measures: strain }\n',
      ),
    };
    expect(foundIn('a.rig.yaml', disk)).toEqual(['duplicate-name hint uses b.rig.yaml', 'fold-in-band error a drive']);
    const [first] = locatedFindings(told('a.rig.yaml', disk).evaluation(`${FOLDER}a.rig.yaml`)!);
    expect(first!.finding.message).toContain('the sensor `stud`, the filter `card`');
    expect(first!.finding.related).toHaveLength(4);
  });

  it('may come by two ways from one file', () => {
    const disk: Disk = {
      ...DISK,
      'a.rig.yaml': text(
        USER.replace('[common/lib.rig.yaml]', '[b.rig.yaml, common/lib.rig.yaml, common/lib.rig.yaml]'),
      ),
      'b.rig.yaml': text('rig: B\nuses: [common/../common/lib.rig.yaml]\n'),
    };
    expect(foundIn('a.rig.yaml', disk)).toEqual(['fold-in-band error a drive']);
  });
});

describe('a used file that can not be read', () => {
  const BARE = USER.replace(/\{ .* \}/, '{ measures: voltage, filter: card, rate: 1 kHz, band: 1 Hz .. 100 Hz }');
  const found = (content: FileContent): readonly string[] =>
    foundIn('a.rig.yaml', { 'a.rig.yaml': text(BARE), 'common/lib.rig.yaml': content });

  it.each<[string, FileContent, string]>([
    ['is missing', 'missing', 'unknown-name'],
    ['is too large', 'too-large', 'too-much'],
    ['is something else', { unread: 'is a folder' }, 'unknown-name'],
    ['has more characters than are read', text(`${LIBRARY}# ${'x'.repeat(MOST_CHARACTERS)}`), 'too-much'],
  ])('because it %s is said once, at the item, and of names nothing', (_, content, check) => {
    expect(found(content)).toEqual([`${check} error uses common/lib.rig.yaml`]);
  });

  it('is said with the path, and what comes of it', () => {
    const workbench = told('a.rig.yaml', { 'a.rig.yaml': text(BARE) });
    const evaluation = workbench.evaluation(`${FOLDER}a.rig.yaml`)!;
    const { finding, range } = locatedFindings(evaluation)[0]!;
    expect(finding.message).toBe(
      '`common/lib.rig.yaml` does not exist. Things from there have no part in the check, and a name that stands for nothing is not reported.',
    );
    expect(range).toEqual({ start: { line: 1, character: 7 }, end: { line: 1, character: 26 } });
  });

  it('is said to those who use a file that uses it, with the place', () => {
    const disk: Disk = {
      'a.rig.yaml': text(BARE),
      'common/lib.rig.yaml': text('rig: B\nuses:\n  - gone.rig.yaml\n'),
    };
    const workbench = told('a.rig.yaml', disk);
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['unknown-name error uses common/lib.rig.yaml']);
    expect(relatedOf(workbench, 'a.rig.yaml', 'unknown-name')).toEqual(['common/lib.rig.yaml: - gone.rig.yaml']);
  });

  it('is nothing to say while nobody has told what it is', () => {
    const workbench = strictWorkbench();
    workbench.setFile(`${FOLDER}a.rig.yaml`, text(BARE));
    expect(lines(workbench, 'a.rig.yaml')).toEqual([]);
    expect(workbench.filesWanted()).toEqual([`${FOLDER}common/lib.rig.yaml`]);
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, text('rig: Empty\n'));
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['unknown-name error a card']);
  });

  it('can not be found from a file that is not saved', () => {
    const workbench = strictWorkbench();
    workbench.openFile('untitled:Untitled-1', BARE);
    const { finding } = locatedFindings(workbench.evaluation('untitled:Untitled-1')!)[0]!;
    expect(finding).toMatchObject({ check: 'unknown-name', about: 'common/lib.rig.yaml' });
    expect(workbench.filesWanted()).toEqual([]);
  });
});

/** Rigs that show what checks find: the samples, and the examples of the checks' own pages. */
const SHOWN = [
  ...SAMPLES.map((sample) => [sample.name, sample.text] as const),
  ...[...CHANNEL_CHECKS, ...RIG_CHECKS].map(({ name, shows }) => [name, shows] as const),
];

describe('a rig whose named things all stand in a used file', () => {
  const SECTIONS = /^(clocks|digitizers|sensors|filters|sources|groups):\n(?:(?: .*|#.*)?\n)*/gm;

  it.each(SHOWN)('is found to have the same as in one piece, and nothing that is not so without it: %s', (_, whole) => {
    const library = `rig: Library\n${[...whole.matchAll(SECTIONS)].map(([section]) => section).join('')}`;
    const user = `uses: [lib.rig.yaml]\n${whole.replaceAll(SECTIONS, '')}`;
    const joined = told('a.rig.yaml', { 'a.rig.yaml': text(user), 'lib.rig.yaml': text(library) });
    const said = (all: readonly string[]): readonly string[] =>
      all.filter((line) => !/^(unused-name|not-computed) |^\S+ \S+ uses /.test(line)).sort();
    const found = said(lines(joined, 'a.rig.yaml'));
    expect(found).toEqual(said(foundIn('a.rig.yaml', { 'a.rig.yaml': text(whole) })));
    const { snapshot, rigFindings, channels } = joined.evaluation(`${FOLDER}a.rig.yaml`)!;
    for (const { place } of [...rigFindings, ...channels.flatMap(({ result }) => result.findings)])
      expect(snapshot.startOf(place.entry)).toBeDefined();
    const without = said(foundIn('a.rig.yaml', { 'a.rig.yaml': text(user) }));
    expect(without.filter((line) => !found.includes(line))).toEqual([]);
  });
});
