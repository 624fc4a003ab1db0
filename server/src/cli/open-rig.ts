import { dirname, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import type { ReadText } from '../server-read-file.ts';
import { decode, readText, reasonOf } from '../server-read-file.ts';
import { readWantedFiles } from '../server-used-files.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { Workbench } from '../workbench/workbench.ts';
import type { CommandIo } from './io.ts';

/** A rig file as read and evaluated, or why it was not. */
export type OpenedRig =
  | {
      readonly path: string;
      readonly uri: string;
      /** Without the byte order mark, which is to be written back before it. */
      readonly text: string;
      readonly byteOrderMark: string;
      readonly evaluation: Evaluation;
    }
  | { readonly path: string; readonly fault: string };

/** A workbench whose own faults go to standard error. */
export function newWorkbench(io: CommandIo): Workbench {
  return new Workbench(
    (message) => io.stderr(`ratewright: ${message}\n`),
    () => io.today,
  );
}

const OUTSIDE = 'is not read, because it lies outside the folder here and those that are given';

/**
 * Reads a file, or standard input where the path is `-`, and what it uses, and has the workbench evaluate it. Files that
 * it uses are read from the folder here, the file's own, and those given.
 *
 * @param given paths of the command line: the folders among them may be read
 */
export async function openRig(
  workbench: Workbench,
  path: string,
  io: CommandIo,
  stdinName: string,
  given: readonly string[] = [],
): Promise<OpenedRig> {
  const shown = path === '-' ? stdinName : path;
  const read: ReadText = path === '-' ? await readStdin(io) : readText(resolve(io.cwd, path));
  if ('fault' in read) return { path: shown, fault: read.fault };
  const uri = pathToFileURL(resolve(io.cwd, shown)).href;
  const { text, byteOrderMark } = read;
  workbench.openFile(uri, text);
  const folders = [io.cwd, dirname(resolve(io.cwd, shown)), ...given.map((one) => resolve(io.cwd, one))];
  readWantedFiles(workbench, () => ({ paths: folders, outside: OUTSIDE }));
  const evaluation = workbench.evaluation(uri);
  return evaluation ? { path: shown, uri, text, byteOrderMark, evaluation } : { path: shown, fault: "can't be read" };
}

async function readStdin(io: CommandIo): Promise<ReadText> {
  try {
    return decode(await io.readStdin());
  } catch (fault) {
    return { fault: reasonOf(fault) };
  }
}
