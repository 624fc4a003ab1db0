import { readStdin } from './read-stdin.ts';
import { run } from './run.ts';

/** The package's version, put in when the program is bundled. */
declare const RATEWRIGHT_VERSION: string;

// A reader that has seen enough (`ratewright check | head`) closes the pipe: that is no error of ours.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (fault: NodeJS.ErrnoException) => {
    if (fault.code === 'EPIPE') process.exit(0);
    throw fault;
  });
}

void run(
  process.argv.slice(2),
  {
    cwd: process.cwd(),
    environment: process.env,
    stdoutIsTerminal: process.stdout.isTTY === true,
    stderrIsTerminal: process.stderr.isTTY === true,
    readStdin,
    stdout: (text) => void process.stdout.write(text),
    stderr: (text) => void process.stderr.write(text),
  },
  RATEWRIGHT_VERSION,
).then(
  (exit) => {
    process.exitCode = exit;
  },
  (fault: unknown) => {
    process.stderr.write(
      `ratewright: a fault of the program: ${fault instanceof Error ? fault.stack : String(fault)}\n`,
    );
    process.exitCode = 2;
  },
);
