import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { makePasswords } from '../postgres/roles.mjs';
import { STATE } from './folders.mjs';

/** @typedef {{ passwords: import('../postgres/roles.mjs').Passwords, sessionSecret: string }} Secrets */

/** What this clone made up for itself at its first start, readable by its user only. @returns {Secrets} */
export function secrets() {
  const file = join(STATE, 'secrets.json');
  if (existsSync(file)) return /** @type {Secrets} */ (JSON.parse(readFileSync(file, 'utf8')));
  const made = { passwords: makePasswords(), sessionSecret: randomBytes(32).toString('hex') };
  writeFileSync(file, JSON.stringify(made), { mode: 0o600 });
  return made;
}
