import { CHECK_NAMES } from '../checks/list.ts';
import { type Environment, readEnvironment } from '../rig/environment.ts';
import { exportsOf } from '../rig/exports.ts';
import { namePlace } from '../rig/fields.ts';
import { MOST_CHARACTERS, MOST_USED_FILES } from '../rig/limits.ts';
import type { PlacedProblem } from '../rig/placed-problem.ts';
import type { ProblemName } from '../rig/problem.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import { NO_USED_FILES, type UsedFile, type UsedFiles } from '../rig/used-things.ts';
import { usedPaths, usesEntryOf } from '../rig/uses.ts';
import { groupsFrom, reachedFrom, shortestWay } from './circles.ts';
import type { ReadText, UsedText } from './evaluation.ts';
import { fileNameOf, uriOfPath } from './uris.ts';

/** Why there is no text to read. */
export interface Unreadable {
  readonly name: ProblemName;
  /** To be said of the file: `does not exist`. */
  readonly fault: string;
}

export const TOO_LARGE: Unreadable = {
  name: 'too-much',
  fault: `is larger than the ${MOST_CHARACTERS.toLocaleString('en')} characters that are read`,
};

/** The files that are known, by their canonical URIs. */
export interface KnownFiles {
  /** `undefined` for one that nobody has told of. */
  contentOf(uri: string): Snapshot | Unreadable | undefined;
  /** What was last read of a file, if it was. */
  readOf(uri: string): ReadText | undefined;
  keepRead(uri: string, read: ReadText): void;
  /** The URI as whoever told of the file wrote it. */
  uriOf(uri: string): string;
}

/** Where the paths of a text's `uses` lead, as canonical URIs; `undefined` for those of a text that lies in no folder. */
type Targets = ReadonlyMap<string, string | undefined>;

const NO_TARGETS: Targets = new Map();
const targetsBySnapshot = new WeakMap<Snapshot, Targets>();

/** Every file that a file uses, however many lie between; itself first. At most as many as are read, and one. */
export function filesReached(root: string, files: KnownFiles): ReadonlySet<string> {
  return reachedFrom(root, (uri) => nextOf(uri, files), MOST_USED_FILES + 1);
}

/**
 * Reads a file but for its channels, and before it every file that it uses. What has been read before is kept where
 * nothing that it depends on has changed, object by object.
 *
 * Files that use each other in a circle are not joined to one another: what they offer would otherwise depend on where
 * one begins to read.
 */
export function readLinked(root: string, files: KnownFiles): ReadText | undefined {
  const reached = filesReached(root, files);
  const within = (uri: string): string[] => [...nextOf(uri, files)].filter((next) => reached.has(next));
  for (const group of groupsFrom(root, within)) {
    const circle = new Set(group);
    for (const uri of group) {
      const snapshot = snapshotOf(uri, files);
      if (snapshot) readOne(uri, snapshot, usedFilesOf(uri, snapshot, circle, reached, files), files);
    }
  }
  const read = files.readOf(root);
  if (!read || read.snapshot !== snapshotOf(root, files)) return undefined;
  const usedTexts = textsOf([...reached].slice(1), files);
  if (sameTexts(read.usedTexts, usedTexts)) return read;
  const fresh = { ...read, usedTexts };
  files.keepRead(root, fresh);
  return fresh;
}

function readOne(uri: string, snapshot: Snapshot, fresh: UsedFiles, files: KnownFiles): void {
  const before = files.readOf(uri);
  const used = before && isSameUsed(before.environment.core.used, fresh) ? before.environment.core.used : fresh;
  if (before?.snapshot === snapshot && before.environment.core.used === used) return;
  const environment: Environment = readEnvironment(snapshot, CHECK_NAMES, before?.environment, used);
  files.keepRead(uri, { snapshot, environment, usedTexts: before?.usedTexts ?? [] });
}

function snapshotOf(uri: string, files: KnownFiles): Snapshot | undefined {
  const content = files.contentOf(uri);
  return content && 'fault' in content ? undefined : content;
}

