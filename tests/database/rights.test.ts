import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

const LEDGER = [
  'movement',
  'posting',
  'balance',
  'memo',
  'memo_line',
  'memo_keep',
  'difference',
  'weighing',
  'document',
  'idempotency',
  'seal',
  'seal_member',
  'to_seal',
  'movement_rule',
  'currency',
];

describe('the role api has no other way to the ledger', () => {
  it.each(LEDGER)('may not write, change or take away a row of %s', async (table) => {
    const codes = await Promise.all(
      [`INSERT INTO ${table} DEFAULT VALUES`, `DELETE FROM ${table}`, `TRUNCATE ${table}`].map(
        (sql) =>
          house.api.query(sql).then(
            () => 'done',
            (error: { code: string }) => error.code,
          ),
      ),
    );
    expect(codes).toEqual(['42501', '42501', '42501']);
  });

  it('may not switch a guard off or make anything', async () => {
    for (const sql of [
      'ALTER TABLE posting DISABLE TRIGGER ALL',
      'CREATE TABLE mine ()',
      `SET session_replication_role = 'replica'`,
    ]) {
      const code = await house.api.query(sql).then(
        () => 'done',
        (error: { code: string }) => error.code,
      );
      expect(code).toBe('42501');
    }
  });

  it('may not call the parts of the writer by themselves', async () => {
    const code = await house.api.query(`SELECT make_lots('{}', house_today())`).then(
      () => 'done',
      (error: { code: string }) => error.code,
    );
    expect(code).toBe('42501');
  });
});
