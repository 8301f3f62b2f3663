import type { LotPage, LotSum } from '@foldwell/contracts';
import { CLARITIES } from '@foldwell/quantities';
import type { Request } from 'express';

import { toCsv } from '../../http/csv.js';
import { Refusal } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { type LotRecord, lotRow, SELECT_LOT } from './lot-row.js';
import { readSieve, type Sieve } from './lot-sieve.js';

const PAGE = 100;
const COUNTED = 10_000;
const CSV_BATCH = 5_000;
/** Columns the list sorts by; a cost column only for who may see cost. */
const SORTS: Record<string, string> = {
  number: 'l.id',
  weight: 'l.whole',
  each: 'l.each_weight',
  ask: 'coalesce(l.ask_price, -1)',
  pieces: 'l.part_pieces',
  colour: 'coalesce(l.colour_from, 99)',
  clarity: 'coalesce(l.clarity_from, 99)',
  shape: 'l.shape',
  report: 'upper(l.report_number)',
  out: 'l.part_out',
};

/** A page of the lots that pass, by keyset: the next one begins after the last row's own value. */
export async function listLots(req: Request, { db, person }: Context): Promise<Answer> {
  const sieve = readSieve(req.query);
  const { column, isDown } = readSort(req);
  const after = readAfter(req);
  if (after) {
    sieve.values.push(after.value, after.id);
    const [value, id] = [`$${sieve.values.length - 1}`, `$${sieve.values.length}`];
    sieve.where.push(`(${column}, l.id) ${isDown ? '<' : '>'} (${value}, ${id}::bigint)`);
  }
  const way = isDown ? 'DESC' : 'ASC';
  const today = await houseToday(db);
  // The ids first by the index alone, then all that a row needs for those few.
  const records = await db.query<(LotRecord & { sort_value: string | number })[]>(
    `SELECT x.*, k.sort_value FROM (SELECT l.id, ${column} AS sort_value FROM lot l ${where(sieve)}
       ORDER BY ${column} ${way}, l.id ${way} LIMIT ${PAGE + 1}) k
     JOIN LATERAL (${SELECT_LOT} WHERE l.id = k.id) x ON true ORDER BY k.sort_value ${way}, k.id ${way}`,
    sieve.values,
  );
  const rows = records.slice(0, PAGE);
  const last = rows.at(-1);
  const body: LotPage = {
    rows: rows.map((record) => lotRow(record, today, person.seesCost)),
    next:
      records.length > PAGE && last
        ? Buffer.from(JSON.stringify([last.sort_value, last.id])).toString('base64url')
        : null,
  };
  return { body };
}

/** Sums of all that pass; only the count stops at 10,000, carats and value are of every lot. */
export async function sumLots(req: Request, { db, person }: Context): Promise<Answer> {
  const sieve = readSieve(req.query);
  const [row] = await db.query<Record<string, string>[]>(
    `SELECT count(*) AS lots, (SELECT count(*) FROM (SELECT 1 FROM lot WHERE whole > 0 LIMIT ${COUNTED + 1}) x) AS of,
       coalesce(sum(part_pieces), 0) AS pieces, coalesce(sum(whole), 0) AS weight,
       coalesce(sum(half_away(ask_price::numeric * whole, 1000)), 0) AS value,
       coalesce(sum(part_safe), 0) AS safe, coalesce(sum(part_out), 0) AS out, coalesce(sum(part_returned), 0) AS returned,
       coalesce(sum(part_sold), 0) AS sold, coalesce(sum(part_missing), 0) AS missing FROM lot l ${where(sieve)}`,
    sieve.values,
  );
  const n = (name: string) => Number(row?.[name] ?? 0);
  const body: LotSum = {
    lots: Math.min(n('lots'), COUNTED),
    isCapped: n('lots') > COUNTED,
    of: Math.min(n('of'), COUNTED),
    pieces: n('pieces'),
    weight: n('weight'),
    value: n('value'),
    bar: {
      safe: n('safe'),
      out: n('out'),
      returned: n('returned'),
      sold: n('sold'),
      missing: n('missing'),
    },
    hint: n('lots') === 0 ? await hintOf(req, { db, person }) : null,
  };
  return { body };
}

