import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { chmodSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import {
  databaseUrls,
  findOrInstallPostgres,
  makeCluster,
  makePasswords,
  runCluster,
} from '@foldwell/local-stack';

import type { TestCluster } from './cluster.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/** A cluster of its own under memory where there is any, and how to take it away again. */
export async function makeTestCluster(): Promise<TestCluster & { remove: () => Promise<void> }> {
  const bin = await findOrInstallPostgres((sentence) => process.stderr.write(`${sentence}\n`));
  const base = mkdtempSync(join(existsSync('/dev/shm') ? '/dev/shm' : tmpdir(), 'foldwell-test-'));
  chmodSync(base, 0o755);
  const folder = join(base, 'postgres');
  const passwords = makePasswords();
  await makeCluster({ bin, folder, passwords });
  const running = await runCluster({
    bin,
    folder,
    settings: ['max_connections=200', 'shared_buffers=256MB'],
  });
  migrate(databaseUrls({ port: running.port, passwords }).owner);
  return {
    port: running.port,
    passwords,
    template: 'foldwell',
    remove: async () => {
      await running.stop();
      rmSync(base, { recursive: true, force: true });
    },
  };
}

/** Runs the program that people run, from its source. */
export function migrate(ownerUrl: string): void {
  const env = {
    ...process.env,
    OWNER_DATABASE_URL: ownerUrl,
    TSX_TSCONFIG_PATH: join(ROOT, 'tsconfig.base.json'),
  };
  const program = join(ROOT, 'apps/api/src/migrate.ts');
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--import', 'tsx', program, 'up'],
    { env, cwd: ROOT, encoding: 'utf8' },
  );
  if (status !== 0) throw new Error(`The migrations did not run:\n${stdout}${stderr}`);
}
