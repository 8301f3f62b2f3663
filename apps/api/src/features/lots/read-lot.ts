import type { Bar, LotDetail, LotPlace } from '@foldwell/contracts';
import { lineAmount } from '@foldwell/quantities';
import type { Request } from 'express';

import { NotFound } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { placeWords } from '../places/place-words.js';
import { houseToday } from './list-lots.js';
import { type LotRecord, lotRow, SELECT_LOT } from './lot-row.js';
import { lotWarnings } from './lot-warnings.js';
import { entriesOf } from './lot-history.js';
import { particularsOf } from './particulars-columns.js';

/** One lot whole: its paper, where every carat of it is, its papers and its history. */
export async function readLot(req: Request, ctx: Context): Promise<Answer> {
  const { db, person } = ctx;
  const [record] = await db.query<(LotRecord & Record<string, unknown>)[]>(
    `${SELECT_LOT} WHERE l.number = $1`,
    [String(req.params.number).toUpperCase()],
  );
  if (!record) throw new NotFound(`There is no lot ${String(req.params.number).slice(0, 20)}.`);
  const row = lotRow(record, await houseToday(db), person.seesCost);
  const [about] = await db.query<
    {
      source: string | null;
      paper: string;
      previous: string | null;
      next: string | null;
      formula: number;
      reports: [];
    }[]
  >(
    `SELECT (SELECT name FROM party WHERE id = l.source_party_id) AS source,
       coalesce((SELECT m.paper FROM movement m JOIN posting g ON g.movement_id = m.id WHERE g.lot_id = l.id ORDER BY m.id LIMIT 1), '') AS paper,
       (SELECT number FROM lot x WHERE x.id < l.id ORDER BY x.id DESC LIMIT 1) AS previous,
       (SELECT number FROM lot x WHERE x.id > l.id ORDER BY x.id LIMIT 1) AS next,
       (SELECT formula_percent FROM house) AS formula,
       (SELECT coalesce(json_agg(json_build_object('laboratory', laboratory, 'number', number, 'standing', standing) ORDER BY id), '[]')
          FROM lot_report r WHERE r.lot_id = l.id) AS reports
     FROM lot l WHERE l.id = $1`,
    [record.id],
  );
  const particulars = particularsOf(record);
  const history = await entriesOf(db, record.id);
  const undoable = history.find((entry) => entry.movementId !== null);
  const body: LotDetail = {
    row,
    version: record.version,
    particulars: { ...particulars, reports: about?.reports ?? [] },
    takenInOn: record.taken_in_on as string | null,
    source: about?.source ?? null,
    sourcePaper: about?.paper ?? '',
    places: await placesOf(ctx, record, row.ask),
    papers: await papersOf(ctx, record.id),
    history,
    warnings: lotWarnings(
      { ...particulars, weight: row.weight, pieces: row.pieces },
      about?.formula ?? 10,
    ).map((one) => one.sentence),
    previous: about?.previous ?? null,
    next: about?.next ?? null,
    isReversible: undoable?.movementId
      ? { movementId: undoable.movementId, what: undoable.what }
      : null,
  };
  return { body };
}

interface PlaceRecord {
  place_id: string;
  kind: string;
  part: keyof Bar;
  name: string;
  safe: string;
  memo: string | null;
  party: string | null;
  due: string | null;
  since: string;
  weight: string;
  pieces: string;
  cost: string;
  price: string | null;
  agreed_sum: string | null;
  currency: string | null;
  sent_weight: string | null;
  priced_weight: string | null;
  difference_id: string | null;
}

async function placesOf(
  { db, person }: Context,
  lot: LotRecord,
  ask: number | null,
): Promise<LotPlace[]> {
  const records = await db.query<PlaceRecord[]>(
    `SELECT b.place_id, p.kind, p.part, p.name, p.safe, m.number AS memo, y.name AS party, coalesce(n.due, m.due)::text AS due,
       b.last_date::text AS since, b.weight, b.pieces, b.cost, n.price, n.agreed_sum, m.currency, n.sent_weight, n.priced_weight,
       CASE WHEN p.kind IN ('missing', 'quarantine') THEN (SELECT d.id FROM difference d WHERE d.lot_id = b.lot_id AND d.answer IS NULL LIMIT 1) END AS difference_id
     FROM balance b JOIN place p ON p.id = b.place_id LEFT JOIN memo m ON m.id = p.memo_id
     LEFT JOIN memo_line n ON n.memo_id = m.id AND n.lot_id = b.lot_id
     LEFT JOIN party y ON y.id = coalesce(m.party_id, p.party_id)
     WHERE b.lot_id = $1 AND p.part IS NOT NULL AND (b.weight > 0 OR b.pieces > 0)
     ORDER BY array_position(ARRAY['safe', 'out', 'returned', 'sold', 'missing'], p.part), b.weight DESC`,
    [lot.id],
  );
  return records.map((record) => {
    const weight = Number(record.weight);
    const price =
      record.price === null ? (record.agreed_sum === null ? ask : null) : Number(record.price);
    return {
      placeId: record.place_id,
      kind: record.kind,
      part: record.part,
      name: placeWords(record),
      paper: record.memo && `M ${record.memo}`,
      since: record.since,
      due: record.kind === 'memo' ? record.due : null,
      holder: record.party ?? '',
      pieces: Number(record.pieces),
      weight,
      price,
      currency: record.currency,
      value: price === null ? null : lineAmount(price, weight),
      differenceId: record.difference_id,
      ...(person.seesCost && { cost: Number(record.cost) }),
    };
  });
}

function papersOf(
  { db }: Context,
  lotId: string,
): Promise<{ paper: string; number: string; date: string }[]> {
  return db.query(
    `SELECT * FROM (
       SELECT initcap(d.kind) AS paper, d.number, coalesce(d.snapshot::jsonb ->> 'date', d.at::date::text) AS date, d.at FROM document d
         WHERE d.memo_id IN (SELECT memo_id FROM memo_line WHERE lot_id = $1)
       UNION ALL SELECT 'Weighing slip', 'W ' || w.number, w.business_date::text, w.at FROM weighing w WHERE w.lot_id = $1) x
     ORDER BY at DESC LIMIT 40`,
    [lotId],
  );
}
