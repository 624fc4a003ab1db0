import type { PositionRange } from '../rig/place.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import { editSnapshot, readSnapshot } from '../rig/snapshot.ts';
import type { Evaluation, ReadText } from './evaluation.ts';
import { filesReached, type KnownFiles, TOO_LARGE, type Unreadable } from './links.ts';
import { canonicalUri } from './uris.ts';

/** A change as an editor tells it: without a range it replaces the whole text. */
export interface TextChange {
  readonly range?: PositionRange;
  readonly text: string;
}

/** What a file was found to be; `unread` is why it can't be read, to be said of it: `is a folder`. */
export type FileContent = { readonly text: string } | 'missing' | 'too-large' | { readonly unread: string };

interface KnownFile {
  /** As it was told. */
  readonly uri: string;
  /** What an editor holds of it, saved or not: this counts before what the disk holds. */
  readonly buffer: Snapshot | undefined;
  readonly disk: Snapshot | Unreadable | undefined;
  /** False for a file that is here only because others use it, or because it is open. */
  readonly forItself: boolean;
  readonly read: ReadText | undefined;
  /** Of the text as it stands, or of one before it that the next evaluation can grow out of. */
  readonly evaluation: Evaluation | undefined;
}

const MISSING: Unreadable = { name: 'unknown-name', fault: 'does not exist' };

/** The files that a workbench was told of, in any spelling of their URIs. */
export class Files implements KnownFiles {
  readonly #files = new Map<string, KnownFile>();

  /** What the disk holds. */
  tell(uri: string, content: FileContent): void {
    const key = canonicalUri(uri);
    const known = this.#files.get(key);
    const forItself = known ? known.forItself : !this.#isUsed(key);
    this.#files.set(key, { ...(known ?? unknown(uri, forItself)), disk: contentAfter(known?.disk, content) });
  }

  /** Opens a file with the text that an editor holds. */
  open(uri: string, text: string): void {
    const key = canonicalUri(uri);
    const known = this.#files.get(key);
    // A file is mostly opened as it was read before: what was read of it then still holds.
    const before = known?.buffer ?? known?.disk;
    this.#files.set(key, { ...(known ?? unknown(uri, false)), uri, buffer: snapshotAfter(before, text) });
  }

  /** Applies changes one after the other, each to the text that the one before left. Unknown files are ignored. */
  edit(uri: string, changes: readonly TextChange[]): void {
    const key = canonicalUri(uri);
    const known = this.#files.get(key);
    if (!known) return;
    let snapshot = textOf(known);
    if (!snapshot) return;
    for (const change of changes) snapshot = changed(snapshot, change);
    this.#files.set(key, { ...known, ...(known.buffer ? { buffer: snapshot } : { disk: snapshot }) });
  }

  /** Closes an open file: from now on what the disk holds counts. */
  close(uri: string): void {
    const key = canonicalUri(uri);
    const known = this.#files.get(key);
    if (!known?.buffer) return;
    if (known.disk === undefined) this.#files.delete(key);
    else this.#files.set(key, { ...known, buffer: undefined });
  }

  forget(uri: string): void {
    this.#files.delete(canonicalUri(uri));
  }

  snapshotOf(uri: string): Snapshot | undefined {
    const known = this.#files.get(canonicalUri(uri));
    return known && textOf(known);
  }

  contentOf(key: string): Snapshot | Unreadable | undefined {
    const known = this.#files.get(key);
    return known?.buffer ?? known?.disk;
  }

  readOf(key: string): ReadText | undefined {
    return this.#files.get(key)?.read;
  }

  keepRead(key: string, read: ReadText): void {
    const known = this.#files.get(key);
    if (known) this.#files.set(key, { ...known, read });
  }

  evaluationOf(key: string): Evaluation | undefined {
    return this.#files.get(key)?.evaluation;
  }

  keepEvaluation(key: string, evaluation: Evaluation): void {
    const known = this.#files.get(key);
    if (known) this.#files.set(key, { ...known, evaluation });
  }

  /** The URI of a file as whoever told of it wrote it. */
  uriOf(key: string): string {
    return this.#files.get(key)?.uri ?? key;
  }

  /** Files that are used, and of which nobody has told yet. */
  wanted(): readonly string[] {
    const wanted = new Set<string>();
    for (const [root] of this.#roots()) {
      for (const key of filesReached(root, this)) if (!this.#files.has(key)) wanted.add(key);
    }
    return [...wanted];
  }

  /** Files that are known only because others use them. */
  used(): readonly string[] {
    return [...this.#files.values()].filter((file) => !isRoot(file)).map(({ uri }) => uri);
  }

  /** Files, of those that are more than used, that use a file, directly or through others. */
  usersOf(uri: string): readonly string[] {
    const key = canonicalUri(uri);
    return [...this.#roots()]
      .filter(([root]) => root !== key && filesReached(root, this).has(key))
      .map(([, file]) => file.uri);
  }

  /** Forgets files that were used and are no longer. */
  forgetUnused(): void {
    if (this.used().length === 0) return;
    const reached = new Set<string>();
    for (const [root] of this.#roots()) for (const key of filesReached(root, this)) reached.add(key);
    for (const key of [...this.#files.keys()]) if (!reached.has(key)) this.#files.delete(key);
  }

  #isUsed(key: string): boolean {
    for (const [root] of this.#roots()) if (filesReached(root, this).has(key)) return true;
    return false;
  }

  *#roots(): Generator<readonly [string, KnownFile]> {
    for (const [key, file] of this.#files) if (isRoot(file)) yield [key, file];
  }
}

function isRoot({ buffer, forItself }: KnownFile): boolean {
  return buffer !== undefined || forItself;
}

function unknown(uri: string, forItself: boolean): KnownFile {
  return { uri, buffer: undefined, disk: undefined, forItself, read: undefined, evaluation: undefined };
}

function textOf({ buffer, disk }: KnownFile): Snapshot | undefined {
  const content = buffer ?? disk;
  return content && 'fault' in content ? undefined : content;
}

function contentAfter(before: Snapshot | Unreadable | undefined, content: FileContent): Snapshot | Unreadable {
  if (content === 'missing') return MISSING;
  if (content === 'too-large') return TOO_LARGE;
  if ('unread' in content) return { name: 'unknown-name', fault: content.unread };
  return snapshotAfter(before, content.text);
}

/** The text as a snapshot that shares what it can with the one before. */
function snapshotAfter(before: Snapshot | Unreadable | undefined, text: string): Snapshot {
  if (!before || 'fault' in before) return readSnapshot(text);
  return before.text() === text ? before : changed(before, { text });
}

function changed(snapshot: Snapshot, change: TextChange): Snapshot {
  if (!change.range) return editSnapshot(snapshot, [{ start: 0, end: snapshot.length, text: change.text }]);
  const start = snapshot.offsetAt(change.range.start);
  const end = snapshot.offsetAt(change.range.end);
  return editSnapshot(snapshot, [{ start: Math.min(start, end), end: Math.max(start, end), text: change.text }]);
}
