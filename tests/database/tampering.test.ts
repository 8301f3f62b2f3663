import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { verifyLedger } from '../../apps/api/src/features/verify/verify-ledger.js';
import { SmallHouse } from './small-house.js';

let house: SmallHouse;
let reader: pg.Client;
beforeAll(async () => {
  house = await SmallHouse.open();
  await house.shortReturn();
  await house.worker.query('SELECT seal_waiting()');
  reader = new pg.Client({ connectionString: house.database.urls.reader });
  await reader.connect();
});
afterAll(async () => {
  await reader.end();
  await house.close();
});

const failures = async (client: pg.Client) =>
  (await verifyLedger(client)).lines.filter((line) => line.includes(' FAIL '));

/** Each with the triggers off, as nobody but the owner of the tables could; and what verify then says. */
const TAMPERINGS: [string, string, RegExp][] = [
  [
    'a posting made heavier',
    `UPDATE posting SET weight = weight + 1 WHERE id = 2`,
    /sums to zero|sum of its postings/,
  ],
  ['a cent moved', `UPDATE posting SET cost = cost + 1 WHERE id = 2`, /sums to zero/],
  [
    'a movement taken away',
    `DELETE FROM posting WHERE movement_id = 3`,
    /two legs|sum of its postings/,
  ],
  [
    'a balance made larger',
    `UPDATE balance SET weight = weight + 1000 WHERE lot_id = 1 AND inside`,
    /sum of its postings/,
  ],
  ['a balance row taken away', `DELETE FROM balance WHERE lot_id = 2`, /sum of its postings/],
  [
    'a lot’s bar painted over',
    `UPDATE lot SET part_safe = part_safe + 500 WHERE id = 1`,
    /bar of each lot/,
  ],
  [
    'a memo line said to be back',
    `UPDATE memo_line SET returned_weight = returned_weight + 10 WHERE id = 2`,
    /flows of each memo line/,
  ],
  [
    'a difference said to hold less',
    `UPDATE difference SET held_weight = 10`,
    /missing is what the open differences hold|each difference holds/,
  ],
  ['a memo number taken out', `UPDATE memo SET number = 7`, /no gaps/],
  [
    'a counter set ahead',
    `UPDATE number_series SET next = next + 3 WHERE series = 'weighing'`,
    /no gaps/,
  ],
  ['who did it', `UPDATE movement SET person_id = 2 WHERE id = 1`, /chain of seals/],
  [
    'when it was, by a microsecond',
    `UPDATE movement SET at = at + interval '1 microsecond' WHERE id = 1`,
    /chain of seals/,
  ],
  ['why it was', `UPDATE movement SET reason = 'other' WHERE id = 2`, /chain of seals/],
  [
    'an issued paper',
    `UPDATE document SET snapshot = '{"number": "M 1", "says": "less"}', hash = sha256('{"number": "M 1", "says": "less"}')`,
    /chain of seals/,
  ],
  [
    'the newest seal cut off',
    `DELETE FROM seal_member; DELETE FROM seal`,
    /sealed or is sealed|waits to be sealed/,
  ],
  [
    'cost on goods of a consignor',
    `UPDATE posting SET cost = 5 WHERE lot_id = 3 AND weight > 0`,
    /consignor carry no cost/,
  ],
  ['a guard switched off', `ALTER TABLE posting DISABLE TRIGGER posting_apply`, /every guard/],
  ['a guard dropped', `ALTER TABLE balance DROP CONSTRAINT balance_never_negative`, /every guard/],
  [
    'a guard rewritten',
    `CREATE OR REPLACE FUNCTION judge_movement() RETURNS trigger LANGUAGE plpgsql AS 'BEGIN RETURN NULL; END'`,
    /every guard/,
  ],
  [
    'arithmetic rewritten',
    `CREATE OR REPLACE FUNCTION half_away(n numeric, d numeric) RETURNS numeric LANGUAGE sql IMMUTABLE RETURN div(n, d)`,
    /every guard.*half_away/,
  ],
  [
    'a trigger that is not ours',
    `CREATE TRIGGER sneaks_in BEFORE INSERT ON posting FOR EACH ROW EXECUTE FUNCTION refuse_change()`,
    /not ours: trigger posting.sneaks_in/,
  ],
  ['a right given away', `GRANT INSERT ON posting TO api`, /right posting api/],
  [
    'what a customer kept at another price',
    `INSERT INTO memo_keep (movement_id, memo_line_id, weight, pieces, price, amount) VALUES (3, 1, 10, 1, 1, 1)`,
    /what each line kept/,
  ],
  [
    'a paper of a memo taken out',
    `INSERT INTO document (kind, number, memo_id, person_id, snapshot, hash) VALUES ('extended memo', 'M 1-2', 1, 1, '{"number": "M 1-2"}', sha256('{"number": "M 1-2"}'))`,
    /papers of a memo are numbered/,
  ],
  [
    'a paper that waits for no seal',
    `DELETE FROM seal_member WHERE document_id IS NOT NULL`,
    /chain of seals|waits to be sealed/,
  ],
];

describe('verify', () => {
  it('holds on a house that nobody tampered with', async () => {
    expect(await failures(reader)).toEqual([]);
  });

  it('counts as many lines as it has assertions', async () => {
    const { lines, ran } = await verifyLedger(reader);
    expect(lines).toHaveLength(ran);
  });

  it.each(TAMPERINGS)('finds %s', async (_what, sql, says) => {
    const root = new pg.Client({ connectionString: house.database.urls.postgres });
    await root.connect();
    try {
      await root.query(
        `BEGIN; SET LOCAL session_replication_role = 'replica'; SET LOCAL search_path = public; ${sql}`,
      );
      // Inside the same transaction, so that it is undone afterwards.
      const inside = {
        query: (text: unknown) =>
          typeof text === 'string' && /^(BEGIN|ROLLBACK)/.test(text)
            ? Promise.resolve({ rows: [] })
            : root.query(text as string),
      };
      expect((await failures(inside as unknown as pg.Client)).join('\n')).toMatch(says);
    } finally {
      await root.query('ROLLBACK');
      await root.end();
    }
  });
});
