import type { Request } from 'express';

import { bodyHash, requireKey } from '../../http/body.js';
import type { Context } from '../../http/route.js';
import { databaseError } from '../../http/problem.js';
import type { Act, Written } from './act.js';

const MOST_TRIES = 4;

/** Whose act it is and under which key: the same key and hash give the same answer again. */
export interface Key {
  personId: string;
  key: string;
  hash: string;
}

/** The key of a request that books. */
export function keyOf(req: Request, { person }: Context): Key {
  return { personId: person.id, key: requireKey(req), hash: bodyHash(req) };
}

/**
 * Hands one act to the database's writer, the only way anything is booked. What two bookings took
 * from each other (serialization, deadlock) is tried again; a refusal is not.
 */
export async function postAct(
  { db }: Pick<Context, 'db'>,
  { personId, key, hash }: Key,
  act: Act,
): Promise<Written> {
  for (let tries = 1; ; tries += 1) {
    try {
      const [row] = await db.query<{ written: Written }[]>(
        'SELECT write_movement($1, $2, $3, $4) AS written',
        [personId, key, hash, JSON.stringify(act)],
      );
      return (row as { written: Written }).written;
    } catch (error) {
      const { code = '' } = databaseError(error);
      if (!['40001', '40P01'].includes(code) || tries >= MOST_TRIES) throw error;
      await new Promise((again) => setTimeout(again, Math.random() * 20 * tries));
    }
  }
}

/** The answer given before under this key, if any: asked before an act is planned on what stands now. */
export async function answeredBefore(
  { db }: Pick<Context, 'db'>,
  { personId, key, hash }: Key,
): Promise<Written | null> {
  const [row] = await db.query<{ answer: Written }[]>(
    'SELECT answer FROM idempotency WHERE person_id = $1 AND key = $2 AND body_hash = $3',
    [personId, key, hash],
  );
  return row?.answer ?? null;
}
