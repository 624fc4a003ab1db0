import { describe, expect, it } from 'vitest';
import { MOST_USED_FILES } from '../../server/src/rig/limits.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import type { FileContent } from '../../server/src/workbench/workbench.ts';
import { strictWorkbench } from './describe-findings.ts';
import { DISK, type Disk, FOLDER, foundIn, LIBRARY, lines, relatedOf, tellWanted, text, told, USER } from './used.ts';

const rig = (uses: string): FileContent => ({ text: `rig: R\nuses: [${uses}]\n` });

describe('files that use each other in a circle', () => {
  const disk: Disk = {
    'a.rig.yaml': rig('b.rig.yaml'),
    'b.rig.yaml': rig('c.rig.yaml'),
    'c.rig.yaml': rig('a.rig.yaml'),
    'outside.rig.yaml': rig('a.rig.yaml'),
  };

  it('are each told so, with the way round', () => {
    for (const [path, next] of [
      ['a.rig.yaml', 'b.rig.yaml'],
      ['b.rig.yaml', 'c.rig.yaml'],
      ['c.rig.yaml', 'a.rig.yaml'],
    ] as const) {
      expect(foundIn(path, disk)).toEqual([`wrong-kind error uses ${next}`]);
    }
    const workbench = told('a.rig.yaml', disk);
    const { finding } = locatedFindings(workbench.evaluation(`${FOLDER}a.rig.yaml`)!)[0]!;
    expect(finding.message).toMatch(
      /^`b.rig.yaml` is used in a circle, .* \(`b.rig.yaml`, which uses `c.rig.yaml`, which uses `a.rig.yaml`, which uses `b.rig.yaml`\)\./,
    );
    expect(relatedOf(workbench, 'a.rig.yaml', 'wrong-kind')).toEqual(['c.rig.yaml: uses: [a.rig.yaml]']);
  });

  it('are told to those who use one of them', () => {
    expect(foundIn('outside.rig.yaml', disk)).toEqual(['wrong-kind error uses a.rig.yaml']);
  });

  it('may be one file that uses itself', () => {
    expect(foundIn('a.rig.yaml', { 'a.rig.yaml': rig('./a.rig.yaml') })).toEqual([
      'wrong-kind error uses ./a.rig.yaml',
    ]);
  });

  it('are joined again as soon as the circle is broken', () => {
    const library = { text: `${LIBRARY}uses: [../a.rig.yaml]\n` };
    const workbench = told('a.rig.yaml', { ...DISK, 'common/lib.rig.yaml': library });
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['wrong-kind error uses common/lib.rig.yaml']);
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, text(LIBRARY));
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['fold-in-band error a drive']);
  });
});

describe('very many used files', () => {
  it('are read as far as a chain of the most that are read, and no farther', () => {
    const disk: Record<string, FileContent> = {};
    for (let index = 0; index <= MOST_USED_FILES + 5; index++) disk[`${index}.rig.yaml`] = rig(`${index + 1}.rig.yaml`);
    disk[`${MOST_USED_FILES}.rig.yaml`] = text(LIBRARY);
    disk['a.rig.yaml'] = text(USER.replace('common/lib', '1'));
    expect(foundIn('a.rig.yaml', disk)).toEqual(['fold-in-band error a drive']);
    disk['a.rig.yaml'] = text(USER.replace('common/lib', '0'));
    const workbench = told('a.rig.yaml', disk);
    expect(lines(workbench, 'a.rig.yaml')).toContain('too-much error uses 0.rig.yaml');
    expect(workbench.filesUsed()).toHaveLength(MOST_USED_FILES);
  });

  it('named by one file are read up to a limit', () => {
    const names = Array.from({ length: MOST_USED_FILES + 2 }, (_, index) => `${index}.rig.yaml`);
    const disk: Record<string, FileContent> = { 'a.rig.yaml': rig(names.join(', ')) };
    for (const name of names) disk[name] = rig('');
    expect(foundIn('a.rig.yaml', disk)).toEqual(['too-much error uses uses']);
  });

  it('that come by ever more ways do not multiply', () => {
    // As by links that lead back: each file uses three below it, without end.
    const disk: Record<string, FileContent> = {};
    const used = (uri: string): string => uri.slice(FOLDER.length);
    const workbench = strictWorkbench();
    workbench.setFile(`${FOLDER}a.rig.yaml`, rig('1/a.rig.yaml, 2/a.rig.yaml, 3/a.rig.yaml'));
    for (let wanted = workbench.filesWanted(); wanted.length > 0; wanted = workbench.filesWanted())
      for (const uri of wanted) {
        disk[used(uri)] = rig('1/a.rig.yaml, 2/a.rig.yaml, 3/a.rig.yaml');
        workbench.setFile(uri, disk[used(uri)]!);
      }
    expect(Object.keys(disk).length).toBe(MOST_USED_FILES);
    expect(lines(workbench, 'a.rig.yaml').every((line) => line.startsWith('too-much error uses '))).toBe(true);
  });
});

