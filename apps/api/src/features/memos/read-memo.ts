import type { MemoDetail, MemoLine } from '@foldwell/contracts';
import type { Request } from 'express';
import type { DataSource } from 'typeorm';

import { queryText } from '../../http/body.js';
import { NotFound } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { type LotRecord, lotRow, SELECT_LOT, whatWords } from '../lots/lot-row.js';
import { differenceRows } from '../returns/difference-rows.js';
import { flowsOf, memoRows } from './memo-rows.js';

/** Memos by state, party and words; late first by due date. */
export async function listMemos(req: Request, { db }: Context): Promise<Answer> {
  const conditions: string[] = [];
  const values: unknown[] = [];
  const state = queryText(req, 'state') || 'open';
  if (state === 'open') conditions.push('NOT m.is_settled');
  if (state === 'late') conditions.push('NOT m.is_settled AND m.due < house_today()');
  if (state === 'settled') conditions.push('m.is_settled');
  if (typeof req.query.party === 'string' && req.query.party)
    conditions.push(`y.number::text = $${values.push(req.query.party.replace(/^C\s*/i, ''))}`);
  if (typeof req.query.q === 'string' && req.query.q) {
    conditions.push(
      `(y.name ILIKE '%' || $${values.push(req.query.q.replace(/[%_\\]/g, '\\$&'))} || '%' OR m.number::text = $${values.push(req.query.q.replace(/^M\s*/i, ''))})`,
    );
  }
  if (typeof req.query.before === 'string' && /^\d{1,12}$/.test(req.query.before))
    conditions.push(`m.number < $${values.push(req.query.before)}`);
  const order =
    state === 'open' || state === 'late'
      ? 'ORDER BY m.due, m.number LIMIT 500'
      : 'ORDER BY m.number DESC LIMIT 100';
  return { body: await memoRows(db, conditions.join(' AND ') || 'true', values, order) };
}

/** The id and a few plain columns of a memo by number. */
export async function memoByNumber(
  db: DataSource,
  number: string,
): Promise<{ id: string; party_id: string; number: string }> {
  const bare = number.replace(/^M\s*/i, '');
  const [memo] = /^\d{1,12}$/.test(bare)
    ? await db.query<{ id: string; party_id: string; number: string }[]>(
        'SELECT id, party_id, number FROM memo WHERE number = $1',
        [bare],
      )
    : [];
  if (!memo) throw new NotFound(`There is no memo M ${bare.slice(0, 20)}.`);
  return memo;
}

/** One memo whole: its flows, lines, words, papers and terms. */
export async function readMemo(req: Request, { db }: Context): Promise<Answer> {
  const { id, party_id: partyId, number } = await memoByNumber(db, String(req.params.number));
  const [row] = await memoRows(db, 'm.id = $1', [id]);
  const [about] = await db.query<AboutMemo[]>(
    `SELECT w.name AS by, m.handed_to AS "handedTo", m.carried_by AS "carriedBy", m.terms, m.remarks, m.prices_until::text AS "pricesUntil",
       m.deposit_percent AS "depositPercent", m.stone_tolerance AS "stoneTolerance", m.parcel_tolerance AS "parcelTolerance",
       (SELECT insured_to FROM house) AS "insuredTo",
       (SELECT number::text FROM memo x WHERE x.number < m.number ORDER BY x.number DESC LIMIT 1) AS previous,
       (SELECT number::text FROM memo x WHERE x.number > m.number ORDER BY x.number LIMIT 1) AS next
     FROM memo m JOIN person w ON w.id = m.person_id WHERE m.id = $1`,
    [id],
  );
  const lines = await linesOf(db, id);
  const isTouched = lines.some(
    ({ flows: f }) => f.returned + f.kept + f.missing + f.converted + f.writtenOff !== 0,
  );
  const body: MemoDetail = {
    ...(row as NonNullable<typeof row>),
    ...(about as AboutMemo),
    insuredTo: about?.insuredTo == null ? null : Number(about.insuredTo),
    id,
    lines,
    differenceList: await differenceRows(db, 'n.memo_id = $1', [id]),
    words: await db.query(
      `SELECT x.at, x.words, coalesce(w.name, 'Foldwell') AS by, x.is_theirs AS "isTheirs" FROM memo_word x LEFT JOIN person w ON w.id = x.person_id WHERE x.memo_id = $1 ORDER BY x.id DESC`,
      [id],
    ),
    papers: await db.query(
      `SELECT * FROM (SELECT initcap(kind) AS kind, number, coalesce(snapshot::jsonb ->> 'date', at::date::text) AS date, at FROM document WHERE memo_id = $1
         UNION ALL SELECT 'Weighing slip', 'W ' || g.number, g.business_date::text, g.at FROM weighing g JOIN memo_line n ON n.id = g.memo_line_id WHERE n.memo_id = $1) p ORDER BY at DESC`,
      [id],
    ),
    otherMemos: (
      await memoRows(db, 'm.party_id = $1 AND m.id <> $2 AND NOT m.is_settled', [partyId, id])
    ).map((memo) => ({ number: memo.number, out: memo.flows.out, due: memo.due })),
    voidRefusal:
      row?.state === 'void' ? 'it is void already' : isTouched ? 'part is already settled' : null,
    previous: about?.previous ?? null,
    next: about?.next ?? null,
    number,
  };
  return { body };
}

