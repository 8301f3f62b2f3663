import {
  ExtendMemoRequest,
  HandOverRequest,
  KeepRequest,
  ReasonRequest,
  RePriceMemoRequest,
  WordsRequest,
  type MemoLine,
} from '@foldwell/contracts';
import { handOver, keep, type Line, together, undoMemo, unKeep } from '@foldwell/ledger';
import { halfAwayFromZero } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { keyOf, postAct, type Key } from '../ledger/post-act.js';
import { lotIds } from '../lots/move-lots.js';
import { partyByNumber } from '../parties/parties.js';
import { linesOf, memoByNumber } from './read-memo.js';

interface Found {
  id: number;
  number: string;
  lines: (MemoLine & { line: Line })[];
}

/** A memo with its lines as the ledger names them. */
export async function findMemo(ctx: Context, number: string): Promise<Found> {
  const memo = await memoByNumber(ctx.db, number);
  const lines = await linesOf(ctx.db, memo.id);
  const ids = await lotIds(
    ctx,
    lines.map((line) => line.lot),
  );
  return {
    id: Number(memo.id),
    number: memo.number,
    lines: lines.map((line) => ({
      ...line,
      line: {
        lot: { id: ids.get(line.lot) ?? 0 },
        memoId: Number(memo.id),
        lineId: Number(line.lineId),
      },
    })),
  };
}

/** One line of a memo by its lot. */
export function lineOf(memo: Found, lot: string): Found['lines'][number] {
  const line = memo.lines.find((one) => one.lot === lot.toUpperCase());
  if (!line) throw new RuleBroken('line_missing', `${lot} is not on M ${memo.number}.`);
  return line;
}

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
  const memo = await findMemo(ctx, String(req.params.number));
  const party = await partyByNumber(ctx.db, number);
  const out = memo.lines.filter((line) => line.flows.out > 0);
  if (out.length === 0)
    throw new RuleBroken('nothing_out', `Nothing of M ${memo.number} is still out.`);
  const written = await postAct(ctx, keyOf(req, ctx), {
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

/** A kept line is on memo again, before it is invoiced. */
export async function unKeepLines(req: Request, ctx: Context): Promise<Answer> {
  const { lines } = await readBody(req, KeepRequest);
  const memo = await findMemo(ctx, String(req.params.number));
  const back = lines.map((asked) => ({ asked, found: lineOf(memo, asked.lot) }));
  const written = await postAct(ctx, keyOf(req, ctx), {
    kind: 'un-kept',
    memoId: memo.id,
    ...together(
      ...back.map(({ asked: { weight, pieces }, found }) => unKeep(found.line, { weight, pieces })),
    ),
    keeps: back.map(({ asked, found }) => ({
      lineId: found.line.lineId,
      weight: -asked.weight,
      pieces: -asked.pieces,
      amount: -keptAmount(found, asked),
    })),
  });
  return { status: 201, body: { movementId: String(written.movementId) } };
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
