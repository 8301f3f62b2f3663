import {
  AddPartyRequest,
  ChangePartyRequest,
  type Exposure,
  type PartyDetail,
  type PartyRow,
} from '@foldwell/contracts';
import type { Request } from 'express';
import type { DataSource, EntityManager } from 'typeorm';

import { changedMeanwhile, queryText, readBody, requireVersion } from '../../http/body.js';
import { NotFound, Refusal, ValidationFailed } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { memoRows } from '../memos/memo-rows.js';
import { Party } from './party.entity.js';

const PARTS = [
  'isCustomer',
  'isSupplier',
  'isConsignor',
  'isBroker',
  'isLaboratory',
  'isWorkshop',
] as const;

/** Parties by part and name, with what each owes or holds now. */
export async function listParties(req: Request, { db }: Context): Promise<Answer> {
  const part = PARTS.find(
    (one) => one === `is${queryText(req, 'part').replace(/^./, (c) => c.toUpperCase())}`,
  );
  const query = db.getRepository(Party).createQueryBuilder('p').orderBy('lower(p.name)').limit(500);
  if (part) query.andWhere(`p.${part}`);
  if (typeof req.query.q === 'string' && req.query.q)
    query.andWhere('(p.name ILIKE :q OR p.number::text = :n)', {
      q: `%${req.query.q}%`,
      n: req.query.q.replace(/^C\s*/i, ''),
    });
  const parties = await query.getMany();
  return { body: await Promise.all(parties.map((party) => rowOf(db, party))) };
}

async function rowOf(db: DataSource, party: Party): Promise<PartyRow> {
  const [memos] = await db.query<{ open: number; late: number; out: string; today: string }[]>(
    `SELECT count(DISTINCT m.id)::int AS open, count(DISTINCT m.id) FILTER (WHERE m.due < house_today())::int AS late,
       coalesce(sum(n.out_weight), 0) AS out, house_today()::text AS today
     FROM memo m JOIN memo_line n ON n.memo_id = m.id WHERE m.party_id = $1 AND NOT m.is_settled`,
    [party.id],
  );
  const lapsing = [
    ['Identity papers', party.identityPapersUntil],
    ['Resale certificate', party.resaleCertificateUntil],
  ]
    .filter(([, until]) => until && until < (memos?.today ?? ''))
    .map(([paper, until]) => `${paper} lapsed ${until}`);
  return {
    number: party.number,
    name: party.name,
    town: party.town,
    parts: PARTS.filter((part) => party[part]).map((part) => part.slice(2).toLowerCase()),
    exposure: await exposureOf(db, party),
    memosOpen: memos?.open ?? 0,
    late: memos?.late ?? 0,
    out: Number(memos?.out ?? 0),
    papers: lapsing[0] ?? null,
  };
}

/** What a party owes or holds now, with its limits, in its own currency. */
export async function exposureOf(db: DataSource, party: Party): Promise<Exposure> {
  const [row] = await db.query<{ on_memo: string; kept: string; total: string }[]>(
    'SELECT * FROM party_exposure($1)',
    [party.id],
  );
  return {
    onMemo: Number(row?.on_memo ?? 0),
    kept: Number(row?.kept ?? 0),
    total: Number(row?.total ?? 0),
    limit: party.creditLimit === null ? null : Number(party.creditLimit),
    memoLimit: party.memoLimit === null ? null : Number(party.memoLimit),
    currency: party.currency,
  };
}

/** A party as other features see it. */
export type FoundParty = Party;

/** A party by its number, as people say it: `118` or `C 118`. */
export async function partyByNumber(db: DataSource, number: string): Promise<FoundParty> {
  const bare = number.replace(/^C\s*/i, '');
  const party = /^\d{1,12}$/.test(bare)
    ? await db.getRepository(Party).findOneBy({ number: bare })
    : null;
  if (!party) throw new NotFound(`There is no customer or party C ${bare.slice(0, 20)}.`);
  return party;
}

/** One party: limits, terms, exposure now, what it holds, how it kept and returned. */
export async function readParty(req: Request, { db }: Context): Promise<Answer> {
  const party = await partyByNumber(db, String(req.params.number));
  const {
    id: _id,
    number: _number,
    version,
    creditLimit,
    memoLimit,
    isCustomer: _c,
    isSupplier: _s,
    isConsignor: _g,
    isBroker: _b,
    isLaboratory: _l,
    isWorkshop: _w,
    ...particulars
  } = party;
  const holds = await db.query<PartyDetail['holds']>(
    `SELECT l.number AS lot, concat_ws(' ', l.shape, nullif(l.report_laboratory || ' ' || l.report_number, ' ')) AS what, m.number::text AS memo,
       n.out_pieces::int AS pieces, n.out_weight::int AS weight,
       memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight, n.out_weight)::float8 AS value, coalesce(n.due, m.due)::text AS due
     FROM memo_line n JOIN memo m ON m.id = n.memo_id JOIN lot l ON l.id = n.lot_id
     WHERE m.party_id = $1 AND n.out_weight > 0 ORDER BY m.due, m.number, n.position LIMIT 500`,
    [party.id],
  );
  const body: PartyDetail = {
    ...(await rowOf(db, party)),
    version,
    particulars: {
      ...particulars,
      creditLimit: creditLimit === null ? null : Number(creditLimit),
      memoLimit: memoLimit === null ? null : Number(memoLimit),
    },
    memos: await memoRows(
      db,
      'm.party_id = $1',
      [party.id],
      'ORDER BY m.is_settled, m.number DESC LIMIT 40',
    ),
    holds,
    keeps: await keepsOf(db, party.id),
  };
  return { body, headers: { ETag: `"v${version}"` } };
}

