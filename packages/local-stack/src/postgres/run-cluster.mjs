import { closeSync, existsSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

import { freePort } from '../processes/free-port.mjs';
import { startProcess } from '../processes/process.mjs';
import { runProgram } from '../processes/run-program.mjs';
import { databaseUser } from './database-user.mjs';

const STARTS_WITHIN_MS = 30_000;

/**
 * @typedef {{ bin: string, folder: string, settings?: string[] }} Place settings as name=value
 * @typedef {import('../processes/process.mjs').Started & { port: number }} RunningCluster
 */

/**
 * Starts the cluster on a free port of the loopback address, no socket file, as a child that ends
 * with this process.
 * @param {Place} place
 * @returns {Promise<RunningCluster>}
 */
export async function runCluster({ bin, folder, settings = [] }) {
  const data = join(folder, 'data');
  await stopLeftOver(bin, folder);
  const port = await freePort();
  const fixed = [
    'listen_addresses=127.0.0.1',
    `port=${port}`,
    'unix_socket_directories=',
    'timezone=UTC',
    'log_timezone=UTC',
    'max_connections=100',
    'log_min_error_statement=panic',
  ];
  const args = [...fixed, ...settings].flatMap((setting) => ['-c', setting]);
  const log = openSync(join(folder, 'server.log'), 'a', 0o600);
  // SIGINT is PostgreSQL's fast shutdown: it ends open transactions and loses nothing committed.
  const server = startProcess(join(bin, 'postgres'), ['-D', data, ...args], {
    ...databaseUser(folder),
    env: { PATH: process.env.PATH, TZ: 'UTC', LC_ALL: 'C.UTF-8' },
    stdio: ['ignore', log, log],
    endsBy: 'SIGINT',
    withinMs: 30_000,
    alone: true,
  });
  closeSync(log);
  try {
    await answers({ folder, ended: server.ended });
  } catch (error) {
    await server.stop();
    throw error;
  }
  return { port, pid: server.pid, ended: server.ended, stop: server.stop };
}

/** The postmaster writes `ready` into its pid file. @param {{ folder: string, ended: Promise<unknown> }} server */
async function answers({ folder, ended }) {
  let hasEnded = false;
  void ended.then(() => {
    hasEnded = true;
  });
  const until = Date.now() + STARTS_WITHIN_MS;
  while (Date.now() < until && !hasEnded) {
    const file = join(folder, 'data/postmaster.pid');
    if (existsSync(file) && readFileSync(file, 'utf8').split('\n')[7]?.startsWith('ready')) return;
    await new Promise((resolve) => {
      setTimeout(resolve, 25);
    });
  }
  throw new Error(
    `The database did not start; its own words are in ${join(folder, 'server.log')}.`,
  );
}

/** A server left by a process that was killed outright. @param {string} bin @param {string} folder */
async function stopLeftOver(bin, folder) {
  const data = join(folder, 'data');
  if (!existsSync(join(data, 'postmaster.pid'))) return;
  // Fails where the file is all that is left, which the server finds out by itself.
  await runProgram(
    join(bin, 'pg_ctl'),
    ['-D', data, '-m', 'fast', '-w', 'stop'],
    databaseUser(folder),
  ).catch(() => undefined);
}
