import { WeighAgainRequest } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { refuseOutOfStep } from '../ledger/in-step.js';
import { answeredBefore, keyOf, postAct } from '../ledger/post-act.js';

/** Weighed again while a difference is open: every reading is kept, the difference is answered by somebody else. */
export async function weighAgain(req: Request, ctx: Context): Promise<Answer> {
  const { weight, pieces } = await readBody(req, WeighAgainRequest);
  await refuseOutOfStep(ctx, [{ field: 'weight', weight }]);
  const key = keyOf(req, ctx);
  const before = await answeredBefore(ctx, key);
  if (before) return { status: 201, body: { weighing: before.weighings[0] } };
  const [difference] = await ctx.db.query<{ lot_id: string; memo_line_id: string | null }[]>(
    'SELECT lot_id, memo_line_id FROM difference WHERE id::text = $1 AND answer IS NULL',
    [String(req.params.id)],
  );
  if (!difference)
    throw new RuleBroken('difference_still_open', 'That difference is answered already.');
  const written = await postAct(ctx, key, {
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
