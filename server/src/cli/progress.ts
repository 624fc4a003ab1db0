import type { CommandIo } from './io.ts';

/** How far a run over many files has come, on one line of a terminal; silent anywhere else. */
export interface Progress {
  step(done: number): void;
  clear(): void;
}

const WIDTH = 24;
const FEWEST_FILES = 8;

export function progressOver(total: number, quiet: boolean, io: CommandIo): Progress {
  if (quiet || !io.stderrIsTerminal || total < FEWEST_FILES) return { step: () => {}, clear: () => {} };
  return {
    step(done) {
      const filled = Math.round((done / total) * WIDTH);
      io.stderr(`\r${'='.repeat(filled)}${'.'.repeat(WIDTH - filled)} ${done} of ${total} files`);
    },
    clear() {
      io.stderr('\r\u001b[K');
    },
  };
}
