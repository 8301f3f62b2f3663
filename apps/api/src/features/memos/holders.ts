import { daysBetween, formatCarats, shortDate } from '@foldwell/quantities';
import type { DataSource } from 'typeorm';

import { placeWords } from '../places/place-words.js';

/** One place that holds some of a lot and how much of it is free to be booked. */
export interface Holding {
  placeId: string;
  kind: string;
  name: string;
  safe: string;
  memo: string | null;
  party: string | null;
  due: string | null;
  /** Since when a memo has it. */
  since: string | null;
  weight: number;
  pieces: number;
  free: number;
}

/** Places whose goods can be booked: drawers, show, desk, with a person. */
const FREE = ['drawer', 'show', 'return desk', 'person'];

/** Where a lot is, most first. */
export async function holdingsOf(db: DataSource, lotId: string): Promise<Holding[]> {
  const rows = await db.query<
    (Omit<Holding, 'weight' | 'pieces' | 'free'> & {
      weight: string;
      pieces: string;
      reserved: string;
    })[]
  >(
    `SELECT b.place_id AS "placeId", p.kind, p.name, p.safe, m.number AS memo, y.name AS party, coalesce(n.due, m.due)::text AS due,
       m.business_date::text AS since, b.weight, b.pieces, b.reserved_weight AS reserved
     FROM balance b JOIN place p ON p.id = b.place_id LEFT JOIN memo m ON m.id = p.memo_id
     LEFT JOIN memo_line n ON n.memo_id = m.id AND n.lot_id = b.lot_id LEFT JOIN party y ON y.id = coalesce(m.party_id, p.party_id)
     WHERE b.lot_id = $1 AND p.part IS NOT NULL AND (b.weight > 0 OR b.pieces > 0)
     ORDER BY p.kind <> 'drawer', b.weight DESC`,
    [lotId],
  );
  return rows.map(({ reserved, ...row }) => ({
    ...row,
    weight: Number(row.weight),
    pieces: Number(row.pieces),
    free: FREE.includes(row.kind) ? Number(row.weight) - Number(reserved) : 0,
  }));
}

/** What is said of a lot that can't be booked, and a way there. */
export interface WhoHasIt {
  sentence: string;
  path: string | null;
  pathWords: string | null;
}

/** Who has a lot that isn't free, since when, what of it is still free, and a way there. */
export function whoHasIt(lot: string, holdings: Holding[], today: string): WhoHasIt {
  const toLot = { path: `/lots/${lot}`, pathWords: `Open ${lot}` };
  if (holdings.length === 0)
    return { sentence: `${lot} not added. It is not in the house any more.`, ...toLot };
  const free = holdings.reduce((sum, holding) => sum + holding.free, 0);
  const rest = free > 0 ? ` ${formatCarats(free)} ct of it is still free.` : '';
  const memos = holdings.filter((holding) => holding.kind === 'memo');
  const [memo] = memos;
  if (memo) {
    const named = memos.slice(0, 3).map((one) => outOn(one, today));
    const more = memos.length > 3 ? `, and on ${memos.length - 3} more` : '';
    return {
      sentence: `${lot} not added. It is out on ${named.join('; on ')}${more}.${rest}`,
      path: `/memos/${memo.memo}`,
      pathWords: `Open M ${memo.memo}`,
    };
  }
  const places = holdings.map(placeWords).join(', ');
  const sentence = free > 0 ? `It lies in ${places}.${rest}` : `It is not free: ${places}.`;
  return { sentence: `${lot} not added. ${sentence}`, ...toLot };
}

/** `M 20562 to Tessaly & Rook since 5 Nov, late 12 d`. */
function outOn({ memo, party, since, due }: Holding, today: string): string {
  const late = due ? daysBetween(due, today) : 0;
  const when = late > 0 ? `, late ${late} d` : due ? `, due ${shortDate(due, today)}` : '';
  return `M ${memo} to ${party}${since ? ` since ${shortDate(since, today)}` : ''}${when}`;
}
