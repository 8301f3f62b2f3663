import { writeFileSync } from 'node:fs';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { sentenceOf } from '../../apps/api/src/http/constraint-sentences.js';
import { GUARDS_NOW } from '../../apps/api/src/features/verify/guards-now.js';
import { guards } from '../../apps/api/src/features/verify/guards.js';
import { freshDatabase, type TestDatabase } from '../support/database.js';

const FILE = new URL('../../apps/api/src/features/verify/guards.ts', import.meta.url);
const HEAD = `/** The guards as the migrations make them, each with a hash of its definition; a test compares them. */\nexport const guards: string[] = [\n`;

let database: TestDatabase;
let owner: pg.Client;
beforeAll(async () => {
  database = await freshDatabase();
  owner = new pg.Client({ connectionString: database.urls.owner });
  await owner.connect();
});
afterAll(async () => {
  await owner.end();
  await database.drop();
});

describe('the list of guards', () => {
  it('is what the migrations make', async () => {
    const { rows } = await owner.query<{ guard: string }>(
      `SELECT guard FROM (${GUARDS_NOW}) x ORDER BY guard COLLATE "C"`,
    );
    const now = rows.map((row) => row.guard);
    // Written anew on demand, after a migration was changed on purpose.
    if (process.env.FOLDWELL_WRITE_GUARDS === '1') {
      writeFileSync(FILE, `${HEAD}${now.map((guard) => `  '${guard}',\n`).join('')}];\n`);
    }
    expect(process.env.FOLDWELL_WRITE_GUARDS === '1' ? now : guards).toEqual(now);
  });

  it('has a sentence for people for every constraint and every rule by name', async () => {
    const { rows } = await owner.query<{ name: string }>(`
      SELECT conname AS name FROM pg_constraint WHERE connamespace = 'public'::regnamespace AND contype <> 't' AND conrelid <> 'migrations'::regclass
      UNION SELECT indexname FROM pg_indexes WHERE schemaname = 'public' AND indexdef LIKE 'CREATE UNIQUE%' AND tablename <> 'migrations'
      UNION SELECT (regexp_matches(prosrc, 'refuse\\(''([a-z_]+)''', 'g'))[1] FROM pg_proc WHERE pronamespace = 'public'::regnamespace`);
    const facts = {
      lot: '1',
      place: 'Safe A1',
      has: 10,
      asked: 20,
      date: '2026-01-01',
      today: '2026-01-01',
      newest: '2026-01-01',
      locked: '2026-01-01',
      until: '2026-01-01',
      limit: 10,
      over: 5,
      exposure: 20,
      worth: 20,
      currency: 'USD',
      party: 'P',
      paper: 'Papers',
      kind: 'transfer',
      answer: 'accepted',
      by: 'B',
    };
    expect(rows.map((row) => row.name).filter((name) => !sentenceOf(name, facts))).toEqual([]);
  });
});
