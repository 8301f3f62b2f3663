import { Stopping, stopAll } from './processes/process.mjs';

const LOOK_EVERY_MS = 250;

/**
 * Runs a command so that Ctrl-C, SIGTERM and the end of whoever started it stop all that it started,
 * and its own errors are one sentence each.
 * @param {() => Promise<number>} command gives its exit code
 */
export function runCommand(command) {
  const parent = process.ppid;
  // npm ends without passing a signal on to what it runs.
  const watch = setInterval(() => {
    if (process.ppid !== parent) void leave(0);
  }, LOOK_EVERY_MS);
  watch.unref();
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']))
    process.on(signal, () => void leave(0));
  command().then(leave, (error) => {
    if (error instanceof Stopping) return undefined;
    if (!isLeaving)
      process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    return leave(1);
  });
}

let isLeaving = false;

/** @param {number} code */
async function leave(code) {
  if (isLeaving) return;
  isLeaving = true;
  await stopAll();
  process.exit(code);
}
