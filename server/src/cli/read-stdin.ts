import { fstatSync } from 'node:fs';
import type { Readable } from 'node:stream';
import { MOST_BYTES } from '../server-read-file.ts';

/**
 * Everything on this process's standard input, as bytes.
 *
 * @throws what the operating system says when it can't be read
 */
export async function readStdin(): Promise<Uint8Array> {
  // Node takes a folder (`ratewright check - < folder`) for a stream that has ended.
  if (fstatSync(0).isDirectory()) throw Object.assign(new Error('a folder'), { code: 'EISDIR' });
  return readStream(process.stdin);
}

/**
 * Everything that a stream brings, as bytes. Past the size of any rig file no more is taken, so that what has no end
 * ends here; the part taken is then too large, and is told to be when it is decoded.
 */
export async function readStream(stream: Readable): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  let length = 0;
  for await (const part of stream as AsyncIterable<Uint8Array>) {
    parts.push(part);
    length += part.length;
    if (length > MOST_BYTES) break;
  }
  return Buffer.concat(parts);
}
