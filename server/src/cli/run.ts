import { nearest } from '../quantity/spelling.ts';
import { check } from './check.ts';
import type { Command } from './command.ts';
import { explain } from './explain.ts';
import { fix } from './fix.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { HelpWanted, UsageError } from './io.ts';
import { map } from './map.ts';
import { rates } from './rates.ts';
import { serve } from './serve.ts';

const COMMANDS: readonly Command[] = [check, fix, map, rates, explain, serve];

const HELP = `Usage: ratewright COMMAND ...

Reads the sampling set-up of a test rig and says where everything the sensors hear
folds to, before it spoils a record.

${COMMANDS.map(({ name, summary }) => `  ${name.padEnd(9)} ${summary}`).join('\n')}

  -h, --help      this, or a command's own help
  -V, --version   the version
`;

/**
 * Runs the command line.
 *
 * @param argv the words after the program's name
 * @param version what `--version` says
 */
export async function run(argv: readonly string[], io: CommandIo, version: string): Promise<ExitCode> {
  const [first, ...rest] = argv;
  if (first === '-V' || first === '--version') {
    io.stdout(`ratewright ${version}\n`);
    return 0;
  }
  if (first === '-h' || first === '--help' || first === 'help') {
    io.stdout(COMMANDS.find(({ name }) => name === rest[0])?.help ?? HELP);
    return 0;
  }
  if (first === undefined) {
    io.stderr(HELP);
    return 2;
  }
  const command = COMMANDS.find(({ name }) => name === first);
  if (!command) {
    const near = nearest(
      first,
      COMMANDS.map(({ name }) => name),
    );
    io.stderr(`ratewright: there is no command '${first}'${near === undefined ? '' : `; the nearest is '${near}'`}\n`);
    return 2;
  }
  try {
    return await command.run(rest, io);
  } catch (fault) {
    if (fault instanceof HelpWanted) {
      io.stdout(command.help);
      return 0;
    }
    if (!(fault instanceof UsageError)) throw fault;
    io.stderr(`ratewright ${command.name}: ${fault.message}\nTry 'ratewright ${command.name} --help'.\n`);
    return 2;
  }
}
