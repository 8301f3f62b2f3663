import { AddPlaceRequest, ChangePlaceRequest, type PlaceRow } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { NotFound, RuleBroken } from '../../http/errors.js';
import { type Answer, type Context, type Route, STAFF } from '../../http/route.js';
import { placeWords } from './place-words.js';

/** Places that people keep, with what lies in each. */
async function listPlaces(_req: Request, { db }: Context): Promise<Answer> {
  const rows = await db.query<
    (Omit<PlaceRow, 'words' | 'isClosed'> & { is_closed: boolean; weight: string })[]
  >(
    `SELECT p.id, p.kind, p.name, p.safe, p.purpose, p.is_closed, count(b.lot_id)::int AS lots, coalesce(sum(b.weight), 0) AS weight
     FROM place p LEFT JOIN balance b ON b.place_id = p.id AND (b.weight > 0 OR b.pieces > 0)
     WHERE p.kind IN ('drawer', 'show', 'person', 'return desk', 'quarantine', 'laboratory', 'workshop', 'missing')
     GROUP BY p.id ORDER BY p.kind, p.safe, length(p.name), p.name`,
  );
  const body: PlaceRow[] = rows.map(({ is_closed: isClosed, ...row }) => ({
    ...row,
    isClosed,
    weight: Number(row.weight),
    words: placeWords(row),
  }));
  return { body };
}

function refuseWithoutHolder(
  kind: string,
  ids: { party: string | null; person: string | null } | undefined,
): void {
  if (kind === 'person' && !ids?.person)
    throw new RuleBroken('person_missing', 'Say which of us carries them.');
  if (['laboratory', 'workshop'].includes(kind) && !ids?.party)
    throw new RuleBroken('party_missing', 'Say which laboratory or workshop it is, by number.');
}

async function addPlace(req: Request, { db, person }: Context): Promise<Answer> {
  const {
    kind,
    name,
    safe = '',
    purpose = '',
    party,
    person: carrier,
  } = await readBody(req, AddPlaceRequest);
  const [ids] = await db.query<{ party: string | null; person: string | null }[]>(
    'SELECT (SELECT id FROM party WHERE number::text = $1) AS party, (SELECT id FROM person WHERE id::text = $2) AS person',
    [party ?? '', carrier ?? ''],
  );
  refuseWithoutHolder(kind, ids);
  const [row] = await db.query<{ id: string }[]>(
    'INSERT INTO place (kind, name, safe, purpose, party_id, person_id) VALUES ($1, $2, $3, $4, $5, $6) RETURNING id',
    [
      kind,
      name.trim(),
      safe.trim().toUpperCase(),
      purpose,
      ids?.party ?? null,
      kind === 'person' ? ids?.person : null,
    ],
  );
  await db.query(`INSERT INTO audit (person_id, action, subject) VALUES ($1, 'place added', $2)`, [
    person.id,
    `place ${row?.id}`,
  ]);
  return { status: 201, body: { id: row?.id } };
}

async function changePlace(req: Request, { db, person }: Context): Promise<Answer> {
  const { purpose, isClosed } = await readBody(req, ChangePlaceRequest);
  const [, count] = await db.query<[unknown, number]>(
    'UPDATE place SET purpose = coalesce($2, purpose), is_closed = coalesce($3, is_closed) WHERE id::text = $1',
    [String(req.params.id), purpose ?? null, isClosed ?? null],
  );
  if (count === 0) throw new NotFound('There is no such place.');
  await db.query(
    `INSERT INTO audit (person_id, action, subject) VALUES ($1, 'place changed', $2)`,
    [person.id, `place ${String(req.params.id)}`],
  );
  return { status: 204 };
}

export const placeRoutes: Route[] = [
  { method: 'get', path: '/places', allowed: STAFF, handle: listPlaces },
  { method: 'post', path: '/places', allowed: ['owner'], handle: addPlace },
  { method: 'patch', path: '/places/:id', allowed: ['owner'], handle: changePlace },
];