/** Over all memos of a party: what was kept of what we sent, days out on average, differences. */
export async function keepsOf(db: DataSource, partyId: string): Promise<PartyDetail['keeps']> {
  const [row] = await db.query<
    { sent: string; kept: string; memos: number; days: string | null; differences: number }[]
  >(
    `SELECT coalesce(sum(n.sent_weight), 0) AS sent, coalesce(sum(n.kept_weight), 0) AS kept, count(DISTINCT m.id)::int AS memos,
       (SELECT round(avg(g.last - o.business_date)) FROM memo o JOIN LATERAL (SELECT max(business_date) AS last FROM movement WHERE memo_id = o.id) g ON true
          WHERE o.party_id = $1 AND o.is_settled) AS days,
       (SELECT count(*)::int FROM difference d JOIN memo_line x ON x.id = d.memo_line_id JOIN memo o ON o.id = x.memo_id WHERE o.party_id = $1) AS differences
     FROM memo m JOIN memo_line n ON n.memo_id = m.id WHERE m.party_id = $1 AND m.void_movement_id IS NULL`,
    [partyId],
  );
  return {
    sent: Number(row?.sent ?? 0),
    kept: Number(row?.kept ?? 0),
    memos: row?.memos ?? 0,
    daysOut: row?.days == null ? null : Number(row.days),
    differences: row?.differences ?? 0,
  };
}

/** Writes down a new party; its number comes from the gap-free series. */
export async function addParty(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, AddPartyRequest);
  refuseLimits(request, ctx);
  if (request.name.trim() === '')
    throw new ValidationFailed([{ field: 'name', message: 'The name is missing.' }]);
  return ctx.db.transaction(async (tx) => {
    const [house] = await tx.query<
      { base_currency: string; memo_days: number; first_limit: string }[]
    >('SELECT base_currency, memo_days, first_limit FROM house');
    // The number last, so that its counter is locked as shortly as can be.
    const values = {
      currency: house?.base_currency,
      memoDays: house?.memo_days,
      ...(Number(house?.first_limit) > 0 && { creditLimit: Number(house?.first_limit) }),
      ...request,
    };
    const names = Object.keys(COLUMNS).filter(
      (name) => values[name as keyof typeof values] !== undefined,
    ) as (keyof typeof COLUMNS)[];
    const [row] = await tx.query<{ id: string; number: string }[]>(
      `INSERT INTO party (number, ${names.map((name) => COLUMNS[name]).join(', ')}) VALUES (take_customer_number(), ${names.map((_, i) => `$${i + 1}`).join(', ')}) RETURNING id, number`,
      names.map((name) => values[name]),
    );
    await audit(tx, ctx, { action: 'party added', number: row?.number ?? '', detail: request });
    return { status: 201, body: { number: row?.number } };
  });
}

/** Changes what is written about a party; limits by an owner only. */
export async function changeParty(req: Request, ctx: Context): Promise<Answer> {
  const version = requireVersion(req);
  const request = await readBody(req, ChangePartyRequest);
  refuseLimits(request, ctx);
  const party = await partyByNumber(ctx.db, String(req.params.number));
  await ctx.db.transaction(async (tx) => {
    const names = Object.keys(COLUMNS).filter(
      (name) => request[name as keyof ChangePartyRequest] !== undefined,
    ) as (keyof typeof COLUMNS)[];
    const [, count] = await tx.query<[unknown, number]>(
      `UPDATE party SET ${[...names.map((name, i) => `${COLUMNS[name]} = $${i + 3}`), 'version = version + 1'].join(', ')} WHERE id = $1 AND version = $2`,
      [party.id, version, ...names.map((name) => request[name])],
    );
    if (count === 0) throw changedMeanwhile(await tx.findOneBy(Party, { id: party.id }));
    await audit(tx, ctx, { action: 'party changed', number: party.number, detail: request });
  });
  return { body: { version: version + 1 } };
}

const COLUMNS = {
  name: 'name',
  isCustomer: 'is_customer',
  isSupplier: 'is_supplier',
  isConsignor: 'is_consignor',
  isBroker: 'is_broker',
  isLaboratory: 'is_laboratory',
  isWorkshop: 'is_workshop',
  town: 'town',
  country: 'country',
  address: 'address',
  email: 'email',
  phone: 'phone',
  contact: 'contact',
  taxNumber: 'tax_number',
  currency: 'currency',
  memoDays: 'memo_days',
  paymentDays: 'payment_days',
  terms: 'terms',
  creditLimit: 'credit_limit',
  memoLimit: 'memo_limit',
  identityPapersUntil: 'identity_papers_until',
  resaleCertificateUntil: 'resale_certificate_until',
  sanctionsCheckedOn: 'sanctions_checked_on',
  isMuted: 'is_muted',
  note: 'note',
} as const satisfies Record<keyof ChangePartyRequest, string>;

function refuseLimits(
  request: { creditLimit?: number | null; memoLimit?: number | null },
  { person }: Context,
): void {
  if (
    (request.creditLimit !== undefined || request.memoLimit !== undefined) &&
    !person.roles.includes('owner')
  ) {
    throw new Refusal(403, 'not_yours', 'Limits, owner only. Ask an owner.');
  }
}

interface Trail {
  action: string;
  number: string;
  detail: object;
}

const audit = (tx: EntityManager, { person }: Context, { action, number, detail }: Trail) =>
  tx.query('INSERT INTO audit (person_id, action, subject, detail) VALUES ($1, $2, $3, $4)', [
    person.id,
    action,
    `party C ${number}`,
    { ...detail },
  ]);
