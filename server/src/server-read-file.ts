import { closeSync, constants, fstatSync, openSync, readFileSync } from 'node:fs';
import { MOST_CHARACTERS } from './rig/limits.ts';

/** A file's text without the byte order mark that it may begin with (and the mark, or nothing), or why it can't be had. */
export type ReadText =
  | { readonly text: string; readonly byteOrderMark: '' | typeof BYTE_ORDER_MARK }
  | { readonly fault: string };

/** Where bytes have an order it tells which; in UTF-8 it tells nothing, and editors neither show nor count it. */
const BYTE_ORDER_MARK = '\ufeff';

/** UTF-8 takes at most three bytes for one UTF-16 unit: a file of more bytes than this is over the limit for sure. */
export const MOST_BYTES = MOST_CHARACTERS * 3;

/** What is said of a file that is too large. */
export const TOO_LARGE = `is larger than the ${MOST_CHARACTERS.toLocaleString('en')} characters that are read`;

/** Where pipes can stand among files, opening one waits for its other end unless told not to. */
const READ_WITHOUT_WAITING = constants.O_RDONLY | (constants.O_NONBLOCK ?? 0);

/** Reads a file as UTF-8. Never throws: a folder, a device, wrong bytes and the like come back as a fault. */
export function readText(path: string): ReadText {
  let descriptor: number | undefined;
  try {
    descriptor = openSync(path, READ_WITHOUT_WAITING);
    const status = fstatSync(descriptor);
    if (status.isDirectory()) return { fault: 'is a folder' };
    if (!status.isFile()) return { fault: 'is not a regular file' };
    if (status.size > MOST_BYTES) return { fault: TOO_LARGE };
    return decode(readFileSync(descriptor));
  } catch (fault) {
    return { fault: reasonOf(fault) };
  } finally {
    if (descriptor !== undefined) closeSync(descriptor);
  }
}

/** Bytes as UTF-8 text; too many are a fault, and so are wrong ones: it says where they begin, from 0. */
export function decode(bytes: Uint8Array): ReadText {
  if (bytes.length > MOST_BYTES) return { fault: TOO_LARGE };
  try {
    const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
    return text.startsWith(BYTE_ORDER_MARK)
      ? { text: text.slice(1), byteOrderMark: BYTE_ORDER_MARK }
      : { text, byteOrderMark: '' };
  } catch {
    return { fault: `is not UTF-8 text: the bytes from ${firstWrongByte(bytes)} on are no character` };
  }
}

/** Where the first byte stands that is no character and does not begin one. */
function firstWrongByte(bytes: Uint8Array): number {
  const holds = (end: number, mayBreakOff: boolean): boolean => {
    try {
      new TextDecoder('utf-8', { fatal: true }).decode(bytes.subarray(0, end), { stream: mayBreakOff });
      return true;
    } catch {
      return false;
    }
  };
  let good = 0;
  let bad = bytes.length;
  while (bad - good > 1) {
    const middle = Math.floor((good + bad) / 2);
    if (holds(middle, true)) good = middle;
    else bad = middle;
  }
  // What could still have become a character began at most three bytes before.
  while (!holds(good, false)) good--;
  return good;
}

/** What the operating system said, in words, of what could not be read or written. */
export function reasonOf(fault: unknown, done: 'read' | 'written' = 'read'): string {
  const code = fault instanceof Error && 'code' in fault ? String(fault.code) : '';
  switch (code) {
    case 'ENOENT':
    case 'ENOTDIR':
      return done === 'read' ? 'does not exist' : "can't be written: its folder does not exist";
    case 'EACCES':
    case 'EPERM':
      return `may not be ${done}`;
    case 'ELOOP':
      return 'is a link that leads to itself';
    case 'EISDIR':
      return 'is a folder';
    default:
      return fault instanceof Error ? `can't be ${done}: ${fault.message}` : `can't be ${done}`;
  }
}
