import { spawn, spawnSync } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

import { guard } from '../processes/guard.mjs';
import { freePort } from '../processes/free-port.mjs';
import { stopProcess } from '../processes/stop-process.mjs';
import { databaseUser } from './database-user.mjs';

const STARTS_WITHIN_MS = 30_000;

/** @typedef {{ port: number, pid: number, ended: Promise<number | null>, stop: () => Promise<void> }} RunningCluster */

/**
 * Starts the cluster on a free port of the loopback address, no socket file, as a child that ends
 * with this process.
 * @param {{ bin: string, folder: string, settings?: string[] }} cluster settings as name=value
 * @returns {Promise<RunningCluster>}
 */
export async function runCluster({ bin, folder, settings = [] }) {
  const data = join(folder, 'data');
  stopLeftOver(bin, data);
  const port = await freePort();
  const fixed = ['listen_addresses=127.0.0.1', `port=${port}`, 'unix_socket_directories=', 'timezone=UTC',
    'log_timezone=UTC', 'max_connections=100', 'log_min_error_statement=panic'];
  const log = openSync(join(folder, 'server.log'), 'a', 0o600);
  const child = spawn(join(bin, 'postgres'), ['-D', data, ...[...fixed, ...settings].flatMap((one) => ['-c', one])],
    { ...databaseUser(), env: { PATH: process.env.PATH, TZ: 'UTC', LC_ALL: 'C.UTF-8' }, stdio: ['ignore', log, log], detached: true });
  closeSync(log);
  /** @type {Promise<number | null>} */
  const ended = new Promise((resolve) => child.once('exit', resolve).once('error', () => resolve(null)));
  const pid = child.pid;
  if (pid === undefined) throw new Error('The database could not be started.');
  const release = guard(pid, 'SIGINT');
  // SIGINT is PostgreSQL's fast shutdown: it ends open transactions and loses nothing committed.
  const stop = () => stopProcess({ pid, ended, signal: 'SIGINT', withinMs: 20_000 }).then(release);
  try {
    await answers({ data, ended });
  } catch (error) {
    await stop();
    throw error;
  }
  return { port, pid, ended, stop };
}

/** The postmaster writes `ready` into its pid file. @param {{ data: string, ended: Promise<number | null> }} server */
async function answers({ data, ended }) {
  let hasEnded = false;
  void ended.then(() => { hasEnded = true; });
  const until = Date.now() + STARTS_WITHIN_MS;
  while (Date.now() < until && !hasEnded) {
    const file = join(data, 'postmaster.pid');
    if (existsSync(file) && readFileSync(file, 'utf8').split('\n')[7]?.startsWith('ready')) return;
    await new Promise((resolve) => { setTimeout(resolve, 25); });
  }
  throw new Error(`The database did not start; its own words are in ${join(data, '../server.log')}.`);
}

/** A server left by a process that was killed outright. @param {string} bin @param {string} data */
function stopLeftOver(bin, data) {
  if (!existsSync(join(data, 'postmaster.pid'))) return;
  spawnSync(join(bin, 'pg_ctl'), ['-D', data, '-m', 'fast', '-w', 'stop'], { ...databaseUser(), stdio: 'ignore' });
}
