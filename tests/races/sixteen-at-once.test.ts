import { randomUUID } from 'node:crypto';
import { bringBack, move, sendOut, together } from '@foldwell/ledger';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';

import { makeDataSource } from '../../apps/api/src/database/data-source.js';
import { postAct } from '../../apps/api/src/features/ledger/post-act.js';
import { verifyLedger } from '../../apps/api/src/features/verify/verify-ledger.js';
import { SmallHouse } from '../database/small-house.js';
import { isFull } from '../support/scale.js';

const WORKERS = 16;
const FOR_MS = isFull ? 60_000 : 3000;
const DESK = { kind: 'return desk' } as const;

let house: SmallHouse;
let lots: number[] = [];
beforeAll(async () => {
  house = await SmallHouse.open();
  await house.owner.query('UPDATE party SET credit_limit = NULL');
  const refs = Array.from({ length: 10 }, (_, index) => `p${index}`);
  const { lots: made } = await house.write({
    kind: 'opening',
    newLots: refs.map((ref) => ({ ref, kind: 'parcel', origin: 'natural', is_estimated: true })),
    legs: refs.flatMap((ref, index) => [
      {
        lot: { new: ref },
        place: { kind: 'supplier' },
        weight: -20_000,
        pieces: -500,
        cost: { how: 'given', amount: -700_001 },
      },
      {
        lot: { new: ref },
        place: { id: house.drawer },
        weight: 20_000,
        pieces: 500,
        cost: { how: 'allotted', pool: index, weight: 1 },
      },
    ]),
    pools: refs.map((_, index) => ({ of: [2 * index] })),
  });
  lots = Object.values(made).map(({ id }) => id);
});
afterAll(() => house.close());

test('sixteen at once on the same ten parcels leave a house that verify holds true', async () => {
  const db = await makeDataSource(house.database.urls.api, WORKERS).initialize();
  const until = Date.now() + FOR_MS;
  const told = new Map<string, number>();
  const ask = async (act: Parameters<typeof postAct>[2]) => {
    const key = { personId: '1', key: randomUUID(), hash: 'hash' };
    try {
      const written = await postAct({ db }, key, act);
      told.set('booked', (told.get('booked') ?? 0) + 1);
      return written;
    } catch (error) {
      const { constraint, code } = (error as { driverError: pg.DatabaseError }).driverError;
      const said = constraint ?? code ?? 'unknown';
      told.set(said, (told.get(said) ?? 0) + 1);
      return null;
    }
  };
  const work = async () => {
    while (Date.now() < until) {
      const some = [...lots].sort(() => Math.random() - 0.5).slice(0, 3);
      const goods = { weight: 10 * Math.ceil(Math.random() * 800), pieces: 3 };
      const drawer = { id: house.drawer };
      const [from, to] = Math.random() < 0.5 ? [drawer, DESK] : [DESK, drawer];
      const moved = some.map((id) => move({ lot: { id }, from, to, ...goods }));
      await ask({ kind: 'transfer', ...together(...moved) });
      const sent = await ask({
        kind: 'memo out',
        newMemo: {
          partyId: 1,
          due: '2999-01-01',
          currency: 'USD',
          lines: some.map((lotId) => ({ lotId, price: 100, pricedWeight: goods.weight })),
        },
        document: { kind: 'memo', snapshot: {} },
        ...sendOut(some.map((id) => ({ lot: { id }, from: drawer, ...goods }))),
      });
      if (!sent?.memoId) continue;
      const memoId = Number(sent.memoId);
      const lines = await db.query<{ id: string; lot: string }[]>(
        'SELECT id, lot_id AS lot FROM memo_line WHERE memo_id = $1',
        [memoId],
      );
      const back = lines.map(({ id, lot }) =>
        bringBack({ lot: { id: Number(lot) }, memoId, lineId: Number(id) }, DESK, goods),
      );
      await ask({ kind: 'memo return', memoId, ...together(...back) });
    }
  };
  try {
    await Promise.all(Array.from({ length: WORKERS }, work));
  } finally {
    await db.destroy();
  }
  process.stdout.write(`${WORKERS} at once: ${JSON.stringify(Object.fromEntries(told))}\n`);
  // Refused for what is not there; never for a lock, a deadlock or a broken rule of the ledger.
  expect([...told.keys()].filter((said) => !/^(booked|balance_\w+)$/.test(said))).toEqual([]);
  expect(told.get('booked')).toBeGreaterThan(WORKERS);

  await house.worker.query('SELECT seal_waiting()');
  const reader = new pg.Client({ connectionString: house.database.urls.reader });
  await reader.connect();
  const { lines } = await verifyLedger(reader);
  await reader.end();
  expect(lines.filter((line) => line.includes(' FAIL '))).toEqual([]);
});
