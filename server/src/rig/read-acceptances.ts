import { nearest } from '../quantity/spelling.ts';
import type { Acceptance, LastDay } from './acceptance.ts';
import {
  clipped,
  describeNode,
  type Field,
  type Fields,
  innerPlace,
  innerSpan,
  itemsOf,
  placeOf,
  readFieldsOf,
  reportMissingKeys,
} from './fields.ts';
import { MOST_ACCEPTANCES } from './limits.ts';
import { type NamePattern, namePattern } from './name-matching.ts';
import { namePartsOf, sizeOf } from './name-pattern.ts';
import { type Reader, report } from './reader.ts';
import { alternative, readText, reportValue, reportWrongKind, scalarOf } from './values.ts';
import { keysOf } from './vocabulary.ts';

/** Reads the list behind `accept`; what can't be understood accepts nothing. */
export function readAcceptances(reader: Reader, field: Field, checkNames: readonly string[]): readonly Acceptance[] {
  if (field.node.kind !== 'list') {
    reportWrongKind(reader, field);
    return [];
  }
  const items = itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of);
  const beyond = items[MOST_ACCEPTANCES];
  if (beyond) {
    const message = `A file may have ${MOST_ACCEPTANCES.toLocaleString('en')} items of \`accept\`: this one and those after it are not read.`;
    report(reader, { name: 'too-much', place: placeOf(beyond.entry, beyond.node), message, about: field.path });
  }
  const known = new Set(checkNames);
  return items.slice(0, MOST_ACCEPTANCES).flatMap((item) => {
    const acceptance = readAcceptance(reader, item, checkNames, known);
    return acceptance ? [acceptance] : [];
  });
}

const REQUIRED: readonly string[] = keysOf('acceptance')
  .filter(({ required }) => required)
  .map(({ key }) => key);

function readAcceptance(
  reader: Reader,
  item: Field,
  checkNames: readonly string[],
  known: ReadonlySet<string>,
): Acceptance | undefined {
  if (item.node.kind !== 'map') {
    reportWrongKind(reader, item);
    return undefined;
  }
  const fields = readFieldsOf(reader, 'acceptance', item, item.node);
  reportMissingKeys(reader, fields, REQUIRED);
  const textOf = (key: string): string | undefined => readText(reader, fields.byKey.get(key))?.value;
  const finding = readText(reader, fields.byKey.get('finding'));
  const on = readChannels(reader, fields);
  const about = textOf('about');
  const reason = textOf('reason')?.trim() ?? '';
  const by = textOf('by');
  const until = readLastDay(reader, fields.byKey.get('until'));
  if (!finding) return undefined;
  if (!known.has(finding.value)) {
    const near = nearest(finding.value, checkNames);
    report(reader, {
      name: 'unknown-name',
      place: finding.place,
      message: `There is no check \`${clipped(finding.value)}\`${near ? `; \`${near}\` is the nearest` : ''}.`,
      about: clipped(finding.value),
      cure: near ? { kind: 'replace', text: near } : undefined,
    });
    return undefined;
  }
  return { finding: finding.value, findingPlace: finding.place, on, about, reason, by, until };
}

function readChannels(reader: Reader, fields: Fields): NamePattern | undefined {
  const field = fields.byKey.get('on');
  const node = field && scalarOf(reader, field);
  if (!field || !node) return undefined;
  for (const part of namePartsOf(node.text)) {
    if (part.kind !== 'numbers' || sizeOf(part) >= 1) continue;
    const written = node.text.slice(part.start, part.end);
    const turned = written.replace(/\{(\d+)\.\.(\d+)\}/, '{$2..$1}');
    const message = `\`${clipped(written)}\` is upside down, so it stands for no channels: write \`${clipped(turned)}\`.`;
    const place = innerSpan(field.entry, node, part.start, part.end);
    reportValue(reader, field, 'out-of-range', place, message, { kind: 'replace', text: turned });
  }
  return namePattern(node.text);
}

function readLastDay(reader: Reader, field: Field | undefined): LastDay | undefined {
  const node = field && scalarOf(reader, field);
  if (!field || !node) return undefined;
  const place = innerPlace(field.entry, node);
  if (isDay(node.text)) return { day: node.text, place };
  const message = `\`${field.row.key}\` is a day, such as \`${field.row.example}\`; here stands ${describeNode(node)}.`;
  reportValue(reader, field, 'wrong-kind', place, message);
  return undefined;
}

const DAY = /^(\d{4})-(\d{2})-(\d{2})$/;
const DAYS_OF_MONTHS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31] as const;

/** Whether a text is a calendar date of ISO 8601, such as `2027-03-31`. */
function isDay(text: string): boolean {
  const [, year, month, day] = (DAY.exec(text) ?? []).map(Number);
  if (year === undefined || month === undefined || day === undefined) return false;
  const isLeapYear = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  const days = month === 2 && isLeapYear ? 29 : (DAYS_OF_MONTHS[month - 1] ?? 0);
  return day >= 1 && day <= days;
}
