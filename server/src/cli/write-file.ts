import { randomBytes } from 'node:crypto';
import {
  closeSync,
  fchmodSync,
  fchownSync,
  fsyncSync,
  openSync,
  realpathSync,
  renameSync,
  rmSync,
  type Stats,
  statSync,
  writeSync,
} from 'node:fs';
import { dirname, join } from 'node:path';

/**
 * Replaces a file's text so that whoever looks sees the old text or the new one, whole: it is written beside the file
 * and then renamed over it. A link is followed, and the file's permissions stay, as does its owner
 * where we may see to it.
 *
 * @throws what the operating system says when it can't be done; the file is then as it was
 */
export function replaceFile(path: string, text: string): void {
  const target = existing(path);
  const beside = join(dirname(target), `.ratewright-${randomBytes(6).toString('hex')}`);
  const before = statSync(target, { throwIfNoEntry: false });
  try {
    const descriptor = openSync(beside, 'wx');
    try {
      if (before) keepRights(descriptor, before);
      const bytes = Buffer.from(text, 'utf8');
      for (let written = 0; written < bytes.length; ) written += writeSync(descriptor, bytes, written);
      fsyncSync(descriptor);
    } finally {
      closeSync(descriptor);
    }
    renameSync(beside, target);
  } catch (fault) {
    rmSync(beside, { force: true });
    throw fault;
  }
}

function existing(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    return path;
  }
}

function keepRights(descriptor: number, { uid, gid, mode }: Stats): void {
  try {
    fchownSync(descriptor, uid, gid);
  } catch {
    // Only who runs the machine may give a file away: it then belongs to whoever wrote it.
  }
  fchmodSync(descriptor, mode & 0o7777);
}
