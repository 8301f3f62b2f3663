import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

describe('the writer refuses acts of somebody who may not, and of another day', () => {
  const carried = { how: 'carried' };
  const all = { how: 'allotted', pool: 0, weight: 1 };

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
