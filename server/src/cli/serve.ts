import type { Command } from './command.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { UsageError } from './io.ts';
import { parseOptions } from './options.ts';

export const serve: Command = {
  name: 'serve',
  summary: 'run the language server on standard input and output',
  help: `Usage: ratewright serve [--stdio]

Runs the language server for any editor that speaks the protocol, on standard input
and output.
`,
  run: runServe,
};

async function runServe(argv: readonly string[], _io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, { stdio: { type: 'boolean' } });
  if (options.words.length > 0) throw new UsageError('serve takes no words besides --stdio');
  // Loaded only here, so that the other commands start without the protocol's libraries.
  const [{ createConnection, ProposedFeatures }, server] = await Promise.all([
    import('vscode-languageserver/node'),
    import('../server.ts'),
  ]);
  const connection = createConnection(ProposedFeatures.all, process.stdin, process.stdout);
  const ended = new Promise<ExitCode>((resolve) => connection.onExit(() => resolve(0)));
  server.serve(connection);
  return ended;
}
