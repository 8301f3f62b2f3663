import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
let difference = 0;
beforeAll(async () => {
  house = await SmallHouse.open();
  difference = await house.shortReturn();
});
afterAll(() => house.close());

const DESK = { kind: 'return desk' };
const drawer = () => ({ id: house.drawer });
const some = { weight: 1000, pieces: 70 };
const CARRIED = { how: 'carried' };
const all = (pool: number) => ({ how: 'allotted', pool, weight: 1 });

/** A memo of a part of the parcel, with what is said otherwise about it. */
const memo = (more: object = {}) => {
  const act = house.move(house.parcel, drawer(), { memoOf: 'new' }, some);
  const [leaves, arrives] = act.legs as object[];
  return {
    ...act,
    kind: 'memo out',
    newMemo: {
      partyId: 1,
      due: '2999-01-01',
      currency: 'USD',
      lines: [{ lotId: house.parcel, price: 42_000, pricedWeight: 1000 }],
      ...more,
    },
    legs: [leaves, { ...arrives, line: { newLine: 0 }, flow: 'sent' }],
  };
};

const withParty = async (change: string, act: object, person: number) => {
  await house.owner.query(`UPDATE party SET ${change}`);
  const said = await house.refusal(act as never, person);
  await house.owner.query(
    'UPDATE party SET memo_limit = NULL, credit_limit = 100000000, identity_papers_until = NULL',
  );
  return said;
};

describe('the writer refuses by name', () => {
  it('a memo past a limit, or to a party whose papers lapsed', async () => {
    expect(await withParty('memo_limit = 1', memo(), 2)).toBe('party_memo_limit');
    expect(await withParty('credit_limit = 1', memo(), 2)).toBe('party_credit_limit');
    const lapsed = `identity_papers_until = '2020-01-01'`;
    expect(await withParty(lapsed, memo(), 2)).toBe('party_papers_lapsed');
    const released = { ...memo(), releaseReason: 'known for years' };
    expect(await withParty('memo_limit = 1', released, 2)).toBe('party_memo_limit');
  });

  it('a memo in a currency without a rate', async () => {
    expect(await house.refusal(memo({ currency: 'EUR' }))).toBe('currency_has_rate');
  });

  it('an act that says nothing', async () => {
    expect(await house.refusal({})).toBe('movement_says_something');
  });

  it('a void memo of which something came back', async () => {
    const act = house.move(house.stone, { memoOf: house.memo }, drawer(), {
      weight: 1020,
      pieces: 1,
    });
    const voided = { ...act, kind: 'memo void', memoId: house.memo, reason: 'wrong party' };
    const [leaves, arrives] = act.legs as object[];
    const { rows } = await house.owner.query<{ id: string }>(
      'SELECT id FROM memo_line WHERE lot_id = $1',
      [house.stone],
    );
    const line = { line: { id: Number(rows[0]?.id) }, flow: 'returned' };
    expect(await house.refusal({ ...voided, legs: [{ ...leaves, ...line }, arrives] })).toBe(
      'memo_void_while_unsettled',
    );
  });

  it('an answer to what is not open, and one past the limit of a role', async () => {
    const answers = [{ differenceId: 999, answer: 'accepted' }];
    expect(await house.refusal({ answers })).toBe('difference_still_open');
    await house.owner.query('UPDATE house SET accept_limit = 10');
    const over = { answers: [{ differenceId: difference, answer: 'accepted' }] };
    expect(await house.refusal(over, 2)).toBe('difference_within_role_limit');
  });

  it('a restatement past the memo’s tolerance', async () => {
    const sent = await house.write(memo());
    const { rows } = await house.owner.query<{ id: string }>(
      'SELECT id FROM memo_line WHERE memo_id = $1',
      [sent.memoId],
    );
    const mark = { lot: { id: house.parcel }, line: { id: Number(rows[0]?.id) } };
    const place = { memoOf: sent.memoId };
    const legs = [
      { ...mark, place, weight: -1000, pieces: -70, cost: CARRIED, flow: 'out' },
      { ...mark, place: DESK, weight: 970, pieces: 70, cost: all(0), flow: 'returned' },
      {
        ...mark,
        place: { kind: 'loss' },
        weight: 30,
        pieces: 0,
        cost: { how: 'none' },
        flow: 'restated',
      },
    ];
    const back = { kind: 'memo return', memoId: sent.memoId, legs, pools: [{ of: [0] }] };
    expect(await house.refusal(back)).toBe('memo_restated_within_tolerance');
  });

  it('goods of another treatment in one lot', async () => {
    const act = house.move(house.parcel, drawer(), { kind: 'conversion' }, some);
    const [leaves, passes] = act.legs as object[];
    const other = { lot: { new: 'x' } };
    const conversion = { kind: 'conversion' };
    const legs = [
      leaves,
      passes,
      { ...other, place: conversion, weight: -1000, pieces: -70, cost: all(1) },
      { ...other, place: drawer(), ...some, cost: all(2) },
    ];
    const newLots = [{ ref: 'x', kind: 'parcel', origin: 'natural', treatment: 'HPHT' }];
    const pools = [{ of: [0] }, { of: [1] }, { of: [2] }];
    expect(await house.refusal({ kind: 'conversion', word: 'split', newLots, legs, pools })).toBe(
      'conversion_one_treatment',
    );
  });

  it('an undoing of an undoing, of a sale, and of what is no longer the newest', async () => {
    const undo = (reverses: number) => ({ kind: 'reversal', reverses, reason: 'a mistake' });
    const moved = await house.write({
      kind: 'transfer',
      ...house.move(house.parcel, drawer(), DESK, some),
    });
    const again = await house.write({
      kind: 'transfer',
      ...house.move(house.parcel, drawer(), DESK, some),
    });
    expect(await house.refusal(undo(moved.movementId))).toBe('reversal_of_newest');
    const undone = await house.write(undo(again.movementId));
    expect(await house.refusal(undo(undone.movementId))).toBe('reversal_not_of_reversal');
    const sold = await house.write({
      kind: 'sale',
      ...house.move(house.parcel, drawer(), { kind: 'sold' }, some),
    });
    expect(await house.refusal(undo(sold.movementId))).toBe('reversal_of_this_kind');
    expect(await house.refusal(undo(again.movementId))).toBe('movement_reversed_once');
  });

  it('a series that is in use set elsewhere, and a place of papers made by hand', async () => {
    const ask = (sql: string) =>
      house.api.query(sql).then(
        () => '',
        (error: { constraint: string }) => error.constraint,
      );
    expect(await ask(`UPDATE number_series SET first = 50, next = 50 WHERE series = 'lot'`)).toBe(
      'number_series_used',
    );
    expect(await ask(`INSERT INTO place (kind, name) VALUES ('memo in', 'x')`)).toMatch(
      /place_made_by_writer|place_names_its_holder/,
    );
    expect(await ask(`INSERT INTO place (kind, name) VALUES ('sold', 'x')`)).toBe(
      'place_made_by_writer',
    );
  });
});
