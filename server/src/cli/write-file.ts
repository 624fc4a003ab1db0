import { randomBytes } from 'node:crypto';
import { closeSync, fsyncSync, openSync, realpathSync, renameSync, rmSync, statSync, writeSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';

/**
 * Replaces a file's text so that whoever looks sees the old text or the new one, whole: it is written beside the file
 * and then renamed over it. A link is followed, and the file's permissions stay.
 *
 * @throws what the operating system says when it can't be done; the file is then as it was
 */
export function replaceFile(path: string, text: string): void {
  const target = existing(path);
  const beside = join(dirname(target), `.${basename(target)}.${randomBytes(6).toString('hex')}`);
  const mode = modeOf(target);
  try {
    const descriptor = openSync(beside, 'wx', mode);
    try {
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

function modeOf(path: string): number {
  try {
    return statSync(path).mode & 0o7777;
  } catch {
    return 0o644;
  }
}
