import { spawnSync } from 'node:child_process';
import Papa from 'papaparse';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import type { TestDatabase } from '../support/database.js';
import { demoDatabase } from '../support/demo-database.js';
import { balancesOf, journalOf } from './journal.js';

/** hledger is a double-entry ledger of other people's: https://hledger.org. */
function hledger(journal: string, ...words: string[]) {
  return spawnSync('hledger', ['-f', '-', ...words], {
    input: journal,
    encoding: 'utf8',
    maxBuffer: 500_000_000,
    env: { ...process.env, LANG: 'C.UTF-8' },
  });
}

describe('hledger reads the demo house', () => {
  let database: TestDatabase;
  let client: pg.Client;
  let journal: string;

  beforeAll(async () => {
    database = await demoDatabase();
    client = new pg.Client({ connectionString: database.urls.reader });
    await client.connect();
    journal = await journalOf(client);
  });

  afterAll(async () => {
    await client.end();
    await database.drop();
  });

  it('and finds every movement in balance, lot by lot, in carats, pieces and cost', () => {
    const { status, stderr } = hledger(journal, 'check');
    expect(stderr).toBe('');
    expect(status).toBe(0);
    expect(journal.split('\n').length).toBeGreaterThan(5000);
  });

  it('and comes to the same balances, place by place', async () => {
    const { stdout } = hledger(
      journal,
      'balance',
      '--flat',
      '--no-total',
      '--layout=bare',
      '-O',
      'csv',
    );
    const rows = Papa.parse<{ account: string; commodity: string; balance: string }>(stdout, {
      header: true,
      skipEmptyLines: true,
    }).data;
    const theirs = rows.map(
      ({ account, commodity, balance }) => [`${account}, ${commodity}`, balance] as const,
    );
    const ours = await balancesOf(client);
    expect(ours.size).toBeGreaterThan(1000);
    expect(new Map(theirs.filter(([, balance]) => !/^-?[0.]+$/.test(balance)))).toEqual(ours);
  });

  it('and would see one thousandth of a carat too much', () => {
    const [amount = ''] = /-?\d+[.]\d{3} "ct \d+"/.exec(journal) ?? [];
    const heavier = journal.replace(
      amount,
      amount.replace(/(\d) "/, (_, digit: string) => `${(Number(digit) + 1) % 10} "`),
    );
    const { status, stderr } = hledger(heavier, 'check');
    expect(status).not.toBe(0);
    expect(stderr.slice(0, 2000)).toMatch(/balance/);
  });
});
