import type { DifferenceRow } from '@foldwell/contracts';
import type { DataSource } from 'typeorm';

/** Differences that fit a condition on `d` (and `n`, its memo line), the open ones with who else may answer. */
export async function differenceRows(
  db: DataSource,
  condition: string,
  values: unknown[],
): Promise<DifferenceRow[]> {
  return db.query<DifferenceRow[]>(
    `SELECT d.id, l.number AS lot, concat_ws(' ', initcap(l.kind), lower(l.shape)) AS what, m.number::text AS memo, y.name AS party, d.kind,
       d.expected_weight::float8 AS expected, d.found_weight::float8 AS found, d.expected_pieces::int AS "expectedPieces", d.found_pieces::int AS "foundPieces",
       d.held_weight::float8 AS held, d.held_pieces::int AS "heldPieces",
       CASE WHEN l.kind = 'parcel' THEN coalesce(m.parcel_tolerance, h.parcel_tolerance) ELSE coalesce(m.stone_tolerance, h.stone_tolerance) END AS tolerance,
       w.name AS "openedBy", d.opened_by AS "openedById", d.opened_on::text AS "openedOn", d.asked_at AS "askedAt", d.answer,
       (SELECT coalesce(json_agg(p.name ORDER BY 'owner' = ANY (p.roles) DESC, p.id), '[]') FROM person p
          WHERE p.id <> d.opened_by AND p.disabled_at IS NULL AND p.roles && ARRAY['owner', 'bookkeeper']) AS answerers,
       coalesce(memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight, d.held_weight), 0)::float8 AS value,
       coalesce(m.currency, h.price_currency) AS currency, (SELECT number FROM lot WHERE id = d.came_lot_id) AS "cameLot"
     FROM difference d JOIN lot l ON l.id = d.lot_id JOIN person w ON w.id = d.opened_by CROSS JOIN house h
     LEFT JOIN memo_line n ON n.id = d.memo_line_id LEFT JOIN memo m ON m.id = n.memo_id LEFT JOIN party y ON y.id = m.party_id
     WHERE ${condition} ORDER BY d.answer IS NOT NULL, d.id`,
    values,
  );
}
