import { type Quantity, type QuantityProblem, readQuantity, type Scalar } from '../quantity/quantity.ts';
import { nearest } from '../quantity/spelling.ts';
import { type Unit, unitsOf } from '../quantity/unit.ts';
import { clipped, describeNode, type Field, innerPlace, innerSpan, noteNotComputed, placeOf } from './fields.ts';
import { MOST_MAGNITUDE } from './limits.ts';
import type { Given } from './model.ts';
import type { Place } from './place.ts';
import type { Cure, ProblemName } from './problem.ts';
import { type Reader, report } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import type { Bounds, ChoiceValue, NumberKind, ValueKind } from './vocabulary-kinds.ts';

/** Says what is wrong with a value, at a place in it. */
export function reportValue(
  reader: Reader,
  field: Field,
  name: ProblemName,
  place: Place,
  message: string,
  cure?: Cure,
): void {
  report(reader, { name, place, message, about: field.path, cure });
}

/** Says that a value is of the wrong kind, with an example of the right one. */
export function reportWrongKind(reader: Reader, field: Field): void {
  const { key, example } = field.row;
  const message = `\`${key}\` can't be ${describeNode(field.node)}; write it like \`${key}: ${example}\`.`;
  reportValue(reader, field, 'wrong-kind', placeOf(field.entry, field.node), message);
}

/** The scalar of a field; anything else is said to be of the wrong kind. Nothing is said of an empty one here. */
export function scalarOf(reader: Reader, field: Field): ScalarNode | undefined {
  const { node } = field;
  if (node.kind === 'scalar') return node;
  if (node.kind !== 'empty') reportWrongKind(reader, field);
  return undefined;
}

/** The value of a field as given at its place. */
export function given<T>(field: Field, value: T, written?: Quantity): Given<T> {
  const { node, entry, inherited } = field;
  const place = node.kind === 'scalar' ? innerPlace(entry, node) : placeOf(entry, node);
  if (inherited) return written ? { value, place, written, inherited } : { value, place, inherited };
  return written ? { value, place, written } : { value, place };
}

/** The first alternative of a kind. */
export function alternative<K extends ValueKind['kind']>(kind: ValueKind, wanted: K): Extract<ValueKind, { kind: K }> {
  const found = findAlternative(kind, wanted);
  if (!found) throw new Error(`The vocabulary has no ${wanted} here.`);
  return found;
}

function findAlternative<K extends ValueKind['kind']>(
  kind: ValueKind,
  wanted: K,
): Extract<ValueKind, { kind: K }> | undefined {
  if (kind.kind === wanted) return kind as Extract<ValueKind, { kind: K }>;
  if (kind.kind !== 'alternatives') return undefined;
  for (const one of kind.of) {
    const found = findAlternative(one, wanted);
    if (found) return found;
  }
  return undefined;
}

/** Any text. */
export function readText(reader: Reader, field: Field | undefined): Given<string> | undefined {
  const node = field && scalarOf(reader, field);
  return node && field && given(field, node.text);
}

/** `true` or `false`. */
export function readTruth(reader: Reader, field: Field | undefined): Given<boolean> | undefined {
  const node = field && scalarOf(reader, field);
  if (!node || !field) return undefined;
  const truth = TRUTHS.get(node.text);
  if (truth !== undefined) return given(field, truth);
  const meant = MEANT_TRUTHS.get(node.text.toLowerCase());
  const message = `\`${field.row.key}\` is \`true\` or \`false\`, not ${describeNode(node)}.`;
  const cure: Cure | undefined = meant ? { kind: 'replace', text: meant } : undefined;
  reportValue(reader, field, 'wrong-kind', innerPlace(field.entry, node), message, cure);
  return undefined;
}

/** YAML 1.2, core schema. */
const TRUTHS: ReadonlyMap<string, boolean> = new Map([
  ['true', true],
  ['True', true],
  ['TRUE', true],
  ['false', false],
  ['False', false],
  ['FALSE', false],
]);
const MEANT_TRUTHS: ReadonlyMap<string, string> = new Map([
  ['yes', 'true'],
  ['on', 'true'],
  ['y', 'true'],
  ['no', 'false'],
  ['off', 'false'],
  ['n', 'false'],
]);

