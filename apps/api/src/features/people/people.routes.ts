import type { HouseInBrief, Me } from '@foldwell/contracts';
import type { Request } from 'express';

import { type Answer, type Context, type Route, STAFF } from '../../http/route.js';
import { endSession } from '../../http/session.js';
import { addPerson, changePerson, rowOf, signOutPerson } from './change-people.js';
import { isEmptyHouse, makeFirstOwner } from './first-owner.js';
import { Person } from './person.entity.js';
import { changePassword, endSessionsOf, signIn } from './sign-in.js';

/** Sign-in, one's own password and sessions, and the people of the house. */
export const peopleRoutes: Route[] = [
  { method: 'get', path: '/first-owner', allowed: 'anyone', handle: isEmptyHouse },
  { method: 'post', path: '/first-owner', allowed: 'anyone', handle: makeFirstOwner },
  { method: 'post', path: '/sign-in', allowed: 'anyone', handle: signIn },
  { method: 'post', path: '/sign-out', allowed: 'signed-in', handle: signOut },
  { method: 'post', path: '/sign-out-everywhere', allowed: 'signed-in', handle: signOutEverywhere },
  { method: 'post', path: '/password', allowed: 'signed-in', handle: changePassword },
  { method: 'get', path: '/me', allowed: 'signed-in', handle: me },
  { method: 'get', path: '/people', allowed: STAFF, handle: listPeople },
  { method: 'post', path: '/people', allowed: ['owner'], handle: addPerson },
  { method: 'patch', path: '/people/:id', allowed: ['owner'], handle: changePerson },
  { method: 'post', path: '/people/:id/sign-out', allowed: ['owner'], handle: signOutPerson },
];

async function signOut(req: Request): Promise<Answer> {
  await endSession(req);
  return { status: 204 };
}

async function signOutEverywhere(req: Request, { db, person }: Context): Promise<Answer> {
  await endSessionsOf(db, person.id);
  await endSession(req);
  return { status: 204 };
}

async function me(req: Request, { db, person }: Context): Promise<Answer> {
  const own = await db.getRepository(Person).findOneByOrFail({ id: person.id });
  const [house] = await db.query<HouseInBrief[]>(
    `SELECT name, town, is_demo AS "isDemo", zone, step, base_currency AS "baseCurrency", price_currency AS "priceCurrency",
       house_today()::text AS today, (SELECT count(*)::int FROM difference WHERE answer IS NULL) AS "differencesOpen" FROM house`,
  );
  const isOutside = own.roles.every((role) => role === 'retailer');
  const body: Me = {
    id: own.id,
    name: own.name,
    roles: own.roles,
    seesCost: person.seesCost,
    mustChangePassword: own.mustChangePassword,
    csrf: req.session.csrf ?? '',
    house: { ...(house as HouseInBrief), ...(isOutside && { differencesOpen: 0 }) },
  };
  return { body };
}

async function listPeople(_req: Request, { db }: Context): Promise<Answer> {
  const people = await db.getRepository(Person).find({ order: { id: 'ASC' } });
  return { body: people.map(rowOf) };
}
