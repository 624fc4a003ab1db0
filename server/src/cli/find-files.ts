import { type Dirent, existsSync, readdirSync, readFileSync, realpathSync, statSync } from 'node:fs';
import { dirname, join, relative, resolve, sep } from 'node:path';
import ignore from 'ignore';
import { reasonOf } from '../server-read-file.ts';

/** The endings of rig files. */
const RIG_FILE = /\.rig\.(?:yaml|yml|json)$/;

/** Folders that never hold rigs of one's own. */
const PASSED_OVER = new Set(['.git', 'node_modules']);

/** As Git has it: names that differ in case alone are one where the file system takes them for one. */
const IGNORES_CASE = process.platform === 'win32' || process.platform === 'darwin';

/** What is said where nothing is found. */
export const NO_FILES = 'no rig files here (*.rig.yaml, *.rig.yml, *.rig.json)';

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
 * every `.gitignore` in it, below it, and above it as far as its repository reaches. A folder that is ignored itself
 * but given by name is searched all the same. Sorted within each path given, each file once.
 */
export function findFiles(paths: readonly string[], cwd: string): FoundFiles {
  const files = new Map<string, string>();
  const add = (name: string): void => {
    const full = resolve(cwd, name);
    if (!files.has(full)) files.set(full, name);
  };
  const faults: { path: string; reason: string }[] = [];
  for (const path of paths) {
    const full = resolve(cwd, path);
    try {
      if (statSync(full).isDirectory()) {
        const unread: { path: string; reason: string }[] = [];
        for (const file of searched(full, rulesAbove(full), new Set(), unread)) add(named(file, path, full));
        for (const { path: inside, reason } of unread) faults.push({ path: named(inside, path, full), reason });
      } else add(path);
    } catch (fault) {
      faults.push({ path, reason: reasonOf(fault) });
    }
  }
  return { files: [...files.values()], faults };
}

function named(file: string, given: string, folder: string): string {
  return join(given, relative(folder, file));
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
      rules: ignore({ ignoreCase: IGNORES_CASE }).add(readFileSync(join(folder, '.gitignore'), 'utf8')),
    };
  } catch {
    return { folder, rules: ignore() };
  }
}

/** The rules of the folders above one, outermost first; none outside a repository. */
function rulesAbove(folder: string): readonly Ignoring[] {
  const above: string[] = [];
  for (let at = folder; !existsSync(join(at, '.git')); at = dirname(at)) {
    if (at === dirname(at)) return [];
    above.unshift(dirname(at));
  }
  const ignoring = above.map(rulesOf);
  return isIgnored(folder, true, ignoring) ? [] : ignoring;
}

/** The innermost rules that say something of a path decide. */
function isIgnored(path: string, isFolder: boolean, ignoring: readonly Ignoring[]): boolean {
  for (const { folder, rules } of [...ignoring].reverse()) {
    const inside = relative(folder, path).split(sep).join('/');
    const { ignored, unignored } = rules.test(isFolder ? `${inside}/` : inside);
    if (ignored || unignored) return ignored;
  }
  return false;
}

function leadsToFolder(path: string): boolean {
  try {
    return statSync(path).isDirectory();
  } catch {
    return false;
  }
}
