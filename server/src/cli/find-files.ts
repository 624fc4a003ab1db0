import { type Dirent, readdirSync, readFileSync, realpathSync, statSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import ignore from 'ignore';
import { reasonOf } from './read-file.ts';

/** The endings of rig files. */
const RIG_FILE = /\.rig\.(?:yaml|yml|json)$/;

/** Folders that never hold rigs of one's own. */
const PASSED_OVER = new Set(['.git', 'node_modules']);

export interface FoundFiles {
  /** As they are to be named in reports: relative where the path given was. */
  readonly files: readonly string[];
  readonly faults: readonly {
    readonly path: string;
    readonly reason: string;
  }[];
}

interface Ignoring {
  readonly folder: string;
  readonly rules: ReturnType<typeof ignore>;
}

/**
 * The rig files behind some paths: a file is taken whatever its name, a folder is searched for rig files, honouring
 * `.gitignore` in it and below. Sorted within each path given, each file once.
 */
export function findFiles(paths: readonly string[], cwd: string): FoundFiles {
  const files = new Set<string>();
  const faults: { path: string; reason: string }[] = [];
  for (const path of paths) {
    const full = join(cwd, relative(cwd, path.startsWith(sep) ? path : join(cwd, path)));
    try {
      if (statSync(full).isDirectory()) {
        for (const file of searched(full, [], new Set(), faults)) files.add(named(file, path, full));
      } else files.add(path);
    } catch (fault) {
      faults.push({ path, reason: reasonOf(fault) });
    }
  }
  return { files: [...files], faults };
}

function named(file: string, given: string, folder: string): string {
  const inside = relative(folder, file);
  return given === '.' ? inside : join(given, inside);
}

function searched(
  folder: string,
  above: readonly Ignoring[],
  visited: Set<string>,
  faults: { path: string; reason: string }[],
): string[] {
  let items: Dirent[];
  try {
    // A link may lead back to a folder above: each real folder is entered once.
    const real = realpathSync(folder);
    if (visited.has(real)) return [];
    visited.add(real);
    items = readdirSync(folder, { withFileTypes: true });
  } catch (fault) {
    faults.push({ path: folder, reason: reasonOf(fault) });
    return [];
  }
  const ignoring = items.some((item) => item.name === '.gitignore') ? [...above, rulesOf(folder)] : above;
  return items
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((item) => {
      const path = join(folder, item.name);
      const isFolder = item.isDirectory() || (item.isSymbolicLink() && leadsToFolder(path));
      if (PASSED_OVER.has(item.name) || isIgnored(path, isFolder, ignoring)) return [];
      if (isFolder) return searched(path, ignoring, visited, faults);
      return RIG_FILE.test(item.name) ? [path] : [];
    });
}

function rulesOf(folder: string): Ignoring {
  try {
    return {
      folder,
      rules: ignore().add(readFileSync(join(folder, '.gitignore'), 'utf8')),
    };
  } catch {
    return { folder, rules: ignore() };
  }
}

function isIgnored(path: string, isFolder: boolean, ignoring: readonly Ignoring[]): boolean {
  return ignoring.some(({ folder, rules }) => {
    const inside = relative(folder, path).split(sep).join('/');
    return rules.ignores(isFolder ? `${inside}/` : inside);
  });
}

function leadsToFolder(path: string): boolean {
  try {
    return statSync(path).isDirectory();
  } catch {
    return false;
  }
}
