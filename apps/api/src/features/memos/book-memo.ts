import { BookMemoRequest, type BookedMemo, type MemoLineRequest } from '@foldwell/contracts';
import { sendOut } from '@foldwell/ledger';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import { databaseError } from '../../http/problem.js';
import { sentenceOf } from '../../http/constraint-sentences.js';
import type { Answer, Context } from '../../http/route.js';
import type { Written } from '../ledger/act.js';
import { refuseOutOfStep, weightsOf } from '../ledger/in-step.js';
import { answeredBefore, type Key, keyOf, postAct } from '../ledger/post-act.js';
import { houseToday } from '../lots/list-lots.js';
import { type LotRecord, SELECT_LOT } from '../lots/lot-row.js';
import { type FoundParty, partyByNumber } from '../parties/parties.js';
import { holdingsOf, whoHasIt } from './holders.js';
import { type PlannedLine, snapshotOf } from './memo-snapshot.js';

/** Books a memo out, whole or not at all; over a limit it waits with its reason. */
export async function bookMemo(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, BookMemoRequest);
  return { status: 201, body: await bookOut(ctx, keyOf(req, ctx), request) };
}

/** The act itself, as people and the demo house do it. */
export async function bookOut(
  ctx: Context,
  key: Key,
  request: BookMemoRequest,
): Promise<BookedMemo> {
  const before = await answeredBefore(ctx, key);
  if (before) return booked(before);
  const party = await partyByNumber(ctx.db, request.party);
  if (!party.isCustomer && !party.isBroker)
    throw new RuleBroken('party_not_customer', `${party.name} is not a customer of ours.`);
  await refuseOutOfStep(ctx, weightsOf(request.lines));
  const lines = await Promise.all(request.lines.map((line) => plan(ctx, line)));
  try {
    return booked(
      await postAct(ctx, key, {
        kind: 'memo out',
        businessDate: request.businessDate,
        draftId: request.draftId,
        releaseReason: request.releaseReason,
        newMemo: newMemo(request, party, lines),
        document: { kind: 'memo', snapshot: await snapshotOf(ctx, request, party, lines) },
        ...sendOut(
          lines.map(({ record, placeId, weight, pieces }) => ({
            lot: { id: Number(record.id) },
            from: { id: placeId },
            weight,
            pieces,
          })),
        ),
        audit: { action: 'memo booked out' },
      }),
    );
  } catch (error) {
    await explain(ctx, request, lines, error);
    throw error;
  }
}

const booked = (written: Written): BookedMemo => ({
  number: String(written.memoNumber),
  movementId: String(written.movementId),
  memoId: String(written.memoId),
});

async function plan({ db }: Context, line: MemoLineRequest): Promise<PlannedLine> {
  const [record] = await db.query<LotRecord[]>(`${SELECT_LOT} WHERE l.number = $1`, [
    line.lot.toUpperCase(),
  ]);
  if (!record)
    throw new ValidationFailed([{ field: 'lines', message: `There is no lot ${line.lot}.` }]);
  if ((line.price === undefined) === (line.sum === undefined)) {
    throw new ValidationFailed([
      { field: 'lines', message: `${line.lot} needs a price per carat or a sum.` },
    ]);
  }
  const holdings = await holdingsOf(db, record.id);
  const free = holdings.filter(
    (holding) => holding.free > 0 && (!line.place || holding.placeId === line.place),
  );
  const placeId = (free.find((holding) => holding.free >= line.weight) ?? free[0])?.placeId;
  if (!placeId) {
    const { sentence, ...way } = whoHasIt(record.number, holdings, await houseToday(db));
    throw new RuleBroken('lot_not_free', sentence, { lot: record.number, ...way });
  }
  const isStated = record.kind === 'stone' && record.stated_weight !== null;
  return {
    ...line,
    record,
    placeId: Number(placeId),
    pricedWeight: isStated ? Number(record.stated_weight) : line.weight,
  };
}

function newMemo(
  request: BookMemoRequest,
  party: FoundParty,
  lines: PlannedLine[],
): Record<string, unknown> {
  const { due, pricesUntil, handedTo, carriedBy, terms, remarks, depositPercent } = request;
  return {
    partyId: party.id,
    due,
    pricesUntil,
    handedTo,
    carriedBy,
    terms,
    remarks,
    depositPercent,
    currency: party.currency,
    lines: lines.map((line) => ({
      lotId: Number(line.record.id),
      price: line.price,
      agreedSum: line.sum,
      pricedWeight: line.pricedWeight,
      remarks: line.remarks,
    })),
  };
}

const WAITS = ['party_credit_limit', 'party_memo_limit', 'party_papers_lapsed'];

/** Says who has what is gone, and lets a draft over the limit wait with its reason. */
async function explain(
  { db }: Context,
  request: BookMemoRequest,
  lines: PlannedLine[],
  error: unknown,
): Promise<void> {
  const { constraint = '', detail = '{}' } = databaseError(error);
  if (WAITS.includes(constraint) && request.draftId) {
    const reason =
      sentenceOf(constraint, JSON.parse(detail) as Record<string, string>) ?? constraint;
    await db.query(
      'UPDATE draft SET waits_because = $2, at = clock_timestamp() WHERE id::text = $1',
      [request.draftId, reason],
    );
  }
  if (constraint === 'balance_not_enough') {
    const { lotId } = JSON.parse(detail) as { lotId: number };
    const line = lines.find(({ record }) => Number(record.id) === lotId);
    const lot = line?.record.number ?? '';
    const who = whoHasIt(lot, await holdingsOf(db, String(lotId)), await houseToday(db));
    throw new RuleBroken('lot_not_free', who.sentence, {
      lot,
      path: who.path,
      pathWords: who.pathWords,
    });
  }
}
