import {
  ChangeHouseRequest,
  type House,
  SetRateRequest,
  StartSeriesRequest,
} from '@foldwell/contracts';
import type { Request } from 'express';

import { changedMeanwhile, readBody, requireVersion } from '../../http/body.js';
import { NotFound } from '../../http/errors.js';
import { type Answer, type Context, type Route, STAFF } from '../../http/route.js';

const COLUMNS = {
  stoneTolerance: 'stone_tolerance',
  parcelTolerance: 'parcel_tolerance',
  formulaPercent: 'formula_percent',
  acceptLimit: 'accept_limit',
  writeOffLimit: 'write_off_limit',
  memoDays: 'memo_days',
  depositPercent: 'deposit_percent',
  firstLimit: 'first_limit',
  insuredTo: 'insured_to',
  lockDate: 'lock_date',
  memoText: 'memo_text',
  warrantyText: 'warranty_text',
} as const satisfies Record<keyof ChangeHouseRequest, string>;

async function readHouse(_req: Request, { db }: Context): Promise<Answer> {
  return { body: await houseNow(db) };
}

async function houseNow(db: Context['db']): Promise<House> {
  const fields = Object.entries(COLUMNS).map(
    ([field, column]) => `${column}${column === 'lock_date' ? '::text' : ''} AS "${field}"`,
  );
  const [house] = await db.query<House[]>(
    `SELECT ${fields.join(', ')}, name, town, zone, step, base_currency AS "baseCurrency", price_currency AS "priceCurrency", is_demo AS "isDemo",
       memo_text_version AS "memoTextVersion", house_today()::text AS today, version FROM house`,
  );
  const rates = await db.query<House['rates']>(
    `SELECT currency, on_date::text AS "onDate", rate::text AS rate, (SELECT name FROM person WHERE id = person_id) AS by FROM currency_rate ORDER BY on_date DESC, currency LIMIT 60`,
  );
  const series = await db.query<House['series']>(
    `SELECT s.series, s.mark, CASE WHEN s.next > s.first THEN s.next - 1 END::int AS "lastUsed", s.next::int,
       (s.next - s.first - CASE s.series WHEN 'memo' THEN (SELECT count(*) FROM memo) WHEN 'weighing' THEN (SELECT count(*) FROM weighing)
          WHEN 'customer' THEN (SELECT count(*) FROM party) ELSE (SELECT count(*) FROM lot WHERE number ~ '^[0-9]+$') END)::int AS gaps
     FROM number_series s ORDER BY s.series`,
  );
  const whole = house as House;
  return {
    ...whole,
    firstLimit: Number(whole.firstLimit),
    insuredTo: whole.insuredTo === null ? null : Number(whole.insuredTo),
    rates,
    series,
  };
}

async function changeHouse(req: Request, { db, person }: Context): Promise<Answer> {
  const version = requireVersion(req);
  const request = await readBody(req, ChangeHouseRequest);
  const names = (Object.keys(COLUMNS) as (keyof typeof COLUMNS)[]).filter(
    (name) => request[name] !== undefined,
  );
  const set = names.map((name, index) => `${COLUMNS[name]} = $${index + 2}`);
  if (request.memoText !== undefined) set.push('memo_text_version = memo_text_version + 1');
  await db.transaction(async (tx) => {
    const [, count] = await tx.query<[unknown, number]>(
      `UPDATE house SET ${[...set, 'version = version + 1'].join(', ')} WHERE version = $1`,
      [version, ...names.map((name) => request[name])],
    );
    if (count === 0) throw changedMeanwhile(await houseNow(db));
    await tx.query(
      `INSERT INTO audit (person_id, action, subject, detail) VALUES ($1, 'house changed', 'house', $2)`,
      [person.id, { ...request }],
    );
  });
  return { body: await houseNow(db) };
}

async function setRate(req: Request, { db, person }: Context): Promise<Answer> {
  const { currency, onDate, rate } = await readBody(req, SetRateRequest);
  await db.query(
    `INSERT INTO currency_rate (currency, on_date, rate, person_id) VALUES ($1, $2, $3, $4)
     ON CONFLICT ON CONSTRAINT currency_rate_pkey DO UPDATE SET rate = excluded.rate, person_id = excluded.person_id, at = clock_timestamp()`,
    [currency.toUpperCase(), onDate, rate, person.id],
  );
  await db.query(
    `INSERT INTO audit (person_id, action, subject, detail) VALUES ($1, 'rate written', $2, $3)`,
    [person.id, `rate ${currency}`, { onDate, rate }],
  );
  return { status: 201 };
}

async function startSeries(req: Request, { db }: Context): Promise<Answer> {
  const { first } = await readBody(req, StartSeriesRequest);
  const [, count] = await db.query<[unknown, number]>(
    'UPDATE number_series SET first = $2, next = $2 WHERE series = $1',
    [String(req.params.series), first],
  );
  if (count === 0) throw new NotFound('There is no such number series.');
  return { status: 204 };
}

export const houseRoutes: Route[] = [
  { method: 'get', path: '/house', allowed: STAFF, handle: readHouse },
  { method: 'patch', path: '/house', allowed: ['owner'], handle: changeHouse },
  { method: 'post', path: '/rates', allowed: ['owner', 'bookkeeper'], handle: setRate },
  { method: 'patch', path: '/number-series/:series', allowed: ['owner'], handle: startSeries },
];
