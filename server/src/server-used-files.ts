import { realpathSync } from 'node:fs';
import { isAbsolute, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { readText, TOO_LARGE } from './server-read-file.ts';
import type { FileContent, Workbench } from './workbench/workbench.ts';

/** The folders whose files may be read, and what is said of a file that lies in none of them. */
export interface ReadableFolders {
  readonly paths: readonly string[];
  readonly outside: string;
}

/** Tells a workbench of all files that its files use and that it was never told of. */
export function readWantedFiles(workbench: Workbench, folders: () => ReadableFolders): void {
  for (;;) {
    const wanted = workbench.filesWanted();
    if (wanted.length === 0) return;
    const readable = folders();
    for (const uri of wanted) workbench.setFile(uri, readUsedFile(uri, readable));
  }
}

/**
 * What a used file holds. One outside the folders is not even looked at, and neither is one that a link inside them
 * leads out to: a rig file that somebody was sent must not have files read that are no business of it.
 */
export function readUsedFile(uri: string, { paths, outside }: ReadableFolders): FileContent {
  const path = pathOf(uri);
  if (path === undefined) return { unread: "can't be read from here" };
  if (!isInOneOf(path, paths)) return { unread: outside };
  const real = realPath(path);
  if (real !== undefined && !isInOneOf(real, [...paths, ...paths.flatMap((one) => realPath(one) ?? [])]))
    return { unread: outside };
  const read = readText(path);
  if (!('fault' in read)) return { text: read.text };
  return read.fault === TOO_LARGE ? 'too-large' : { unread: read.fault };
}

/** The path of a file's URI; `undefined` where it is none of a file on this machine. */
export function pathOf(uri: string): string | undefined {
  try {
    return fileURLToPath(uri);
  } catch {
    return undefined;
  }
}

/** Whether a path is one of the folders or below it. */
export function isInOneOf(path: string, folders: readonly string[]): boolean {
  return folders.some((folder) => {
    const inside = relative(folder, path);
    return inside !== '..' && !inside.startsWith(`..${sep}`) && !isAbsolute(inside);
  });
}

function realPath(path: string): string | undefined {
  try {
    return realpathSync(path);
  } catch {
    return undefined;
  }
}
