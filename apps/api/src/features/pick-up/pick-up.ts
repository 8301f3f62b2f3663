import type { PickUpAnswer, PickUpHit } from '@foldwell/contracts';
import { readMark } from '@foldwell/quantities';
import type { Request } from 'express';

import { queryText } from '../../http/body.js';
import { type Answer, type Context, type Route, STAFF } from '../../http/route.js';

const MOST_HITS = 8;

/** The field in the band: a lot, memo, customer or report by number, scan or name; late and differing first. */
async function pickUp(req: Request, { db }: Context): Promise<Answer> {
  const typed = queryText(req, 'q').slice(0, 80);
  if (typed === '') return { body: { hits: [], opens: null } satisfies PickUpAnswer };
  const mark = readMark(typed);
  const like = `${typed.replace(/[%_\\]/g, '\\$&')}%`;
  const number = mark?.number ?? '';
  const wants = (kind: string) => (mark === null || mark.kind === kind ? '' : ' AND false');
  const hits = await db.query<(PickUpHit & { exact: boolean })[]>(
    `SELECT * FROM (
       (SELECT 'lot' AS kind, l.number, concat_ws(' ', l.shape, nullif(l.report_laboratory || ' ' || l.report_number, ' ')) AS words, '/lots/' || l.number AS path,
         CASE WHEN EXISTS (SELECT 1 FROM difference d WHERE d.lot_id = l.id AND d.answer IS NULL) THEN 'differs' ELSE 'plain' END AS tone,
         l.number = upper($2) OR upper(l.report_number) = upper($3) OR upper(l.report_laboratory || ' ' || l.report_number) = upper($3)
           OR EXISTS (SELECT 1 FROM lot_report r WHERE r.lot_id = l.id AND upper(r.number) = upper($3)) AS exact
        FROM lot l WHERE (l.number LIKE $1 OR upper(l.report_number) LIKE upper($1)
          OR EXISTS (SELECT 1 FROM lot_report r WHERE r.lot_id = l.id AND upper(r.number) = upper($3)))
          ${mark && mark.kind !== 'lot' ? 'AND false' : ''} ORDER BY l.number = upper($2) DESC, l.is_living DESC, l.id LIMIT ${MOST_HITS})
       UNION ALL
       (SELECT 'memo', m.number::text, y.name, '/memos/' || m.number, CASE WHEN NOT m.is_settled AND m.due < house_today() THEN 'late' ELSE 'plain' END,
         m.number::text = $2 FROM memo m JOIN party y ON y.id = m.party_id
        WHERE (m.number::text LIKE $2 || '%' AND $2 <> '' OR y.name ILIKE $1)${wants('memo')} ORDER BY m.is_settled, m.due LIMIT ${MOST_HITS})
       UNION ALL
       (SELECT 'customer', y.number::text, y.name, '/customers/' || y.number, 'plain', y.number::text = $2
        FROM party y WHERE (y.number::text = $2 AND $2 <> '' OR y.name ILIKE '%' || $1)${wants('customer')} LIMIT ${MOST_HITS})) x
     ORDER BY exact AND kind = $4 DESC, exact DESC, tone = 'plain' LIMIT ${MOST_HITS}`,
    [like, number, typed, mark?.kind ?? 'lot'],
  );
  const exact = hits.filter((hit) => hit.exact && (mark === null || hit.kind === mark.kind));
  const answer: PickUpAnswer = {
    hits: hits.map(({ exact: _exact, ...hit }) => hit),
    opens: exact.length === 1 ? (exact[0]?.path ?? null) : null,
  };
  return { body: answer };
}

export const pickUpRoutes: Route[] = [
  { method: 'get', path: '/pick-up', allowed: STAFF, handle: pickUp },
];
