import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { type Body, HouseOverHttp, PARCEL } from '../support/house-over-http.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

/** A parcel of 10.00 ct for 3,000.00 USD, 4.00 ct of it out on a memo at 1,000 USD/ct. */
async function parcelOut(more: object = {}): Promise<{ lot: string; memo: string }> {
  const [lot = ''] = await house.takeIn({ ...PARCEL, ...more });
  const body = house.memoOf([{ lot, weight: 4000, pieces: 200 }]);
  return { lot, memo: (await house.people.dealer.post('/api/memos', body)).body.number };
}

async function weighedBack(
  { lot, memo }: { lot: string; memo: string },
  reading: object,
): Promise<Body> {
  const path = `/api/memos/${memo}/returns`;
  const { body } = await house.people.bookkeeper.post(path, { lot, ...reading });
  const open = (await house.people.owner.get('/api/differences')).body;
  return { ...body, difference: open.find((one: Body) => one.lot === lot) };
}

const answer = (id: string, body: object, who = house.people.owner) =>
  who.post(`/api/differences/${id}/answer`, body);

async function lotNow(lot: string): Promise<Body> {
  const { row } = (await house.people.owner.get(`/api/lots/${lot}`)).body;
  return { ...row.bar, whole: row.weight, cost: row.cost };
}

const BACK_LIGHT = { safe: 6000, out: 0, returned: 3900, sold: 0, missing: 0 };

describe('ten points short of four carats', () => {
  it.each([
    ['customer keeps it', { ...BACK_LIGHT, sold: 100, whole: 10_000, cost: 300_000 }],
    ['accepted', { ...BACK_LIGHT, whole: 9900, cost: 300_000 }],
    ['found again', { ...BACK_LIGHT, returned: 4000, whole: 10_000, cost: 300_000 }],
    ['record corrected', { ...BACK_LIGHT, returned: 4000, whole: 10_000, cost: 300_000 }],
    ['written off', { ...BACK_LIGHT, whole: 9900, cost: 297_000 }],
  ])('are answered “%s”', async (word, expected) => {
    const out = await parcelOut();
    const { difference, outcome } = await weighedBack(out, { weight: 3900 });
    expect([outcome, difference.held, difference.value]).toEqual(['short', 100, 10_000]);
    const held = await lotNow(out.lot);
    expect(held).toEqual({ ...BACK_LIGHT, missing: 100, whole: 10_000, cost: 300_000 });
    const said = await answer(difference.id, { answer: word, reason: 'looked into' });
    expect(said.status).toBe(201);
    expect(await lotNow(out.lot)).toEqual(expected);
    const memo = (await house.people.owner.get(`/api/memos/${out.memo}`)).body;
    expect(memo.state).toBe('settled');
    expect(memo.differenceList[0].answer).toBe(word);
  });

  it('are not answered by what fits an excess, nor written off without a reason', async () => {
    const { difference } = await weighedBack(await parcelOut(), { weight: 3900 });
    for (const word of ['our short weighing', 'their short weighing', 'other stone']) {
      const said = await answer(difference.id, { answer: word, reason: 'x' });
      expect([said.status, said.body.code]).toEqual([409, 'answer_fits']);
    }
    const silent = await answer(difference.id, { answer: 'written off' });
    expect([silent.status, silent.body.code]).toEqual([409, 'movement_reason_where_due']);
    expect((await answer(difference.id, { answer: 'sold' })).status).toBe(400);
    expect((await answer('999999', { answer: 'accepted' })).status).toBe(404);
  });

  it('asking the customer is written down and posts nothing', async () => {
    const out = await parcelOut();
    const { difference } = await weighedBack(out, { weight: 3900 });
    expect((await house.people.dealer.post(`/api/differences/${difference.id}/ask`)).status).toBe(
      201,
    );
    const { words, differenceList } = (await house.people.owner.get(`/api/memos/${out.memo}`)).body;
    expect(words[0]).toMatchObject({
      by: 'dealer person',
      words: `Asked about the difference of ${out.lot}`,
    });
    expect(differenceList[0].askedAt).not.toBeNull();
    expect((await lotNow(out.lot)).missing).toBe(100);
  });

  it('over a bookkeeper’s limit wait for an owner', async () => {
    const out = await parcelOut();
    const path = `/api/memos/${out.memo}/returns`;
    await house.people.dealer.post(path, { lot: out.lot, weight: 1000 });
    const open = (await house.people.owner.get('/api/differences')).body;
    const { id } = open.find((one: Body) => one.lot === out.lot);
    const { bookkeeper } = house.people;
    const refused = await answer(id, { answer: 'written off', reason: 'gone' }, bookkeeper);
    expect([refused.status, refused.body.code]).toEqual([409, 'difference_within_role_limit']);
    expect(refused.body.detail).toMatch(/^Over .* ct only an owner answers “written off”\.$/);
    expect((await answer(id, { answer: 'written off', reason: 'gone' })).status).toBe(201);
    expect(await lotNow(out.lot)).toMatchObject({ whole: 7000, cost: 210_000 });
  });
});

