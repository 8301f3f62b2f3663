import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { runProgram } from './processes/run-program.mjs';
import { ROOT } from './root.mjs';

/** The built API and web, for the parts of the product that hold them. */
export const API_DIST = join(ROOT, 'apps/api/dist');
export const WEB_DIST = join(ROOT, 'apps/web/dist');

/** Builds what changed since it was built last, API and web at once. */
export async function build() {
  await Promise.all([
    buildInto(API_DIST, ['apps/api'], (folder) => ['apps/api/build.mjs', folder]),
    buildInto(WEB_DIST, ['apps/web'], (folder) => [
      'node_modules/vite/bin/vite.js',
      'build',
      'apps/web',
      '--outDir',
      folder,
      '--emptyOutDir',
      '--logLevel',
      'warn',
    ]),
  ]);
}

/**
 * Beside, then put in its place: a house that runs from the old files never sees half of the new.
 * @param {string} dist
 * @param {string[]} folders
 * @param {(folder: string) => string[]} command
 */
async function buildInto(dist, folders, command) {
  const stamp = hashOf(['package-lock.json', 'tsconfig.base.json', ...folders, 'packages']);
  const stampFile = join(dist, '.inputs');
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === stamp) return;
  const next = `${dist}.${process.pid}`;
  try {
    await runProgram(process.execPath, command(next), {
      cwd: ROOT,
      env: { ...process.env, NODE_ENV: 'production' },
    });
    writeFileSync(join(next, '.inputs'), stamp);
    putInPlace(next, dist);
  } finally {
    rmSync(next, { recursive: true, force: true });
  }
}

/**
 * Another build of the same sources may put its own there first, which is as good.
 * @param {string} next @param {string} dist
 */
function putInPlace(next, dist) {
  const old = `${next}.old`;
  try {
    if (existsSync(dist)) renameSync(dist, old);
    renameSync(next, dist);
  } catch (error) {
    if (!existsSync(join(dist, '.inputs'))) throw error;
  } finally {
    rmSync(old, { recursive: true, force: true });
  }
}

/** @param {string[]} paths from the root of the clone */
function hashOf(paths) {
  const hash = createHash('sha256');
  for (const path of paths) addTo(hash, path);
  return hash.digest('hex');
}

/** @param {import('node:crypto').Hash} hash @param {string} path */
function addTo(hash, path) {
  const full = join(ROOT, path);
  if (!/[.][a-z]+$/.test(path)) {
    const names = readdirSync(full).filter(
      (name) => !/^(node_modules|dist.*|[.].*)$/.test(name) && !name.includes('.test.'),
    );
    for (const name of names.sort()) addTo(hash, join(path, name));
    return;
  }
  hash.update(`${path}\n`).update(readFileSync(full));
}
