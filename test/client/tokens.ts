import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { createOnigScanner, createOnigString, loadWASM } from 'vscode-oniguruma';
import textmate, { type IGrammar } from 'vscode-textmate';

const root = new URL('../..', import.meta.url);

export const grammarText = readFileSync(new URL('syntaxes/rig.tmLanguage.json', root), 'utf8');

/** Loads the grammar as the editor does. */
export async function loadGrammar(): Promise<IGrammar> {
  const wasm = createRequire(import.meta.url).resolve('vscode-oniguruma/release/onig.wasm');
  await loadWASM(readFileSync(wasm).buffer as ArrayBuffer);
  const registry = new textmate.Registry({
    onigLib: Promise.resolve({ createOnigScanner, createOnigString }),
    loadGrammar: async () => textmate.parseRawGrammar(grammarText, 'rig.tmLanguage.json'),
  });
  const grammar = await registry.loadGrammar('source.rig');
  if (grammar === null) throw new Error('the grammar could not be read');
  return grammar;
}

/**
 * The tokens of a text that have a scope of their own, as `text|scope` with the shared `.rig` ending left out; plain
 * white space is skipped.
 */
export function tokensOf(grammar: IGrammar, text: string): string[] {
  const found: string[] = [];
  let state = textmate.INITIAL;
  for (const line of text.split('\n')) {
    const { tokens, ruleStack } = grammar.tokenizeLine(line, state);
    state = ruleStack;
    for (const token of tokens) {
      const piece = line.slice(token.startIndex, token.endIndex);
      if (piece.trim() === '') continue;
      found.push(
        `${piece}|${token.scopes
          .slice(1)
          .join(' ')
          .replace(/\.rig\b/g, '')}`,
      );
    }
  }
  return found;
}
