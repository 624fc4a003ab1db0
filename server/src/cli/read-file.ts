import { closeSync, fstatSync, openSync, readFileSync } from 'node:fs';
import { MOST_CHARACTERS } from '../rig/limits.ts';

/** A file's text, or why it can't be had. */
export type ReadText = { readonly text: string } | { readonly fault: string };

/** UTF-8 takes at most three bytes for one UTF-16 unit: a file of more bytes than this is over the limit for sure. */
const MOST_BYTES = MOST_CHARACTERS * 3;

/** Reads a file as UTF-8. Never throws: a folder, a device, wrong bytes and the like come back as a fault. */
export function readText(path: string): ReadText {
  let descriptor: number | undefined;
  try {
    descriptor = openSync(path, 'r');
    const status = fstatSync(descriptor);
    if (status.isDirectory()) return { fault: 'is a folder' };
    if (!status.isFile()) return { fault: 'is not a regular file' };
    if (status.size > MOST_BYTES)
      return {
        fault: `is larger than the ${MOST_CHARACTERS} characters that are read`,
      };
    return decode(readFileSync(descriptor));
  } catch (fault) {
    return { fault: reasonOf(fault) };
  } finally {
    if (descriptor !== undefined) closeSync(descriptor);
  }
}

/** Bytes as UTF-8 text; wrong bytes are a fault that says where they are. */
export function decode(bytes: Uint8Array): ReadText {
  try {
    return {
      text: new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes),
    };
  } catch {
    return {
      fault: `is not UTF-8 text: the bytes from ${firstWrongByte(bytes)} on are no character`,
    };
  }
}

function firstWrongByte(bytes: Uint8Array): number {
  let good = 0;
  let bad = bytes.length;
  const decoder = (end: number): boolean => {
    try {
      new TextDecoder('utf-8', { fatal: true }).decode(bytes.subarray(0, end), {
        stream: true,
      });
      return true;
    } catch {
      return false;
    }
  };
  while (bad - good > 1) {
    const middle = Math.floor((good + bad) / 2);
    if (decoder(middle)) good = middle;
    else bad = middle;
  }
  return good;
}

/** What the operating system said, in words. */
export function reasonOf(fault: unknown): string {
  const code = fault instanceof Error && 'code' in fault ? String(fault.code) : '';
  switch (code) {
    case 'ENOENT':
      return 'does not exist';
    case 'EACCES':
    case 'EPERM':
      return 'may not be read';
    case 'ELOOP':
      return 'is a link that leads to itself';
    case 'EISDIR':
      return 'is a folder';
    default:
      return fault instanceof Error ? `can't be read: ${fault.message}` : "can't be read";
  }
}
