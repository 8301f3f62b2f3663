import { ReverseRequest, TransferRequest, type TransferLine } from '@foldwell/contracts';
import { move, together } from '@foldwell/ledger';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { NotFound, RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { refuseOutOfStep, weightsOf } from '../ledger/in-step.js';
import { type Key, keyOf, postAct } from '../ledger/post-act.js';
import type { Act, Written } from '../ledger/act.js';

/** Goods go from drawer to drawer, to a show, to or from somebody who carries them. */
export async function transfer(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, TransferRequest);
  const written = await moveLines(ctx, keyOf(req, ctx), { kind: 'transfer', ...request });
  return { status: 201, body: { movementId: String(written.movementId) } };
}

/** Moves lines to one place as one act. */
export async function moveLines(
  ctx: Context,
  key: Key,
  act: {
    kind: 'transfer' | 'put away';
    to: string;
    lines: TransferLine[];
    businessDate?: string | undefined;
    reason?: string | undefined;
  },
): Promise<Written> {
  await refuseOutOfStep(ctx, weightsOf(act.lines));
  const lots = await lotIds(
    ctx,
    act.lines.map((line) => line.lot),
  );
  const legs = together(
    ...act.lines.map(({ lot, from, weight, pieces }) =>
      move({
        lot: { id: lots.get(lot) ?? 0 },
        from: { id: Number(from) },
        to: { id: Number(act.to) },
        weight,
        pieces,
      }),
    ),
  );
  const whole: Act = {
    kind: act.kind,
    businessDate: act.businessDate,
    reason: act.reason,
    ...legs,
  };
  return postAct(ctx, key, whole);
}

/** Ids of lots by number; a number that is none says so. */
export async function lotIds({ db }: Context, numbers: string[]): Promise<Map<string, number>> {
  const rows = await db.query<{ id: string; number: string }[]>(
    'SELECT id, number FROM lot WHERE number = ANY ($1)',
    [numbers],
  );
  const found = new Map(rows.map((row) => [row.number, Number(row.id)]));
  const missing = numbers.find((number) => !found.has(number));
  if (missing !== undefined) throw new NotFound(`There is no lot ${missing.slice(0, 20)}.`);
  return found;
}

/** Undoes a booking by its mirror; where that is not possible the later movements are named. */
export async function reverse(req: Request, ctx: Context): Promise<Answer> {
  const { reason } = await readBody(req, ReverseRequest);
  const id = String(req.params.id);
  const [movement] = await ctx.db.query<{ id: string; kind: string; person_id: string }[]>(
    'SELECT id, kind, person_id FROM movement WHERE id::text = $1',
    [id],
  );
  if (!movement) throw new NotFound('There is no such booking.');
  if (reason.trim() === '')
    throw new RuleBroken('movement_reason_where_due', 'Say why it is undone.');
  const later = await laterThan(ctx, id);
  if (later.length > 0) {
    throw new RuleBroken(
      'reversal_of_newest',
      `It can’t be undone while something later stands: ${later.map((one) => `${one.lot} ${one.kind} on ${one.date}`).join('; ')}.`,
      { later },
    );
  }
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: 'reversal',
    reverses: Number(id),
    reason,
  });
  return { status: 201, body: { movementId: String(written.movementId) } };
}

/** What came later on a lot and inside place that the movement added to. */
function laterThan(
  { db }: Context,
  id: string,
): Promise<{ movementId: string; kind: string; date: string; lot: string }[]> {
  return db.query(
    `SELECT DISTINCT m.id AS "movementId", m.kind, m.business_date::text AS date, l.number AS lot
     FROM posting mine JOIN place p ON p.id = mine.place_id AND p.inside
     JOIN posting later ON later.lot_id = mine.lot_id AND later.place_id = mine.place_id AND later.movement_id > mine.movement_id
     JOIN movement m ON m.id = later.movement_id JOIN lot l ON l.id = mine.lot_id
     WHERE mine.movement_id = $1 AND (mine.weight > 0 OR mine.pieces > 0) ORDER BY m.id LIMIT 10`,
    [id],
  );
}
