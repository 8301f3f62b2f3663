import { daysBetween } from '@foldwell/quantities';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { type Body, HouseOverHttp, PARCEL, STONE } from '../support/house-over-http.js';

let house: HouseOverHttp;
let lots: string[] = [];
let late = '';
let open = '';
beforeAll(async () => {
  house = await HouseOverHttp.open();
  const taken = await house.people.buyer.post('/api/lots', {
    how: 'purchase',
    party: house.supplier,
    businessDate: '2026-01-05',
    lots: [PARCEL, STONE, STONE, STONE].map((lot) => ({ ...lot, place: house.drawer })),
  });
  lots = taken.body.numbers;
  const [parcel = '', one = '', two = ''] = lots;
  const stone = (lot: string) => ({ lot, weight: 1020, pieces: 1 });
  const dated = { businessDate: '2026-01-06', due: '2026-01-20' };
  const book = async (body: object) =>
    (await house.people.dealer.post('/api/memos', body)).body.number;
  late = await book(house.memoOf([{ lot: parcel, weight: 4000, pieces: 200 }, stone(one)], dated));
  open = await book(house.memoOf([stone(two)]));
});
afterAll(() => house.close());

async function firstLight(who = house.people.dealer): Promise<Body> {
  return (await who.get('/api/first-light')).body;
}

function expectWhole({ bar, whole }: Body): void {
  expect(Object.values<number>(bar).reduce((sum, part) => sum + part, 0)).toBe(whole);
}

describe('first light', () => {
  it('the house’s bar adds up to the whole, with what is under each part', async () => {
    const light = await firstLight();
    expect(light.bar).toEqual({ safe: 7020, out: 6040, returned: 0, sold: 0, missing: 0 });
    expectWhole(light);
    expect(light.under).toEqual({
      safe: '2 lots in 1 safe',
      out: '2 memos, 1 customer',
      returned: '0 lots on the return desk',
      sold: '0 lots kept or sold',
      missing: 'nothing to answer',
      whole: 'taken in 13.06, restated 0 pt',
    });
  });

  it('names what is out with the late first, and who is late with the last word', async () => {
    const { today, memos, late: rows } = await firstLight();
    expect(memos.map((memo: Body) => memo.number)).toEqual([late, open]);
    expect(rows).toEqual([
      {
        party: 'Customer',
        partyNumber: house.customer,
        days: daysBetween('2026-01-20', today),
        memo: late,
        lastWord: 'no word since 6 Jan',
        value: 502_000,
        currency: 'USD',
      },
    ]);
    const words = { words: 'back on Thursday', isTheirs: true };
    expect((await house.people.dealer.post(`/api/memos/${late}/words`, words)).status).toBe(201);
    expect((await firstLight()).late[0].lastWord).toMatch(/^\d+ [A-Z][a-z]{2}, back on Thursday$/);
    const none = await house.people.dealer.post(`/api/memos/${late}/words`, { words: '  ' });
    expect(none.body.detail).toBe('There is nothing to keep.');
  });

  it('shows what came back and does not agree, and still adds up', async () => {
    const [parcel, one] = lots;
    const { bookkeeper, owner } = house.people;
    const path = `/api/memos/${late}/returns`;
    await bookkeeper.post(path, { lot: parcel, weight: 3920 });
    await bookkeeper.post(path, { lot: one, weight: 1020 });
    const light = await firstLight();
    expect(light.bar).toEqual({ safe: 7020, out: 1020, returned: 4940, sold: 0, missing: 80 });
    expectWhole(light);
    expect(light.under).toMatchObject({
      missing: '1 to answer',
      returned: '2 lots on the return desk',
    });
    const [difference] = light.differences;
    expect(difference).toMatchObject({ lot: parcel, memo: late, kind: 'short', held: 80 });
    await owner.post(`/api/differences/${difference.id}/answer`, {
      answer: 'written off',
      reason: 'not found',
    });
    const after = await firstLight();
    expect([after.bar.missing, after.whole, after.differences]).toEqual([0, 12_980, []]);
    expectWhole(after);
    expect(after.under.whole).toBe('taken in 13.06, restated or lost −8 pt');
    expect(after.late).toEqual([]);
  });

  it('memos are found by state, customer, number and name', async () => {
    const numbers = async (query: string) =>
      (await house.people.bookkeeper.get(`/api/memos?${query}`)).body.map(
        (memo: Body) => memo.number,
      );
    expect(await numbers('state=open')).toEqual([open]);
    expect(await numbers('state=settled')).toEqual([late]);
    expect(await numbers('state=all')).toEqual([open, late]);
    expect(await numbers(`state=all&q=M${late}`)).toEqual([late]);
    expect(await numbers('state=all&q=custom')).toEqual([open, late]);
    expect(await numbers('state=all&q=100%25')).toEqual([]);
    expect(await numbers(`state=all&party=${house.customer}`)).toEqual([open, late]);
    expect(await numbers(`state=all&before=${open}`)).toEqual([late]);
  });
});
