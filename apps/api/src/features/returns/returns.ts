import { PutAwayRequest, type ReturnsList } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { NotFound } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { keyOf, postAct } from '../ledger/post-act.js';
import { moveLines } from '../lots/move-lots.js';
import { findMemo } from '../memos/find-memo.js';
import { differenceRows } from './difference-rows.js';

/** Memos with something out or not agreeing, and what lies on the desk or in quarantine. */
export async function listReturns(_req: Request, { db }: Context): Promise<Answer> {
  const memos = await db.query<ReturnsList['memos']>(
    `SELECT m.number::text, y.name AS party, m.due::text, sum(n.out_weight)::float8 AS out,
       count(d.id)::int AS differences
     FROM memo m JOIN party y ON y.id = m.party_id JOIN memo_line n ON n.memo_id = m.id
     LEFT JOIN difference d ON d.memo_line_id = n.id AND d.answer IS NULL
     WHERE NOT m.is_settled OR EXISTS (SELECT 1 FROM difference e JOIN memo_line x ON x.id = e.memo_line_id WHERE x.memo_id = m.id AND e.answer IS NULL)
     GROUP BY m.id, y.name ORDER BY count(d.id) DESC, m.due LIMIT 200`,
  );
  const desk = await db.query<ReturnsList['desk']>(
    `SELECT l.number AS lot, concat_ws(' ', initcap(l.kind), lower(l.shape)) AS what, m.number::text AS memo, b.pieces::int AS pieces, b.weight::float8 AS weight,
       b.place_id AS "placeId", p.name AS place, b.last_date::text AS since
     FROM balance b JOIN place p ON p.id = b.place_id JOIN lot l ON l.id = b.lot_id
     LEFT JOIN movement v ON v.id = b.last_movement_id LEFT JOIN memo m ON m.id = v.memo_id
     WHERE p.kind IN ('return desk', 'quarantine') AND b.weight > 0 ORDER BY p.kind DESC, b.last_movement_id, l.id LIMIT 500`,
  );
  return { body: { memos, desk } satisfies ReturnsList };
}

/** From the desk or quarantine to a drawer, several at once. */
export async function putAway(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, PutAwayRequest);
  const written = await moveLines(ctx, keyOf(req, ctx), { kind: 'put away', ...request });
  return { status: 201, body: { movementId: String(written.movementId) } };
}

/** Closes a return with its slip: what came back, what was found, what is still open. */
export async function closeReturn(req: Request, ctx: Context): Promise<Answer> {
  const memo = await findMemo(ctx, String(req.params.number));
  const differences = await differenceRows(ctx.db, 'n.memo_id = $1 AND d.answer IS NULL', [
    memo.id,
  ]);
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: null,
    memoId: memo.id,
    audit: { action: 'return slip' },
    document: {
      kind: 'return slip',
      snapshot: {
        memo: `M ${memo.number}`,
        by: ctx.person.name,
        lines: memo.lines.map(({ lot, what, flows, found, weighing }) => ({
          lot,
          what,
          ...flows,
          found,
          weighing,
        })),
        differences: differences.map(({ lot, kind, expected, found, held }) => ({
          lot,
          kind,
          expected,
          found,
          held,
        })),
      },
    },
  });
  return { status: 201, body: { number: written.document?.number } };
}

export async function listDifferences(_req: Request, { db }: Context): Promise<Answer> {
  return { body: await differenceRows(db, 'd.answer IS NULL', []) };
}

/** The customer was asked; written down, nothing posted. */
export async function askCustomer(req: Request, { db, person }: Context): Promise<Answer> {
  const id = String(req.params.id);
  const [rows] = await db.query<[{ memo_line_id: string | null; lot_id: string }[], number]>(
    'UPDATE difference SET asked_at = clock_timestamp() WHERE id::text = $1 AND answer IS NULL RETURNING memo_line_id, lot_id',
    [id],
  );
  if (!rows[0]) throw new NotFound('That difference is not open.');
  await db.query(
    `INSERT INTO memo_word (memo_id, person_id, words) SELECT n.memo_id, $2, 'Asked about the difference of ' || l.number
     FROM memo_line n JOIN lot l ON l.id = n.lot_id WHERE n.id = $1`,
    [rows[0].memo_line_id, person.id],
  );
  return { status: 201 };
}
