import { afterAll, beforeAll, expect, it } from 'vitest';

import { HouseOverHttp, PARCEL } from '../support/house-over-http.js';

let house: HouseOverHttp;
let stone = '';
let parcel = '';
beforeAll(async () => {
  house = await HouseOverHttp.open();
  [stone = '', parcel = ''] = await house.takeIn(
    { reportLaboratory: 'Invented Lab', reportNumber: '90017' },
    PARCEL,
  );
});
afterAll(() => house.close());

const passing = async (sieve: string) =>
  (await house.people.dealer.get(`/api/lots?${sieve}`)).body.rows.map(
    (row: { number: string }) => row.number,
  );

it('sieves by the report, its laboratory, or goods without one', async () => {
  expect(await passing('report=any')).toEqual([stone]);
  expect(await passing('report=none')).toEqual([parcel]);
  expect(await passing('report=invented%20lab')).toEqual([stone]);
  expect(await passing('report=another')).toEqual([]);
});

it('sieves by the supplier, with or without the letter before the number', async () => {
  expect(await passing(`supplier=${house.supplier}`)).toEqual([stone, parcel]);
  expect(await passing(`supplier=C%20${house.supplier}`)).toEqual([stone, parcel]);
  expect(await passing(`supplier=${house.customer}`)).toEqual([]);
});
