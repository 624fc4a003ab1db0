/** The value of an attribute. */
export type AttributeValue = string | number;

/** One element with its attributes; content is markup already, or nothing. */
export function element(name: string, attributes: Readonly<Record<string, AttributeValue>>, content = ''): string {
  const written = Object.entries(attributes)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? short(value) : escaped(value)}"`)
    .join('');
  return content === '' ? `<${name}${written}/>` : `<${name}${written}>${content}</${name}>`;
}

/** Text as the content of an element. What XML has no way of writing becomes the sign for a lost character. */
export function escaped(text: string): string {
  let result = '';
  for (const character of text) result += ENTITIES.get(character) ?? (isWritable(character) ? character : '\ufffd');
  return result;
}

const ENTITIES: ReadonlyMap<string, string> = new Map([
  ['&', '&amp;'],
  ['<', '&lt;'],
  ['>', '&gt;'],
  ['"', '&quot;'],
]);

/** The characters of XML 1.0: no control characters but tab and line ends, no lone surrogates. */
function isWritable(character: string): boolean {
  const code = character.codePointAt(0)!;
  if (code < 0x20) return code === 0x09 || code === 0x0a || code === 0x0d;
  return !(code >= 0xd800 && code <= 0xdfff) && code !== 0xfffe && code !== 0xffff;
}

/** Coordinates to a tenth of a pixel. */
export function short(value: number): string {
  return String(Math.round(value * 10) / 10);
}
