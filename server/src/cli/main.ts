import { today } from '../server-today.ts';
import { readStdin } from './read-stdin.ts';
import { run } from './run.ts';

/** The package's version, put in when the program is bundled. */
declare const RATEWRIGHT_VERSION: string;

process.stdout.on('error', (fault: NodeJS.ErrnoException) => {
  // A reader that has seen enough (`ratewright check | head`) closes the pipe: that is no error of ours.
  if (fault.code !== 'EPIPE') process.stderr.write(`ratewright: standard output can't be written: ${fault.message}\n`);
  process.exit(fault.code === 'EPIPE' ? 0 : 2);
});

// Messages that nobody reads are no reason to leave the work undone.
process.stderr.on('error', () => {});

void run(
  process.argv.slice(2),
  {
    cwd: process.cwd(),
    environment: process.env,
    today: today(),
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
