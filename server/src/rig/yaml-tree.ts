import type { Problem } from './problem.ts';
import type { YamlReading } from './yaml-reading.ts';
import { readDirectly } from './yaml-tree-direct.ts';
import { composeYaml } from './yaml-tree-library.ts';
import { UNCLOSED_QUOTE_MESSAGE } from './yaml-tree-messages.ts';

/** Up to this length a text is read by the library once more to see what it says without an open quote. */
const MOST_READ_TWICE = 10_000;

/** Reads one YAML document. Never throws: what can't be read is an empty node and a problem. */
export function readYaml(text: string): YamlReading {
  const root = readDirectly(text);
  if (root) return { root, problems: [] };
  const reading = composeYaml(text);
  const openQuote = reading.problems.find(({ message }) => message === UNCLOSED_QUOTE_MESSAGE);
  return (openQuote && withoutQuote(text, openQuote)) ?? reading;
}

/**
 * A quote that is never closed swallows all that follows. If the text makes sense without it, then that is what it
 * says, and the quote all that is wrong.
 */
function withoutQuote(text: string, openQuote: Problem): YamlReading | undefined {
  const mended = `${text.slice(0, openQuote.start)} ${text.slice(openQuote.start + 1)}`;
  const root = readDirectly(mended);
  if (root) return { root, problems: [openQuote] };
  if (text.length > MOST_READ_TWICE) return undefined;
  const reading = composeYaml(mended);
  return reading.problems.length === 0 ? { root: reading.root, problems: [openQuote] } : undefined;
}
