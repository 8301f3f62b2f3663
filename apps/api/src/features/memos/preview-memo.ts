import { BookMemoRequest, type MemoPreview } from '@foldwell/contracts';
import { lineAmount, shortDate } from '@foldwell/quantities';
import type { Request } from 'express';
import type { DataSource } from 'typeorm';

import { readBody } from '../../http/body.js';
import type { Answer, Context } from '../../http/route.js';
import { exposureOf, keepsOf, partyByNumber } from '../parties/parties.js';
import { consignorDues } from './consignor-due.js';
import { memoRows } from './memo-rows.js';

/** Exposure while writing: what is out, what this memo adds, how far over, and what would make it fit. */
export async function previewMemo(req: Request, { db }: Context): Promise<Answer> {
  const request = await readBody(req, BookMemoRequest);
  const party = await partyByNumber(db, request.party);
  const exposure = await exposureOf(db, party);
  const stated = await db.query<{ number: string; stated: string | null; kind: string }[]>(
    `SELECT number, kind, CASE WHEN kind = 'stone' THEN stated_weight END AS stated FROM lot WHERE number = ANY ($1)`,
    [request.lines.map((line) => line.lot)],
  );
  const priced = (line: { lot: string; weight: number }) =>
    Number(stated.find((lot) => lot.number === line.lot)?.stated ?? line.weight);
  const amounts = request.lines.map(
    (line) => line.sum ?? lineAmount(line.price ?? 0, priced(line)),
  );
  const thisMemo = amounts.reduce((sum, amount) => sum + amount, 0);
  const after = exposure.total + thisMemo;
  const overBy = exposure.limit === null ? 0 : Math.max(0, after - exposure.limit);
  const last = request.lines.at(-1);
  const isParcel = stated.find((lot) => lot.number === last?.lot)?.kind === 'parcel';
  const [house] = await db.query<{ step: number; today: string }[]>(
    'SELECT step, house_today()::text AS today FROM house',
  );
  const owners = await db.query<{ name: string }[]>(
    `SELECT name FROM person WHERE 'owner' = ANY (roles) AND disabled_at IS NULL ORDER BY id`,
  );
  const open = await memoRows(db, 'm.party_id = $1 AND NOT m.is_settled', [party.id]);
  const lapsed = [
    ['Identity papers', party.identityPapersUntil],
    ['Resale certificate', party.resaleCertificateUntil],
  ].find(([, until]) => until && until < (house?.today ?? ''));
  const body: MemoPreview = {
    exposure,
    thisMemo,
    after,
    overBy,
    overMemoBy: exposure.memoLimit === null ? 0 : Math.max(0, thisMemo - exposure.memoLimit),
    openMemos: open.map((memo) => ({
      number: memo.number,
      weight: memo.flows.out,
      value: memo.value,
    })),
    lapsed: lapsed
      ? `${lapsed[0]} lapsed ${lapsed[1]}. Nothing leaves after that without an owner’s reason.`
      : null,
    cutLastTo:
      last && isParcel && overBy > 0
        ? cut(last, amounts.at(-1) ?? 0, overBy, house?.step ?? 10)
        : null,
    cautions: await dueBefore(db, request, house?.today),
    owners: owners.map((owner) => owner.name),
    keeps: await keepsOf(db, party.id),
  };
  return { body };
}

/** Due dates chain: a memo that ends after what its goods came in on says so. */
async function dueBefore(
  db: DataSource,
  { due, lines }: BookMemoRequest,
  today: string | undefined,
): Promise<string[]> {
  const dues = await consignorDues(
    db,
    lines.map(({ lot }) => lot.toUpperCase()),
  );
  return dues
    .filter((one) => one.due < due)
    .map(
      (one) =>
        `${one.lot} is due back to ${one.owner} on ${shortDate(one.due, today)}, before this memo ends.`,
    );
}

/** The most of the last line, in the house's step, that stays inside the limit; null where none does. */
function cut(
  line: { weight: number; price?: number | undefined },
  amount: number,
  overBy: number,
  step: number,
): number | null {
  if (!line.price || amount <= overBy) return null;
  const most = Number((BigInt(amount - overBy) * 1000n) / BigInt(line.price));
  const stepped = Math.floor(most / step) * step;
  return stepped > 0 ? stepped : null;
}
