import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { type Body, HouseOverHttp, PARCEL } from '../support/house-over-http.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

const whole = (lot: string) => ({ lot, weight: 1020, pieces: 1 });

async function stonesOut(count: number): Promise<{ number: string; lots: string[] }> {
  const lots = await house.takeIn(...Array.from({ length: count }, () => ({})));
  const booked = await house.people.dealer.post('/api/memos', house.memoOf(lots.map(whole)));
  return { number: booked.body.number, lots };
}

async function movements(): Promise<number> {
  const [row] = await house.db.query<{ n: number }[]>('SELECT count(*)::int AS n FROM movement');
  return row?.n ?? 0;
}

/** The same request twice, then with another body; what is posted and what is answered. */
async function twice(path: string, body: object, other: object): Promise<Body[]> {
  const key = { 'idempotency-key': randomUUID() };
  const before = await movements();
  const answers = [
    await house.people.owner.post(path, body, key),
    await house.people.owner.post(path, body, key),
  ];
  expect((await movements()) - before).toBe(1);
  const third = await house.people.owner.post(path, other, key);
  expect(third.status).toBeGreaterThanOrEqual(400);
  expect((await movements()) - before).toBe(1);
  return answers;
}

describe('a request sent twice', () => {
  it('to the return desk posts once and says the same again', async () => {
    const { number, lots } = await stonesOut(1);
    const [parcel = ''] = await house.takeIn({ ...PARCEL });
    const more = (
      await house.people.dealer.post(
        '/api/memos',
        house.memoOf([{ lot: parcel, weight: 4000, pieces: 200 }]),
      )
    ).body.number;
    const agrees = { lot: lots[0], weight: 1020 };
    const [first, second] = await twice(`/api/memos/${number}/returns`, agrees, {
      ...agrees,
      weight: 1010,
    });
    expect([first.status, first.body.outcome]).toEqual([201, 'agrees']);
    expect(second.body).toEqual(first.body);
    const [light, again] = await twice(
      `/api/memos/${more}/returns`,
      { lot: parcel, weight: 3900 },
      { lot: parcel, weight: 3910 },
    );
    expect(light.body).toMatchObject({ outcome: 'short', says: '10 pt missing, in hand' });
    expect(again.body).toEqual(light.body);
  });

  it('to another party, kept or void posts once', async () => {
    const party = (
      await house.people.owner.post('/api/parties', { name: 'Next', isCustomer: true })
    ).body.number;
    const one = await stonesOut(2);
    const keep = { lines: [whole(one.lots[0] ?? '')] };
    const kept = await twice(`/api/memos/${one.number}/keep`, keep, {
      lines: [{ ...whole(one.lots[0] ?? ''), price: 1 }],
    });
    expect(kept[1].body).toEqual(kept[0].body);
    const over = { party, due: '2999-01-01' };
    const handed = await twice(`/api/memos/${one.number}/transfer`, over, {
      ...over,
      due: '2999-01-02',
    });
    expect(handed[1].body).toEqual(handed[0].body);
    const two = await stonesOut(1);
    const undone = await twice(
      `/api/memos/${two.number}/void`,
      { reason: 'wrong party' },
      { reason: 'other' },
    );
    expect(undone.map((answer) => answer.status)).toEqual([201, 201]);
  });

  it('to answer a difference posts once; another answer is told who answered and how', async () => {
    const [parcel = ''] = await house.takeIn({ ...PARCEL });
    const { number } = (
      await house.people.dealer.post(
        '/api/memos',
        house.memoOf([{ lot: parcel, weight: 4000, pieces: 200 }]),
      )
    ).body;
    await house.people.bookkeeper.post(`/api/memos/${number}/returns`, {
      lot: parcel,
      weight: 3900,
    });
    const open = (await house.people.owner.get('/api/differences')).body;
    const { id } = open.find((one: Body) => one.lot === parcel);
    const answers = await twice(
      `/api/differences/${id}/answer`,
      { answer: 'customer keeps it' },
      { answer: 'accepted' },
    );
    expect(answers[1].body).toEqual(answers[0].body);
    const late = await house.people.owner.post(`/api/differences/${id}/answer`, {
      answer: 'accepted',
    });
    expect([late.status, late.body.detail]).toEqual([
      409,
      'That difference was answered already by Olga Owner: customer keeps it.',
    ]);
  });
});

describe('what a customer keeps', () => {
  it('at a price of its own and then not after all leaves no cent and no piece', async () => {
    const [parcel = ''] = await house.takeIn({ ...PARCEL });
    const party = (
      await house.people.owner.post('/api/parties', { name: 'Keeper', isCustomer: true })
    ).body.number;
    const booked = await house.people.dealer.post('/api/memos', {
      ...house.memoOf([{ lot: parcel, weight: 4000, pieces: 200 }]),
      party,
    });
    const { number } = booked.body;
    const post = (act: string, line: object) =>
      house.people.bookkeeper.post(`/api/memos/${number}/${act}`, {
        lines: [{ lot: parcel, ...line }],
      });
    const exposure = async () =>
      (await house.people.dealer.get(`/api/parties/${party}`)).body.exposure;
    expect(await exposure()).toMatchObject({ onMemo: 400_000, kept: 0 });
    await post('keep', { weight: 1000, pieces: 50, price: 90_001 });
    await post('keep', { weight: 500, pieces: 25, sum: 44_444 });
    expect(await exposure()).toMatchObject({ onMemo: 250_000, kept: 134_445 });
    const more = await post('un-keep', { weight: 1510, pieces: 75 });
    expect([more.status, more.body.detail]).toEqual([409, `Only 1.50 ct of ${parcel} is kept.`]);
    await post('un-keep', { weight: 700, pieces: 35 });
    const [line] = (await house.people.dealer.get(`/api/memos/${number}`)).body.lines;
    expect(line).toMatchObject({ keptPieces: 40, outPieces: 160, flows: { kept: 800, out: 3200 } });
    await post('un-keep', { weight: 800, pieces: 40 });
    expect(await exposure()).toMatchObject({ onMemo: 400_000, kept: 0 });
  });
});

