import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { databaseUrls } from '@foldwell/local-stack';
import pg from 'pg';
import { inject } from 'vitest';

import { freshDatabase, type TestDatabase } from './database.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const DEMO = 'foldwell_demo';
/** Any number that no other lock of the tests has. */
const MAKING = 420_817;

/** The demo house in a database of its own: made once in a run, by the built program, then cloned. */
export async function demoDatabase(): Promise<TestDatabase> {
  const cluster = inject('cluster');
  const client = new pg.Client({
    connectionString: databaseUrls({ ...cluster, database: 'postgres' }).postgres,
  });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [MAKING]);
    const { rowCount } = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [DEMO]);
    if (rowCount === 0) await makeDemo(client);
  } finally {
    await client.end();
  }
  return freshDatabase({ template: DEMO });
}

async function makeDemo(client: pg.Client): Promise<void> {
  const making = await freshDatabase();
  const env = { PATH: process.env.PATH, TZ: 'UTC', DATABASE_URL: making.urls.api };
  const { status, stderr } = spawnSync(process.execPath, ['apps/api/dist/seed.mjs'], {
    cwd: ROOT,
    env,
    encoding: 'utf8',
  });
  if (status !== 0) throw new Error(`The demo house could not be made: ${stderr}`);
  await client.query(`ALTER DATABASE ${making.name} RENAME TO ${DEMO}`);
}
