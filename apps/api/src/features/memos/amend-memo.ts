import {
  ExtendMemoRequest,
  HandOverRequest,
  ReasonRequest,
  RePriceMemoRequest,
  WordsRequest,
} from '@foldwell/contracts';
import { handOver, undoMemo } from '@foldwell/ledger';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { answeredBefore, keyOf, postAct } from '../ledger/post-act.js';
import { partyByNumber } from '../parties/parties.js';
import { findMemo, lineOf } from './find-memo.js';
import { memoByNumber } from './read-memo.js';

/** A memo booked to the wrong party: every line goes back where it came from, while nothing is settled. */
export async function voidMemo(req: Request, ctx: Context): Promise<Answer> {
  const { reason } = await readBody(req, ReasonRequest);
  const memo = await findMemo(ctx, String(req.params.number));
  const cameFrom = await ctx.db.query<{ lot: string; place_id: string }[]>(
    `SELECT l.number AS lot, g.place_id FROM posting g JOIN movement m ON m.id = g.movement_id JOIN lot l ON l.id = g.lot_id
     WHERE m.memo_id = $1 AND m.kind = 'memo out' AND g.weight < 0`,
    [memo.id],
  );
  const lines = memo.lines.map(({ line, lot, flows, outPieces }) => ({
    line,
    weight: flows.out,
    pieces: outPieces,
    cameFrom: { id: Number(cameFrom.find((from) => from.lot === lot)?.place_id ?? 0) },
  }));
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: 'memo void',
    memoId: memo.id,
    reason,
    ...undoMemo(lines.filter((line) => line.weight > 0)),
    document: { kind: 'void memo', snapshot: { memo: `M ${memo.number}`, reason } },
  });
  return { status: 201, body: { movementId: String(written.movementId) } };
}

/** A new due date for the memo or some of its lines, as an appended paper. */
export async function extendMemo(req: Request, ctx: Context): Promise<Answer> {
  const { due, pricesUntil, reason, lots } = await readBody(req, ExtendMemoRequest);
  const memo = await findMemo(ctx, String(req.params.number));
  const lines = (lots ?? []).map((lot) => ({ lineId: Number(lineOf(memo, lot).lineId), due }));
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: null,
    memoId: memo.id,
    memoChange: { memoId: memo.id, ...(lots ? {} : { due }), pricesUntil, lines },
    document: {
      kind: 'extended memo',
      snapshot: {
        memo: `M ${memo.number}`,
        due,
        pricesUntil: pricesUntil ?? null,
        reason,
        lots: lots ?? 'all',
      },
    },
    audit: { action: 'memo extended' },
  });
  return { status: 201, body: { number: written.document?.number } };
}

/** New prices from today; both stay on the papers. */
export async function rePriceMemo(req: Request, ctx: Context): Promise<Answer> {
  const { reason, lines } = await readBody(req, RePriceMemoRequest);
  const memo = await findMemo(ctx, String(req.params.number));
  const changed = lines.map(({ lot, price, sum }) => {
    if ((price === undefined) === (sum === undefined))
      throw new ValidationFailed([
        { field: 'lines', message: `${lot} needs a price per carat or a sum.` },
      ]);
    const line = lineOf(memo, lot);
    return {
      lot,
      was: { price: line.price, sum: line.sum },
      lineId: Number(line.lineId),
      ...(price === undefined ? { agreedSum: sum } : { price }),
    };
  });
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: null,
    memoId: memo.id,
    memoChange: { memoId: memo.id, lines: changed },
    document: {
      kind: 're-priced memo',
      snapshot: { memo: `M ${memo.number}`, reason, lines: changed },
    },
    audit: { action: 'memo re-priced' },
  });
  return { status: 201, body: { number: written.document?.number } };
}

/** Back and out to another party in one act: a new memo, at the same prices. */
export async function handOverMemo(req: Request, ctx: Context): Promise<Answer> {
  const { party: number, due, reason, releaseReason } = await readBody(req, HandOverRequest);
  const key = keyOf(req, ctx);
  const before = await answeredBefore(ctx, key);
  if (before) return { status: 201, body: { number: String(before.memoNumber) } };
  const memo = await findMemo(ctx, String(req.params.number));
  const party = await partyByNumber(ctx.db, number);
  const out = memo.lines.filter((line) => line.flows.out > 0);
  if (out.length === 0)
    throw new RuleBroken('nothing_out', `Nothing of M ${memo.number} is still out.`);
  const written = await postAct(ctx, key, {
    kind: 'memo out',
    reason,
    releaseReason,
    partyId: party.id,
    newMemo: {
      partyId: party.id,
      due,
      currency: party.currency,
      remarks: `Transferred from M ${memo.number}`,
      lines: out.map((line) => ({
        lotId: (line.line.lot as { id: number }).id,
        price: line.price,
        agreedSum: line.sum,
        pricedWeight: line.lotKind === 'parcel' ? line.flows.out : line.pricedWeight,
      })),
    },
    ...handOver(
      out.map((line) => ({ line: line.line, weight: line.flows.out, pieces: line.outPieces })),
    ),
    document: {
      kind: 'memo',
      snapshot: {
        from: `M ${memo.number}`,
        party: { number: party.number, name: party.name },
        due,
        reason: reason ?? '',
        lines: out.map((line, index) => ({
          position: index + 1,
          lot: line.lot,
          what: line.what,
          pieces: line.outPieces,
          weight: line.flows.out,
          price: line.price,
          sum: line.sum,
        })),
      },
    },
  });
  return { status: 201, body: { number: String(written.memoNumber) } };
}

/** Writes down what we said or they said. */
export async function writeWords(req: Request, { db, person }: Context): Promise<Answer> {
  const { words, isTheirs } = await readBody(req, WordsRequest);
  if (words.trim() === '')
    throw new ValidationFailed([{ field: 'words', message: 'There is nothing to keep.' }]);
  const memo = await memoByNumber(db, String(req.params.number));
  await db.query(
    'INSERT INTO memo_word (memo_id, person_id, words, is_theirs) VALUES ($1, $2, $3, $4)',
    [memo.id, person.id, words.trim(), isTheirs ?? false],
  );
  return { status: 201 };
}
