import { describe, expect, it } from 'vitest';
import { ALL_CHECKS } from '../../server/src/checks/list.ts';
import { PRACTICES } from '../../server/src/practices/practices.ts';
import { REMEDIES } from '../../server/src/remedies/list.ts';
import { CONTEXTS, keysOf } from '../../server/src/rig/vocabulary.ts';
import { ran } from './ran.ts';

const KEYS = [...new Set(CONTEXTS.flatMap(({ name }) => keysOf(name).map(({ key }) => key)))];

describe('explain', () => {
  it('lists every check with its severity, every remedy with its kind, every practice, and every key', async () => {
    const { code, stdout, stderr } = await ran(['explain']);
    expect([code, stderr]).toEqual([0, '']);
    const [checks, remedies, practices, keys] = stdout.split('\n\n') as [string, string, string, string];
    expect(checks.split('\n')).toHaveLength(1 + ALL_CHECKS.length);
    for (const { name, severity } of ALL_CHECKS)
      expect(checks).toMatch(new RegExp(`^ {2}${name} +${severity} +\\S`, 'm'));
    expect(remedies.split('\n')).toHaveLength(1 + REMEDIES.length);
    for (const { name, kind } of REMEDIES) expect(remedies).toMatch(new RegExp(`^ {2}${name} +${kind} +\\S`, 'm'));
    expect(practices.split('\n')).toHaveLength(1 + PRACTICES.length);
    for (const { name } of PRACTICES) expect(practices).toMatch(new RegExp(`^ {2}${name} +\\S`, 'm'));
    expect(ALL_CHECKS.length * REMEDIES.length * KEYS.length).toBeGreaterThan(0);
    for (const key of KEYS) expect(keys).toMatch(new RegExp(`[ ,]${key}(,|$)`, 'm'));
  });

  it.each(ALL_CHECKS)('shows the page of the check $name', async (check) => {
    const { code, stdout } = await ran(['explain', check.name]);
    expect(code).toBe(0);
    expect(stdout).toContain(`# ${check.name}\n\n*${check.severity}* · ${check.finds}\n`);
    expect(stdout).toContain(check.why);
    expect(stdout).toContain(`checks:\n  ${check.name}: hint`);
    for (const { name, answers } of REMEDIES) {
      expect([name, stdout.includes(`- \`${name}\`: `)]).toEqual([name, answers.includes(check.name)]);
    }
  });

  it.each(REMEDIES)('shows what the remedy $name does', async ({ name, kind, finds, why, answers }) => {
    const { code, stdout } = await ran(['explain', name]);
    const page = `# ${name}\n\n*${kind}* · ${finds}\n\n${why}\n\nAnswers ${answers.join(', ')}.\n`;
    // What is a key as well is explained as both.
    const isKey = KEYS.includes(name);
    expect([code, isKey ? stdout.slice(0, page.length) : stdout]).toEqual([0, page]);
    expect(stdout.includes('## Rig file')).toBe(isKey);
  });

  it.each(PRACTICES)(
    'shows what the practice $name asks for, whose word it is and what is left out',
    async (practice) => {
      const { code, stdout } = await ran(['explain', practice.name]);
      expect(code).toBe(0);
      expect(stdout).toContain(`# ${practice.name}\n\n${practice.title}.\n`);
      for (const { name } of practice.requirements) expect(stdout).toContain(` (\`${name}\`)\n`);
      expect(stdout).toContain('from memory');
      for (const one of practice.leftOut) expect(stdout).toContain(`\n- ${one}\n`);
    },
  );

  it.each(KEYS)('shows what the key %s means, in each place that has it', async (key) => {
    const { code, stdout } = await ran(['explain', key]);
    expect(code).toBe(0);
    const places = CONTEXTS.filter(({ name }) => keysOf(name).some((row) => row.key === key));
    expect(stdout.match(/^## .+$/gm)).toEqual(places.map(({ title }) => `## ${title}`));
    for (const { name } of places) {
      const row = keysOf(name).find((one) => one.key === key)!;
      expect(stdout).toContain(`\n\n${row.doc}\n\n- example: ${key}:`);
    }
    expect(stdout).not.toMatch(/ $/m);
  });

  it('tells what is required, what holds where a key is left out, and what is not computed', async () => {
    expect((await ran(['explain', 'rate'])).stdout).toContain('\n- required\n');
    const rows = CONTEXTS.flatMap(({ name }) => keysOf(name));
    const defaulted = rows.find((row) => row.default !== undefined)!;
    expect((await ran(['explain', defaulted.key])).stdout).toContain(`\n- left out: ${defaulted.default}\n`);
    // None is left that is only known; one that comes is told of.
    for (const { key } of rows.filter((row) => !row.computed)) {
      expect((await ran(['explain', key])).stdout).toContain('known, but not computed by this version');
    }
  });

  it('names the nearest where there is no such name', async () => {
    expect(await ran(['explain', 'fold-in-bnd'])).toMatchObject({
      code: 2,
      stdout: '',
      stderr: "ratewright: nothing is called 'fold-in-bnd'; the nearest is 'fold-in-band'\n",
    });
    expect((await ran(['explain', 'xyzzyxyzzyxyzzy'])).stderr).toBe(
      "ratewright: nothing is called 'xyzzyxyzzyxyzzy'\n",
    );
  });

  it('writes the page to the file of --output', async () => {
    const direct = await ran(['explain', 'clips']);
    const filed = await ran(['explain', 'clips', '-o', 'clips.md']);
    expect([filed.stdout, filed.files]).toEqual(['', { 'clips.md': direct.stdout }]);
  });
});
