import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

const CARRIED = { how: 'carried' };
const NONE = { how: 'none' };
const all = (pool: number) => ({ how: 'allotted', pool, weight: 1 });
const given = (amount: number) => ({ how: 'given', amount });
const DESK = { kind: 'return desk' };

describe('the writer judges legs by what they mean', () => {
  it('a line said to be back by a movement that never touches its memo', async () => {
    const act = house.move(house.parcel, { id: house.drawer }, DESK, { weight: 100, pieces: 7 });
    const [leaves, arrives] = act.legs as object[];
    const said = { ...arrives, line: { id: house.parcelLine }, flow: 'returned' };
    expect(await house.refusal({ ...act, kind: 'transfer', legs: [leaves, said] })).toBe(
      'memo_place_is_its_lines',
    );
  });

  it('goods back by a credit note that were never sold', async () => {
    const lot = { id: house.parcel };
    const legs = [
      { lot, place: { kind: 'sold' }, weight: -1000, pieces: -70, cost: given(-1) },
      { lot, place: DESK, weight: 1000, pieces: 70, cost: all(0) },
    ];
    expect(await house.refusal({ kind: 'credit return', legs, pools: [{ of: [0] }] })).toBe(
      'balance_sold_not_negative',
    );
  });

  it('a sale that lowers its cost through the supplier', async () => {
    const lot = { id: house.parcel };
    const legs = [
      { lot, place: { id: house.drawer }, weight: -1000, pieces: -70, cost: CARRIED },
      { lot, place: { kind: 'supplier' }, weight: 0, pieces: 0, cost: given(10_000) },
      { lot, place: { kind: 'sold' }, weight: 1000, pieces: 70, cost: all(0) },
    ];
    expect(await house.refusal({ kind: 'sale', legs, pools: [{ of: [0, 1] }] })).toBe(
      'movement_cost_fits_kind',
    );
  });

  it('a fee named at another place than the charges', async () => {
    const lot = { id: house.parcel };
    const legs = [
      { lot, place: { kind: 'loss' }, weight: 0, pieces: 0, cost: given(-500) },
      { lot, place: { id: house.drawer }, weight: 0, pieces: 0, cost: all(0) },
    ];
    const charge = { kind: 'charge', legs, pools: [{ of: [0] }] };
    expect(await house.refusal(charge)).toMatch(/movement_(legs|cost)_fit/);
  });

  it('goods of ours that come in as if consigned, and goods of a consignor bought in', async () => {
    const goods = { weight: 500, pieces: 1 };
    const stone = { kind: 'stone', fixed_pieces: 1, origin: 'natural' };
    const legsFrom = (place: object) => [
      { lot: { new: 'x' }, place, weight: -500, pieces: -1, cost: NONE },
      { lot: { new: 'x' }, place: { id: house.drawer }, ...goods, cost: NONE },
    ];
    const memoIn = Number(
      (await house.owner.query(`SELECT id FROM place WHERE kind = 'memo in'`)).rows[0]?.id,
    );
    const ours = { ref: 'x', ...stone };
    expect(
      await house.refusal({
        kind: 'consignment in',
        newLots: [ours],
        legs: legsFrom({ id: memoIn }),
      }),
    ).toBe('movement_legs_fit_kind');
    expect(
      await house.refusal({
        kind: 'purchase',
        newLots: [{ ...ours, owner_party_id: 1 }],
        legs: legsFrom({ kind: 'supplier' }),
      }),
    ).toBe('movement_legs_fit_kind');
  });

  it('more goods onto a line that was sent', async () => {
    const act = house.move(
      house.parcel,
      { id: house.drawer },
      { memoOf: house.memo },
      { weight: 1000, pieces: 70 },
    );
    const [leaves, arrives] = act.legs as object[];
    const sent = { ...arrives, line: { id: house.parcelLine }, flow: 'sent' };
    const more = { ...act, kind: 'memo out', memoId: house.memo, legs: [leaves, sent] };
    expect(await house.refusal(more)).toBe('memo_line_sent_once');
  });

  it('a stone that comes back at another weight than it went', async () => {
    const { rows } = await house.owner.query<{ id: string }>(
      'SELECT id FROM memo_line WHERE lot_id = $1',
      [house.stone],
    );
    const mark = { lot: { id: house.stone }, line: { id: Number(rows[0]?.id) } };
    const legs = [
      {
        ...mark,
        place: { memoOf: house.memo },
        weight: -1020,
        pieces: -1,
        cost: CARRIED,
        flow: 'out',
      },
      { ...mark, place: DESK, weight: 1010, pieces: 1, cost: all(0), flow: 'returned' },
      { ...mark, place: { kind: 'loss' }, weight: 10, pieces: 0, cost: NONE, flow: 'restated' },
    ];
    const back = { kind: 'memo return', memoId: house.memo, legs, pools: [{ of: [0] }] };
    expect(await house.refusal(back)).toBe('balance_stone_whole');
  });

  it('takes back the rest of a line of which a difference was accepted', async () => {
    const mark = { lot: { id: house.parcel }, line: { id: house.parcelLine } };
    const memo = { memoOf: house.memo };
    const difference = await shortOfPart();
    const accepted = [
      {
        ...mark,
        place: { kind: 'missing' },
        weight: -80,
        pieces: 0,
        cost: CARRIED,
        flow: 'missing',
        difference: { id: difference },
      },
      { ...mark, place: { kind: 'loss' }, weight: 80, pieces: 0, cost: NONE, flow: 'restated' },
      { lot: mark.lot, place: DESK, weight: 0, pieces: 0, cost: all(0) },
    ];
    const answer = {
      kind: 'difference answered',
      memoId: house.memo,
      legs: accepted,
      pools: [{ of: [0] }],
      answers: [{ differenceId: difference, answer: 'accepted' }],
    };
    expect(await house.refusal(answer, 1)).toBe('');
    const rest = [
      { ...mark, place: memo, weight: -5000, pieces: -300, cost: CARRIED, flow: 'out' },
      { ...mark, place: DESK, weight: 4990, pieces: 300, cost: all(0), flow: 'returned' },
      { ...mark, place: { kind: 'loss' }, weight: 10, pieces: 0, cost: NONE, flow: 'restated' },
    ];
    const back = { kind: 'memo return', memoId: house.memo, legs: rest, pools: [{ of: [0] }] };
    expect(await house.refusal(back, 3)).toBe('');
  });

  async function shortOfPart(): Promise<number> {
    const mark = { lot: { id: house.parcel }, line: { id: house.parcelLine } };
    const memo = { memoOf: house.memo };
    const written = await house.write(
      {
        kind: 'memo return',
        memoId: house.memo,
        newDifferences: [
          {
            ref: 'd',
            lot: mark.lot,
            lineId: house.parcelLine,
            kind: 'short',
            expectedWeight: 4060,
            foundWeight: 3980,
          },
        ],
        legs: [
          { ...mark, place: memo, weight: -3980, pieces: -298, cost: CARRIED, flow: 'out' },
          { ...mark, place: DESK, weight: 3980, pieces: 298, cost: all(0), flow: 'returned' },
          { ...mark, place: memo, weight: -80, pieces: 0, cost: CARRIED, flow: 'out' },
          {
            ...mark,
            place: { kind: 'missing' },
            weight: 80,
            pieces: 0,
            cost: all(1),
            flow: 'missing',
            difference: { new: 'd' },
          },
        ],
        pools: [{ of: [0] }, { of: [2] }],
      },
      3,
    );
    return written.differences.d ?? 0;
  }
});
