/**
 * What an edit writes: a scalar, a list, a map, or an alias. Written in flow style, so that it needs no knowledge of
 * the indentation around it.
 */
export type NewValue =
  | string
  | readonly NewValue[]
  | ReadonlyMap<string, NewValue>
  | { readonly kind: 'alias'; readonly name: string };

/** How the text around an edit is written. */
export interface TextStyle {
  /** Keys and texts are in double quotes, as JSON wants them. */
  readonly json: boolean;
  /** Inside braces or brackets, where commas end a scalar. */
  readonly flow: boolean;
  readonly lineEnd: '\n' | '\r\n';
}

export type Quote = '"' | "'" | '';

/** What may not begin a plain scalar. */
const NEVER_FIRST = /^[,[\]{}#&*!|>'"%@`]|^[-?:](?=\s|$)/;
/** What ends a plain scalar, or makes another of it. */
const NEVER_INSIDE = /:(?=\s|$)|\s#|[\r\n\t]|^\s|\s$/;
const NEVER_INSIDE_FLOW = /[,[\]{}]|:$|^[-?:](?=[,[\]{}])/;

const JSON_NUMBER = /^-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?$/;

/** A scalar, in quotes only where it needs them; `like` are the quotes of what it replaces. */
export function scalarText(text: string, style: TextStyle, like: Quote = ''): string {
  if (style.json) return like === '' && JSON_NUMBER.test(text) ? text : JSON.stringify(text);
  if (like === '"') return JSON.stringify(text);
  if (like === "'" && !/[\r\n]/.test(text)) return `'${text.replaceAll("'", "''")}'`;
  return isPlain(text, style.flow) ? text : JSON.stringify(text);
}

/** A value in flow style. */
export function valueText(value: NewValue, style: TextStyle): string {
  if (typeof value === 'string') return scalarText(value, style);
  if (isAlias(value)) return `*${value.name}`;
  const inside: TextStyle = { ...style, flow: true };
  if (isList(value)) return `[${value.map((item) => valueText(item, inside)).join(', ')}]`;
  const pairs = [...value].map(([key, item]) => pairText(key, item, inside));
  return pairs.length === 0 ? '{}' : `{ ${pairs.join(', ')} }`;
}

/** A key and its value in one line. */
export function pairText(key: string, value: NewValue, style: TextStyle): string {
  const keyText = style.json ? JSON.stringify(key) : key === '<<' ? key : scalarText(key, style);
  return `${keyText}: ${valueText(value, style)}`;
}

function isPlain(text: string, flow: boolean): boolean {
  if (text === '' || NEVER_FIRST.test(text) || NEVER_INSIDE.test(text)) return false;
  return !flow || !NEVER_INSIDE_FLOW.test(text);
}

function isAlias(value: Exclude<NewValue, string>): value is { readonly kind: 'alias'; readonly name: string } {
  return 'kind' in value;
}

function isList(value: readonly NewValue[] | ReadonlyMap<string, NewValue>): value is readonly NewValue[] {
  return Array.isArray(value);
}
