import { spawn } from 'node:child_process';

import { guard } from './guard.mjs';

/**
 * @typedef {object} Started
 * @property {number} pid
 * @property {Promise<number | null>} ended its exit code, null when a signal ended it
 * @property {() => Promise<void>} stop
 *
 * @typedef {object} Ending how it is asked to end
 * @property {NodeJS.Signals} [endsBy]
 * @property {number} [withinMs] after which it is made to end
 * @property {boolean} [alone] the process alone, not those it started itself
 */

/** @type {Set<Started>} */
const started = new Set();
let isStopping = false;

/**
 * Starts a program that ends with this process, however this one ends. It leads a group of its own:
 * a Ctrl-C reaches this process only, which then stops all in order.
 * @param {string} program
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions & Ending} options
 * @returns {Started & { child: import('node:child_process').ChildProcess }}
 */
export function startProcess(
  program,
  args,
  { endsBy = 'SIGTERM', withinMs = 15_000, alone = false, ...options },
) {
  if (isStopping) throw new Stopping();
  const child = spawn(program, args, { ...options, detached: true });
  /** @type {Promise<number | null>} */
  const ended = new Promise((resolve) =>
    child.once('close', resolve).once('error', () => resolve(null)),
  );
  const { pid } = child;
  if (pid === undefined) throw new Error(`${program} could not be started.`);
  const target = alone ? pid : -pid;
  const release = guard(target, endsBy);
  const one = { pid, ended, child, stop: () => stop({ target, ended, endsBy, withinMs }) };
  started.add(one);
  void ended.then(() => {
    started.delete(one);
    release();
  });
  return one;
}

/** Thrown where something should be started while all is being stopped. */
export class Stopping extends Error {}

/** Stops all that was started, the newest first; nothing can be started after that. */
export async function stopAll() {
  isStopping = true;
  for (const one of [...started].reverse()) await one.stop();
}

/** @param {{ target: number, ended: Promise<unknown>, endsBy: NodeJS.Signals, withinMs: number }} one */
async function stop({ target, ended, endsBy, withinMs }) {
  send(target, endsBy);
  /** @type {NodeJS.Timeout | undefined} */
  let timer;
  const late = new Promise((resolve) => {
    timer = setTimeout(() => resolve('late'), withinMs);
  });
  if ((await Promise.race([ended, late])) === 'late') {
    send(target, 'SIGKILL');
    await ended;
  }
  clearTimeout(timer);
}

/** @param {number} target @param {NodeJS.Signals} signal */
function send(target, signal) {
  try {
    process.kill(target, signal);
  } catch {
    // It has ended by itself.
  }
}
