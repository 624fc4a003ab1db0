import { nearest } from '../quantity/spelling.ts';
import { printable } from '../report/printable.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import { channelNamed } from '../workbench/workbench.ts';
import type { CommandIo } from './io.ts';

/** The channel that was named, or `undefined` after saying which name may have been meant. */
export function channelOf(
  evaluation: Evaluation,
  name: string,
  path: string,
  io: CommandIo,
): JudgedChannel | undefined {
  const judged = channelNamed(evaluation, name);
  if (judged) return judged;
  const near = nearest(
    name,
    evaluation.channels.map(({ result }) => result.channel.name),
  );
  const meant = near === undefined ? '' : `; the nearest is '${printable(near)}'`;
  io.stderr(`ratewright: ${path} has no channel '${name}'${meant}\n`);
  return undefined;
}
