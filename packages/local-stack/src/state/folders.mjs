import { createHash } from 'node:crypto';
import { accessSync, constants, existsSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';

import { canReach } from '../postgres/database-user.mjs';
import { ROOT } from '../root.mjs';

/** Everything that a start keeps, git-ignored. */
export const STATE = join(ROOT, '.foldwell');

/** Where the cluster goes when the database's user cannot get into the clone. */
export const ELSEWHERE = join(
  '/var/lib',
  `foldwell-${createHash('sha256').update(ROOT).digest('hex').slice(0, 12)}`,
);

/** Makes the state folder, or throws one sentence where this user may not write it. */
export function makeStateFolder() {
  try {
    mkdirSync(STATE, { recursive: true, mode: 0o755 });
    accessSync(STATE, constants.W_OK);
  } catch {
    throw new Error(`${STATE} cannot be written by this user. Use a clone of your own.`);
  }
}

/** The folder of the cluster: in the clone where the database's user can reach it. */
export function clusterFolder() {
  const inside = join(STATE, 'postgres');
  if (existsSync(inside) || canReach(STATE)) return inside;
  return join(ELSEWHERE, 'postgres');
}