/** What one step wider in clarity, or no place, would let through. */
async function hintOf(req: Request, { db }: Context): Promise<string | null> {
  const { clarity } = req.query;
  const tries: [string, Request['query']][] = [];
  if (typeof clarity === 'string' && clarity) {
    const [from = '', to = from] = clarity.split('-');
    const wider = CLARITIES[(CLARITIES as readonly string[]).indexOf(to.toUpperCase()) + 1];
    if (wider)
      tries.push([`if clarity went to ${wider}`, { ...req.query, clarity: `${from}-${wider}` }]);
  }
  for (const [name, words] of [
    ['place', 'at any place'],
    ['each', 'at any weight'],
    ['colour', 'in any colour'],
    ['clarity', 'in any clarity'],
    ['shape', 'in any shape'],
  ] as const) {
    if (req.query[name]) tries.push([words, { ...req.query, [name]: '' }]);
  }
  for (const [words, query] of tries) {
    const sieve = readSieve(query);
    const [row] = await db.query<{ n: number }[]>(
      `SELECT count(*)::int AS n FROM (SELECT 1 FROM lot l ${where(sieve)} LIMIT 1000) x`,
      sieve.values,
    );
    if (row?.n) return `${row.n} would pass ${words}.`;
  }
  return null;
}

/** The list as CSV; the cost column is there only for who may see it. */
export async function lotsCsv(req: Request, { db, person }: Context): Promise<Answer> {
  const sieve = readSieve(req.query);
  const today = await houseToday(db);
  const records = await everyRecord(db, sieve);
  const fields = [
    'Lot',
    'Kind',
    'Shape',
    'Sieve',
    'Pieces',
    'Weight ct',
    'Colour',
    'Clarity',
    'Cut pol sym',
    'Fluorescence',
    'Report',
    'Origin',
    'Treatment',
    'Ask per ct',
    'Place',
    ...(person.seesCost ? ['Cost'] : []),
  ];
  const rows = records.map((record) => {
    const row = lotRow(record, today, person.seesCost);
    return [
      row.number,
      row.kind,
      row.shape,
      row.sieve,
      row.pieces,
      row.weight / 1000,
      row.colour,
      row.clarity,
      row.make,
      row.fluorescence,
      row.report,
      row.origin,
      row.treatment,
      row.ask === null ? '' : row.ask / 100,
      row.place,
      ...(person.seesCost ? [(row.cost ?? 0) / 100] : []),
    ];
  });
  return {
    text: toCsv(fields, rows),
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': 'attachment; filename="lots.csv"',
      'Content-Security-Policy': 'sandbox',
    },
  };
}

// In batches, so that no one statement holds a connection past its timeout; as of one moment.
async function everyRecord(db: Context['db'], sieve: Sieve): Promise<LotRecord[]> {
  const at = `$${sieve.values.length + 1}`;
  const conditions = where({ ...sieve, where: [...sieve.where, `l.id > ${at}::bigint`] });
  return db.transaction('REPEATABLE READ', async (tx) => {
    const all: LotRecord[] = [];
    for (let batch: LotRecord[], after = '0'; ; after = batch.at(-1)?.id ?? after) {
      batch = await tx.query<LotRecord[]>(
        `${SELECT_LOT} ${conditions} ORDER BY l.id LIMIT ${CSV_BATCH}`,
        [...sieve.values, after],
      );
      all.push(...batch);
      if (batch.length < CSV_BATCH) return all;
    }
  });
}

const where = ({ where: conditions }: Sieve) =>
  conditions.length > 0 ? `WHERE ${conditions.join(' AND ')}` : '';

function readSort(req: Request): { column: string; isDown: boolean } {
  const asked = typeof req.query.sort === 'string' ? req.query.sort : 'number';
  const column = SORTS[asked.replace(/^-/, '')];
  if (!column) throw new Refusal(400, 'sort', `The list can’t be sorted by ${asked.slice(0, 40)}.`);
  return { column, isDown: asked.startsWith('-') };
}

function readAfter(req: Request): { value: string | number; id: string } | null {
  if (typeof req.query.after !== 'string' || !req.query.after) return null;
  try {
    const [value, id] = JSON.parse(Buffer.from(req.query.after, 'base64url').toString()) as [
      string | number,
      string,
    ];
    if (/^\d{1,18}$/.test(id) && ['string', 'number'].includes(typeof value)) return { value, id };
  } catch {
    // Falls through to the one refusal below.
  }
  throw new Refusal(400, 'after', 'The next page can’t be found from there. Start from the first.');
}

/** Today in the house's zone. */
export async function houseToday(db: Context['db']): Promise<string> {
  const [row] = await db.query<{ today: string }[]>('SELECT house_today()::text AS today');
  return row?.today ?? '';
}
