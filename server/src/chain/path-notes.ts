import type { SignalPath } from './model.ts';

/** Something worth keeping about a signal path: `most` of a kind are kept for each. */
export interface NoteKind<Note> {
  readonly name: string;
  readonly most: number;
  /** Only tells the compiler what a note of this kind is. */
  readonly example?: Note;
}

interface Notes {
  readonly items: unknown[];
  next: number;
}

/**
 * What has been worked out for paths that many channels share. A path is never changed, so what is kept can't go out
 * of date: keeping it changes how fast an answer comes, never the answer. Paths that are not shared keep nothing, and
 * one that is shared no longer is told to forget, so that the memory stays bounded.
 */
const notebooks = new WeakMap<SignalPath, Map<string, Notes>>();

/** Begins to keep notes on a path. */
export function keepNotes(path: SignalPath): void {
  notebooks.set(path, new Map());
}

/** Forgets what was noted on a path, and keeps no more. */
export function forgetNotes(path: SignalPath): void {
  notebooks.delete(path);
}

const NOTHING: readonly never[] = [];

/** The notes of one kind on a path. */
export function notesOn<Note>(path: SignalPath, kind: NoteKind<Note>): readonly Note[] {
  return (notebooks.get(path)?.get(kind.name)?.items as Note[] | undefined) ?? NOTHING;
}

/** Notes something on a path that keeps notes; past the most of its kind, in place of the oldest. */
export function note<Note>(path: SignalPath, kind: NoteKind<Note>, item: Note): Note {
  const notebook = notebooks.get(path);
  if (!notebook) return item;
  const notes = notebook.get(kind.name);
  if (!notes) {
    notebook.set(kind.name, { items: [item], next: 0 });
  } else if (notes.items.length < kind.most) {
    notes.items.push(item);
  } else {
    notes.items[notes.next] = item;
    notes.next = (notes.next + 1) % kind.most;
  }
  return item;
}
