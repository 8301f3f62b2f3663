import { spawnSync } from 'node:child_process';
import { chownSync, existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

import { databaseUser } from './database-user.mjs';
import { ROLES, SUPERUSER } from './roles.mjs';
import { runCluster } from './run-cluster.mjs';

const INIT = join(dirname(fileURLToPath(import.meta.url)), '../../../../docker/postgres/init.sql');

/** @typedef {import('./roles.mjs').Passwords} Passwords */
/** @typedef {{ bin: string, folder: string, passwords: Passwords, settings?: string[] }} Cluster */

/** Whether the roles and the database of this cluster were made to the end. @param {string} folder */
export function isMade(folder) {
  return existsSync(join(folder, 'made'));
}

/**
 * Makes a cluster: scram passwords, data checksums, UTF-8 sorted by code point, UTC, then runs
 * docker/postgres/init.sql. One that was cut short before is made again from nothing.
 * @param {Cluster} cluster
 */
export async function makeCluster({ bin, folder, passwords, settings }) {
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const user = databaseUser();
  if (user.uid !== undefined) chownSync(folder, user.uid, user.gid ?? user.uid);
  const passwordFile = join(folder, 'superuser');
  writeFileSync(passwordFile, `${passwords[SUPERUSER]}\n`, { mode: 0o600 });
  if (user.uid !== undefined) chownSync(passwordFile, user.uid, user.gid ?? user.uid);
  run(join(bin, 'initdb'), ['-D', join(folder, 'data'), '-U', SUPERUSER, '--auth=scram-sha-256',
    `--pwfile=${passwordFile}`, '-E', 'UTF8', '--locale=C.UTF-8', '--data-checksums'], user);
  rmSync(passwordFile);
  const running = await runCluster({ bin, folder, settings });
  try {
    runInit(bin, running.port, passwords);
  } finally {
    await running.stop();
  }
  writeFileSync(join(folder, 'made'), '');
}

/** @param {string} bin @param {number} port @param {Passwords} passwords */
function runInit(bin, port, passwords) {
  const given = Object.fromEntries(ROLES.map((role) => [`${role.toUpperCase()}_PASSWORD`, passwords[role]]));
  run(join(bin, 'psql'), ['-qXw', '-h', '127.0.0.1', '-p', String(port), '-U', SUPERUSER, '-d', 'postgres', '-f', INIT],
    { env: { PATH: process.env.PATH, ...given, PGPASSWORD: passwords[SUPERUSER] } });
}

/** @param {string} program @param {string[]} args @param {import('node:child_process').SpawnSyncOptions} options */
function run(program, args, options) {
  const { status, stderr, error } = spawnSync(program, args, { ...options, encoding: 'utf8' });
  if (status !== 0) throw new Error(`The database could not be made: ${error?.message ?? stderr}`);
}
