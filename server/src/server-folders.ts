import { dirname } from 'node:path';
import type { InitializeParams } from 'vscode-languageserver';
import { isInOneOf, pathOf, type ReadableFolders } from './server-used-files.ts';

const OUTSIDE = 'is not read, because it lies outside the folders that are open';

/** The URIs of the folders that a client has open when it connects. */
export function foldersOf({ workspaceFolders, rootUri }: InitializeParams): readonly string[] {
  if (workspaceFolders) return workspaceFolders.map(({ uri }) => uri);
  return rootUri ? [rootUri] : [];
}

/**
 * The folders whose files may be read on behalf of open documents: those that the client has open, and a document's own
 * where it lies in none of these.
 */
export function readableFrom(folders: readonly string[], documents: Iterable<string>): ReadableFolders {
  const paths = folders.flatMap((uri) => pathOf(uri) ?? []);
  const own = [...documents].flatMap((uri) => {
    const path = pathOf(uri);
    return path === undefined || isInOneOf(path, paths) ? [] : [dirname(path)];
  });
  return { paths: [...paths, ...own], outside: OUTSIDE };
}
