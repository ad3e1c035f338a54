/** One line on standard error that says what is being done, drawn only on a terminal and only when the wait is felt. */
import type { Io } from './io.js';

const PATIENCE_MS = 400;

export interface Progress {
  readonly step: (what: string) => void;
  readonly done: () => void;
}

export function progressLine(io: Io, now: () => number = () => performance.now()): Progress {
  const start = now();
  let drawn = false;
  return {
    step: (what) => {
      if (!io.interactive || now() - start < PATIENCE_MS) return;
      drawn = true;
      io.stderr(`\r\u001b[K${what} …`);
    },
    done: () => {
      if (drawn) io.stderr('\r\u001b[K');
      drawn = false;
    },
  };
}
