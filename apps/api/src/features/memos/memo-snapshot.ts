import type { BookMemoRequest } from '@foldwell/contracts';
import { lineAmount, longDate, originWords } from '@foldwell/quantities';

import type { Context } from '../../http/route.js';
import { type LotRecord, lotRow, whatWords } from '../lots/lot-row.js';
import type { FoundParty } from '../parties/parties.js';

interface HouseOnPaper {
  name: string;
  town: string;
  step: number;
  tolerance: number;
  text: string;
  textVersion: number;
  today: string;
}

/** A line as it is planned: what is asked for, its lot, and the weight that prices it. */
export interface PlannedLine {
  record: LotRecord;
  placeId: number;
  weight: number;
  pieces: number;
  pricedWeight: number;
  price?: number | undefined;
  sum?: number | undefined;
  remarks?: string | undefined;
}

/** What the paper says, kept as it was issued: parties, lines in full permitted words, terms. */
export async function snapshotOf(
  { db, person }: Context,
  request: BookMemoRequest,
  party: FoundParty,
  lines: PlannedLine[],
): Promise<object> {
  const [house] = await db.query<HouseOnPaper[]>(
    `SELECT name, town, step, parcel_tolerance AS tolerance, memo_text AS text,
       memo_text_version AS "textVersion", house_today()::text AS today FROM house`,
  );
  const { name, town, step, tolerance, textVersion, today, text } = house as HouseOnPaper;
  const { handedTo = '', carriedBy = '', terms = '', remarks = '', due } = request;
  const pricesUntil = request.pricesUntil ?? due;
  return {
    house: { name, town },
    party: { number: party.number, name: party.name, town: party.town, address: party.address },
    date: request.businessDate ?? today,
    due,
    pricesUntil,
    currency: party.currency,
    handedTo,
    carriedBy,
    terms,
    remarks,
    by: person.name,
    text: text
      .replaceAll('{house}', name)
      .replaceAll('{due date}', longDate(due))
      .replaceAll('{customer}', party.name)
      .replaceAll('{price date}', longDate(pricesUntil)),
    textVersion,
    tolerance,
    step,
    lines: lines.map((line, index) => ({ position: index + 1, ...lineOnPaper(line) })),
  };
}

/** Origin and treatment stand on each line, and whose grades they are. */
function lineOnPaper({ record, weight, pieces, pricedWeight, price, sum, remarks }: PlannedLine) {
  return {
    lot: record.number,
    what: whatWords(lotRow(record, '9999-12-31', false)),
    origin: originWords(record.origin, record.treatment),
    grades: record.report_number
      ? `grades as stated by ${record.report_laboratory}`
      : 'grades as we see them',
    pieces,
    isEstimated: record.is_estimated,
    weight,
    pricedWeight,
    price: price ?? null,
    sum: sum ?? null,
    amount: sum ?? lineAmount(price ?? 0, pricedWeight),
    remarks: remarks ?? '',
  };
}
