import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { folderOf, ran, ranIn } from './ran.ts';
import { CLEAN, FOLDS } from './rigs.ts';

// Whoever runs the tests may be allowed everything, so that what the operating system refuses is put in its mouth.
const refused = vi.hoisted(() => ({ call: '', path: '', code: '' }));

vi.mock('node:fs', async (original) => {
  const real = await original<typeof import('node:fs')>();
  const refusing = <T extends (...args: never[]) => unknown>(name: string, call: T): T =>
    ((...args: Parameters<T>) => {
      const isRefused = refused.call === name && args.some((one) => String(one).endsWith(refused.path));
      if (isRefused) throw Object.assign(new Error(`${refused.code}: refused`), { code: refused.code });
      return call(...args);
    }) as T;
  return {
    ...real,
    renameSync: refusing('rename', real.renameSync),
    readdirSync: refusing('readdir', real.readdirSync),
    fchownSync: refusing('fchown', real.fchownSync),
  };
});

function refuse(call: string, path: string, code: string): void {
  Object.assign(refused, { call, path, code });
}

beforeEach(() => refuse('', '', ''));
afterEach(() => refuse('', '', ''));

describe('a file that can not be replaced', () => {
  const files = { 'a.rig.yaml': FOLDS, 'b.rig.yaml': FOLDS };

  it.each([
    ['EACCES', 'may not be written'],
    ['ENOSPC', "can't be written: ENOSPC: refused"],
  ])(
    'for %s is said, ends with 2, stays as it was with nothing beside it, and the others are done',
    async (code, said) => {
      refuse('rename', 'a.rig.yaml', code);
      const fixed = await ran(['fix'], files);
      expect(fixed.code).toBe(2);
      expect(fixed.stderr).toContain(`ratewright: a.rig.yaml ${said}\n`);
      // What was not done is not said to be.
      expect(fixed.stderr).not.toContain('a.rig.yaml: ');
      expect(fixed.stderr).toContain('b.rig.yaml: Sample at 40 kHz');
      expect(fixed.files).toEqual({ 'a.rig.yaml': FOLDS, 'b.rig.yaml': CLEAN });
    },
  );

  it('as that of --output is not, and keeps its older text', async () => {
    refuse('rename', 'out.json', 'EACCES');
    const checked = await ran(['check', '-o', 'out.json', 'a.rig.yaml'], { ...files, 'out.json': 'older' });
    expect([checked.code, checked.stderr]).toEqual([2, 'ratewright: out.json may not be written\n']);
    expect(checked.files).toEqual({ ...files, 'out.json': 'older' });
  });
});

it('a file of somebody else is fixed, though it can not be given back to them', async () => {
  refuse('fchown', '', 'EPERM');
  expect(await ran(['fix', '-q'], { 'a.rig.yaml': FOLDS })).toMatchObject({
    code: 0,
    stderr: '',
    files: { 'a.rig.yaml': CLEAN },
  });
});

it('a folder that may not be read is named as it was given, ends with 2, and the others are searched', async () => {
  const folder = folderOf({ 'in/shut/a.rig.yaml': FOLDS, 'in/b.rig.yaml': FOLDS });
  refuse('readdir', join('in', 'shut'), 'EACCES');
  for (const [argv, inside, said] of [
    [['check'], '.', 'in/shut'],
    [['check', 'in/'], '.', 'in/shut'],
    [['check', '.'], 'in/shut', '.'],
  ] as const) {
    const { code, stdout, stderr } = await ranIn(folder, argv, { inside });
    expect([code, stderr.split('\n')[0]]).toEqual([2, `ratewright: ${said} may not be read`]);
    expect(stdout.includes('b.rig.yaml:12:11')).toBe(inside === '.');
  }
});
