import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp, PARCEL, type Visitor } from '../support/house-over-http.js';

/** Costs that appear nowhere else: whoever finds these digits has found the cost. */
const CANARIES = [7_771_331, 7_771_337, 7_771_339];

let house: HouseOverHttp;
let lots: string[] = [];
let memo = '';
beforeAll(async () => {
  house = await HouseOverHttp.open();
  lots = await house.takeIn(
    ...CANARIES.map((sum, index) => ({ ...(index === 2 ? PARCEL : {}), sum, price: undefined })),
  );
  const [first = ''] = lots;
  memo = (
    await house.people.dealer.post(
      '/api/memos',
      house.memoOf([{ lot: first, weight: 1020, pieces: 1 }]),
    )
  ).body.number;
});
afterAll(() => house.close());

const pages = () => [
  '/api/lots',
  '/api/lots/sum',
  '/api/lots.csv',
  '/api/lots?sort=-ask',
  ...lots.map((lot) => `/api/lots/${lot}`),
  '/api/pick-up?q=1',
  '/api/first-light',
  '/api/memos',
  `/api/memos/${memo}`,
  `/api/documents/${encodeURIComponent(`M ${memo}`)}`,
  '/api/returns',
  '/api/differences',
  '/api/parties',
  `/api/parties/${house.customer}`,
  `/api/parties/${house.supplier}`,
  '/api/places',
  '/api/house',
  '/api/drafts',
  '/api/people',
  '/api/me',
];
const holdsCost = (text: string) =>
  CANARIES.some(
    (sum) =>
      text.includes(String(sum)) ||
      text.includes((sum / 100).toFixed(2)) ||
      text.includes(String(sum / 100)),
  );
const all = async (visitor: Visitor) =>
  Promise.all(
    pages().map(async (page) => [page, JSON.stringify((await visitor.get(page)).body)] as const),
  );

describe('the cost of a lot', () => {
  it('is seen by buyer, bookkeeper and owner', async () => {
    for (const role of ['owner', 'buyer', 'bookkeeper'] as const) {
      expect(
        (await all(house.people[role])).filter(([, text]) => holdsCost(text)).length,
      ).toBeGreaterThan(3);
    }
  });

  it('is in no answer to a dealer', async () => {
    const answers = await all(house.people.dealer);
    expect(answers.filter(([, text]) => holdsCost(text)).map(([page]) => page)).toEqual([]);
    expect(answers.filter(([, text]) => /"cost"/.test(text)).map(([page]) => page)).toEqual([]);
  });

  it('is not in what a dealer books either, nor in a refusal', async () => {
    const [, second = '', parcel = ''] = lots;
    const { dealer } = house.people;
    const answers = [
      await dealer.post('/api/memo-lines/read', { text: parcel, party: house.customer, lines: [] }),
      await dealer.post(
        '/api/memos/preview',
        house.memoOf([{ lot: second, weight: 1020, pieces: 1 }]),
      ),
      await dealer.post('/api/memos', house.memoOf([{ lot: parcel, weight: 99_000, pieces: 400 }])),
      await dealer.post(`/api/memos/${memo}/keep`, {
        lines: [{ lot: lots[0], weight: 1020, pieces: 1 }],
      }),
      await dealer.post('/api/transfers', {
        to: house.drawer,
        lines: [{ lot: parcel, from: house.drawer, weight: 99_990, pieces: 1 }],
      }),
    ];
    expect(
      answers
        .map(({ body }) => JSON.stringify(body))
        .filter((text) => holdsCost(text) || /cost/i.test(text)),
    ).toEqual([]);
  });

  it('can’t be sorted or sieved by, by anybody who may not see it', async () => {
    for (const query of ['sort=cost', 'sort=-cost'])
      expect((await house.people.dealer.get(`/api/lots?${query}`)).status).toBe(400);
    const sums = await Promise.all(
      ['cost=1-9', 'cost=0-1', ''].map((query) =>
        house.people.dealer.get(`/api/lots/sum?${query}`),
      ),
    );
    expect(new Set(sums.map(({ body }) => JSON.stringify(body))).size).toBe(1);
  });

  it('is laid open to a dealer when the owner says so, and covered again at once', async () => {
    const people = (await house.people.owner.get('/api/people')).body;
    const dealer = people.find((one: { email: string }) => one.email === 'dealer@house.test');
    await house.people.owner.ask('PATCH', `/api/people/${dealer.id}`, {
      body: { seesCost: true },
      headers: { 'if-match': `"v${dealer.version}"` },
    });
    const visitor = house.visitor();
    await visitor.signIn('dealer@house.test', 'own words chosen afterwards');
    expect(JSON.stringify((await visitor.get(`/api/lots/${lots[1]}`)).body)).toContain(
      String(CANARIES[1]),
    );
    await house.db.query('UPDATE person SET sees_cost = false');
    expect(holdsCost(JSON.stringify((await visitor.get(`/api/lots/${lots[1]}`)).body))).toBe(false);
  });

  it('reaches no retailer, and neither does anything else of the house', async () => {
    const answers = await Promise.all(
      pages()
        .filter((page) => page !== '/api/me')
        .map((page) => house.people.retailer.get(page)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([403]));
    expect((await house.people.retailer.get('/api/me')).body.house.differencesOpen).toBe(0);
  });
});

describe('a stale page', () => {
  it('is shown both versions, and one without a version is told so', async () => {
    const [, lot = ''] = lots;
    const change = (headers: Record<string, string>, ask: number) =>
      house.people.buyer.ask('PATCH', `/api/lots/${lot}`, { body: { ask }, headers });
    expect((await change({}, 1)).status).toBe(428);
    expect((await change({ 'if-match': '"v1"' }, 500_000)).status).toBe(200);
    const stale = await change({ 'if-match': '"v1"' }, 600_000);
    expect([stale.status, stale.body.current.particulars.ask]).toEqual([412, 500_000]);
    const { history } = (await house.people.buyer.get(`/api/lots/${lot}`)).body;
    expect(history[0].what).toBe('Ask price changed from 5,280 per ct to 5,000 per ct');
  });
});
