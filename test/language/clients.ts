import type { ClientCapabilities } from 'vscode-languageserver-protocol';
import type { ClientAbilities } from '../../server/src/editor/client-abilities.ts';
import { abilitiesOf } from '../../server/src/editor/client-abilities.ts';

/** What a client announces, in short, as the server understands it. */
export function client(capabilities: ClientCapabilities, initializationOptions?: unknown): ClientAbilities {
  return abilitiesOf({ processId: null, rootUri: null, capabilities, initializationOptions });
}

const MARKDOWN: ClientCapabilities = { textDocument: { hover: { contentFormat: ['markdown', 'plaintext'] } } };

/** Shows Markdown, and no pictures. */
export const CHARACTERS = client(MARKDOWN);
/** Shows Markdown with pictures in it, on a dark background. */
export const PICTURES = client(MARKDOWN, { pictures: true, theme: 'dark' });
/** Shows text, and nothing else. */
export const PLAIN = client({});
/** Has the pages of the reference at hand. */
export const WITH_REFERENCE = client(MARKDOWN, { referenceFolder: 'file:///reference/' });
