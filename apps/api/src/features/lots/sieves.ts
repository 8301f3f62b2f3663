import { SaveSieveRequest } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import type { Answer, Context } from '../../http/route.js';

/** The sieves a person saved, by name. */
export async function listSieves(_req: Request, { db, person }: Context): Promise<Answer> {
  return {
    body: await db.query(
      'SELECT id, name, sieve FROM saved_sieve WHERE person_id = $1 ORDER BY name',
      [person.id],
    ),
  };
}

/** Saves a sieve by name; the same name again replaces it. */
export async function saveSieve(req: Request, { db, person }: Context): Promise<Answer> {
  const { name, sieve } = await readBody(req, SaveSieveRequest);
  await db.query(
    `INSERT INTO saved_sieve (person_id, name, sieve) VALUES ($1, $2, $3)
    ON CONFLICT ON CONSTRAINT saved_sieve_name_key DO UPDATE SET sieve = excluded.sieve`,
    [person.id, name.trim(), sieve],
  );
  return { status: 201 };
}

/** Throws one's own saved sieve away. */
export async function dropSieve(req: Request, { db, person }: Context): Promise<Answer> {
  await db.query('DELETE FROM saved_sieve WHERE person_id = $1 AND id::text = $2', [
    person.id,
    String(req.params.id),
  ]);
  return { status: 204 };
}
