import { DraftRequest, type DraftRow } from '@foldwell/contracts';
import type { Request } from 'express';

import { changedMeanwhile, readBody, requireVersion } from '../../http/body.js';
import { NotFound } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';

const SELECT = `SELECT d.id, d.party_id, y.name AS party, w.name AS by, d.at, coalesce(jsonb_array_length(d.body -> 'lines'), 0) AS lines,
  d.waits_because AS "waitsBecause", d.body, d.version FROM draft d JOIN person w ON w.id = d.person_id LEFT JOIN party y ON y.id = d.party_id`;

/** Drafts of the house, the newest first; one's own and those that wait for an owner. */
export async function listDrafts(_req: Request, { db }: Context): Promise<Answer> {
  return { body: await db.query<DraftRow[]>(`${SELECT} ORDER BY d.at DESC LIMIT 100`) };
}

export async function readDraft(req: Request, { db }: Context): Promise<Answer> {
  const [row] = await db.query<DraftRow[]>(`${SELECT} WHERE d.id::text = $1`, [
    String(req.params.id),
  ]);
  if (!row) throw new NotFound('That draft is gone; it may be booked.');
  return { body: row, headers: { ETag: `"v${row.version}"` } };
}

/** Keeps what was typed, whatever state it is in. */
export async function keepDraft(req: Request, { db, person }: Context): Promise<Answer> {
  const { body, party } = await readBody(req, DraftRequest);
  const [row] = await db.query<{ id: string; version: number }[]>(
    'INSERT INTO draft (person_id, party_id, body) VALUES ($1, (SELECT id FROM party WHERE number::text = $2), $3) RETURNING id, version',
    [person.id, party ?? '', body],
  );
  return { status: 201, body: row };
}

export async function changeDraft(req: Request, { db }: Context): Promise<Answer> {
  const version = requireVersion(req);
  const { body, party } = await readBody(req, DraftRequest);
  const [rows] = await db.query<[{ version: number }[], number]>(
    `UPDATE draft SET body = $3, party_id = (SELECT id FROM party WHERE number::text = $4), version = version + 1, at = clock_timestamp(), waits_because = ''
     WHERE id::text = $1 AND version = $2 RETURNING version`,
    [String(req.params.id), version, body, party ?? ''],
  );
  if (rows[0]) return { body: rows[0] };
  const { body: current } = await readDraft(req, { db } as Context);
  throw changedMeanwhile(current);
}

export async function dropDraft(req: Request, { db }: Context): Promise<Answer> {
  await db.query('DELETE FROM draft WHERE id::text = $1', [String(req.params.id)]);
  return { status: 204 };
}
