import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp, PARCEL } from '../support/house-over-http.js';
import { scale } from '../support/scale.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

const one = (lot: string) => house.memoOf([{ lot, weight: 1020, pieces: 1 }]);
const statuses = (answers: { status: number }[]) => answers.map(({ status }) => status).sort();
const manyStones = async (count: number) => {
  const lots: string[] = [];
  for (let made = 0; made < count; made += 100)
    lots.push(
      ...(await house.takeIn(...Array.from({ length: Math.min(100, count - made) }, () => ({})))),
    );
  return lots;
};

describe('two dealers and one stone', () => {
  it('each time one gets it and the other is told who has it', async () => {
    const { dealer, owner } = house.people;
    await house.db.query('UPDATE party SET credit_limit = NULL');
    const rounds = scale(1000);
    const lots = await manyStones(rounds);
    const wins: number[] = [];
    for (const lot of lots) {
      const answers = await Promise.all([
        dealer.post('/api/memos', one(lot)),
        owner.post('/api/memos', one(lot)),
      ]);
      expect(statuses(answers)).toEqual([201, 409]);
      const refused = answers.find(({ status }) => status === 409);
      expect(refused?.body.detail).toMatch(/It is out on M \d+ to Customer/);
      wins.push(answers.filter(({ status }) => status === 201).length);
    }
    expect(wins).toHaveLength(rounds);
  });

  it('without the guard the same race books twice: the test can fail', async () => {
    const owner = new pg.Client({ connectionString: house.database.urls.owner });
    await owner.connect();
    await owner.query('CREATE TABLE naive (lot integer, who text)');
    const rounds = Math.max(20, scale(1000));
    let doubles = 0;
    for (let lot = 0; lot < rounds; lot += 1) {
      await Promise.all(
        ['a', 'b'].map(async (who) => {
          const client = new pg.Client({ connectionString: house.database.urls.owner });
          await client.connect();
          const { rows } = await client.query('SELECT 1 FROM naive WHERE lot = $1', [lot]);
          if (rows.length === 0)
            await client.query('INSERT INTO naive VALUES ($1, $2)', [lot, who]);
          await client.end();
        }),
      );
      const { rows } = await owner.query<{ n: number }>(
        'SELECT count(*)::int AS n FROM naive WHERE lot = $1',
        [lot],
      );
      if ((rows[0]?.n ?? 0) > 1) doubles += 1;
    }
    await owner.query('DROP TABLE naive');
    await owner.end();
    expect(doubles).toBeGreaterThan(0);
  });
});

describe('one parcel and forty who want some of it', () => {
  it('is never oversold', async () => {
    const [lot = ''] = await house.takeIn({ ...PARCEL, weight: 10_000, pieces: 500 });
    const wants = Array.from({ length: 40 }, () =>
      house.people.dealer.post('/api/memos', house.memoOf([{ lot, weight: 3000, pieces: 150 }])),
    );
    const answers = await Promise.all(wants);
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(3);
    expect(answers.filter(({ status }) => status === 409)).toHaveLength(37);
    const { row } = (await house.people.owner.get(`/api/lots/${lot}`)).body;
    expect([row.bar.safe, row.bar.out, row.cost]).toEqual([1000, 9000, 3_000_00]);
  });
});

describe('two memos that pass a limit only together', () => {
  const together = async (party: string) => {
    const lots = await house.takeIn({}, {});
    return Promise.all(
      lots.map((lot) => house.people.dealer.post('/api/memos', { ...one(lot), party })),
    );
  };

  it('one is booked, the other waits', async () => {
    for (let round = 0; round < scale(40); round += 1) {
      const party = (
        await house.people.owner.post('/api/parties', {
          name: `Limit ${round}`,
          isCustomer: true,
          creditLimit: 150_000,
        })
      ).body.number;
      const answers = await together(party);
      expect(statuses(answers)).toEqual([201, 409]);
      expect(answers.find(({ status }) => status === 409)?.body.code).toBe('party_credit_limit');
    }
  });

  it('asked first and booked afterwards both would pass: the test can fail', async () => {
    const { dealer, owner } = house.people;
    const party = (await owner.post('/api/parties', { name: 'Open', isCustomer: true })).body
      .number;
    const lots = await house.takeIn({}, {});
    const limit = 150_000;
    const answers = await Promise.all(
      lots.map(async (lot) => {
        const body = { ...one(lot), party };
        // What a page could do without the writer's judgement: look, then book.
        const { after } = (await dealer.post('/api/memos/preview', body)).body;
        return after > limit ? { status: 409 } : dealer.post('/api/memos', body);
      }),
    );
    expect(statuses(answers)).toEqual([201, 201]);
    const { exposure } = (await owner.get(`/api/parties/${party}`)).body;
    expect(exposure.total).toBeGreaterThan(limit);
  });
});

describe('twelve who move the same lots in crossing order', () => {
  it('no deadlock reaches anybody', async () => {
    const lots = await manyStones(10);
    const drawers = (await house.people.owner.get('/api/places')).body
      .filter((place: { kind: string }) => place.kind === 'drawer')
      .map((place: { id: string }) => place.id);
    drawers.push(
      (await house.people.owner.post('/api/places', { kind: 'drawer', safe: 'Z', name: '1' })).body
        .id,
    );
    const seen = new Set<number>();
    for (let round = 0; round < scale(80); round += 1) {
      const from = drawers[round % 2];
      const to = drawers[(round + 1) % 2];
      const answers = await Promise.all(
        Array.from({ length: 12 }, (_, client) => {
          const some = [...lots.slice(client % 10), ...lots.slice(0, client % 10)].slice(0, 6);
          if (client % 2) some.reverse();
          return house.people.dealer.post('/api/transfers', {
            to,
            lines: some.map((lot) => ({ lot, from, weight: 1020, pieces: 1 })),
          });
        }),
      );
      for (const { status } of answers) seen.add(status);
      const rest = (await house.people.owner.get(`/api/lots?place=${from}`)).body.rows.filter(
        (row: { number: string }) => lots.includes(row.number),
      );
      if (rest.length > 0)
        await house.people.owner.post('/api/transfers', {
          to,
          lines: rest.map((row: { number: string }) => ({
            lot: row.number,
            from,
            weight: 1020,
            pieces: 1,
          })),
        });
    }
    expect([...seen].filter((status) => status >= 500)).toEqual([]);
    expect(seen.has(201)).toBe(true);
  });
});