/** One of the words of the field's choice. */
export function readChoice<T extends string>(reader: Reader, field: Field | undefined): Given<T> | undefined {
  const node = field && scalarOf(reader, field);
  if (!node || !field) return undefined;
  const { values } = alternative(field.kind, 'choice');
  const value = values.find(({ name }) => name === node.text);
  if (!value) {
    reportWrongChoice(reader, field, node, values);
    return undefined;
  }
  if (!value.computed && field.entry === reader.entry) {
    noteNotComputed(reader, `${field.row.key}: ${value.name}`, placeOf(field.entry, node));
  }
  return given(field, value.name as T);
}

function reportWrongChoice(reader: Reader, field: Field, node: ScalarNode, values: readonly ChoiceValue[]): void {
  const names = values.map(({ name }) => name);
  const near = nearest(node.text, names);
  const message = near
    ? `\`${field.row.key}\` can't be ${describeNode(node)}; \`${near}\` is the nearest that exists.`
    : `\`${field.row.key}\` can't be ${describeNode(node)}; it is one of ${listed(names)}.`;
  const cure: Cure | undefined = near ? { kind: 'replace', text: near } : undefined;
  reportValue(reader, field, 'wrong-kind', innerPlace(field.entry, node), message, cure);
}

export function listed(names: readonly string[]): string {
  return names.map((name) => `\`${name}\``).join(', ');
}

/** A bare number within the bounds of the field's kind. */
export function readNumber(reader: Reader, field: Field | undefined): Given<number> | undefined {
  if (!field) return undefined;
  const quantity = quantityOf(reader, field);
  if (!quantity) return undefined;
  const kind = alternative(field.kind, 'number');
  if (quantity.kind !== 'scalar') {
    reportWrongKind(reader, field);
    return undefined;
  }
  const value = plainNumber(reader, field, quantity, kind);
  return value === undefined ? undefined : given(field, value, quantity);
}

function plainNumber(reader: Reader, field: Field, scalar: Scalar, kind: NumberKind): number | undefined {
  const node = field.node as ScalarNode;
  if (scalar.dimension !== 'number') {
    const message = `\`${field.row.key}\` is a number without a unit, such as \`${field.row.example}\`; here stands ${describeNode(node)}.`;
    reportValue(reader, field, 'unit-mismatch', innerPlace(field.entry, node), message);
    return undefined;
  }
  if (kind.integer && !Number.isInteger(scalar.value)) {
    const message = `\`${field.row.key}\` is a whole number; here stands ${describeNode(node)}.`;
    reportValue(reader, field, 'out-of-range', innerPlace(field.entry, node), message);
    return undefined;
  }
  const { high, clamped } = kind.bounds;
  if (clamped && high !== undefined && scalar.value > high) {
    const message = `\`${field.row.key}\` is ${describeNode(node)}, which is too much to compute; the first ${high} are computed.`;
    reportValue(reader, field, 'too-much', innerPlace(field.entry, node), message);
    return high;
  }
  return withinBounds(reader, field, scalar.value, kind.bounds) ? scalar.value : undefined;
}

/** The numbers of a list, each within the bounds of the field's kind; `undefined` where one of them is not. */
export function readNumbers(reader: Reader, items: readonly Field[]): readonly number[] | undefined {
  const values: number[] = [];
  let complete = true;
  for (const item of items) {
    const value = readNumber(reader, item);
    if (value) values.push(value.value);
    else complete = false;
  }
  return complete ? values : undefined;
}

/** The quantity that a field's scalar holds, as written, nothing checked yet but that it is one. */
export function quantityOf(reader: Reader, field: Field): Quantity | undefined {
  const node = scalarOf(reader, field);
  if (!node) return undefined;
  const read = readQuantity(node.text);
  if (read.quantity && isComputable(read.quantity)) return read.quantity;
  if (read.quantity) {
    reportNotComputable(reader, field);
    return undefined;
  }
  reportNotAQuantity(reader, field, node, read.problem);
  return undefined;
}