function targetsOf(uri: string, snapshot: Snapshot): Targets {
  const known = targetsBySnapshot.get(snapshot);
  if (known) return known;
  const paths = usedPaths(snapshot);
  const targets = paths.length === 0 ? NO_TARGETS : new Map(paths.map((path) => [path, uriOfPath(uri, path)]));
  targetsBySnapshot.set(snapshot, targets);
  return targets;
}

function* nextOf(uri: string, files: KnownFiles): Generator<string> {
  const snapshot = snapshotOf(uri, files);
  if (!snapshot) return;
  for (const target of targetsOf(uri, snapshot).values()) if (target !== undefined) yield target;
}

function usedFilesOf(
  uri: string,
  snapshot: Snapshot,
  circle: ReadonlySet<string>,
  reached: ReadonlySet<string>,
  files: KnownFiles,
): UsedFiles {
  const targets = targetsOf(uri, snapshot);
  if (targets.size === 0) return NO_USED_FILES;
  const used = new Map<string, UsedFile>();
  for (const [path, target] of targets) used.set(path, usedFile(uri, target, circle, reached, files));
  return used;
}

function usedFile(
  uri: string,
  target: string | undefined,
  circle: ReadonlySet<string>,
  reached: ReadonlySet<string>,
  files: KnownFiles,
): UsedFile {
  if (target === undefined) return fault('unknown-name', "can't be found as long as this file has not been saved");
  if (target === uri) return fault('wrong-kind', 'is this file itself');
  if (circle.has(target)) return circleFault(uri, target, circle, files);
  if (!reached.has(target)) {
    const most = MOST_USED_FILES.toLocaleString('en');
    return fault('too-much', `is not read, because more than ${most} files would have to be`);
  }
  const content = files.contentOf(target);
  if (!content) return { kind: 'unread' };
  if ('fault' in content) return fault(content.name, content.fault);
  if (content.length > MOST_CHARACTERS) return fault(TOO_LARGE.name, TOO_LARGE.fault);
  const read = files.readOf(target);
  return read ? { kind: 'read', exports: exportsOf(read.environment.core) } : { kind: 'unread' };
}

function circleFault(uri: string, target: string, circle: ReadonlySet<string>, files: KnownFiles): UsedFile {
  const way = shortestWay(target, uri, (from) => [...nextOf(from, files)].filter((next) => circle.has(next)));
  const names = [...way, target].map((one) => `\`${fileNameOf(one)}\``).join(', which uses ');
  const last = way.at(-2);
  const entry = last === undefined ? undefined : usesEntryOf(snapshotOf(last, files));
  const related = entry ? [{ place: namePlace(entry), message: 'The circle is closed here.' }] : [];
  return fault('wrong-kind', `is used in a circle, and files in a circle are not joined (${names})`, related);
}

function fault(name: ProblemName, what: string, related: PlacedProblem['related'] = []): UsedFile {
  return { kind: 'fault', name, fault: what, related };
}

function isSameUsed(before: UsedFiles, after: UsedFiles): boolean {
  if (before === after) return true;
  if (before.size !== after.size) return false;
  for (const [path, file] of after) {
    const old = before.get(path);
    if (!old || !isSameFile(old, file)) return false;
  }
  return true;
}

function isSameFile(a: UsedFile, b: UsedFile): boolean {
  if (a.kind === 'read') return b.kind === 'read' && a.exports === b.exports;
  if (a.kind === 'unread') return b.kind === 'unread';
  if (b.kind !== 'fault' || a.name !== b.name || a.fault !== b.fault || a.related.length !== b.related.length)
    return false;
  return a.related.every(({ place }, index) => place.entry === b.related[index]?.place.entry);
}

function textsOf(uris: readonly string[], files: KnownFiles): readonly UsedText[] {
  return uris.flatMap((uri) => {
    const snapshot = snapshotOf(uri, files);
    return snapshot ? [{ uri: files.uriOf(uri), snapshot }] : [];
  });
}

function sameTexts(a: readonly UsedText[], b: readonly UsedText[]): boolean {
  return (
    a.length === b.length &&
    a.every(({ uri, snapshot }, index) => uri === b[index]?.uri && snapshot === b[index].snapshot)
  );
}
