import { type ChildProcess, spawn } from 'node:child_process';
import { type AddressInfo, createServer } from 'node:net';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';

import { verifyLedger } from '../../apps/api/src/features/verify/verify-ledger.js';
import { SmallHouse } from './small-house.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

const DESK = { kind: 'return desk' };
const act = (lot: number, goods: { weight: number; pieces: number }) =>
  JSON.stringify({ kind: 'transfer', ...house.move(lot, { id: house.drawer }, DESK, goods) });
const write = async (client: pg.Client, key: string, body: string) => {
  const { rows } = await client.query<{ id: number }>(
    `SELECT (write_movement(1, $1, 'hash', $2) ->> 'movementId')::int AS id`,
    [key, body],
  );
  return rows[0]?.id ?? 0;
};
const sealed = async () => {
  const { rows } = await house.owner.query<{ id: string }>(
    'SELECT movement_id AS id FROM seal_member WHERE movement_id IS NOT NULL ORDER BY seal_id, position',
  );
  return rows.map(({ id }) => Number(id));
};
const failures = async () => {
  const reader = new pg.Client({ connectionString: house.database.urls.reader });
  await reader.connect();
  const { lines } = await verifyLedger(reader);
  await reader.end();
  return lines.filter((line) => line.includes(' FAIL '));
};

describe('seals', () => {
  it('seal a movement that was held open while later ones were sealed', async () => {
    await house.worker.query('SELECT seal_waiting()');
    await house.api.query('BEGIN');
    const held = await write(
      house.api,
      'held-open-0000001',
      act(house.parcel, { weight: 100, pieces: 7 }),
    );
    const other = new pg.Client({ connectionString: house.database.urls.api });
    await other.connect();
    const later = await write(
      other,
      'later-one-0000001',
      act(house.theirs, { weight: 1200, pieces: 1 }),
    );
    await other.end();
    expect(later).toBeGreaterThan(held);
    await house.worker.query('SELECT seal_waiting()');
    expect(await sealed()).toContain(later);
    expect(await sealed()).not.toContain(held);

    await house.api.query('COMMIT');
    await house.worker.query('SELECT seal_waiting()');
    expect((await sealed()).slice(-2)).toEqual([later, held]);
    expect(await failures()).toEqual([]);
  });

  it('list each movement once, also when two workers seal at the same time', async () => {
    for (let turn = 0; turn < 5; turn += 1) {
      await write(
        house.api,
        `two-workers-000${turn}`,
        act(house.parcel, { weight: 10, pieces: 1 }),
      );
    }
    const second = new pg.Client({ connectionString: house.database.urls.worker });
    await second.connect();
    const counts = await Promise.all(
      [house.worker, second].map((one) => one.query<{ n: number }>('SELECT seal_waiting(3) AS n')),
    );
    await second.end();
    expect(counts.map(({ rows }) => rows[0]?.n).sort()).toEqual([2, 3]);
    const all = await sealed();
    expect(new Set(all).size).toBe(all.length);
    expect(await failures()).toEqual([]);
  });

  it('may not be made or changed by the worker itself', async () => {
    for (const sql of [`INSERT INTO seal (hash) VALUES ('x')`, 'DELETE FROM to_seal']) {
      await expect(house.worker.query(sql)).rejects.toMatchObject({ code: '42501' });
    }
  });
});

describe('the sealing worker', () => {
  let worker: ChildProcess;
  const ended = () => new Promise((done) => worker.once('exit', (code) => done(code)));
  const begin = (url: string) => {
    worker = spawn(process.execPath, ['apps/api/dist/worker.mjs'], {
      cwd: ROOT,
      stdio: 'ignore',
      env: { PATH: process.env.PATH, TZ: 'UTC', WORKER_DATABASE_URL: url },
    });
  };

  it('seals at its start what waits, then what comes, and stops when asked', async () => {
    const goods = { weight: 10, pieces: 1 };
    const waits = await write(house.api, 'before-it-starts-1', act(house.parcel, goods));
    begin(house.database.urls.worker);
    await vi.waitFor(async () => expect(await sealed()).toContain(waits), { timeout: 20_000 });
    const comes = await write(house.api, 'while-it-runs-0001', act(house.parcel, goods));
    await vi.waitFor(async () => expect(await sealed()).toContain(comes), { timeout: 10_000 });
    const exit = ended();
    worker.kill('SIGTERM');
    expect(await exit).toBe(0);
  });

  it('waits while the database is away, and stops when asked all the same', async () => {
    const refused = createServer((socket) => socket.destroy());
    const tries = new Promise((tried) => refused.once('connection', tried));
    await new Promise<void>((listening) => refused.listen(0, '127.0.0.1', listening));
    begin(`postgres://worker:x@127.0.0.1:${(refused.address() as AddressInfo).port}/foldwell`);
    const exit = ended();
    await tries;
    expect(worker.exitCode).toBeNull();
    worker.kill('SIGTERM');
    expect(await exit).toBe(0);
    refused.close();
  });
});
