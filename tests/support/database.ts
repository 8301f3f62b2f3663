import { randomBytes } from 'node:crypto';
import { databaseUrls } from '@foldwell/local-stack';
import pg from 'pg';
import { inject } from 'vitest';

import type { Urls } from './cluster.js';

/** One database of its own for a test file. */
export interface TestDatabase {
  name: string;
  /** An address for each role: owner, api, worker, counter, reader, and postgres, the superuser. */
  urls: Urls;
  /** Takes it away; end the pools first. */
  drop(): Promise<void>;
}

/** A migrated database that nobody else uses, cloned in about 50 ms from `template`. */
export async function freshDatabase({
  template,
}: {
  template?: string;
} = {}): Promise<TestDatabase> {
  const cluster = inject('cluster');
  const name = `t_${randomBytes(6).toString('hex')}`;
  await asSuperuser(`CREATE DATABASE ${name} OWNER owner TEMPLATE ${template ?? cluster.template}`);
  await asSuperuser(`REVOKE ALL ON DATABASE ${name} FROM PUBLIC`);
  await asSuperuser(`GRANT CONNECT ON DATABASE ${name} TO api, worker, counter, reader`);
  return {
    name,
    urls: databaseUrls({ ...cluster, database: name }),
    drop: () => asSuperuser(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`),
  };
}

async function asSuperuser(statement: string): Promise<void> {
  const client = new pg.Client({
    connectionString: databaseUrls({ ...inject('cluster'), database: 'postgres' }).postgres,
  });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
