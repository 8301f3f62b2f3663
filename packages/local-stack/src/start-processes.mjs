import { closeSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

import { isFree } from './processes/free-port.mjs';
import { startProcess } from './processes/process.mjs';
import { programArgs } from './programs.mjs';
import { STATE } from './state/folders.mjs';

const FIRST_PORT = 4180;
const OPENS_WITHIN_MS = 30_000;

/**
 * Starts the API and waits until it answers that all is well.
 * @param {NodeJS.ProcessEnv} env
 * @param {number | null} chosen the port asked for; without one 4180 or the next free one
 */
export async function startApi(env, chosen) {
  for (let port = chosen ?? FIRST_PORT; ; port += 1) {
    if (!chosen && !(await isFree(port))) continue;
    const address = `http://127.0.0.1:${port}`;
    const api = startLogged('main', { ...env, PORT: String(port), PUBLIC_URL: address });
    if (await answers(address, api.ended)) return { ...api, address };
    const words = lastWords('main');
    // Another start may have been faster to this port.
    if (chosen || !/taken|EADDRINUSE/.test(words))
      throw new Error(`The API did not open. ${words}`);
  }
}

/** Starts the process that seals. @param {NodeJS.ProcessEnv} env */
export function startWorker(env) {
  return startLogged('worker', env);
}

/** @param {'main' | 'worker'} name @param {NodeJS.ProcessEnv} env */
function startLogged(name, env) {
  const log = openSync(logFile(name), 'w', 0o600);
  const process_ = startProcess(process.execPath, programArgs(name), {
    env,
    stdio: ['ignore', log, log],
    alone: true,
  });
  closeSync(log);
  return process_;
}

/** @param {string} name */
function logFile(name) {
  return join(STATE, `${name}.log`);
}

/** @param {string} name */
function lastWords(name) {
  return readFileSync(logFile(name), 'utf8').trim().split('\n').slice(-5).join('\n');
}

/** @param {string} address @param {Promise<unknown>} ended */
async function answers(address, ended) {
  let hasEnded = false;
  void ended.then(() => {
    hasEnded = true;
  });
  const until = Date.now() + OPENS_WITHIN_MS;
  while (!hasEnded && Date.now() < until) {
    const answer = await fetch(`${address}/api/health`).catch(() => null);
    // The one that answers may be another house, which was faster to this port.
    if (answer?.ok && readFileSync(logFile('main'), 'utf8').includes('"listening"')) return true;
    await new Promise((resolve) => {
      setTimeout(resolve, 50);
    });
  }
  return false;
}
