import pg from 'pg';
import { afterAll, describe, expect, it } from 'vitest';

import { freshDatabase } from '../support/database.js';

describe('the five roles of the database', async () => {
  const database = await freshDatabase();
  afterAll(() => database.drop());

  async function ask(url: string, question: string): Promise<unknown> {
    const client = new pg.Client({ connectionString: url });
    await client.connect();
    try {
      return (await client.query({ text: question, rowMode: 'array' })).rows[0]?.[0];
    } finally {
      await client.end();
    }
  }

  it.each(['owner', 'api', 'worker', 'counter', 'reader'] as const)(
    '%s is no superuser and plans without jit',
    async (role) => {
      expect(
        await ask(database.urls[role], 'SELECT usesuper FROM pg_user WHERE usename = current_user'),
      ).toBe(false);
      expect(await ask(database.urls[role], 'SHOW jit')).toBe('off');
    },
  );

  it.each(['api', 'worker', 'counter', 'reader'] as const)('%s makes no table', async (role) => {
    await expect(ask(database.urls[role], 'CREATE TABLE own (id int)')).rejects.toMatchObject({
      code: expect.stringMatching(/^(42501|25006)$/) as string,
    });
  });

  it('waits five seconds for a lock and no longer', async () => {
    expect(await ask(database.urls.api, 'SHOW lock_timeout')).toBe('5s');
  });

  it('lets nobody in without the password', async () => {
    const url = new URL(database.urls.api);
    url.password = 'wrong';
    await expect(ask(url.href, 'SELECT 1')).rejects.toMatchObject({ code: '28P01' });
  });

  it('keeps its pages with checksums and its clock in UTC', async () => {
    expect(await ask(database.urls.reader, 'SHOW data_checksums')).toBe('on');
    expect(await ask(database.urls.reader, 'SHOW timezone')).toBe('UTC');
  });
});