describe('what a workbench is told of used files', () => {
  it('an open file counts before what the disk holds, in any spelling of its URI', () => {
    const workbench = told('a.rig.yaml', DISK);
    const quieter = LIBRARY.replace('level: 1 V', 'level: 1 mV');
    workbench.openFile('file:///rigs/common/%6Cib%2Erig.yaml', quieter);
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['filter-short warning a']);
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, 'missing');
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['filter-short warning a']);
    workbench.closeFile(`${FOLDER}common/lib.rig.yaml`);
    expect(lines(workbench, 'a.rig.yaml')).toContain('unknown-name error uses common/lib.rig.yaml');
  });

  it('a file that is closed and never was on the disk is wanted again', () => {
    const workbench = strictWorkbench();
    workbench.openFile(`${FOLDER}common/lib.rig.yaml`, LIBRARY);
    workbench.openFile(`${FOLDER}a.rig.yaml`, USER);
    expect(workbench.filesWanted()).toEqual([]);
    workbench.closeFile(`${FOLDER}common/lib.rig.yaml`);
    expect(workbench.filesWanted()).toEqual([`${FOLDER}common/lib.rig.yaml`]);
  });

  it('is forgotten when nobody uses it any longer', () => {
    const workbench = told('a.rig.yaml', DISK);
    workbench.forgetUnused();
    expect(workbench.filesUsed()).toEqual([`${FOLDER}common/lib.rig.yaml`]);
    expect(workbench.usersOf(`${FOLDER}common/lib.rig.yaml`)).toEqual([`${FOLDER}a.rig.yaml`]);
    workbench.setFile(`${FOLDER}a.rig.yaml`, text(USER.replace('common/lib', 'other')));
    workbench.forgetUnused();
    tellWanted(workbench, DISK);
    expect(workbench.filesUsed()).toEqual([`${FOLDER}other.rig.yaml`]);
    expect(workbench.usersOf(`${FOLDER}common/lib.rig.yaml`)).toEqual([]);
  });

  it('is kept, object by object, where it has not changed', () => {
    const workbench = told('a.rig.yaml', {
      ...DISK,
      'a.rig.yaml': text(`${USER}  b: { rate: 2 kHz, band: 1 Hz .. 2 Hz, measures: voltage, hears: none }\n`),
    });
    const uri = `${FOLDER}a.rig.yaml`;
    const before = workbench.evaluation(uri)!;
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, text(LIBRARY.replace('corner: 500 Hz', 'corner: 50 Hz')));
    const after = workbench.evaluation(uri)!;
    expect(after.environment.digitizers.get('box')).toBe(before.environment.digitizers.get('box'));
    expect(after.environment.filters.get('card')).not.toBe(before.environment.filters.get('card'));
    expect(after.channels.map((channel, index) => channel === before.channels[index])).toEqual([false, true]);
    // What the other file adds for nobody here, and its remarks, change nothing at all.
    workbench.setFile(
      `${FOLDER}common/lib.rig.yaml`,
      text(`# x\n${LIBRARY.replace('corner: 500 Hz', 'corner: 50 Hz')}`),
    );
    const moved = workbench.evaluation(uri)!;
    expect(moved.channels).toBe(after.channels);
    expect(moved.rigFindings).toBe(after.rigFindings);
    // An edit in a channel of the file itself leaves everything that it shares.
    const snapshot = workbench.snapshot(uri)!;
    const at = snapshot.positionAt(snapshot.text().indexOf('2 Hz, measures'));
    workbench.editFile(uri, [{ range: { start: at, end: at }, text: '1' }]);
    const edited = workbench.evaluation(uri)!;
    expect(edited.environment.core).toBe(moved.environment.core);
    expect(edited.channels[0]).toBe(moved.channels[0]);
  });

  it('makes an evaluation that is under way when it changes be made again', () => {
    const workbench = told('a.rig.yaml', DISK);
    const steps = workbench.evaluating(`${FOLDER}a.rig.yaml`);
    steps.next();
    workbench.setFile(`${FOLDER}common/lib.rig.yaml`, text(LIBRARY.replace('level: 1 V', 'level: 1 mV')));
    while (!steps.next().done);
    expect(lines(workbench, 'a.rig.yaml')).toEqual(['filter-short warning a']);
  });
});
