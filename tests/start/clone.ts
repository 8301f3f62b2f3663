import { spawnSync } from 'node:child_process';
import {
  chmodSync,
  cpSync,
  existsSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  rmSync,
  symlinkSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const LEFT_OUT = /^(node_modules|[.]git|[.]foldwell|[.]tsbuild)$|^dist[.]/;

/** Debian's user of no rights, as whom an ordinary person's start is tried. */
export const ORDINARY = { uid: 65_534, gid: 65_534 };

export type User = 'root' | 'ordinary';

/** Only root can try both. */
export const USERS: User[] = process.getuid?.() === 0 ? ['root', 'ordinary'] : ['ordinary'];

export interface Clone {
  folder: string;
  user: User;
  remove(): void;
}

/**
 * This repository in a folder of its own, with no state. `warm` has its packages installed, `cold`
 * has none; `mode` is that of the folder above it.
 */
export function makeClone(user: User, { packages = 'warm', mode = 0o755 } = {}): Clone {
  const above = mkdtempSync(join(tmpdir(), 'foldwell-clone-'));
  chmodSync(above, mode);
  const folder = join(above, 'foldwell');
  copy(ROOT, folder);
  if (packages === 'warm') {
    for (const workspace of ['', 'apps/api', 'apps/web', 'packages/local-stack', 'tests']) {
      linkPackages(join(ROOT, workspace, 'node_modules'), join(folder, workspace, 'node_modules'));
    }
  }
  if (user === 'ordinary' && process.getuid?.() === 0) {
    spawnSync('chown', ['-hR', `${ORDINARY.uid}:${ORDINARY.gid}`, above]);
  }
  return { folder, user, remove: () => rmSync(above, { recursive: true, force: true }) };
}

function copy(from: string, to: string): void {
  mkdirSync(to, { recursive: true });
  for (const entry of readdirSync(from, { withFileTypes: true })) {
    if (LEFT_OUT.test(entry.name)) continue;
    if (entry.isDirectory()) copy(join(from, entry.name), join(to, entry.name));
    else cpSync(join(from, entry.name), join(to, entry.name));
  }
}

/** One link for each package; our own point into the clone, as npm's do. */
function linkPackages(from: string, to: string): void {
  if (!existsSync(from)) return;
  mkdirSync(to);
  for (const name of readdirSync(from)) {
    const path = join(from, name);
    if (name === '@foldwell')
      cpSync(path, join(to, name), { recursive: true, verbatimSymlinks: true });
    else if (name === '.package-lock.json') cpSync(path, join(to, name));
    else if (name.startsWith('@') && lstatSync(path).isDirectory())
      linkPackages(path, join(to, name));
    else if (!name.startsWith('.vite')) symlinkSync(path, join(to, name));
  }
}
