import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, statSync } from 'node:fs';

/**
 * As whom the database runs: PostgreSQL refuses root, so root hands it to whoever owns the folder
 * already, else to `postgres`.
 * @param {string} [folder] of the cluster
 * @returns {{ uid?: number, gid?: number, cwd: string }} what to add to the options of spawn
 */
export function databaseUser(folder) {
  if (process.getuid?.() !== 0) return { cwd: '/' };
  if (folder && existsSync(folder)) {
    const { uid, gid } = statSync(folder);
    if (uid !== 0) return { uid, gid, cwd: '/' };
  }
  const users = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .map((line) => line.split(':'));
  const user =
    users.find(([name]) => name === 'postgres') ?? users.find(([name]) => name === 'nobody');
  if (!user) throw new Error('There is no user on this machine that the database could run as.');
  return { uid: Number(user[2]), gid: Number(user[3]), cwd: '/' };
}

/**
 * Whether the database's user can get into this folder.
 * @param {string} folder
 */
export function canReach(folder) {
  return spawnSync('/usr/bin/test', ['-x', folder], databaseUser()).status === 0;
}
