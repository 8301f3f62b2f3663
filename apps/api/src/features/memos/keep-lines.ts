import { KeepRequest, type MemoLine } from '@foldwell/contracts';
import { keep, together, unKeep } from '@foldwell/ledger';
import { formatCarats, halfAwayFromZero } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { refuseOutOfStep, weightsOf } from '../ledger/in-step.js';
import { answeredBefore, keyOf, postAct, type Key } from '../ledger/post-act.js';
import { findMemo, lineOf } from './find-memo.js';

/** Kept, whole or in part, at the memo price or a newly agreed one. */
export async function keepLines(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, KeepRequest);
  return {
    status: 201,
    body: await keepAct(ctx, keyOf(req, ctx), String(req.params.number), request),
  };
}

/** The act itself, as people and the demo house do it. */
export async function keepAct(
  ctx: Context,
  key: Key,
  number: string,
  { lines, businessDate }: KeepRequest,
): Promise<{ movementId: string }> {
  await refuseOutOfStep(ctx, weightsOf(lines));
  const memo = await findMemo(ctx, number);
  const kept = lines.map((asked) => ({ asked, found: lineOf(memo, asked.lot) }));
  const written = await postAct(ctx, key, {
    kind: 'kept',
    memoId: memo.id,
    businessDate,
    ...together(
      ...kept.map(({ asked: { weight, pieces }, found }) => keep(found.line, { weight, pieces })),
    ),
    keeps: kept.map(({ asked, found }) => ({
      lineId: found.line.lineId,
      weight: asked.weight,
      pieces: asked.pieces,
      price: asked.price ?? null,
      agreedSum: asked.sum ?? null,
      amount: keptAmount(found, asked),
    })),
  });
  return { movementId: String(written.movementId) };
}

function keptAmount(
  line: MemoLine,
  asked: { weight: number; price?: number | undefined; sum?: number | undefined },
): number {
  if (asked.sum !== undefined) return asked.sum;
  const [w, sent] = [BigInt(asked.weight), BigInt(line.flows.sent)];
  if (asked.price === undefined && line.sum !== null)
    return Number(halfAwayFromZero(BigInt(line.sum) * w, sent));
  return Number(
    halfAwayFromZero(
      BigInt(asked.price ?? line.price ?? 0) * BigInt(line.pricedWeight) * w,
      sent * 1000n,
    ),
  );
}

/** A kept line is on memo again, before it is invoiced, at what it was kept for. */
export async function unKeepLines(req: Request, ctx: Context): Promise<Answer> {
  const key = keyOf(req, ctx);
  const { lines } = await readBody(req, KeepRequest);
  const before = await answeredBefore(ctx, key);
  if (before) return { status: 201, body: { movementId: String(before.movementId) } };
  await refuseOutOfStep(ctx, weightsOf(lines));
  const memo = await findMemo(ctx, String(req.params.number));
  const back = lines.map((asked) => ({ asked, found: lineOf(memo, asked.lot) }));
  const standing = await keptAmounts(
    ctx,
    back.map(({ found }) => found.lineId),
  );
  const written = await postAct(ctx, key, {
    kind: 'un-kept',
    memoId: memo.id,
    ...together(
      ...back.map(({ asked: { weight, pieces }, found }) => unKeep(found.line, { weight, pieces })),
    ),
    keeps: back.map(({ asked, found }) => ({
      lineId: found.line.lineId,
      weight: -asked.weight,
      pieces: -asked.pieces,
      amount: -shareOfKept(found, asked.weight, standing.get(found.lineId) ?? 0n),
    })),
  });
  return { status: 201, body: { movementId: String(written.movementId) } };
}

/** What lines were kept for, in minor units of the memo's currency. */
async function keptAmounts({ db }: Context, lineIds: string[]): Promise<Map<string, bigint>> {
  const rows = await db.query<{ line: string; amount: string }[]>(
    'SELECT memo_line_id AS line, sum(amount) AS amount FROM memo_keep WHERE memo_line_id = ANY ($1) GROUP BY memo_line_id',
    [lineIds],
  );
  return new Map(rows.map(({ line, amount }) => [line, BigInt(amount)]));
}

/** The last weight takes all of it, so that nothing kept leaves a cent. */
function shareOfKept({ lot, flows }: MemoLine, weight: number, amount: bigint): number {
  if (weight > flows.kept)
    throw new RuleBroken('kept_less', `Only ${formatCarats(flows.kept)} ct of ${lot} is kept.`, {
      lot,
    });
  return Number(halfAwayFromZero(amount * BigInt(weight), BigInt(flows.kept)));
}
