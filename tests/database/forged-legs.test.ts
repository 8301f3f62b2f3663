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

  it('a day before the goods came, and a day ahead', async () => {
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { kind: 'return desk' },
      { weight: 1000, pieces: 10 },
    );
    expect(await house.refusal({ kind: 'transfer', businessDate: '2025-01-01', ...act })).toBe(
      'balance_date_in_order',
    );
    expect(await house.refusal({ kind: 'transfer', businessDate: '2999-01-01', ...act })).toBe(
      'movement_date_not_ahead',
    );
  });

  it('a person who was taken away', async () => {
    await house.owner.query('UPDATE person SET disabled_at = now() WHERE id = 2');
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { kind: 'return desk' },
      { weight: 1000, pieces: 10 },
    );
    expect(await house.refusal({ kind: 'transfer', ...act }, 2)).toBe('movement_person_active');
  });

  it('an answer by who weighed, and a second answer', async () => {
    const difference = await house.shortReturn();
    const line = { line: { id: house.parcelLine } };
    const legs = [
      {
        lot: { id: house.parcel },
        place: { kind: 'missing' },
        weight: -80,
        pieces: -5,
        cost: carried,
        ...line,
        flow: 'missing',
        difference: { id: difference },
      },
      {
        lot: { id: house.parcel },
        place: { kind: 'return desk' },
        weight: 80,
        pieces: 5,
        cost: all,
        ...line,
        flow: 'returned',
      },
    ];
    const act = {
      kind: 'difference answered',
      memoId: house.memo,
      legs,
      pools: [{ of: [0] }],
      answers: [{ differenceId: difference, answer: 'found again' }],
    };
    expect(await house.refusal(act, 3)).toBe('difference_not_by_who_weighed');
    expect(await house.refusal(act, 1)).toBe('');
    expect(await house.refusal(act, 1)).toBe('balance_not_enough');
  });

  it('another body under the same key; the same body is answered as before', async () => {
    const ask = (hash: string) =>
      house.api.query<{ a: unknown }>('SELECT write_movement(1, $1, $2, $3) AS a', [
        'same-key-same-key-1',
        hash,
        JSON.stringify({
          kind: 'transfer',
          ...house.move(
            house.parcel,
            { id: house.drawer },
            { kind: 'return desk' },
            { weight: 10, pieces: 1 },
          ),
        }),
      ]);
    const first = await ask('one');
    expect((await ask('one')).rows).toEqual(first.rows);
    await expect(ask('other')).rejects.toMatchObject({ constraint: 'idempotency_same_body' });
  });
});
