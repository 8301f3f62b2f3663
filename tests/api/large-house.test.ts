import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp } from '../support/house-over-http.js';

const LOTS = 20_010;

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
  const client = new pg.Client({ connectionString: house.database.urls.postgres });
  await client.connect();
  // Without the writer: what is tested is the reading of many lots, not their booking.
  await client.query(`SET session_replication_role = replica;
    INSERT INTO lot (number, kind, origin, is_estimated, is_living, part_safe, part_pieces, ask_price)
    SELECT n::text, 'parcel', 'natural', false, true, 1000, 2, 100 FROM generate_series(1, ${LOTS}) n`);
  await client.end();
});
afterAll(() => house.close());

describe('a house of more lots than are counted', () => {
  it('stops the count at 10,000 but sums carats, pieces and value of every lot', async () => {
    const { body } = await house.people.owner.get('/api/lots/sum');
    expect(body).toMatchObject({ lots: 10_000, isCapped: true, of: 10_000 });
    expect(body).toMatchObject({ weight: LOTS * 1000, pieces: LOTS * 2, value: LOTS * 100 });
    expect(body.bar.safe).toBe(LOTS * 1000);
  });

  it('writes every lot once into the CSV, and only those that pass the sieve', async () => {
    const numbers = async (path: string) => {
      const { body } = await house.people.owner.get(path);
      return String(body)
        .trim()
        .split('\r\n')
        .slice(1)
        .map((line) => line.split(',')[0]);
    };
    const all = await numbers('/api/lots.csv');
    expect(all.length).toBe(LOTS);
    expect(new Set(all).size).toBe(LOTS);
    expect(await numbers('/api/lots.csv?q=20009')).toEqual(['"20009"']);
  });
});
