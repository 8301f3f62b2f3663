import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { assertMatrix, MATRIX } from '../../apps/api/src/http/matrix.js';
import { routes } from '../../apps/api/src/routes.js';
import {
  HouseOverHttp,
  OWN_PASSWORD,
  type RoleName,
  type Visitor,
} from '../support/house-over-http.js';

let house: HouseOverHttp;
let disabled: Visitor;
let expired: Visitor;
beforeAll(async () => {
  house = await HouseOverHttp.open();
  disabled = await another('disabled');
  expired = await another('expired');
  await house.db.query(`UPDATE person SET disabled_at = now() WHERE email = 'disabled@house.test'`);
  await house.db.query(
    `UPDATE session SET expire = now() - interval '1 minute' WHERE sess ->> 'personId' = (SELECT id::text FROM person WHERE email = 'expired@house.test')`,
  );
});
afterAll(() => house.close());

async function another(name: string): Promise<Visitor> {
  await house.people.owner.post('/api/people', {
    name,
    email: `${name}@house.test`,
    roles: ['owner'],
    password: 'first words that were given',
  });
  const visitor = house.visitor();
  await visitor.signIn(`${name}@house.test`, 'first words that were given');
  await visitor.post('/api/password', {
    current: 'first words that were given',
    password: OWN_PASSWORD,
  });
  await visitor.takeToken();
  return visitor;
}

const path = (route: string) => `/api${route.replace(/:\w+/g, '999999')}`;
const ROLES: RoleName[] = ['owner', 'dealer', 'buyer', 'bookkeeper', 'retailer'];
// Ending sessions would end the test's own; they are tried by themselves.
const GUARDED = routes.filter(
  ({ allowed, path: where }) => allowed !== 'anyone' && !where.startsWith('/sign-out'),
);

describe('every route and every role', () => {
  it('says the same in the routes and in the matrix, and a route absent there does not start', () => {
    expect(Object.keys(MATRIX)).toHaveLength(routes.length);
    expect(() =>
      assertMatrix([...routes, { method: 'get', path: '/new', allowed: 'anyone' }]),
    ).toThrow('get /new');
    expect(() => assertMatrix(routes.slice(1))).toThrow('differ');
  });

  it.each(GUARDED.map((route) => [`${route.method} ${route.path}`, route] as const))(
    '%s',
    async (_name, route) => {
      const ask = (visitor: Visitor) =>
        visitor.ask(
          route.method.toUpperCase(),
          path(route.path),
          route.method === 'get' || route.method === 'delete' ? {} : { body: {} },
        );
      expect((await ask(house.visitor())).status).toBe(401);
      expect((await ask(disabled)).status).toBe(401);
      expect((await ask(expired)).status).toBe(401);
      for (const role of ROLES) {
        const isAllowed =
          route.allowed === 'signed-in' || (route.allowed as readonly string[]).includes(role);
        const { status, body } = await ask(house.people[role]);
        if (isAllowed) expect([role, status]).not.toEqual([role, 403]);
        else expect([role, status, body.code]).toEqual([role, 403, 'not_yours']);
        expect(status).toBeLessThan(500);
      }
    },
  );
});
