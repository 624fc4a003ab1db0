import type { Hover } from 'vscode-languageserver-types';
import { MarkupKind } from 'vscode-languageserver-types';
import { ALL_CHECKS } from '../checks/list.ts';
import { practiceNamed } from '../practices/practices.ts';
import { practiceMarkdown } from '../practices/words.ts';
import type { Entry } from '../rig/entry.ts';
import type { Position } from '../rig/place.ts';
import { keyRow } from '../rig/vocabulary.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import type { ClientAbilities } from './client-abilities.ts';
import { protocolRange } from './convert.ts';
import { expectedAt } from './expectation.ts';
import { filterMarkdown } from './hover-filter.ts';
import { groupMarkdown } from './hover-group.ts';
import { mapMarkdown } from './hover-map.ts';
import { sourceMarkdown } from './hover-source.ts';
import { spectrumIsMeant, spectrumMarkdown } from './hover-spectrum.ts';
import { channelAt } from './map-view.ts';
import { codeMarkdown, MOST_HOVER_CHARACTERS } from './picture-markdown.ts';
import { plainTextOf } from './plain-text.ts';
import { type Pointed, pointedAt } from './tree-path.ts';

/** What is shown for the word under the pointer; nothing where it says no more than it shows already. */
export function hoverAt(evaluation: Evaluation, position: Position, abilities: ClientAbilities): Hover | null {
  const { snapshot } = evaluation;
  const offset = snapshot.offsetAt(position);
  const entry = snapshot.entryAt(offset);
  const start = entry && snapshot.startOf(entry);
  if (!entry || start === undefined) return null;
  const pointed = pointedAt(entry, offset - start);
  if (!pointed?.node) return null;
  const whole = markdownFor(evaluation, entry, pointed, channelAt(evaluation, position), abilities);
  if (whole === undefined) return null;
  // Names may be of any length; what holds them is cut before an editor does it.
  const markdown = whole.length < MOST_HOVER_CHARACTERS ? whole : `${whole.slice(0, MOST_HOVER_CHARACTERS - 2)}…`;
  return {
    contents: abilities.showsMarkdown
      ? { kind: MarkupKind.Markdown, value: markdown }
      : { kind: MarkupKind.PlainText, value: plainTextOf(markdown) },
    range: protocolRange(snapshot, start + pointed.node.start, start + pointed.node.end),
  };
}

function markdownFor(
  evaluation: Evaluation,
  entry: Entry,
  pointed: Pointed,
  channel: JudgedChannel | undefined,
  abilities: ClientAbilities,
): string | undefined {
  if (pointed.on === 'key' && pointed.pair?.key === entry.key) {
    const named = entryMarkdown(evaluation, entry, channel, abilities);
    if (named !== undefined) return named;
  }
  const key = pointed.pair?.key.text;
  if (channel && mapIsMeant(pointed, key)) return mapMarkdown(channel, abilities);
  const spectrum = channel && spectrumIsMeant(pointed) ? spectrumMarkdown(channel) : undefined;
  if (pointed.on === 'key' && key !== undefined) {
    const explained = keyMarkdown(pointed, key);
    if (spectrum !== undefined && explained !== undefined) return `${spectrum}\n\n${explained}`;
    return explained ?? nameMarkdown(evaluation, pointed, key, channel, abilities);
  }
  const text = pointed.node?.kind === 'scalar' ? pointed.node.text : undefined;
  const named = text === undefined ? undefined : nameMarkdown(evaluation, pointed, text, channel, abilities, key);
  return spectrum === undefined || named === undefined ? (spectrum ?? named) : `${spectrum}\n\n${named}`;
}

/** What stands behind an entry's own name: a channel's map, a filter's curve, how far a group is apart, where a source lands. */
function entryMarkdown(
  evaluation: Evaluation,
  entry: Entry,
  channel: JudgedChannel | undefined,
  abilities: ClientAbilities,
): string | undefined {
  if (channel) return mapMarkdown(channel, abilities);
  const filter = entry.section === 'filters' ? evaluation.environment.filters.get(entry.name) : undefined;
  if (filter) return filterMarkdown(filter, evaluation, undefined, abilities);
  const group = entry.section === 'groups' ? evaluation.environment.groups.get(entry.name) : undefined;
  if (group) return groupMarkdown(group, evaluation);
  const isSource = entry.section === 'sources' || (entry.section === undefined && entry.name === 'mains');
  const source = isSource ? evaluation.environment.sources.get(entry.name) : undefined;
  return source && sourceMarkdown(source, evaluation);
}

/** The alias map belongs to the value of a rate and of a decimation, and to all that stands behind `hears`. */
function mapIsMeant({ path, on }: Pointed, key: string | undefined): boolean {
  const insideHears = path.some((step) => step.kind === 'key' && step.key === 'hears');
  if (insideHears) return true;
  if (on === 'value') return key === 'rate' || key === 'decimate' || key === 'hears';
  return false;
}

function keyMarkdown({ path }: Pointed, key: string): string | undefined {
  const expected = expectedAt(path);
  const row = expected.contexts.map((context) => keyRow(context, key)).find((found) => found !== undefined);
  if (!row) return undefined;
  const facts = [
    `Example: \`${row.key}: ${row.example}\``,
    ...(row.required ? ['Required.'] : []),
    ...(row.default === undefined ? [] : [`Left out: ${row.default}.`]),
    ...(row.computed ? [] : ['This version knows the key but does not compute it yet.']),
  ];
  return `**${row.key}**\n\n${row.doc}\n\n${facts.join('\n\n')}`;
}

function nameMarkdown(
  evaluation: Evaluation,
  pointed: Pointed,
  text: string,
  channel: JudgedChannel | undefined,
  abilities: ClientAbilities,
  key?: string,
): string | undefined {
  const inside = key === undefined ? pointed.path : [...pointed.path, { kind: 'key' as const, key }];
  for (const kind of expectedAt(inside).values) {
    const names = kind.kind === 'name' ? kind.of : kind.kind === 'map-of' ? kind.keys : undefined;
    if (names === 'filter') {
      const filter = evaluation.environment.filters.get(text);
      if (filter) return filterMarkdown(filter, evaluation, channel, abilities);
    }
    if (names === 'group') {
      const group = evaluation.environment.groups.get(text);
      if (group) return groupMarkdown(group, evaluation);
    }
    if (names === 'source') {
      const source = evaluation.environment.sources.get(text);
      if (source) return sourceMarkdown(source, evaluation);
    }
    if (kind.kind === 'choice') {
      const value = kind.values.find(({ name }) => name === text);
      if (value) return `**${codeMarkdown(value.name)}**\n\n${value.doc}`;
    }
    if (kind.kind === 'practice-name') {
      const practice = practiceNamed(text);
      if (practice) return `**${practice.name}**\n\n${practiceMarkdown(practice)}`;
    }
    if (kind.kind === 'check-name' || names === 'check') return checkMarkdown(text, abilities);
  }
  return undefined;
}

function checkMarkdown(name: string, { links }: ClientAbilities): string | undefined {
  const check = ALL_CHECKS.find((one) => one.name === name);
  if (!check) return undefined;
  const href = links.check(name);
  const title = href === undefined ? check.name : `[${check.name}](${href})`;
  return `**${title}** · ${check.severity}\n\n${check.finds}\n\n${check.why}`;
}
