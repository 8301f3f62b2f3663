import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';

import { verifyLedger } from '../../apps/api/src/features/verify/verify-ledger.js';
import { HouseOverHttp, Visitor } from '../support/house-over-http.js';
import { scale } from '../support/scale.js';
import { KillableApi } from './killable-api.js';

const KILLS = scale(200);
const LINES = 3;

let house: HouseOverHttp;
let api: KillableApi;
let root: pg.Client;
let dealer: Visitor;
beforeAll(async () => {
  house = await HouseOverHttp.open();
  api = await KillableApi.on(house.database.urls.api);
  root = new pg.Client({ connectionString: house.database.urls.postgres });
  await root.connect();
  dealer = new Visitor(api.base);
  dealer.cookie = house.people.dealer.cookie;
  dealer.csrf = house.people.dealer.csrf;
  await house.db.query('UPDATE party SET credit_limit = NULL');
  await api.begin();
});
afterAll(async () => {
  await api.kill();
  await root.end();
  await house.close();
});

const working = async () => {
  const { rows } = await root.query<{ n: number }>(
    `SELECT count(*)::int AS n FROM pg_stat_activity WHERE datname = $1 AND usename = 'api'
     AND state <> 'idle' AND query LIKE '%write_movement(%'`,
    [house.database.name],
  );
  return rows[0]?.n ?? 0;
};

async function written(key: string): Promise<{ memos: number; lines: number }> {
  const [row] = await house.db.query<{ memos: number; lines: number }[]>(
    `SELECT count(DISTINCT m.memo_id)::int AS memos, count(g.id)::int AS lines
     FROM movement m JOIN posting g ON g.movement_id = m.id AND g.place_kind = 'memo' WHERE m.request_id = $1`,
    [key],
  );
  return row ?? { memos: 0, lines: 0 };
}

/**
 * Sends a memo and kills the API: while the database is writing it, or so many milliseconds after
 * sending. Gives what the client was told, if anything.
 */
async function killInside(body: unknown, key: string, after?: number): Promise<unknown> {
  const asked = dealer.post('/api/memos', body, { 'idempotency-key': key }).then(
    (answer) => answer,
    () => null,
  );
  let hasEnded = false;
  void asked.then(() => {
    hasEnded = true;
  });
  const sent = performance.now();
  const isTime = async () =>
    after === undefined ? (await working()) > 0 : performance.now() - sent >= after;
  while (!hasEnded && !(await isTime())) await new Promise(setImmediate);
  await api.kill();
  return asked;
}

test(`the API killed inside a booking ${KILLS} times leaves each memo whole or absent`, async () => {
  const told = { acknowledged: 0, writtenUnsaid: 0, absent: 0 };
  for (let kill = 0; kill < KILLS; kill += 1) {
    const lots = await house.takeIn({}, {}, {});
    const body = house.memoOf(lots.map((lot) => ({ lot, weight: 1020, pieces: 1 })));
    const key = randomUUID();
    // Every third somewhere on the way, the others while the database writes.
    const said = await killInside(body, key, kill % 3 === 0 ? kill % 20 : undefined);
    await vi.waitFor(async () => expect(await working()).toBe(0), { timeout: 10_000 });

    const left = await written(key);
    expect([0, LINES]).toContain(left.lines);
    if (said) told.acknowledged += 1;
    else if (left.memos === 1) told.writtenUnsaid += 1;
    else told.absent += 1;
    if (said) expect(left).toEqual({ memos: 1, lines: LINES });

    // The same request again, as a browser sends it: booked once, whatever happened before.
    await api.begin();
    const again = await dealer.post('/api/memos', body, { 'idempotency-key': key });
    expect(again.status).toBe(201);
    expect(await written(key)).toEqual({ memos: 1, lines: LINES });
  }
  process.stdout.write(`${KILLS} kills: ${JSON.stringify(told)}\n`);
  expect(told.acknowledged + told.writtenUnsaid + told.absent).toBe(KILLS);
  expect(told.writtenUnsaid + told.absent).toBeGreaterThan(0);

  const reader = new pg.Client({ connectionString: house.database.urls.reader });
  await reader.connect();
  const { lines } = await verifyLedger(reader);
  await reader.end();
  expect(lines.filter((line) => line.includes(' FAIL '))).toEqual([]);
});
