import { WeighAgainRequest, WeighBackRequest, type WeighedBack } from '@foldwell/contracts';
import { formatCarats, formatPoints } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { type Key, keyOf, postAct } from '../ledger/post-act.js';
import { findMemo, lineOf } from '../memos/amend-memo.js';
import { type Expected, judgeReading, type Judged } from './judge-reading.js';
import { returnAct } from './return-act.js';
import type { FoundLine } from './weighed.js';

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
  const memo = await findMemo(ctx, number);
  const line = lineOf(memo, request.lot);
  if (line.flows.out === 0)
    throw new RuleBroken(
      'line_closed',
      `${line.lot} is settled on M ${memo.number}; nothing of it is still out.`,
    );
  const rules = await rulesOf(ctx, memo.id);
  if (request.weight % rules.step !== 0)
    throw new ValidationFailed([
      { field: 'weight', message: 'Three decimals; this house’s balance reads to 0.01 ct.' },
    ]);
  const expected: Expected = {
    ...rules,
    kind: line.lotKind,
    isEstimated: line.isEstimated,
    report: line.report,
    out: line.flows.out,
    outPieces: line.outPieces,
    restated: line.flows.restated,
  };
  const judged = judgeReading(expected, request);
  if (judged.outcome === 'asks') return { weighing: 0, outcome: 'asks', says: asks(line, request) };
  const written = await postAct(ctx, key, {
    memoId: memo.id,
    businessDate: request.businessDate,
    ...(await returnAct(ctx, { memoId: memo.id, line, request, judged })),
  });
  return {
    weighing: written.weighings[0] ?? 0,
    outcome: judged.outcome,
    says: says(line, request, judged),
  };
}

interface Rules {
  stoneTolerance: number;
  parcelTolerance: number;
  step: number;
}

async function rulesOf({ db }: Context, memoId: number): Promise<Rules> {
  const [rules] = await db.query<Rules[]>(
    'SELECT stone_tolerance AS "stoneTolerance", parcel_tolerance AS "parcelTolerance", step FROM memo WHERE id = $1',
    [memoId],
  );
  return rules as Rules;
}

/** Weighed again while a difference is open: every reading is kept, the difference is answered by somebody else. */
export async function weighAgain(req: Request, ctx: Context): Promise<Answer> {
  const { weight, pieces } = await readBody(req, WeighAgainRequest);
  const [difference] = await ctx.db.query<{ lot_id: string; memo_line_id: string | null }[]>(
    'SELECT lot_id, memo_line_id FROM difference WHERE id::text = $1 AND answer IS NULL',
    [String(req.params.id)],
  );
  if (!difference)
    throw new RuleBroken('difference_still_open', 'That difference is answered already.');
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: null,
    weighings: [
      {
        lot: { id: Number(difference.lot_id) },
        purpose: 'again',
        weight,
        pieces,
        ...(difference.memo_line_id && { lineId: Number(difference.memo_line_id) }),
        difference: { id: Number(req.params.id) },
      },
    ],
    audit: { action: 'weighed again' },
  });
  return { status: 201, body: { weighing: written.weighings[0] } };
}

function asks(line: FoundLine, { weight, reportRead }: WeighBackRequest): string {
  const off = formatPoints(weight - line.flows.out);
  const number =
    reportRead && !line.report.toUpperCase().endsWith(reportRead.trim().toUpperCase())
      ? ` Its number reads ${reportRead}, ours is ${line.report}.`
      : '';
  return `${line.lot} does not match: ${formatCarats(weight)} ct found, ${formatCarats(line.flows.out)} ct expected, ${off}.${number} Is it ours?`;
}

function says(line: FoundLine, { weight }: WeighBackRequest, { outcome }: Judged): string {
  const off = weight - line.flows.out;
  const words: Record<string, string> = {
    agrees: 'agrees',
    restated: `inside tolerance, restated ${formatPoints(off)}`,
    short: `${formatPoints(-off).replace('+', '')} missing, in hand`,
    excess: `${formatPoints(off)} over, in quarantine unposted`,
    'pieces short': 'pieces missing, in hand',
    'not found': 'not found, all of it missing',
    'other weight': 'whole to quarantine',
    'suspected switch': 'ours stays on the memo; what came lies in quarantine',
  };
  return words[outcome] ?? outcome;
}
