import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { FIRST_PASSWORD, HouseOverHttp, OWN_PASSWORD } from '../support/house-over-http.js';

let house: HouseOverHttp;
beforeAll(async () => {
  house = await HouseOverHttp.open();
});
afterAll(() => house.close());

const signedIn = async (email: string) => {
  const visitor = house.visitor();
  await visitor.signIn(email, OWN_PASSWORD);
  return visitor;
};
const meOf = async (cookie: string) => {
  const visitor = house.visitor();
  visitor.cookie = cookie;
  return (await visitor.get('/api/me')).status;
};

describe('a session', () => {
  it('gets a new id at sign-in, so that one planted before is worth nothing', async () => {
    const visitor = await signedIn('dealer@house.test');
    const before = visitor.cookie;
    await visitor.signIn('dealer@house.test', OWN_PASSWORD);
    expect(visitor.cookie).not.toBe(before);
    expect(await meOf(before)).toBe(401);
    expect(await meOf(visitor.cookie)).toBe(200);
  });

  it('is worth nothing after sign-out, and with a changed or unsigned cookie', async () => {
    const visitor = await signedIn('dealer@house.test');
    const { cookie } = visitor;
    expect(await meOf(cookie.replace(/.$/, (last) => (last === 'a' ? 'b' : 'a')))).toBe(401);
    expect(await meOf(cookie.replace(/\..*$/, ''))).toBe(401);
    await visitor.post('/api/sign-out');
    expect(await meOf(cookie)).toBe(401);
  });

  it('ends everywhere at once', async () => {
    const [one, other] = [await signedIn('buyer@house.test'), await signedIn('buyer@house.test')];
    await one.post('/api/sign-out-everywhere');
    expect([await meOf(one.cookie), await meOf(other.cookie)]).toEqual([401, 401]);
    house.people.buyer = await signedIn('buyer@house.test');
  });

  it('ends for every other browser when the password changes', async () => {
    const [one, other] = [
      await signedIn('bookkeeper@house.test'),
      await signedIn('bookkeeper@house.test'),
    ];
    await one.post('/api/password', { current: OWN_PASSWORD, password: 'a third choice of words' });
    expect([await meOf(other.cookie), await meOf(one.cookie)]).toEqual([401, 200]);
  });

  it('ends with a change of roles, and a person taken away is out at the next request', async () => {
    const dealer = await signedIn('dealer@house.test');
    const people = (await house.people.owner.get('/api/people')).body;
    const row = people.find((one: { email: string }) => one.email === 'dealer@house.test');
    const change = (body: object, version: number) =>
      house.people.owner.ask('PATCH', `/api/people/${row.id}`, {
        body,
        headers: { 'if-match': `"v${version}"` },
      });
    expect((await change({ roles: ['dealer', 'buyer'] }, row.version)).status).toBe(204);
    expect(await meOf(dealer.cookie)).toBe(401);
    const again = await signedIn('dealer@house.test');
    expect((await change({ isActive: false }, row.version + 1)).status).toBe(204);
    expect(await meOf(again.cookie)).toBe(401);
    expect((await change({ isActive: true, roles: ['dealer'] }, row.version + 2)).status).toBe(204);
  });

  it('ends after twelve hours, however busy', async () => {
    const visitor = await signedIn('dealer@house.test');
    await house.db.query(
      `UPDATE session SET sess = jsonb_set(sess::jsonb, '{startedAt}', to_jsonb((extract(epoch FROM now()) * 1000 - 43200001)::bigint))::json`,
    );
    expect(await meOf(visitor.cookie)).toBe(401);
    for (const role of ['owner', 'dealer', 'buyer'] as const)
      house.people[role] = await signedIn(`${role}@house.test`);
  });

  it('is at most five of a person; the oldest ends', async () => {
    const visitors = [];
    for (let n = 0; n < 6; n += 1) visitors.push(await signedIn('dealer@house.test'));
    const [row] = await house.db.query(
      `SELECT count(*)::int AS n FROM session WHERE sess ->> 'personId' = (SELECT id::text FROM person WHERE email = 'dealer@house.test')`,
    );
    expect(row.n).toBe(5);
  });
});