describe('ten points over', () => {
  it('lie in quarantine unposted; as our short weighing they join the lot', async () => {
    const out = await parcelOut();
    const { difference, outcome } = await weighedBack(out, { weight: 4100 });
    expect([outcome, difference.held]).toEqual(['excess', 0]);
    expect(await lotNow(out.lot)).toMatchObject({ returned: 4000, whole: 10_000 });
    expect((await answer(difference.id, { answer: 'our short weighing' })).status).toBe(201);
    expect(await lotNow(out.lot)).toMatchObject({
      safe: 6100,
      returned: 4000,
      whole: 10_100,
      cost: 300_000,
    });
  });

  it('as theirs they become a lot of that party, without cost', async () => {
    const out = await parcelOut();
    const { difference } = await weighedBack(out, { weight: 4100 });
    expect((await answer(difference.id, { answer: 'their short weighing' })).status).toBe(201);
    expect(await lotNow(out.lot)).toMatchObject({ whole: 10_000 });
    const { desk } = (await house.people.owner.get('/api/returns')).body;
    const theirs = desk.filter((one: Body) => one.place === 'Quarantine').at(-1);
    expect(theirs).toMatchObject({ weight: 100 });
    const lot = (await house.people.owner.get(`/api/lots/${theirs.lot}`)).body;
    expect(lot.row).toMatchObject({ owner: 'Customer', origin: 'natural', cost: 0 });
  });
});

