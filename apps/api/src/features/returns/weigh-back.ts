import { WeighBackRequest, type WeighedBack } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { refuseOutOfStep } from '../ledger/in-step.js';
import { answeredBefore, type Key, keyOf, postAct } from '../ledger/post-act.js';
import { findMemo, lineOf } from '../memos/find-memo.js';
import { comingBack } from './coming.js';
import { type Expected, judgeReading } from './judge-reading.js';
import { returnAct } from './return-act.js';
import { asks, says } from './said-at-desk.js';
import { weighedBefore } from './weighed-before.js';

/** One Enter at the desk: reads, judges, posts; asks first where number or weight of a stone disagree. */
export async function weighBack(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, WeighBackRequest);
  const body = await weighBackLine(ctx, keyOf(req, ctx), String(req.params.number), request);
  return { status: body.outcome === 'asks' ? 200 : 201, body };
}

/** The act itself, as people and the demo house do it. */
export async function weighBackLine(
  ctx: Context,
  key: Key,
  number: string,
  request: WeighBackRequest,
): Promise<WeighedBack> {
  const before = await answeredBefore(ctx, key);
  if (before) return weighedBefore(ctx, before);
  await refuseOutOfStep(ctx, [
    { field: 'weight', weight: request.weight },
    { field: 'expected', weight: request.expected ?? 0 },
  ]);
  const memo = await findMemo(ctx, number);
  const line = lineOf(memo, request.lot);
  if (line.flows.out === 0)
    throw new RuleBroken(
      'line_closed',
      `${line.lot} is settled on M ${memo.number}; nothing of it is still out.`,
    );
  const rules = await rulesOf(ctx, memo.id);
  const coming = comingBack(line, request);
  const expected: Expected = {
    ...rules,
    kind: line.lotKind,
    isEstimated: line.isEstimated,
    report: line.report,
    out: coming.weight,
    outPieces: coming.pieces,
    restated: await cameBackOff(ctx, line.line.lineId),
  };
  const judged = judgeReading(expected, request);
  if (judged.outcome === 'asks') return { weighing: 0, outcome: 'asks', says: asks(line, request) };
  const written = await postAct(ctx, key, {
    memoId: memo.id,
    businessDate: request.businessDate,
    ...(await returnAct(ctx, { memoId: memo.id, line, coming, request, judged })),
  });
  return {
    weighing: written.weighings[0] ?? 0,
    outcome: judged.outcome,
    says: says(judged.outcome, request.weight - coming.weight),
  };
}

/** Restated as it came back, in thousandths of a carat; what an answer accepted later is no part of it. */
async function cameBackOff({ db }: Context, lineId: number): Promise<number> {
  const [row] = await db.query<{ off: string }[]>('SELECT memo_line_came_back_off($1) AS off', [
    lineId,
  ]);
  return Number(row?.off);
}

interface Rules {
  stoneTolerance: number;
  parcelTolerance: number;
}

async function rulesOf({ db }: Context, memoId: number): Promise<Rules> {
  const [rules] = await db.query<Rules[]>(
    'SELECT stone_tolerance AS "stoneTolerance", parcel_tolerance AS "parcelTolerance" FROM memo WHERE id = $1',
    [memoId],
  );
  return rules as Rules;
}
