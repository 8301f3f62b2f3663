import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

describe('the writer refuses what a caller made up', () => {
  const carried = { how: 'carried' };
  const all = { how: 'allotted', pool: 0, weight: 1 };
  const none = { how: 'none' };

  it('legs that do not sum to zero', async () => {
    const legs = [
      {
        lot: { id: house.parcel },
        place: { id: house.drawer },
        weight: -1000,
        pieces: -10,
        cost: carried,
      },
      {
        lot: { id: house.parcel },
        place: { kind: 'return desk' },
        weight: 900,
        pieces: 10,
        cost: all,
      },
    ];
    expect(await house.refusal({ kind: 'transfer', legs, pools: [{ of: [0] }] })).toBe(
      'movement_conserves',
    );
  });

  it('more than is there', async () => {
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { kind: 'return desk' },
      { weight: 999_990, pieces: 1 },
    );
    expect(await house.refusal({ kind: 'transfer', ...act })).toBe('balance_not_enough');
  });

  it('a weight that the house’s balance can’t read', async () => {
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { kind: 'return desk' },
      { weight: 1005, pieces: 10 },
    );
    expect(await house.refusal({ kind: 'transfer', ...act })).toBe('movement_weight_in_step');
  });

  it('goods that are out already, sent again', async () => {
    const act = house.move(
      house.stone,
      { id: house.drawer },
      { kind: 'return desk' },
      { weight: 1020, pieces: 1 },
    );
    expect(await house.refusal({ kind: 'transfer', ...act })).toBe('balance_not_enough');
  });

  it('cost that stays behind when carats leave', async () => {
    const legs = [
      {
        lot: { id: house.parcel },
        place: { id: house.drawer },
        weight: -1000,
        pieces: -10,
        cost: none,
      },
      {
        lot: { id: house.parcel },
        place: { kind: 'return desk' },
        weight: 1000,
        pieces: 10,
        cost: none,
      },
    ];
    expect(await house.refusal({ kind: 'transfer', legs })).toBe('movement_cost_fits_kind');
  });

  it('a cost of the caller’s own', async () => {
    const legs = [
      {
        lot: { id: house.parcel },
        place: { id: house.drawer },
        weight: -1000,
        pieces: -10,
        cost: { how: 'given', amount: -1 },
      },
      {
        lot: { id: house.parcel },
        place: { kind: 'return desk' },
        weight: 1000,
        pieces: 10,
        cost: all,
      },
    ];
    expect(await house.refusal({ kind: 'transfer', legs, pools: [{ of: [0] }] })).toBe(
      'movement_cost_fits_kind',
    );
  });

  it('a transfer that ends in sold', async () => {
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { kind: 'sold' },
      { weight: 1000, pieces: 10 },
    );
    expect(await house.refusal({ kind: 'transfer', ...act })).toBe('movement_legs_fit_kind');
  });

  it('a line of another lot', async () => {
    const [out, desk] = house.move(
      house.stone,
      { memoOf: house.memo },
      { kind: 'return desk' },
      { weight: 1020, pieces: 1 },
    ).legs as object[];
    const line = { line: { id: house.parcelLine } };
    const legs = [
      { ...out, ...line, flow: 'out' },
      { ...desk, ...line, flow: 'returned' },
    ];
    expect(
      await house.refusal({ kind: 'memo return', memoId: house.memo, legs, pools: [{ of: [0] }] }),
    ).toBe('posting_line_known');
  });

  it('goods of two owners in one lot', async () => {
    const legs = [
      {
        lot: { id: house.theirs },
        place: { id: house.drawer },
        weight: -1200,
        pieces: -1,
        cost: carried,
      },
      {
        lot: { id: house.theirs },
        place: { kind: 'conversion' },
        weight: 1200,
        pieces: 1,
        cost: all,
      },
      { lot: { new: 'x' }, place: { kind: 'conversion' }, weight: -1200, pieces: -1, cost: none },
      { lot: { new: 'x' }, place: { id: house.drawer }, weight: 1200, pieces: 1, cost: none },
    ];
    const newLots = [{ ref: 'x', kind: 'parcel', origin: 'natural' }];
    expect(
      await house.refusal({ kind: 'conversion', word: 'mix', newLots, legs, pools: [{ of: [0] }] }),
    ).toBe('conversion_one_owner');
  });

  it('natural goods turned laboratory-grown', async () => {
    const legs = [
      {
        lot: { id: house.parcel },
        place: { id: house.drawer },
        weight: -1000,
        pieces: -10,
        cost: carried,
      },
      {
        lot: { id: house.parcel },
        place: { kind: 'conversion' },
        weight: 1000,
        pieces: 10,
        cost: all,
      },
      {
        lot: { new: 'x' },
        place: { kind: 'conversion' },
        weight: -1000,
        pieces: -10,
        cost: { how: 'allotted', pool: 1, weight: 1 },
      },
      {
        lot: { new: 'x' },
        place: { id: house.drawer },
        weight: 1000,
        pieces: 10,
        cost: { how: 'allotted', pool: 2, weight: 1 },
      },
    ];
    const newLots = [{ ref: 'x', kind: 'parcel', origin: 'laboratory-grown' }];
    for (const word of ['split', 'test result']) {
      expect(
        await house.refusal({
          kind: 'conversion',
          word,
          newLots,
          legs,
          pools: [{ of: [0] }, { of: [1] }, { of: [2] }],
        }),
      ).toBe('conversion_one_origin');
    }
  });
});
