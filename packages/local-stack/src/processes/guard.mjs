import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const WATCH = fileURLToPath(new URL('./watch.mjs', import.meta.url));

/** @type {import('node:child_process').ChildProcess | undefined} */
let watcher;

/**
 * Ends a child when this process ends, also when it is killed outright: a watcher of its own holds
 * the other end of a pipe and sends the signal when the pipe closes.
 * @param {number} pid
 * @param {NodeJS.Signals} signal
 * @returns {() => void} to be called when the child has ended
 */
export function guard(pid, signal) {
  watcher ??= startWatcher();
  watcher.stdin?.write(`+ ${pid} ${signal}\n`);
  return () => watcher?.stdin?.write(`- ${pid}\n`);
}

function startWatcher() {
  const child = spawn(process.execPath, [WATCH], {
    stdio: ['pipe', 'ignore', 'ignore'],
    detached: true,
    cwd: '/',
  });
  child.unref();
  const pipe = /** @type {import('node:net').Socket | null} */ (
    /** @type {unknown} */ (child.stdin)
  );
  pipe?.unref();
  // The watcher outlives nobody; a write after its end has nothing left to guard.
  pipe?.on('error', () => undefined);
  return child;
}
