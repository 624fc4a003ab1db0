/** The most characters that a hover may take: editors cut what is much longer. */
export const MOST_HOVER_CHARACTERS = 48_000;

/** An SVG text as a picture in Markdown. */
export function pictureMarkdown(svg: string, alternative: string): string {
  return `![${escapedAlternative(alternative)}](data:image/svg+xml;base64,${base64(svg)})`;
}

/** A drawing in characters, as a block that keeps its columns. */
export function drawingMarkdown(drawing: string): string {
  return `\`\`\`text\n${drawing}\n\`\`\``;
}

/** A Markdown table; cells must not be empty strings at the line's end, and bars in them are escaped. */
export function tableMarkdown(heads: readonly string[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]): string =>
    `| ${cells.map((cell) => cell.replaceAll('|', '\\|')).join(' | ')} |`;
  return [line(heads), `|${heads.map(() => '---').join('|')}|`, ...rows.map(line)].join('\n');
}

/** A name from a rig file as code, whatever characters it has. */
export function codeMarkdown(text: string): string {
  const clean = text.replaceAll(/[\r\n]+/g, ' ');
  const longest = Math.max(0, ...[...clean.matchAll(/`+/g)].map(([run]) => run.length));
  const fence = '`'.repeat(longest + 1);
  const pad = longest > 0 ? ' ' : '';
  return `${fence}${pad}${clean}${pad}${fence}`;
}

/** Code, links and markup in a name would end the alternative before its time. */
function escapedAlternative(text: string): string {
  return text.replaceAll(/[[\]\\`*_<>&~!]/g, '\\$&').replaceAll(/\s+/g, ' ');
}

const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Base 64 of a text's UTF-8 (RFC 4648), without anything of Node: the core runs in a browser too. */
function base64(text: string): string {
  const bytes = new TextEncoder().encode(text);
  const parts: string[] = [];
  for (let index = 0; index < bytes.length; index += 3) {
    const [a = 0, b, c] = [bytes[index], bytes[index + 1], bytes[index + 2]];
    const group = (a << 16) | ((b ?? 0) << 8) | (c ?? 0);
    parts.push(
      ALPHABET[group >> 18]! +
        ALPHABET[(group >> 12) & 63]! +
        (b === undefined ? '=' : ALPHABET[(group >> 6) & 63]!) +
        (c === undefined ? '=' : ALPHABET[group & 63]!),
    );
  }
  return parts.join('');
}
