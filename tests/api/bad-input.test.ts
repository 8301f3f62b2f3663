import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { HouseOverHttp, PARCEL, STONE } from '../support/house-over-http.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

const ROUTES = [
  '/api/lots',
  '/api/memos',
  '/api/parties',
  '/api/transfers',
  '/api/put-away',
  '/api/people',
  '/api/drafts',
  '/api/memo-lines/read',
  '/api/rates',
  '/api/sieves',
  '/api/memos/1/returns',
  '/api/differences/1/answer',
];
const RUBBISH = [
  '',
  '{',
  'null',
  '[]',
  '1',
  '"x"',
  '{"lots":1}',
  '{"lots":[null]}',
  '{"__proto__":{"x":1}}',
  '['.repeat(45_000),
  `{"a":${'['.repeat(40)}1${']'.repeat(40)}}`,
  '{"name":"\\u0000"}',
  '{"name":"\\ud800"}',
  '{"weight":1e309}',
  '{"weight":9007199254740993}',
  `{"name":"${'x'.repeat(99_000)}"}`,
  `{"name":"${'x'.repeat(101_000)}"}`,
];

describe('rubbish', () => {
  it.each(ROUTES)('sent to %s is a refusal in words, never our fault', async (route) => {
    for (const raw of RUBBISH) {
      const { status, body, headers } = await house.people.owner.ask('POST', route, { raw });
      expect([raw.slice(0, 20), status >= 400 && status < 500]).toEqual([raw.slice(0, 20), true]);
      expect(headers.get('content-type')).toContain('application/problem+json');
      expect(body.detail.length).toBeGreaterThan(10);
      expect(JSON.stringify(body)).not.toMatch(/at .*\.(ts|mjs):|SELECT |INSERT /);
    }
  });

  it('in the address is a refusal too', async () => {
    for (const path of [
      '/api/lots?sort=cost',
      '/api/lots?colour=D-%00',
      '/api/lots?after=xx',
      '/api/lots?each=a-b',
      '/api/lots/%E0%A4%A',
      '/api/lots?q=%00',
      '/api/lots?clarity=VS9',
      '/api/memos/999999999999999999999',
      '/api/lots?shape=a&shape=b',
      '/api/nothing',
    ]) {
      const { status } = await house.people.owner.get(path);
      expect([path, status >= 400 && status < 500]).toEqual([path, true]);
    }
    expect((await house.people.owner.ask('DELETE', '/api/lots')).status).toBe(404);
  });
});

describe('a field that says more than it may', () => {
  const EXTRA = [
    'id',
    'role',
    'roles',
    'number',
    'cost',
    'status',
    'version',
    'createdAt',
    'ownerPartyId',
    'isDemo',
  ];
  it.each(EXTRA)('%s is refused at every depth', async (field) => {
    const lot = { ...STONE, place: house.drawer };
    const bodies: [string, object][] = [
      ['/api/lots', { how: 'purchase', party: house.supplier, [field]: 1, lots: [lot] }],
      ['/api/lots', { how: 'purchase', party: house.supplier, lots: [{ ...lot, [field]: 1 }] }],
      [
        '/api/lots',
        { how: 'purchase', party: house.supplier, lots: [{ ...lot, proportions: { [field]: 1 } }] },
      ],
      [
        '/api/memos',
        {
          party: house.customer,
          due: '2999-01-01',
          [field]: 1,
          lines: [{ lot: '1', weight: 10, pieces: 1, price: 1 }],
        },
      ],
      [
        '/api/memos',
        {
          party: house.customer,
          due: '2999-01-01',
          lines: [{ lot: '1', weight: 10, pieces: 1, price: 1, [field]: 1 }],
        },
      ],
      ['/api/parties', { name: 'x', isCustomer: true, [field]: 1 }],
      [
        '/api/transfers',
        { to: house.drawer, lines: [{ lot: '1', from: '1', weight: 1, pieces: 1, [field]: 1 }] },
      ],
    ];
    for (const [route, body] of bodies) {
      const answer = await house.people.owner.post(route, body);
      expect([route, answer.status]).toEqual([route, 400]);
      expect(answer.body.fields.some((one: { field: string }) => one.field.endsWith(field))).toBe(
        true,
      );
    }
  });
});

describe('weights and pieces that can’t be', () => {
  const take = (lot: object) =>
    house.people.buyer.post('/api/lots', {
      how: 'purchase',
      party: house.supplier,
      lots: [{ ...STONE, place: house.drawer, ...lot }],
    });

  it.each([0, -1020, 1.5, 2 ** 53, 'NaN', null, 1025])(
    'a stone of %s thousandths',
    async (weight) => {
      const { status, body } = await take({ weight });
      expect(status).toBe(400);
      expect(body.fields[0].field).toMatch(/weight$/);
    },
  );

  it('a stone of two pieces, a parcel without pieces, goods without a cost', async () => {
    expect((await take({ pieces: 2 })).body.fields[0].message).toBe('A stone is one piece.');
    expect((await take({ ...PARCEL, pieces: 0 })).status).toBe(400);
    expect((await take({ price: undefined })).body.fields[0].message).toBe(
      'Say what it cost, for a carat or as a sum.',
    );
  });

  it('a thousand counted pieces in half a point', async () => {
    const { status, body } = await take({
      ...PARCEL,
      isEstimated: false,
      weight: 10,
      pieces: 1000,
    });
    expect([status, body.code]).toEqual([409, 'balance_pieces_weigh']);
  });
});

describe('the database away', () => {
  it('is 503 with when to try again, and the house comes back by itself', async () => {
    const health = () => house.visitor().get('/api/health');
    expect((await health()).body).toMatchObject({ status: 'ok', migrations: 'all applied' });
    const broken = await house.db
      .query(
        `SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = current_database() AND usename = 'api' AND pid <> pg_backend_pid()`,
      )
      .then(
        () => 'cut',
        () => 'cut',
      );
    expect(broken).toBe('cut');
    const answers = [];
    for (let n = 0; n < 6; n += 1) answers.push(await health());
    for (const answer of answers) expect([200, 503]).toContain(answer.status);
    expect(answers.at(-1)?.status).toBe(200);
  });
});