type AboutMemo = Pick<
  MemoDetail,
  | 'by'
  | 'handedTo'
  | 'carriedBy'
  | 'terms'
  | 'remarks'
  | 'pricesUntil'
  | 'depositPercent'
  | 'stoneTolerance'
  | 'parcelTolerance'
  | 'insuredTo'
  | 'previous'
  | 'next'
>;

interface LineRecord {
  line_id: string;
  sent_pieces: string;
  out_pieces: string;
  kept_pieces: string;
  price: string | null;
  agreed_sum: string | null;
  priced_weight: string;
  value_out: string;
  due: string | null;
  is_estimated: boolean;
  difference_id: string | null;
  found: string | null;
  found_pieces: string | null;
  weighing: string | null;
  lot: LotRecord;
  ledger: string;
}

/** The lines of a memo with what became of each. */
export async function linesOf(db: DataSource, memoId: string): Promise<MemoLine[]> {
  const records = await db.query<(LineRecord & Parameters<typeof flowsOf>[0])[]>(
    `SELECT n.id AS line_id, n.sent_pieces, n.out_pieces, n.kept_pieces, n.price, n.agreed_sum, n.priced_weight, n.due::text, n.is_estimated,
       memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight, n.out_weight) AS value_out,
       n.out_weight AS out, n.returned_weight AS returned, n.kept_weight AS kept, n.missing_weight AS missing, n.written_off_weight AS written_off,
       n.converted_weight AS converted, n.restated_weight AS restated, n.sent_weight AS sent,
       (SELECT id FROM difference d WHERE d.memo_line_id = n.id AND d.answer IS NULL LIMIT 1) AS difference_id,
       w.weight AS found, w.pieces AS found_pieces, w.number AS weighing, row_to_json(l) AS lot
     FROM memo_line n JOIN LATERAL (${SELECT_LOT} WHERE l.id = n.lot_id) l ON true
     LEFT JOIN LATERAL (SELECT * FROM weighing g WHERE g.memo_line_id = n.id ORDER BY g.id DESC LIMIT 1) w ON true
     WHERE n.memo_id = $1 ORDER BY n.position`,
    [memoId],
  );
  return records.map((record) => {
    const row = lotRow(record.lot, '9999-12-31', false);
    return {
      lineId: record.line_id,
      lot: row.number,
      lotKind: row.kind,
      what: whatWords(row),
      report: row.report,
      isEstimated: record.is_estimated,
      sentPieces: Number(record.sent_pieces),
      outPieces: Number(record.out_pieces),
      keptPieces: Number(record.kept_pieces),
      flows: flowsOf(record),
      price: record.price === null ? null : Number(record.price),
      sum: record.agreed_sum === null ? null : Number(record.agreed_sum),
      pricedWeight: Number(record.priced_weight),
      valueOut: Number(record.value_out),
      due: record.due,
      differenceId: record.difference_id,
      found: record.found === null ? null : Number(record.found),
      foundPieces: record.found_pieces === null ? null : Number(record.found_pieces),
      weighing: record.weighing === null ? null : Number(record.weighing),
      ledgerWeight: row.weight,
    };
  });
}

/** A paper as it was issued; what is printed is made from this and nothing newer. */
export async function readDocument(req: Request, { db }: Context): Promise<Answer> {
  const [paper] = await db.query<
    { kind: string; number: string; snapshot: string; hash: string; at: string }[]
  >(
    `SELECT kind, number, snapshot, encode(hash, 'hex') AS hash, at FROM document WHERE number = $1`,
    [String(req.params.number)],
  );
  if (!paper) throw new NotFound('There is no such paper.');
  return { body: { ...paper, snapshot: JSON.parse(paper.snapshot) as unknown } };
}
