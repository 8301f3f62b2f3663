import { FirstOwnerRequest } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { beginSession } from '../../http/session.js';
import { hashPassword } from './passwords.js';

/** A draft for the house's counsel, not a text to rely on. */
const DRAFT_TERMS =
  'The goods stay the property of {house} until we invoice them. They are sent for inspection only, to be kept or returned by {due date}. {customer} carries loss and damage from hand to hand. Prices are per carat, held until {price date}.';

/** Makes an empty house and its first owner, once. */
export async function makeFirstOwner(req: Request, { db }: Context): Promise<Answer> {
  const request = await readBody(req, FirstOwnerRequest);
  if (!isZone(request.zone))
    throw new ValidationFailed([
      { field: 'zone', message: `${request.zone} is not a time zone, such as Europe/Brussels.` },
    ]);
  const hash = await hashPassword(request.password, [request.name, request.house, request.email]);
  const id = await db.transaction(async (tx) => {
    await tx.query('SELECT pg_advisory_xact_lock(hashtext($1))', ['first owner']);
    const [taken] = await tx.query<{ n: number }[]>('SELECT count(*)::int AS n FROM person');
    if (taken?.n) throw new RuleBroken('has_owner', 'This house has its owner already. Sign in.');
    const currency = request.baseCurrency.toUpperCase();
    await tx.query(
      `INSERT INTO house (name, town, zone, base_currency, price_currency, books_currency, step, memo_text, stone_tolerance)
       VALUES ($1, $2, $3, $4, $4, $4, $5::smallint, $6, $7)`,
      [
        request.house.trim(),
        request.town.trim(),
        request.zone,
        currency,
        request.step,
        DRAFT_TERMS,
        request.step === 10 ? 10 : 3,
      ],
    );
    const [row] = await tx.query<{ id: string }[]>(
      `INSERT INTO person (name, email, roles, password_hash) VALUES ($1, $2, '{owner}', $3) RETURNING id`,
      [request.name.trim(), request.email, hash],
    );
    await tx.query(
      `INSERT INTO place (kind, name, safe, purpose) VALUES ('drawer', '1', 'A', 'first drawer')`,
    );
    return row?.id ?? '';
  });
  await beginSession(req, id);
  return { status: 201 };
}

/** Whether nobody is here yet. */
export async function isEmptyHouse(_req: Request, { db }: Context): Promise<Answer> {
  const [row] = await db.query<{ n: number }[]>('SELECT count(*)::int AS n FROM person');
  return { body: { isEmpty: row?.n === 0 } };
}

function isZone(zone: string): boolean {
  try {
    return Boolean(new Intl.DateTimeFormat('en', { timeZone: zone }));
  } catch {
    return false;
  }
}