describe('what another site could send', () => {
  it('is refused without the token, from another origin, and as a form', async () => {
    const dealer = await signedIn('dealer@house.test');
    const words = (headers: Record<string, string>) =>
      dealer.post('/api/sieves', { name: 'x', sieve: 'x' }, headers);
    expect((await words({ 'x-csrf-token': '' })).status).toBe(403);
    expect((await words({ origin: 'https://elsewhere.example' })).status).toBe(403);
    expect((await words({ 'sec-fetch-site': 'cross-site' })).status).toBe(403);
    const form = await dealer.ask('POST', '/api/sieves', {
      raw: 'name=x&sieve=x',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
    });
    expect(form.status).toBe(415);
    expect((await words({})).status).toBe(201);
  });

  it('cannot sign somebody in from elsewhere', async () => {
    const answer = await house
      .visitor()
      .post(
        '/api/sign-in',
        { email: 'dealer@house.test', password: OWN_PASSWORD },
        { origin: 'https://elsewhere.example' },
      );
    expect(answer.status).toBe(403);
  });
});

describe('guessing', () => {
  it('gets the same answer for a known and an unknown name, is told how many tries are left, then waits', async () => {
    const guess = (email: string) =>
      house.visitor().post('/api/sign-in', { email, password: 'not the right words at all' });
    const [known, unknown] = [await guess('owner@house.test'), await guess('nobody@house.test')];
    const said = ({ status, body }: typeof known) => ({
      status,
      title: body.title,
      detail: body.detail,
      code: body.code,
    });
    expect(said(known)).toEqual(said(unknown));
    expect(known.body.detail).toBe(
      'E-mail or password is wrong. 9 tries left, then this name waits 10 minutes.',
    );
    for (let n = 0; n < 9; n += 1) await guess('nobody@house.test');
    const waiting = await guess('nobody@house.test');
    expect([waiting.status, waiting.body.code]).toEqual([429, 'wait']);
    expect(Number(waiting.headers.get('retry-after'))).toBeGreaterThan(500);
    // The wait is kept in the database, not in the process; a right password does not pass it.
    const [row] = await house.db.query(
      `SELECT count(*)::int AS n FROM throttle WHERE waits_until > now()`,
    );
    expect(row.n).toBe(1);
  });
});

describe('passwords', () => {
  it('are refused when short, over 72 bytes, or words of the house', async () => {
    const add = (password: string) =>
      house.people.owner.post('/api/people', {
        name: 'New',
        email: 'new@house.test',
        roles: ['dealer'],
        password,
      });
    for (const password of [
      'short',
      'x'.repeat(73),
      '💎'.repeat(19),
      'foldwell diamond carat',
      'aaaaaaaaaaaaaaaaaaaa',
    ]) {
      const answer = await add(password);
      expect([password.slice(0, 8), answer.status, answer.body.fields?.[0]?.field]).toEqual([
        password.slice(0, 8),
        400,
        'password',
      ]);
    }
  });

  it('given by an owner must be changed before anything else opens', async () => {
    await house.people.owner.post('/api/people', {
      name: 'Nina',
      email: 'nina@house.test',
      roles: ['dealer'],
      password: FIRST_PASSWORD,
    });
    const nina = house.visitor();
    await nina.signIn('nina@house.test', FIRST_PASSWORD);
    expect((await nina.get('/api/lots')).body.code).toBe('must_change_password');
    expect(
      (await nina.post('/api/password', { current: FIRST_PASSWORD, password: OWN_PASSWORD }))
        .status,
    ).toBe(204);
    expect((await nina.get('/api/lots')).status).toBe(200);
  });

  it('leave no trace in what is answered or kept in the clear', async () => {
    const rows = JSON.stringify(await house.db.query('SELECT * FROM person'));
    expect(rows).not.toContain(OWN_PASSWORD);
  });
});

describe('people', () => {
  it('keep at least one owner, and nobody changes himself', async () => {
    const people = (await house.people.owner.get('/api/people')).body;
    const owner = people.find((one: { email: string }) => one.email === 'owner@house.test');
    const change = await house.people.owner.ask('PATCH', `/api/people/${owner.id}`, {
      body: { roles: ['dealer'] },
      headers: { 'if-match': `"v${owner.version}"` },
    });
    expect(change.body.code).toBe('own_role');
    const [audit] = await house.db.query(
      `SELECT count(*)::int AS n FROM audit WHERE action = 'person changed'`,
    );
    expect(audit.n).toBeGreaterThan(0);
  });

  it('make a first owner only once', async () => {
    const second = await house.visitor().post('/api/first-owner', {
      house: 'H',
      town: '',
      zone: 'UTC',
      baseCurrency: 'USD',
      step: 10,
      name: 'N',
      email: 'n@n.test',
      password: OWN_PASSWORD,
    });
    expect(second.body.code).toBe('has_owner');
  });
});
