import { ratesText } from '../report/rates-text.ts';
import { ratesAround } from '../workbench/rates.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { UsageError } from './io.ts';
import { newWorkbench, openRig } from './open-rig.ts';
import { paintFor, parseOptions } from './options.ts';
import { channelOf } from './pick-channel.ts';

export const rates: Command = {
  name: 'rates',
  summary: 'list the rates that a channel could be sampled at',
  help: `Usage: ratewright rates FILE CHANNEL

Lists the rates around the channel's band that its digitizer can make, each with its
margin and with what the channel would then be found to have. FILE may be -.

  --stdin-filename NAME     what to call standard input (stdin.rig.yaml)
  -o, --output FILE         write the list to FILE
  --color auto|always|never
`,
  run: runRates,
};

async function runRates(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, { 'stdin-filename': { type: 'string' } });
  const [path, name, ...rest] = options.words;
  if (path === undefined || name === undefined || rest.length > 0)
    throw new UsageError('rates takes a FILE and a CHANNEL');
  const rig = await openRig(newWorkbench(io), path, io, options.text('stdin-filename') ?? 'stdin.rig.yaml');
  if ('fault' in rig) {
    io.stderr(`ratewright: ${rig.path} ${rig.fault}\n`);
    return 2;
  }
  const judged = channelOf(rig.evaluation, name, rig.path, io);
  if (!judged) return 2;
  const found = ratesAround(judged, rig.evaluation);
  if (found.length === 0) {
    io.stderr(`ratewright: ${name} has no band to choose a rate for, or no rate can be made for it\n`);
    return 2;
  }
  return deliver(ratesText(judged, found, paintFor(options, io)), options, io);
}
