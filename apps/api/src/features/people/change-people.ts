import { AddPersonRequest, ChangePersonRequest } from '@foldwell/contracts';
import type { Request } from 'express';
import type { EntityManager } from 'typeorm';

import { changedMeanwhile, readBody, requireVersion } from '../../http/body.js';
import { NotFound, RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { hashPassword } from './passwords.js';
import { Person } from './person.entity.js';
import { endSessionsOf } from './sign-in.js';

/** The owner gives a first password; it must be changed at the first sign-in. */
export async function addPerson(req: Request, { db, person }: Context): Promise<Answer> {
  const request = await readBody(req, AddPersonRequest);
  const hash = await hashPassword(request.password, [request.name, request.email]);
  return db.transaction(async (tx) => {
    const partyId = request.roles.includes('retailer') ? await partyNamed(tx, request.party) : null;
    const [row] = await tx.query<{ id: string }[]>(
      `INSERT INTO person (name, email, roles, password_hash, must_change_password, party_id) VALUES ($1, $2, $3, $4, true, $5) RETURNING id`,
      [request.name.trim(), request.email, request.roles, hash, partyId],
    );
    await audit(tx, person.id, {
      action: 'person added',
      subject: row?.id ?? '',
      detail: { roles: request.roles },
    });
    return { status: 201, body: { id: row?.id } };
  });
}

async function partyNamed(tx: EntityManager, number: string | undefined): Promise<string> {
  const [party] = await tx.query<{ id: string }[]>('SELECT id FROM party WHERE number::text = $1', [
    number ?? '',
  ]);
  if (!party)
    throw new RuleBroken(
      'party_missing',
      'A retailer belongs to a customer; say which, by number.',
    );
  return party.id;
}

/** Roles, leave to see cost, taking away and giving back; the last owner stays, and nobody changes himself. */
export async function changePerson(req: Request, { db, person }: Context): Promise<Answer> {
  const version = requireVersion(req);
  const request = await readBody(req, ChangePersonRequest);
  const id = String(req.params.id);
  if (id === person.id)
    throw new RuleBroken('own_role', 'Nobody changes his own roles. Ask another owner.');
  await db.transaction(async (tx) => {
    // One lock for all changes of people: two owners can't take each other away at once.
    await tx.query('SELECT pg_advisory_xact_lock(hashtext($1))', ['people']);
    const found = await tx.findOneBy(Person, { id });
    if (!found) throw new NotFound('There is no such person in this house.');
    if (found.version !== version) throw changedMeanwhile(rowOf(found));
    const roles = request.roles ?? found.roles;
    const isActive = request.isActive ?? !found.disabledAt;
    if (!(isActive && roles.includes('owner')) && (await otherOwners(tx, id)) === 0) {
      throw new RuleBroken(
        'last_owner',
        `${found.name} is the last owner. Make somebody else an owner first.`,
      );
    }
    await tx.query(
      `UPDATE person SET roles = $2, sees_cost = $3, version = version + 1,
         disabled_at = CASE WHEN $4 THEN NULL ELSE coalesce(disabled_at, clock_timestamp()) END WHERE id = $1`,
      [id, roles, request.seesCost ?? found.seesCost, isActive],
    );
    await tx.query(`DELETE FROM session WHERE sess ->> 'personId' = $1`, [id]);
    await audit(tx, person.id, { action: 'person changed', subject: id, detail: { ...request } });
  });
  return { status: 204 };
}

async function otherOwners(tx: EntityManager, id: string): Promise<number> {
  const [row] = await tx.query<{ n: number }[]>(
    `SELECT count(*)::int AS n FROM person WHERE id <> $1 AND disabled_at IS NULL AND 'owner' = ANY (roles)`,
    [id],
  );
  return row?.n ?? 0;
}

/** Ends every session of a person of the house. */
export async function signOutPerson(req: Request, { db, person }: Context): Promise<Answer> {
  await endSessionsOf(db, String(req.params.id));
  await audit(db.manager, person.id, {
    action: 'signed out everywhere',
    subject: String(req.params.id),
    detail: {},
  });
  return { status: 204 };
}

/** A person as the list shows him. */
export function rowOf(person: Person) {
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    roles: person.roles,
    seesCost: person.seesCost,
    isActive: !person.disabledAt,
    lastHereAt: person.lastHereAt?.toISOString() ?? null,
    version: person.version,
  };
}

interface Trail {
  action: string;
  subject: string;
  detail: object;
}

const audit = (tx: EntityManager, by: string, { action, subject, detail }: Trail) =>
  tx.query('INSERT INTO audit (person_id, action, subject, detail) VALUES ($1, $2, $3, $4)', [
    by,
    action,
    `person ${subject}`,
    detail,
  ]);
