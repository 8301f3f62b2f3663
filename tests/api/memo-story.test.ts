import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp, PARCEL } from '../support/house-over-http.js';

let house: HouseOverHttp;
let parcel = '';
let stone = '';
let memo = '';
beforeAll(async () => {
  house = await HouseOverHttp.open();
  [parcel = '', stone = ''] = await house.takeIn(
    { ...PARCEL, weight: 48_620, pieces: 3214 },
    { reportLaboratory: 'Norvane', reportNumber: '21180453' },
  );
  const lines = [
    { lot: parcel, weight: 9060, pieces: 598 },
    { lot: stone, weight: 1020, pieces: 1 },
  ];
  memo = (await house.people.dealer.post('/api/memos', house.memoOf(lines))).body.number;
});
afterAll(() => house.close());

const weigh = (lot: string, body: object, who = house.people.bookkeeper) =>
  who.post(`/api/memos/${memo}/returns`, { lot, ...body });

describe('goods out on memo and back', () => {
  it('are told apart when somebody else wants them: who has them, since when and until when', async () => {
    const again = await house.people.dealer.post(
      '/api/memos',
      house.memoOf([{ lot: stone, weight: 1020, pieces: 1 }]),
    );
    expect([again.status, again.body.code]).toEqual([409, 'lot_not_free']);
    const says = new RegExp(
      `^${stone} not added. It is out on M ${memo} to Customer since \\d+ [A-Z][a-z]+, due 1 Jan 2999.$`,
    );
    expect(again.body.detail).toMatch(says);
    expect(again.body.path).toBe(`/memos/${memo}`);
  });

  it('say what is still free of a parcel', async () => {
    const more = await house.people.dealer.post(
      '/api/memos',
      house.memoOf([{ lot: parcel, weight: 40_000, pieces: 2000 }]),
    );
    expect(more.body.detail).toContain('39.56 ct of it is still free');
  });

  it('post once for the same request sent twice, and refuse another body under its key', async () => {
    const body = house.memoOf([{ lot: parcel, weight: 1000, pieces: 66 }]);
    const key = { 'idempotency-key': 'the-same-key-twice-1' };
    const [first, second] = [
      await house.people.dealer.post('/api/memos', body, key),
      await house.people.dealer.post('/api/memos', body, key),
    ];
    expect(second.body).toEqual(first.body);
    const other = await house.people.dealer.post('/api/memos', { ...body, due: '2999-02-02' }, key);
    expect(other.body.code).toBe('idempotency_same_body');
    expect(
      (await house.people.dealer.post('/api/memos', body, { 'idempotency-key': 'short' })).status,
    ).toBe(400);
  });

  it('come back eight points light: the difference is answered by somebody else', async () => {
    const short = await weigh(parcel, { weight: 8980 });
    expect([short.status, short.body.outcome, short.body.says]).toEqual([
      201,
      'short',
      '8 pt missing, in hand',
    ]);
    const [difference] = (await house.people.bookkeeper.get('/api/differences')).body;
    expect(difference).toMatchObject({
      lot: parcel,
      held: 80,
      kind: 'short',
      openedBy: 'bookkeeper person',
      answerers: ['Olga Owner'],
    });
    const own = await house.people.bookkeeper.post(`/api/differences/${difference.id}/answer`, {
      answer: 'accepted',
    });
    expect([own.status, own.body.code]).toEqual([409, 'difference_not_by_who_weighed']);
    const dealer = await house.people.dealer.post(`/api/differences/${difference.id}/answer`, {
      answer: 'accepted',
    });
    expect(dealer.status).toBe(403);
    expect(
      (
        await house.people.bookkeeper.post(`/api/differences/${difference.id}/weigh-again`, {
          weight: 8990,
        })
      ).status,
    ).toBe(201);
    const answered = await house.people.owner.post(`/api/differences/${difference.id}/answer`, {
      answer: 'accepted',
    });
    expect(answered.status).toBe(201);
    const { row } = (await house.people.owner.get(`/api/lots/${parcel}`)).body;
    expect(row.bar).toEqual({ safe: 38_560, out: 1000, returned: 8980, sold: 0, missing: 0 });
  });

  it('ask whose stone it is when weight or number disagree, and post nothing until told', async () => {
    const asked = await weigh(stone, { weight: 1020, reportRead: '99999999' });
    expect([asked.status, asked.body.outcome]).toEqual([200, 'asks']);
    const one = (await house.people.bookkeeper.get(`/api/memos/${memo}`)).body.lines.find(
      (line: { lot: string }) => line.lot === stone,
    );
    expect(one.flows.out).toBe(1020);
  });

  it('a switched stone: ours stays on the memo, what came is theirs, without cost, in quarantine', async () => {
    const told = await weigh(stone, { weight: 1000, reportRead: '99999999', decision: 'not ours' });
    expect(told.body.outcome).toBe('suspected switch');
    const [difference] = (await house.people.owner.get('/api/differences')).body;
    expect(difference.kind).toBe('suspected switch');
    const came = (await house.people.owner.get(`/api/lots/${difference.cameLot}`)).body;
    expect(came.row).toMatchObject({
      owner: 'Customer',
      weight: 1000,
      cost: 0,
      place: 'Quarantine',
    });
    expect((await house.people.owner.get(`/api/lots/${stone}`)).body.row.bar.out).toBe(1020);
    expect(
      (
        await house.people.owner.post(`/api/differences/${difference.id}/answer`, {
          answer: 'other stone',
          reason: 'seen',
        })
      ).status,
    ).toBe(201);
  });

  it('a stone of ours that weighs otherwise lies whole in quarantine until its weight is accepted', async () => {
    expect((await weigh(stone, { weight: 1000, decision: 'ours' })).body.outcome).toBe(
      'other weight',
    );
    const [difference] = (await house.people.owner.get('/api/differences')).body;
    expect(
      (
        await house.people.owner.post(`/api/differences/${difference.id}/answer`, {
          answer: 'accepted',
        })
      ).status,
    ).toBe(201);
    const lot = (await house.people.owner.get(`/api/lots/${stone}`)).body;
    expect(lot.row).toMatchObject({ weight: 1000, cost: 408_000, place: 'Quarantine' });
  });

  it('are put away from the desk, and the slip is kept', async () => {
    const { desk } = (await house.people.bookkeeper.get('/api/returns')).body;
    const lines = desk
      .filter((one: { place: string }) => one.place === 'Return desk')
      .map((one: Record<string, unknown>) => ({
        lot: one.lot,
        from: one.placeId,
        weight: one.weight,
        pieces: one.pieces,
      }));
    expect(
      (await house.people.bookkeeper.post('/api/put-away', { to: house.drawer, lines })).status,
    ).toBe(201);
    const slip = await house.people.bookkeeper.post(`/api/memos/${memo}/return-slip`);
    expect(slip.body.number).toBe(`M ${memo}-1`);
    const paper = await house.people.owner.get(
      `/api/documents/${encodeURIComponent(slip.body.number)}`,
    );
    expect(paper.body.snapshot.number).toBe(slip.body.number);
  });

  it('a memo that is settled in part can’t be void; one that is untouched goes back where it came from', async () => {
    expect(
      (await house.people.dealer.post(`/api/memos/${memo}/void`, { reason: 'wrong party' })).body
        .code,
    ).toBe('memo_void_while_unsettled');
    const [lot = ''] = await house.takeIn({});
    const { number } = (
      await house.people.dealer.post('/api/memos', house.memoOf([{ lot, weight: 1020, pieces: 1 }]))
    ).body;
    expect(
      (await house.people.dealer.post(`/api/memos/${number}/void`, { reason: 'wrong party' }))
        .status,
    ).toBe(201);
    expect((await house.people.dealer.get(`/api/memos/${number}`)).body.state).toBe('void');
    expect((await house.people.owner.get(`/api/lots/${lot}`)).body.row).toMatchObject({
      place: 'Safe A1',
      cost: 408_000,
    });
  });

  it('are extended, re-priced, kept and handed over by appended papers', async () => {
    const lots = await house.takeIn({}, {}, {});
    const lines = lots.map((lot) => ({ lot, weight: 1020, pieces: 1 }));
    const { number } = (
      await house.people.dealer.post('/api/memos', house.memoOf(lines, { due: '2990-01-01' }))
    ).body;
    const post = (act: string, body: object) =>
      house.people.dealer.post(`/api/memos/${number}/${act}`, body);
    expect((await post('extend', { due: '2991-01-01', reason: 'asked' })).body.number).toBe(
      `M ${number}-1`,
    );
    expect(
      (await post('re-price', { reason: 'market', lines: [{ lot: lots[0], price: 90_000 }] })).body
        .number,
    ).toBe(`M ${number}-2`);
    expect(
      (await post('keep', { lines: [{ lot: lots[1], weight: 1020, pieces: 1, price: 95_000 }] }))
        .status,
    ).toBe(201);
    const { body: kept } = await house.people.dealer.get(`/api/parties/${house.customer}`);
    expect(kept.exposure.kept).toBe(96_900);
    expect(
      (await post('un-keep', { lines: [{ lot: lots[1], weight: 1020, pieces: 1, price: 95_000 }] }))
        .status,
    ).toBe(201);
    const other = (
      await house.people.owner.post('/api/parties', { name: 'Other', isCustomer: true })
    ).body.number;
    const handed = await post('transfer', { party: other, due: '2991-02-01', reason: 'asked' });
    expect(handed.status).toBe(201);
    const now = (await house.people.dealer.get(`/api/memos/${number}`)).body;
    expect([now.due, now.state, now.flows.returned]).toEqual(['2991-01-01', 'settled', 3060]);
    expect((await house.people.dealer.get(`/api/memos/${handed.body.number}`)).body.flows.out).toBe(
      3060,
    );
  });

  it('over the limit wait for an owner, who books with a reason', async () => {
    const poor = (
      await house.people.owner.post('/api/parties', {
        name: 'Small',
        isCustomer: true,
        creditLimit: 50_000,
      })
    ).body.number;
    const [lot = ''] = await house.takeIn({});
    const body = { ...house.memoOf([{ lot, weight: 1020, pieces: 1 }]), party: poor };
    const draft = (
      await house.people.dealer.post('/api/drafts', { body: { lines: [] }, party: poor })
    ).body;
    const refused = await house.people.dealer.post('/api/memos', { ...body, draftId: draft.id });
    expect(refused.body.code).toBe('party_credit_limit');
    expect(refused.body.detail).toContain('Over the limit by 520.00 USD.');
    expect((await house.people.dealer.get(`/api/drafts/${draft.id}`)).body.waitsBecause).toContain(
      'Over the limit',
    );
    expect(
      (await house.people.dealer.post('/api/memos', { ...body, releaseReason: 'please' })).status,
    ).toBe(409);
    expect(
      (
        await house.people.owner.post('/api/memos', {
          ...body,
          draftId: draft.id,
          releaseReason: 'pays on the day',
        })
      ).status,
    ).toBe(201);
    expect((await house.people.dealer.get(`/api/drafts/${draft.id}`)).status).toBe(404);
  });
});
