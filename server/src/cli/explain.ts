import { nearest } from '../quantity/spelling.ts';
import { explainedNames, explanationOf, listOfNames } from '../report/explain.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { UsageError } from './io.ts';
import { parseOptions } from './options.ts';

export const explain: Command = {
  name: 'explain',
  summary: 'show the reference page of a check, a remedy, a practice or a key',
  help: `Usage: ratewright explain [NAME]

Shows what a check finds and why it matters, what a remedy does, what a practice asks
for, or what a key of the rig file means. Without a NAME it lists them all.

  -o, --output FILE         write the page to FILE
`,
  run: runExplain,
};

async function runExplain(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, {});
  const [name, ...rest] = options.words;
  if (rest.length > 0) throw new UsageError('explain takes one NAME');
  if (name === undefined) return deliver(listOfNames(), options, io);
  const page = explanationOf(name);
  if (page !== undefined) return deliver(page, options, io);
  const near = nearest(name, explainedNames());
  io.stderr(`ratewright: nothing is called '${name}'${near === undefined ? '' : `; the nearest is '${near}'`}\n`);
  return 2;
}