/** Whether products of a few such numbers stay finite and above 0. */
function isComputable(quantity: Quantity): boolean {
  if (quantity.kind === 'range') return hasMagnitude(quantity.low) && hasMagnitude(quantity.high);
  return hasMagnitude(quantity.kind === 'symmetric' ? quantity.limit : quantity);
}

function hasMagnitude({ value }: Scalar): boolean {
  const size = Math.abs(value);
  return size === 0 || (size <= MOST_MAGNITUDE && size >= 1 / MOST_MAGNITUDE);
}

function reportNotAQuantity(reader: Reader, field: Field, node: ScalarNode, problem: QuantityProblem): void {
  const { key, example } = field.row;
  const { suggestion } = problem;
  if (problem.kind === 'not-finite' || problem.kind === 'too-long') {
    reportNotComputable(reader, field);
    return;
  }
  const said = clipped(problem.text);
  const message =
    problem.kind === 'unknown-unit'
      ? `\`${said}\` is no unit${suggestion === undefined ? '' : `; \`${suggestion}\` is the nearest`}.`
      : problem.kind === 'digit-separator'
        ? `\`${said}\` is not written as a plain number, such as \`1000\` or \`1.5\`.`
        : problem.kind === 'amplitude-misplaced'
          ? `\`${said}\` belongs behind an amplitude, which \`${key}\` is not; write it like \`${example}\`.`
          : `\`${key}\` can't be ${describeNode(node)}; write it like \`${key}: ${example}\`.`;
  const name =
    problem.kind === 'unknown-unit' || problem.kind === 'amplitude-misplaced' ? 'unit-mismatch' : 'wrong-kind';
  const exact = problem.kind !== 'not-a-quantity' || suggestion !== undefined;
  const place = exact ? innerSpan(field.entry, node, problem.start, problem.end) : innerPlace(field.entry, node);
  const cure: Cure | undefined = suggestion === undefined ? undefined : { kind: 'replace', text: suggestion };
  reportValue(reader, field, name, place, message, cure);
}

/** Says that a number is none that can be computed with. */
export function reportNotComputable(reader: Reader, field: Field): void {
  const node = field.node as ScalarNode;
  const message = `${describeNode(node)} is no number that can be computed with: it is too large or too small, or none at all.`;
  reportValue(reader, field, 'out-of-range', innerPlace(field.entry, node), message);
}

/** Says so where a value is outside its bounds, which are in the base unit of the given unit's dimension. */
export function withinBounds(reader: Reader, field: Field, value: number, bounds: Bounds, unit?: Unit): boolean {
  const { low, high } = bounds;
  const tooLow = low !== undefined && (bounds.lowExcluded ? value <= low : value < low);
  const tooHigh = high !== undefined && (bounds.highExcluded ? value >= high : value > high);
  if (!tooLow && !tooHigh && Number.isFinite(value)) return true;
  const limit = tooHigh
    ? `${bounds.highExcluded ? 'below' : 'at most'} ${boundText(high ?? 0, unit)}`
    : `${bounds.lowExcluded ? 'above' : 'at least'} ${boundText(low ?? 0, unit)}`;
  const { node } = field;
  const place = node.kind === 'scalar' ? innerPlace(field.entry, node) : placeOf(field.entry, node);
  const message = `\`${field.row.key}\` must be ${limit}; here stands ${describeNode(node)}.`;
  reportValue(reader, field, 'out-of-range', place, message);
  return false;
}

/** A bound in the base unit, or in the given one where the base unit has no symbol: 1 is 100 %. */
function boundText(bound: number, unit: Unit | undefined): string {
  if (!unit) return String(bound);
  const base = unitsOf(unit.dimension).find(({ factor }) => factor === 1);
  return base ? `${bound} ${base.symbol}` : `${bound / unit.factor} ${unit.symbol}`;
}
