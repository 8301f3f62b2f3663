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
       b.weight, b.pieces, b.reserved_weight AS reserved
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

/** Who has a lot that isn't free, in words with a way there. */
export function whoHasIt(
  lot: string,
  holdings: Holding[],
  today: string,
): { sentence: string; path: string | null; pathWords: string | null } {
  const [first] = holdings;
  const free = holdings.reduce((sum, holding) => sum + holding.free, 0);
  const rest = free > 0 ? ` ${formatCarats(free)} ct of it is still free.` : '';
  if (!first)
    return {
      sentence: `${lot} not added. It is not in the house any more.`,
      path: `/lots/${lot}`,
      pathWords: `Open ${lot}`,
    };
  const memo = holdings.find((holding) => holding.kind === 'memo');
  if (memo) {
    const late = memo.due ? daysBetween(memo.due, today) : 0;
    const when = late > 0 ? `late ${late} d` : memo.due ? `due ${shortDate(memo.due, today)}` : '';
    return {
      sentence: `${lot} not added. It is out on M ${memo.memo} to ${memo.party}, ${when}.${rest}`,
      path: `/memos/${memo.memo}`,
      pathWords: `Open M ${memo.memo}`,
    };
  }
  return {
    sentence: `${lot} not added. It is not free: ${holdings.map(placeWords).join(', ')}.${rest}`,
    path: `/lots/${lot}`,
    pathWords: `Open ${lot}`,
  };
}
