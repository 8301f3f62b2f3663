import { randomUUID } from 'node:crypto';
import { move, together } from '@foldwell/ledger';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { freshDatabase, type TestDatabase } from '../support/database.js';
import { type OpenApi, openApi } from './open-api.js';

const CLIENTS = [1, 4];
const LOTS_EACH = 10;
const BOOKINGS_EACH = 100;
/** The HTTP side does at least this share of what the same function does when asked directly. */
const GOAL = 0.6;

interface Stone {
  id: number;
  number: string;
}

describe('a booking of ten stones through HTTP, against the same function asked directly', () => {
  let database: TestDatabase;
  let api: OpenApi;
  let pool: pg.Pool;
  let drawers: string[];
  let stones: Stone[];

  beforeAll(async () => {
    database = await freshDatabase();
    api = await openApi(database.urls.api);
    pool = new pg.Pool({ connectionString: database.urls.api, max: 10 });
    await api.ask('POST', '/places', { kind: 'drawer', name: '2', safe: 'A' });
    const found = await pool.query<{ id: string }>(
      "SELECT id FROM place WHERE kind = 'drawer' ORDER BY id",
    );
    drawers = found.rows.map(({ id }) => id);
    const stone = {
      kind: 'stone',
      weight: 1000,
      pieces: 1,
      origin: 'natural',
      place: drawers[0],
      sum: 500_000,
    };
    const lots = Array.from({ length: Math.max(...CLIENTS) * LOTS_EACH }, () => stone);
    await api.ask('POST', '/lots', { how: 'opening', lots });
    const made = await pool.query<{ id: string; number: string }>(
      'SELECT id, number FROM lot ORDER BY id',
    );
    stones = made.rows.map(({ id, number }) => ({ id: Number(id), number }));
  });

  afterAll(async () => {
    await pool.end();
    await api.close();
    await database.drop();
  });

  /** Runs every client's bookings, there and back, and gives bookings a second. */
  async function rate(
    clients: number,
    book: (own: Stone[], from: string, to: string) => Promise<unknown>,
  ): Promise<number> {
    const began = performance.now();
    await Promise.all(
      Array.from({ length: clients }, async (_, client) => {
        const own = stones.slice(client * LOTS_EACH, (client + 1) * LOTS_EACH);
        for (let round = 0; round < BOOKINGS_EACH; round += 1) {
          const [from = '', to = ''] = round % 2 === 0 ? drawers : [...drawers].reverse();
          await book(own, from, to);
        }
      }),
    );
    return (clients * BOOKINGS_EACH * 1000) / (performance.now() - began);
  }

  function overHttp(own: Stone[], from: string, to: string): Promise<unknown> {
    const lines = own.map(({ number }) => ({ lot: number, from, weight: 1000, pieces: 1 }));
    return api.ask('POST', '/transfers', { to, lines });
  }

  function directly(own: Stone[], from: string, to: string): Promise<unknown> {
    const places = { from: { id: Number(from) }, to: { id: Number(to) } };
    const legs = together(
      ...own.map(({ id }) => move({ lot: { id }, ...places, weight: 1000, pieces: 1 })),
    );
    const act = JSON.stringify({ kind: 'transfer', ...legs });
    return pool.query('SELECT write_movement(1, $1, $1, $2)', [randomUUID(), act]);
  }

  it.each(CLIENTS)('with %i at once', async (clients) => {
    const before = await pool.query<{ n: number }>('SELECT count(*)::int AS n FROM movement');
    await rate(clients, directly);
    const floor = await rate(clients, directly);
    const ours = await rate(clients, overHttp);
    const ratio = ours / floor;
    process.stdout.write(
      `${clients} at once: HTTP ${ours.toFixed(0)}/s, directly ${floor.toFixed(0)}/s, ratio ${ratio.toFixed(2)}, goal ${GOAL}\n`,
    );
    const after = await pool.query<{ n: number }>('SELECT count(*)::int AS n FROM movement');
    expect((after.rows[0]?.n ?? 0) - (before.rows[0]?.n ?? 0)).toBe(3 * clients * BOOKINGS_EACH);
  });
});
