import { dirname, join, normalize } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { ALL_CHECKS } from '../../server/src/checks/list.ts';
import { PRACTICES } from '../../server/src/practices/practices.ts';
import { REMEDIES } from '../../server/src/remedies/list.ts';
import { explainedNames, explanationOf } from '../../server/src/report/explain.ts';
import { referencePages } from '../../server/src/report/reference.ts';
import { checkPage } from '../../server/src/report/reference-check.ts';
import { CONTEXTS, keysOf } from '../../server/src/rig/vocabulary.ts';
import { findingLines } from '../workbench/describe-findings.ts';

const PAGES = referencePages();
const pageAt = (path: string): string => PAGES.find((page) => page.path === path)!.text;
/** The blocks of YAML in a page. */
const blocks = (text: string): readonly string[] =>
  [...text.matchAll(/^```yaml\n([\s\S]*?)^```$/gm)].map(([, block]) => block!);

describe('the reference', () => {
  it('has an index, the keys, the remedies, the practices and a page for each check, and nothing twice', () => {
    expect(PAGES.map(({ path }) => path)).toEqual([
      'README.md',
      'keys.md',
      'remedies.md',
      'practices.md',
      ...ALL_CHECKS.map(({ name }) => `checks/${name}.md`),
    ]);
    expect(referencePages()).toEqual(PAGES);
  });

  it.each(PAGES)('$path is whole Markdown', ({ text }) => {
    expect(text.match(/^# /gm)).toHaveLength(1);
    expect(text).toMatch(/[^\n]\n$/);
    expect(text).not.toMatch(/undefined|\[object|NaN/);
    expect(text).not.toMatch(/[ \t]$/m);
    expect(text).not.toContain('\n\n\n');
    expect((text.match(/^```/gm) ?? []).length % 2).toBe(0);
  });

  it('has no link that leads nowhere', () => {
    const links = PAGES.flatMap(({ path, text }) =>
      [...text.matchAll(/\]\((?!https?:)([^)#]+)[^)]*\)/g)].map(([, target]) =>
        normalize(join(dirname(path), target!)),
      ),
    );
    expect(links.length).toBeGreaterThanOrEqual(ALL_CHECKS.length + 2);
    const paths = PAGES.map(({ path }) => path);
    for (const link of links) expect(paths).toContain(link);
  });

  it('lists every check in the index, with its severity', () => {
    for (const { name, severity, finds } of ALL_CHECKS) {
      expect(pageAt('README.md')).toContain(`\n| [\`${name}\`](checks/${name}.md) | ${severity} | ${finds} |\n`);
    }
    for (const row of pageAt('README.md').match(/^\|.*$/gm)!) expect(row.match(/(?<!\\)\|/g)).toHaveLength(4);
  });

  // As long as every key is computed, nothing can show that one is not.
  it.each(ALL_CHECKS.filter(({ name }) => name !== 'not-computed'))(
    'the page of $name shows the check in its first example, and not in its second',
    (check) => {
      const text = pageAt(`checks/${check.name}.md`);
      const examples = blocks(text);
      // The last block is how its severity is changed.
      expect(parse(examples.at(-1)!)).toEqual({ checks: { [check.name]: 'hint' } });
      if (check.shows !== '') {
        expect(text).toContain('## An example that shows it');
        expect(findingLines(examples[0]!).some((line) => line.startsWith(`${check.name} `))).toBe(true);
      }
      if (check.clean !== '') {
        expect(text).toContain('## One that just does not');
        expect(findingLines(examples.at(-2)!).some((line) => line.startsWith(`${check.name} `))).toBe(false);
      }
      for (const source of check.sources) expect(text).toContain(`\n- ${source}\n`);
    },
  );

  it('leaves out what a check does not have', () => {
    const bare = { ...ALL_CHECKS[0]!, shows: '', clean: '', sources: [] };
    expect(checkPage(bare, []).match(/^## .*$/gm)).toEqual(['## Severity']);
    expect(checkPage({ ...bare, sources: ['A book'] }, REMEDIES).match(/^## .*$/gm)).toEqual([
      ...(REMEDIES.some(({ answers }) => answers.includes(bare.name)) ? ['## Remedies'] : []),
      '## Severity',
      '## Sources',
    ]);
  });

  it('tells of every remedy under its kind, and what it answers', () => {
    const sections = pageAt('remedies.md').split(/^## /m).slice(1);
    expect(sections.map((section) => section.split('\n')[0])).toEqual([
      'text',
      'setting',
      'hardware',
      'requirement',
      'claim',
    ]);
    for (const { name, kind, finds, why, answers } of REMEDIES) {
      const section = sections.find((one) => one.startsWith(`${kind}\n`))!;
      expect(section).toContain(
        `### ${name}\n\n${finds}\n\n${why}\n\nAnswers ${answers.map((one) => `\`${one}\``).join(', ')}.\n`,
      );
      for (const answer of answers) expect(ALL_CHECKS.map((check) => check.name)).toContain(answer);
    }
  });

  it('tells of every practice what it asks for, where that stands written and what is left out', () => {
    const sections = pageAt('practices.md').split(/^## /m).slice(1);
    expect(sections.map((section) => section.split('\n')[0])).toEqual(PRACTICES.map(({ name }) => name));
    expect(pageAt('practices.md')).toContain('its own text decides');
    for (const [index, { title, requirements, authority, leftOut }] of PRACTICES.entries()) {
      const section = sections[index]!;
      expect(section).toContain(`\n\n${title}.\n`);
      expect(section.match(/^- .* \(`[a-z-]+`\)$/gm)).toHaveLength(requirements.length);
      expect(section).toContain('from memory');
      const titles =
        authority.kind === 'published' ? authority.documents.map((one) => one.subject) : [authority.reason];
      for (const text of [...titles, ...leftOut]) expect(section).toContain(text);
    }
  });

  it('tells of every key, in each place that has it, with an example of how it is written', () => {
    const sections = pageAt('keys.md').split(/^## /m).slice(1);
    expect(sections.map((section) => section.split('\n')[0])).toEqual(CONTEXTS.map(({ title }) => title));
    for (const [index, { name, doc }] of CONTEXTS.entries()) {
      expect(sections[index]).toContain(doc);
      const entries = sections[index]!.split(/^### /m).slice(1);
      expect(entries.map((entry) => entry.split('\n')[0])).toEqual(keysOf(name).map(({ key }) => key));
      for (const [at, row] of keysOf(name).entries()) {
        const entry = entries[at]!;
        expect(entry).toContain(row.doc);
        expect(entry).toMatch(new RegExp(`^- example: \`${row.key}:( .*\\S)?\`$`, 'm'));
        expect(entry.includes('\n- required')).toBe(row.required);
        expect(entry.includes('\n- left out: ')).toBe(row.default !== undefined);
        expect(entry.includes('does not compute it yet')).toBe(!row.computed);
      }
    }
  });
});

describe('explanations', () => {
  it('there are of every check, every remedy, every practice and every key, and of nothing else', () => {
    const names = explainedNames();
    expect(new Set(names).size).toBe(names.length);
    for (const name of names) expect(explanationOf(name)).toMatch(new RegExp(`^# ${name}\n`));
    expect(explanationOf('nothing-of-the-kind')).toBeUndefined();
    expect(explanationOf('')).toBeUndefined();
    expect(explanationOf('constructor')).toBeUndefined();
  });

  it('of a check is its page of the reference', () => {
    for (const { name } of ALL_CHECKS) expect(explanationOf(name)).toBe(pageAt(`checks/${name}.md`));
  });
});
