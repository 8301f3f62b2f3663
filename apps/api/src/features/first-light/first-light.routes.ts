import type { FirstLight } from '@foldwell/contracts';
import { formatCarats, formatPoints, grouped } from '@foldwell/quantities';
import type { Request } from 'express';

import { type Answer, type Context, type Route, STAFF } from '../../http/route.js';
import { houseToday } from '../lots/list-lots.js';
import { memoRows } from '../memos/memo-rows.js';
import { differenceRows } from '../returns/difference-rows.js';

/** `1,104 lots`, `1 lot`. */
const count = (n: number, word: string) => `${grouped(String(n))} ${word}${n === 1 ? '' : 's'}`;

/** The arrival page: the house's bar adds up to the whole, and what needs a hand today. */
async function firstLight(_req: Request, { db }: Context): Promise<Answer> {
  const [sums] = await db.query<Record<string, string>[]>(
    `SELECT coalesce(sum(part_safe), 0) AS safe, coalesce(sum(part_out), 0) AS out, coalesce(sum(part_returned), 0) AS returned,
       coalesce(sum(part_sold), 0) AS sold, coalesce(sum(part_missing), 0) AS missing, coalesce(sum(whole), 0) AS whole,
       count(*) FILTER (WHERE part_safe > 0) AS safe_lots, count(*) FILTER (WHERE part_returned > 0) AS desk_lots, count(*) FILTER (WHERE part_sold > 0) AS sold_lots,
       (SELECT count(DISTINCT safe) FROM place WHERE kind = 'drawer') AS safes,
       (SELECT count(*) FROM balance b JOIN place p ON p.id = b.place_id WHERE p.kind = 'quarantine' AND b.weight > 0) AS quarantine,
       (SELECT coalesce(-sum(b.weight), 0) FROM balance b WHERE b.place_kind = 'loss') AS restated FROM lot`,
  );
  const n = (name: string) => Number(sums?.[name] ?? 0);
  const memos = await memoRows(db, 'NOT m.is_settled', [], 'ORDER BY m.due, m.number LIMIT 500');
  const differences = await differenceRows(db, 'd.answer IS NULL', []);
  const late = await db.query<FirstLight['late']>(
    `SELECT y.name AS party, y.number AS "partyNumber", house_today() - m.due AS days, m.number::text AS memo,
       coalesce((SELECT to_char(x.at, 'FMDD Mon') || ', ' || left(x.words, 60) FROM memo_word x WHERE x.memo_id = m.id ORDER BY x.id DESC LIMIT 1), 'no word since ' || to_char(m.business_date, 'FMDD Mon')) AS "lastWord",
       (SELECT sum(memo_line_amount(k.price, k.agreed_sum, k.priced_weight, k.sent_weight, k.out_weight)) FROM memo_line k WHERE k.memo_id = m.id)::float8 AS value, m.currency
     FROM memo m JOIN party y ON y.id = m.party_id WHERE NOT m.is_settled AND m.due < house_today() ORDER BY m.due LIMIT 40`,
  );
  const customers = new Set(memos.map((memo) => memo.party)).size;
  const body: FirstLight = {
    today: await houseToday(db),
    whole: n('whole'),
    memos,
    differences,
    late,
    bar: {
      safe: n('safe'),
      out: n('out'),
      returned: n('returned'),
      sold: n('sold'),
      missing: n('missing'),
    },
    under: {
      safe: `${count(n('safe_lots'), 'lot')} in ${count(n('safes'), 'safe')}${n('quarantine') > 0 ? `, ${n('quarantine')} in quarantine` : ''}`,
      out: `${count(memos.length, 'memo')}, ${count(customers, 'customer')}`,
      returned: `${count(n('desk_lots'), 'lot')} on the return desk`,
      sold: `${count(n('sold_lots'), 'lot')} kept or sold`,
      missing: differences.length === 0 ? 'nothing to answer' : `${differences.length} to answer`,
      whole: `taken in ${formatCarats(n('whole') - n('restated'))}, ${n('restated') < 0 ? 'restated or lost' : 'restated'} ${n('restated') === 0 ? '0 pt' : formatPoints(n('restated'))}`,
    },
  };
  return { body };
}

export const firstLightRoutes: Route[] = [
  { method: 'get', path: '/first-light', allowed: STAFF, handle: firstLight },
];
