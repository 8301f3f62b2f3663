import type { WeighedBack } from '@foldwell/contracts';

import type { Context } from '../../http/route.js';
import type { Written } from '../ledger/act.js';
import { says } from './said-at-desk.js';

/** The answer to an Enter that was posted before, told again from what stands in the ledger. */
export async function weighedBefore({ db }: Context, written: Written): Promise<WeighedBack> {
  const weighing = written.weighings[0] ?? 0;
  const [row] = await db.query<{ kind: WeighedBack['outcome'] | null; off: string | null }[]>(
    `SELECT d.kind, coalesce(g.weight - d.expected_weight,
       (SELECT -sum(l.weight) FROM posting l WHERE l.movement_id = g.movement_id AND l.place_kind = 'loss')) AS off
     FROM weighing g LEFT JOIN difference d ON d.id = g.difference_id WHERE g.number = $1`,
    [weighing],
  );
  const off = Number(row?.off ?? 0);
  const outcome = row?.kind ?? (off === 0 ? 'agrees' : 'restated');
  return { weighing, outcome, says: says(outcome, off) };
}
