import { BookMemoRequest, type BookedMemo, type MemoLineRequest } from '@foldwell/contracts';
import { sendOut } from '@foldwell/ledger';
import { lineAmount, longDate, originWords } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { RuleBroken, ValidationFailed } from '../../http/errors.js';
import { databaseError } from '../../http/problem.js';
import { sentenceOf } from '../../http/constraint-sentences.js';
import type { Answer, Context } from '../../http/route.js';
import type { Written } from '../ledger/act.js';
import { answeredBefore, type Key, keyOf, postAct } from '../ledger/post-act.js';
import { houseToday } from '../lots/list-lots.js';
import { type LotRecord, lotRow, SELECT_LOT, whatWords } from '../lots/lot-row.js';
import { partyByNumber } from '../parties/parties.js';
import type { Party } from '../parties/party.entity.js';
import { holdingsOf, whoHasIt } from './holders.js';

/** Books a memo out, whole or not at all; over a limit it waits with its reason. */
export async function bookMemo(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, BookMemoRequest);
  return { status: 201, body: await bookOut(ctx, keyOf(req, ctx), request) };
}

interface PlannedLine extends MemoLineRequest {
  record: LotRecord;
  placeId: number;
  pricedWeight: number;
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
  party: Party,
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

/** What the paper says, kept as it was issued: parties, lines in full permitted words, terms. */
async function snapshotOf(
  { db, person }: Context,
  request: BookMemoRequest,
  party: Party,
  lines: PlannedLine[],
): Promise<object> {
  const [house] = await db.query<
    {
      name: string;
      town: string;
      step: number;
      parcel_tolerance: number;
      memo_text: string;
      memo_text_version: number;
      today: string;
    }[]
  >(
    'SELECT name, town, step, parcel_tolerance, memo_text, memo_text_version, house_today()::text AS today FROM house',
  );
  return {
    house: { name: house?.name, town: house?.town },
    party: { number: party.number, name: party.name, town: party.town, address: party.address },
    date: request.businessDate ?? house?.today,
    due: request.due,
    pricesUntil: request.pricesUntil ?? request.due,
    currency: party.currency,
    handedTo: request.handedTo ?? '',
    carriedBy: request.carriedBy ?? '',
    terms: request.terms ?? '',
    remarks: request.remarks ?? '',
    by: person.name,
    text: (house?.memo_text ?? '')
      .replaceAll('{house}', house?.name ?? '')
      .replaceAll('{due date}', longDate(request.due))
      .replaceAll('{customer}', party.name)
      .replaceAll('{price date}', longDate(request.pricesUntil ?? request.due)),
    textVersion: house?.memo_text_version,
    tolerance: house?.parcel_tolerance,
    step: house?.step,
    lines: lines.map((line, index) => ({
      position: index + 1,
      lot: line.record.number,
      what: whatWords(lotRow(line.record, request.due, false)),
      origin: originWords(line.record.origin, line.record.treatment),
      grades: line.record.report_number
        ? `grades as stated by ${line.record.report_laboratory}`
        : 'grades as we see them',
      pieces: line.pieces,
      isEstimated: line.record.is_estimated,
      weight: line.weight,
      pricedWeight: line.pricedWeight,
      price: line.price ?? null,
      sum: line.sum ?? null,
      amount: line.sum ?? lineAmount(line.price ?? 0, line.pricedWeight),
      remarks: line.remarks ?? '',
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
