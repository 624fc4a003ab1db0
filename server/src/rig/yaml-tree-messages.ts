import type { YAMLParseError } from 'yaml';

/** Says in plain words what the YAML library found. Its own messages speak of its inner workings. */
export function plainMessage({ code, message }: YAMLParseError): string {
  switch (code) {
    case 'ALIAS_PROPS':
      return 'An alias (*name) can have no anchor or tag of its own.';
    case 'BAD_ALIAS':
      return 'A name is missing after this & or *.';
    case 'BAD_DQ_ESCAPE':
      return 'This is no escape sequence of a double-quoted text: write \\\\ for a backslash.';
    case 'BAD_SCALAR_START':
      return "A value can't start with this character: put the value in quotes.";
    case 'BAD_PROP_ORDER':
      return 'An anchor or tag stands after the indicator that it belongs to, not before it.';
    case 'BLOCK_AS_IMPLICIT_KEY':
      return `A second "key: value" can't stand on the same line: start a new line, or put the value in quotes.`;
    case 'BLOCK_IN_FLOW':
      return 'Inside { } and [ ] everything is written with commas and brackets, not by indentation.';
    case 'KEY_OVER_1024_CHARS':
      return 'This key is longer than 1,024 characters.';
    case 'MULTILINE_IMPLICIT_KEY':
      return 'A key stands on one line, with its colon: a colon or a closing quote may be missing.';
    case 'MULTIPLE_ANCHORS':
      return 'A value can have one anchor only.';
    case 'MULTIPLE_TAGS':
      return 'A value can have one tag only.';
    case 'TAB_AS_INDENT':
      return TABS_MESSAGE;
    case 'BAD_INDENT':
      return badIndentMessage(message);
    case 'MISSING_CHAR':
      return missingMessage(message);
    case 'BAD_COLLECTION_TYPE':
    case 'TAG_RESOLVE_FAILED':
      return 'This tag does not fit the value behind it.';
    case 'BAD_DIRECTIVE':
      return 'A line that starts with % is a directive, and this one is not known.';
    case 'RESOURCE_EXHAUSTION':
      return 'This is nested too deeply to be read.';
    default:
      return unexpectedMessage(message);
  }
}

export const TABS_MESSAGE = "Tabs can't indent YAML: use spaces.";
export const UNCLOSED_QUOTE_MESSAGE = 'The quote opened here is never closed.';

export function unclosedBracketMessage(bracket: string): string {
  return `The ${bracket} opened here is never closed.`;
}

function badIndentMessage(message: string): string {
  if (message.includes('end with a')) return 'A closing bracket is missing, or stands too far to the left.';
  if (message.startsWith('All sequence items')) return 'The items of one list start in the same column.';
  if (message.startsWith('Block scalar')) return 'The lines of this text are indented less than its first line.';
  return 'The keys of one map start in the same column: this one does not.';
}

function missingMessage(message: string): string {
  if (message.startsWith('Missing closing')) return UNCLOSED_QUOTE_MESSAGE;
  if (message.includes('must end with a')) return 'A closing bracket is missing here.';
  if (message.startsWith('Missing , or :')) return 'A comma or a colon is missing here.';
  if (message.startsWith('Missing ,')) return 'A comma is missing here.';
  if (message.startsWith('Missing space after :')) return 'A space is missing after this colon.';
  if (message.startsWith('Implicit map keys')) return 'A colon and a value are missing after this.';
  if (message.startsWith('Comments must')) return 'A space is missing before this #.';
  if (message.startsWith('Tags and anchors')) return 'A space is missing after this anchor or tag.';
  if (message.startsWith('Sequence item')) return 'A dash is missing before this item of the list.';
  if (message.includes('directives-end'))
    return 'A line that starts with % is a directive, and needs a line --- after it.';
  return 'Something is missing here.';
}

function unexpectedMessage(message: string): string {
  if (message.includes('Unexpected , in')) return 'Nothing stands before this comma.';
  if (message.includes('Unexpected empty item')) return 'Nothing stands between these commas.';
  if (message.includes('same line with key')) return 'A list starts on a line of its own, below its key.';
  if (message.startsWith('Block scalar header')) return 'Nothing but a comment can stand on the line after | or >.';
  if (message.includes('Unexpected flow-seq-end') || message.includes('Unexpected flow-map-end')) {
    return 'This bracket closes nothing.';
  }
  return "This can't stand here: a quote, a comma or a colon may be missing before it.";
}
