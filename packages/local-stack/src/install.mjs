import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

import { runProgram } from './processes/run-program.mjs';
import { ROOT, say } from './root.mjs';

/** @typedef {{ packages: Record<string, { version?: string, optional?: boolean, link?: boolean }> }} Lock */

/** `npm ci` where what is installed is not what the lock says, e.g. in a fresh clone. */
export async function installPackages() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major !== 20 || minor < 19) {
    throw new Error(`Foldwell runs on Node 20.19 or a later 20; this is ${process.versions.node}.`);
  }
  if (isInstalled()) return;
  say('Installing packages (npm ci), about a minute.');
  await runProgram('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error'], { cwd: ROOT });
}

/** npm writes its own lock into node_modules at the end of each install. */
function isInstalled() {
  const kept = join(ROOT, 'node_modules/.package-lock.json');
  if (!existsSync(kept)) return false;
  const wanted = read(join(ROOT, 'package-lock.json'));
  const installed = read(kept);
  return Object.entries(wanted.packages).every(([path, { version, optional, link }]) => {
    if (!path.includes('node_modules/')) return true;
    const found = installed.packages[path];
    return found ? link || found.version === version : Boolean(optional);
  });
}

/** @param {string} file @returns {Lock} */
function read(file) {
  return /** @type {Lock} */ (JSON.parse(readFileSync(file, 'utf8')));
}