describe('what the tolerance forgives and what it does not', () => {
  it('two points restate the parcel; what was restated before counts against the same two', async () => {
    const out = await parcelOut();
    const { outcome, says, difference } = await weighedBack(out, { weight: 4020 });
    expect([outcome, says, difference]).toEqual([
      'restated',
      'inside tolerance, restated +2 pt',
      undefined,
    ]);
    expect(await lotNow(out.lot)).toMatchObject({ returned: 4020, whole: 10_020, cost: 300_000 });
    const { lines } = (await house.people.owner.get(`/api/memos/${out.memo}`)).body;
    expect(lines[0]).toMatchObject({
      found: 4020,
      flows: { restated: -20, returned: 4020, out: 0 },
    });
    const again = await house.people.owner.post(`/api/memos/${out.memo}/returns`, {
      lot: out.lot,
      weight: 4000,
    });
    expect(again.body.code).toBe('line_closed');
  });

  it('part of a parcel comes back and the rest stays out; the second part has what the first left', async () => {
    const out = await parcelOut();
    const part = await weighedBack(out, { weight: 1510, expected: 1500 });
    expect([part.outcome, part.says]).toEqual(['restated', 'inside tolerance, restated +1 pt']);
    const { lines, state } = (await house.people.owner.get(`/api/memos/${out.memo}`)).body;
    expect(state).toBe('part settled');
    expect(lines[0]).toMatchObject({ outPieces: 125, flows: { out: 2500, returned: 1510 } });
    const rest = await weighedBack(out, { weight: 2520 });
    expect([rest.outcome, rest.difference.found]).toEqual(['excess', 2520]);
    const light = await parcelOut();
    const short = await weighedBack(light, { weight: 1400, expected: 1500 });
    expect([short.outcome, short.difference.held]).toEqual(['short', 100]);
    expect(await lotNow(light.lot)).toMatchObject({ out: 2500, returned: 1400, missing: 100 });
  });

  it('a difference accepted on the first part takes nothing of the tolerance of the second', async () => {
    const out = await parcelOut();
    const first = await weighedBack(out, { weight: 1400, expected: 1500 });
    expect((await answer(first.difference.id, { answer: 'accepted' })).status).toBe(201);
    const second = await weighedBack(out, { weight: 2480 });
    expect([second.outcome, second.says]).toEqual(['restated', 'inside tolerance, restated −2 pt']);
    expect(await lotNow(out.lot)).toMatchObject({ out: 0, returned: 3880, cost: 300_000 });
  });

  it('more than is out, a part of a stone, or counted pieces unsaid can’t be expected', async () => {
    const refusal = async (out: { lot: string; memo: string }, reading: object) =>
      (await weighedBack(out, reading)).detail;
    const counted = await parcelOut({ isEstimated: false });
    expect(await refusal(counted, { weight: 1000, expected: 4010 })).toBe(
      `Only 4.00 ct of ${counted.lot} is out.`,
    );
    expect(await refusal(counted, { weight: 1000, expected: 1000 })).toBe(
      'Its pieces are counted: say how many are to come.',
    );
    const all = { weight: 1000, expected: 1000, expectedPieces: 200 };
    expect(await refusal(counted, all)).toBe('200 pcs are out; some stay out with the rest.');
    const agrees = await weighedBack(counted, { ...all, expectedPieces: 50, pieces: 50 });
    expect(agrees.outcome).toBe('agrees');
    const [lot = ''] = await house.takeIn({});
    const body = house.memoOf([{ lot, weight: 1020, pieces: 1 }]);
    const memo = (await house.people.dealer.post('/api/memos', body)).body.number;
    expect(await refusal({ lot, memo }, { weight: 500, expected: 500 })).toBe(
      'A stone, pair or set comes back whole.',
    );
  });

  it('counted pieces have none: one missing is a difference, its carats there or not', async () => {
    const counted = { isEstimated: false };
    const { difference, outcome } = await weighedBack(await parcelOut(counted), {
      weight: 4000,
      pieces: 199,
    });
    expect([outcome, difference.kind, difference.heldPieces, difference.held]).toEqual([
      'pieces short',
      'pieces short',
      1,
      0,
    ]);
    const light = await weighedBack(await parcelOut(counted), { weight: 3980, pieces: 199 });
    expect([light.outcome, light.difference.heldPieces, light.difference.held]).toEqual([
      'short',
      1,
      20,
    ]);
  });

  it('a stone that did not come is missing whole until it is found', async () => {
    const [lot = ''] = await house.takeIn({});
    const body = house.memoOf([{ lot, weight: 1020, pieces: 1 }]);
    const memo = (await house.people.dealer.post('/api/memos', body)).body.number;
    const gone = await weighedBack({ lot, memo }, { weight: 0, decision: 'not found' });
    expect([gone.outcome, gone.difference.held]).toEqual(['not found', 1020]);
    expect(await lotNow(lot)).toMatchObject({ out: 0, missing: 1020, cost: 408_000 });
    expect((await answer(gone.difference.id, { answer: 'found again' })).status).toBe(201);
    expect(await lotNow(lot)).toMatchObject({ returned: 1020, missing: 0, cost: 408_000 });
  });
});
