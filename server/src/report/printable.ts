/** Control characters, and those that turn the direction of writing round. */
const UNPRINTABLE = /[\p{Cc}\u202a-\u202e\u2066-\u2069]/gu;

/**
 * A text as a terminal may be shown it, on one line: a name out of a rig file may hold any character, and a terminal
 * would obey some of them. They are shown as JSON would write them.
 */
export function printable(text: string): string {
  return text.replace(UNPRINTABLE, escaped);
}

/** The same for a text of several lines, whose ends stay. */
export function printableLines(text: string): string {
  return text.replace(UNPRINTABLE, (character) => (character === '\n' ? character : escaped(character)));
}

function escaped(character: string): string {
  return `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`;
}