describe('weights that the balance can’t read', () => {
  it('are refused with their line, and nothing is booked', async () => {
    const [parcel = ''] = await house.takeIn({ ...PARCEL });
    const before = await movements();
    const booked = await house.people.dealer.post(
      '/api/memos',
      house.memoOf([{ lot: parcel, weight: 4005, pieces: 200 }]),
    );
    expect([booked.status, booked.body.fields]).toEqual([
      400,
      [
        {
          field: 'lines.0.weight',
          message: '4.005 ct has three decimals; this house’s balance reads to 0.01 ct.',
        },
      ],
    ]);
    const { number } = (
      await house.people.dealer.post(
        '/api/memos',
        house.memoOf([{ lot: parcel, weight: 4000, pieces: 200 }]),
      )
    ).body;
    for (const [act, body] of [
      ['keep', { lines: [{ lot: parcel, weight: 1005, pieces: 50 }] }],
      ['un-keep', { lines: [{ lot: parcel, weight: 1005, pieces: 50 }] }],
      ['returns', { lot: parcel, weight: 3995 }],
    ] as const) {
      const refused = await house.people.owner.post(`/api/memos/${number}/${act}`, body);
      expect([act, refused.status, refused.body.code]).toEqual([act, 400, 'fields']);
    }
    const line = { lot: parcel, from: house.drawer, weight: 1005, pieces: 50 };
    for (const path of ['/api/transfers', '/api/put-away']) {
      const { owner } = house.people;
      const refused = await owner.post(path, { to: house.drawer, lines: [line] });
      expect([path, refused.status, refused.body.code]).toEqual([path, 400, 'fields']);
    }
    expect((await movements()) - before).toBe(1);
  });
});

describe('a memo', () => {
  it('is not there, lacks lines, is dated wrongly, or names goods that are not ours: said in words', async () => {
    const [lot = ''] = await house.takeIn({});
    const { dealer } = house.people;
    expect((await dealer.get('/api/memos/77777')).body.detail).toBe('There is no memo M 77777.');
    const nobody = { ...house.memoOf([whole(lot)]), party: '99999' };
    expect((await dealer.post('/api/memos', nobody)).status).toBe(404);
    expect((await dealer.post('/api/memos', house.memoOf([]))).body.detail).toBe(
      'A memo needs at least one line.',
    );
    expect((await dealer.post('/api/memos', house.memoOf([whole('777777')]))).body.detail).toBe(
      'There is no lot 777777.',
    );
    const early = house.memoOf([whole(lot)], { due: '2020-01-01' });
    expect((await dealer.post('/api/memos', early)).body).toMatchObject({
      status: 409,
      code: 'memo_due_after_date',
    });
    const supplier = { ...house.memoOf([whole(lot)]), party: house.supplier };
    expect((await dealer.post('/api/memos', supplier)).body.detail).toBe(
      'Supplier is not a customer of ours.',
    );
    const both = house.memoOf([{ ...whole(lot), sum: 5 } as never]);
    expect((await dealer.post('/api/memos', both)).body.detail).toBe(
      `${lot} needs a price per carat or a sum.`,
    );
  });

  it('stops at lapsed papers until an owner gives a reason', async () => {
    const party = (
      await house.people.owner.post('/api/parties', {
        name: 'Lapsed',
        isCustomer: true,
        identityPapersUntil: '2026-01-31',
      })
    ).body.number;
    const [lot = ''] = await house.takeIn({});
    const body = { ...house.memoOf([whole(lot)]), party };
    expect((await house.people.dealer.post('/api/memos', body)).body).toMatchObject({
      code: 'party_papers_lapsed',
      detail:
        'Identity papers of Lapsed lapsed on Sat 31 Jan 2026. Nothing leaves without an owner’s reason.',
    });
    const released = { ...body, releaseReason: 'new papers seen' };
    expect((await house.people.owner.post('/api/memos', released)).status).toBe(201);
  });

  it('keeps what was typed in its draft; a stale page is shown both versions', async () => {
    const { dealer, owner } = house.people;
    const typed = { lines: [], scan: '4140 4.0', handedTo: 'somebody' };
    const { id, version } = (await dealer.post('/api/drafts', { body: typed })).body;
    const change = (by: typeof dealer, body: object, ifMatch?: number) =>
      by.ask('PUT', `/api/drafts/${id}`, {
        body: { body },
        ...(ifMatch !== undefined && { headers: { 'if-match': `"v${ifMatch}"` } }),
      });
    expect((await change(dealer, typed)).status).toBe(428);
    expect((await change(owner, { ...typed, scan: '4141' }, version)).status).toBe(200);
    const stale = await change(dealer, { ...typed, scan: '4140 4.00' }, version);
    expect([stale.status, stale.body.current.body.scan]).toEqual([412, '4141']);
    expect((await dealer.get(`/api/drafts/${id}`)).body.body).toEqual({ ...typed, scan: '4141' });
    expect((await dealer.get('/api/drafts')).body.map((draft: Body) => draft.id)).toContain(id);
    expect((await dealer.ask('DELETE', `/api/drafts/${id}`)).status).toBe(204);
  });
});
