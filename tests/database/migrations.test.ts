import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { findOrInstallPostgres } from '@foldwell/local-stack';
import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, expect, it } from 'vitest';

import { makeDataSource } from '../../apps/api/src/database/data-source.js';
import { freshDatabase, type TestDatabase } from '../support/database.js';

let database: TestDatabase;
let owner: DataSource;
let dumper: string;
beforeAll(async () => {
  database = await freshDatabase();
  owner = await makeDataSource(database.urls.owner).initialize();
  dumper = join(await findOrInstallPostgres(() => undefined), 'pg_dump');
});
afterAll(async () => {
  await owner.destroy();
  await database.drop();
});

/** Schema, rights and rows, without what differs from dump to dump. */
function dump(): string[] {
  const { stdout, stderr, status } = spawnSync(
    dumper,
    ['--exclude-table-data=migrations', '--no-owner', '-d', database.urls.postgres],
    { encoding: 'utf8', maxBuffer: 64_000_000 },
  );
  if (status !== 0) throw new Error(stderr);
  return stdout.split('\n').filter((line) => !/^\\(un)?restrict |migrations_id_seq/.test(line));
}

it('up, down and up again makes the same schema, rights and first rows', async () => {
  const first = dump();
  expect(first.join('\n')).toContain('CREATE TABLE public.posting');
  for (const _ of owner.migrations) await owner.undoLastMigration({ transaction: 'each' });
  const nothing = dump().join('\n');
  expect(nothing.match(/CREATE (TABLE|FUNCTION|TYPE) public\.(?!migrations)\w+/g)).toBeNull();

  await owner.runMigrations({ transaction: 'each' });
  expect(dump()).toEqual(first);
});
