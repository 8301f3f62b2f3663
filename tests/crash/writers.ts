import pg from 'pg';

import type { CrashCluster } from './crash-cluster.js';

const WRITERS = 6;

/** A house with a parcel for each writer, in the first of two drawers. */
export async function fillHouse(cluster: CrashCluster): Promise<void> {
  await cluster.withClient('owner', async (owner) => {
    await owner.query(`
      INSERT INTO person (email, name, roles) VALUES ('a@house.test', 'Ada', '{owner}');
      INSERT INTO house (name, zone, base_currency, price_currency, books_currency) VALUES ('House', 'UTC', 'USD', 'USD', 'USD');
      INSERT INTO place (kind, name, safe) VALUES ('drawer', '1', 'A')`);
  });
  await cluster.withClient('api', async (api) => {
    const drawer = await drawerOf(api);
    for (let writer = 1; writer <= WRITERS; writer += 1) {
      await write(api, `writer-${writer}-takes-in`, {
        kind: 'opening',
        newLots: [{ ref: 'p', kind: 'parcel', origin: 'natural', is_estimated: true }],
        legs: [
          {
            lot: { new: 'p' },
            place: { kind: 'supplier' },
            weight: -50_000,
            pieces: -1000,
            cost: { how: 'given', amount: -1_000_001 },
          },
          {
            lot: { new: 'p' },
            place: { id: drawer },
            weight: 50_000,
            pieces: 1000,
            cost: { how: 'allotted', pool: 0, weight: 1 },
          },
        ],
        pools: [{ of: [0] }],
      });
    }
  });
}

async function drawerOf(client: pg.Client): Promise<number> {
  const { rows } = await client.query<{ id: string }>(`SELECT id FROM place WHERE kind = 'drawer'`);
  return Number(rows[0]?.id);
}

async function write(client: pg.Client, key: string, act: object): Promise<void> {
  await client.query('SELECT write_movement(1, $1, $2, $3)', [key, 'hash', JSON.stringify(act)]);
}

/**
 * Six writers, each moving its own parcel to and fro, until they are stopped or the database is gone.
 * Each keeps the keys of what was acknowledged to it in a list of its own, outside the database.
 */
export class Writers {
  readonly acknowledged: string[] = [];
  #isStopping = false;
  #turn = 0;
  #running: Promise<unknown> = Promise.resolve();

  /** Begins to write; `settled` resolves when all have ended. */
  begin(url: string): void {
    this.#isStopping = false;
    this.#turn += 1;
    const turn = this.#turn;
    const all = Array.from({ length: WRITERS }, (_, index) => this.#write(url, index + 1, turn));
    this.#running = Promise.allSettled(all);
  }

  async end(): Promise<void> {
    this.#isStopping = true;
    await this.#running;
  }

  async #write(url: string, lot: number, turn: number): Promise<void> {
    const client = new pg.Client({ connectionString: url });
    client.on('error', () => undefined);
    await client.connect();
    const drawer = await drawerOf(client);
    try {
      for (let act = 1; !this.#isStopping; act += 1) {
        const key = `turn-${turn}-lot-${lot}-act-${act}`;
        const [from, to] = [{ id: drawer }, { kind: 'return desk' }];
        const isBack = act % 2 === 0;
        await write(client, key, {
          kind: 'transfer',
          legs: [
            {
              lot: { id: lot },
              place: isBack ? to : from,
              weight: -10,
              pieces: 0,
              cost: { how: 'carried' },
            },
            {
              lot: { id: lot },
              place: isBack ? from : to,
              weight: 10,
              pieces: 0,
              cost: { how: 'allotted', pool: 0, weight: 1 },
            },
          ],
          pools: [{ of: [0] }],
        });
        this.acknowledged.push(key);
      }
    } finally {
      await client.end().catch(() => undefined);
    }
  }
}

/** Which of the keys the database knows nothing of any more. */
export function missing(cluster: CrashCluster, keys: string[]): Promise<string[]> {
  return cluster.withClient('reader', async (reader) => {
    const { rows } = await reader.query<{ key: string }>(
      'SELECT key FROM unnest($1::text[]) AS key EXCEPT SELECT request_id FROM movement',
      [keys],
    );
    return rows.map(({ key }) => key);
  });
}
