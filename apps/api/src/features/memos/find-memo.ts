import type { MemoLine } from '@foldwell/contracts';
import type { Line } from '@foldwell/ledger';

import { RuleBroken } from '../../http/errors.js';
import type { Context } from '../../http/route.js';
import { lotIds } from '../lots/move-lots.js';
import { linesOf, memoByNumber } from './read-memo.js';

/** A memo and its lines as the ledger names them. */
export interface Found {
  id: number;
  number: string;
  lines: (MemoLine & { line: Line })[];
}

/** A memo with its lines as the ledger names them. */
export async function findMemo(ctx: Context, number: string): Promise<Found> {
  const memo = await memoByNumber(ctx.db, number);
  const lines = await linesOf(ctx.db, memo.id);
  const ids = await lotIds(
    ctx,
    lines.map((line) => line.lot),
  );
  return {
    id: Number(memo.id),
    number: memo.number,
    lines: lines.map((line) => ({
      ...line,
      line: {
        lot: { id: ids.get(line.lot) ?? 0 },
        memoId: Number(memo.id),
        lineId: Number(line.lineId),
      },
    })),
  };
}

/** One line of a memo by its lot. */
export function lineOf(memo: Found, lot: string): Found['lines'][number] {
  const line = memo.lines.find((one) => one.lot === lot.toUpperCase());
  if (!line) throw new RuleBroken('line_missing', `${lot} is not on M ${memo.number}.`);
  return line;
}
