import { createInterface } from 'node:readline';

// Runs beside the process that started it: see guard.mjs.
/** @type {Map<number, NodeJS.Signals>} */
const guarded = new Map();

// A Ctrl-C of the terminal is for the other process; this one ends with the pipe.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => undefined);

const lines = createInterface({ input: process.stdin });
lines.on('line', (line) => {
  const [act, pid, signal] = line.split(' ');
  if (act === '+') guarded.set(Number(pid), /** @type {NodeJS.Signals} */ (signal));
  else guarded.delete(Number(pid));
});
lines.on('close', () => {
  for (const [pid, signal] of [...guarded].reverse()) {
    try {
      process.kill(pid, signal);
    } catch {
      // It has ended by itself.
    }
  }
  process.exit(0);
});
