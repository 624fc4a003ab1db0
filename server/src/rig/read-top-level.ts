import { nearest } from '../quantity/spelling.ts';
import type { Acceptance } from './acceptance.ts';
import { type Entry, NAMED_SECTIONS } from './entry.ts';
import {
  clipped,
  describeNode,
  type Field,
  innerPlace,
  namePlace,
  noteNotComputed,
  pairsOf,
  placeOf,
  readFieldsOf,
  reportUnknownKey,
  resolved,
} from './fields.ts';
import type { Given, Run, Source } from './model.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { readAcceptances } from './read-acceptances.ts';
import { channelOf } from './read-channel.ts';
import { readFollows } from './read-follows.ts';
import { readRun } from './read-run.ts';
import { readMains } from './read-source.ts';
import { readUses } from './read-uses.ts';
import { placedProblem, type Reader, report } from './reader.ts';
import type { MapNode } from './tree.ts';
import { checkValue } from './uncomputed.ts';
import type { JoinedThings, UsedFiles } from './used-things.ts';
import { alternative, readChoice, readText, reportWrongKind } from './values.ts';
import { keyRow, keysOf } from './vocabulary.ts';

export type SeverityChoice = 'off' | 'hint' | 'warning' | 'error';

/** What one top-level key gave. */
export interface TopLevel {
  readonly rigName?: Given<string> | undefined;
  readonly joined?: JoinedThings;
  readonly mains?: Source | undefined;
  readonly defaults?: ReadonlyMap<string, Field>;
  /** What channels take over that have no `follows` of their own, nor one from `defaults`. */
  readonly follows?: Field;
  readonly acceptances?: readonly Acceptance[];
  readonly severities?: ReadonlyMap<string, SeverityChoice>;
  readonly run?: Run | undefined;
}

const SECTIONS: ReadonlySet<string> = new Set(NAMED_SECTIONS);

/** Reads a top-level key that is no named thing: `rig`, `mains`, `defaults`, `checks`, the head of a section, ... */
export function readTopLevel(reader: Reader, checkNames: readonly string[], used: UsedFiles): TopLevel {
  const { entry } = reader;
  const { key } = entry;
  if (!key) return {};
  const row = keyRow('rig', key.text);
  if (!row) {
    const known = keysOf('rig').map((one) => one.key);
    reportUnknownKey(reader, 'rig', key, entry, key.text, known);
    return {};
  }
  const found = resolved(reader, entry.value, entry, undefined);
  if (!row.computed) noteNotComputed(reader, row.key, namePlace(entry));
  if (!found) return {};
  const field: Field = { kind: row.value, row, path: key.text, ...found };
  if (SECTIONS.has(row.key)) {
    checkSection(reader, field);
    return {};
  }
  if (field.node.kind === 'empty') {
    // A map that holds nothing yet says nothing; a value that is left out does.
    if (row.key === 'rig' || row.key === 'mains') {
      const message = `\`${row.key}\` has no value; write it like \`${row.key}: ${row.example}\`.`;
      report(reader, { name: 'wrong-kind', place: namePlace(entry), message, about: row.key });
    }
    return {};
  }
  switch (row.key) {
    case 'rig':
      return { rigName: readText(reader, field) };
    case 'uses':
      return { joined: readUses(reader, field, used) };
    case 'mains':
      return { mains: readMains(reader, field) };
    case 'defaults':
      return readMap(reader, field, readDefaults);
    case 'run':
      return readMap(reader, field, (_, one, node) => ({ run: readRun(reader, one, node) }));
    case 'follows':
      return { follows: readFollowsOfAll(reader, field) };
    case 'accept':
      return { acceptances: readAcceptances(reader, field, checkNames) };
    case 'checks':
      return readMap(reader, field, (_, one, node) => readSeverities(reader, one, node, checkNames));
    default:
      checkValue(reader, field);
      return {};
  }
}

/** Things that are named have entries of their own; at the head of a section stands nothing, or something wrong. */
function checkSection(reader: Reader, field: Field): void {
  const { node, entry, row } = field;
  if (node.kind === 'empty' || (node.kind === 'map' && entry === reader.entry)) return;
  const what = field.entry === reader.entry ? describeNode(node) : 'an alias';
  report(reader, {
    name: 'wrong-kind',
    place: namePlace(reader.entry),
    message: `\`${row.key}\` needs names beneath it, each with its own keys; here stands ${what}.`,
    about: row.key,
  });
}

function readMap(
  reader: Reader,
  field: Field,
  how: (reader: Reader, field: Field, node: MapNode) => TopLevel,
): TopLevel {
  if (field.node.kind === 'map') return how(reader, field, field.node);
  reportWrongKind(reader, field);
  return {};
}

/** The defaults as fields that channels take over; their values are checked here, once. */
function readDefaults(reader: Reader, field: Field, node: MapNode): TopLevel {
  const fields = readFieldsOf(reader, 'channel', field, node);
  const own = { ...fields, prefix: '', byKey: new Map<string, Field>() };
  for (const [key, one] of fields.byKey) {
    const inherited = { from: 'defaults', place: placeOf(one.entry, one.node) } as const;
    own.byKey.set(key, { ...one, path: key, inherited });
  }
  channelOf(reader, own);
  return { defaults: own.byKey };
}

/** What all channels follow, as a field that they take over; its names are looked up here, once. */
function readFollowsOfAll(reader: Reader, field: Field): Field {
  readFollows(reader, field);
  return { ...field, inherited: { from: 'defaults', place: placeOf(field.entry, field.node) } };
}

function readSeverities(reader: Reader, field: Field, node: MapNode, checkNames: readonly string[]): TopLevel {
  const merged = pairsOf(reader, node, field.entry);
  for (const problem of merged.problems) report(reader, problem);
  const kind = alternative(field.kind, 'map-of').value;
  const known = new Set(checkNames);
  const severities = new Map<string, SeverityChoice>();
  for (const { key, keyEntry, value, entry, inherited } of merged.pairs) {
    if (!known.has(key.text)) {
      const near = nearest(key.text, checkNames);
      report(reader, {
        name: 'unknown-name',
        place: innerPlace(keyEntry, key),
        message: `There is no check \`${clipped(key.text)}\`${near ? `; \`${near}\` is the nearest` : ''}.`,
        about: clipped(key.text),
        cure: near ? { kind: 'replace', text: near } : undefined,
      });
      continue;
    }
    const path = `checks.${key.text}`;
    const pair: Field = { kind, row: field.row, path, node: value, entry, inherited };
    const severity = readChoice<SeverityChoice>(reader, pair);
    if (severity) severities.set(key.text, severity.value);
  }
  return { severities };
}

/** Where a file has no entry at all, what it lacks is missed at its beginning. */
const NO_ENTRY: Entry = {
  section: undefined,
  name: '',
  key: undefined,
  value: { kind: 'empty', start: 0, end: 0 },
  text: '',
  problems: [],
  anchors: [],
  aliases: [],
};

/** Says that the rig has no name, at the first key of the file. */
export function missingRigName(first: Entry | undefined): PlacedProblem {
  const row = keyRow('rig', 'rig');
  return placedProblem({
    name: 'missing-key',
    place: namePlace(first ?? NO_ENTRY),
    message: `\`rig\` is missing: the file has no name for the rig, such as \`rig: ${row?.example}\`.`,
    about: 'rig',
    cure: { kind: 'add-key', key: 'rig' },
  });
}
