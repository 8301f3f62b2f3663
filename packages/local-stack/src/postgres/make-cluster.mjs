import { chownSync, existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

import { runProgram } from '../processes/run-program.mjs';
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
 * Makes a cluster: scram passwords, data checksums, UTF-8 sorted by code point, then runs
 * docker/postgres/init.sql. One that was cut short before is made again from nothing.
 * @param {Cluster} cluster
 */
export async function makeCluster({ bin, folder, passwords, settings }) {
  rmSync(folder, { recursive: true, force: true });
  const user = databaseUser();
  const passwordFile = join(folder, 'superuser');
  mkdirSync(dirname(folder), { recursive: true, mode: 0o755 });
  mkdirSync(folder, { mode: 0o700 });
  writeFileSync(passwordFile, `${passwords[SUPERUSER]}\n`, { mode: 0o600 });
  for (const path of [folder, passwordFile]) {
    if (user.uid !== undefined && user.gid !== undefined) chownSync(path, user.uid, user.gid);
  }
  await runProgram(
    join(bin, 'initdb'),
    [
      '-D',
      join(folder, 'data'),
      '-U',
      SUPERUSER,
      '--auth=scram-sha-256',
      `--pwfile=${passwordFile}`,
      '-E',
      'UTF8',
      '--locale=C.UTF-8',
      '--data-checksums',
    ],
    user,
  );
  rmSync(passwordFile);
  const running = await runCluster({ bin, folder, settings });
  try {
    await runInit(bin, running.port, passwords);
  } finally {
    await running.stop();
  }
  writeFileSync(join(folder, 'made'), '');
}

/** @param {string} bin @param {number} port @param {Passwords} passwords */
async function runInit(bin, port, passwords) {
  const given = Object.fromEntries(
    ROLES.map((role) => [`${role.toUpperCase()}_PASSWORD`, passwords[role]]),
  );
  const args = [
    '-qXw',
    '-h',
    '127.0.0.1',
    '-p',
    String(port),
    '-U',
    SUPERUSER,
    '-d',
    'postgres',
    '-f',
    INIT,
  ];
  await runProgram(join(bin, 'psql'), args, {
    env: { PATH: process.env.PATH, ...given, PGPASSWORD: passwords[SUPERUSER] },
  });
}
