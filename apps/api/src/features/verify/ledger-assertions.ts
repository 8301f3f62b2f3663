import type { Assertion } from './assertion.js';

/** What movements, balances and lots must agree on. */
export const OF_LEDGER: Assertion[] = [
  {
    says: 'every movement sums to zero for each lot in weight, pieces and cost',
    offenders: `SELECT 'movement ' || g.movement_id || ', lot ' || l.number FROM posting g JOIN lot l ON l.id = g.lot_id
      GROUP BY g.movement_id, l.number HAVING sum(g.weight) <> 0 OR sum(g.pieces) <> 0 OR sum(g.cost) <> 0`,
  },
  {
    says: 'every movement has two legs or more',
    offenders: `SELECT 'movement ' || m.id FROM movement m LEFT JOIN posting g ON g.movement_id = m.id GROUP BY m.id HAVING count(g.id) < 2`,
  },
  {
    says: 'the conversion place sums to zero over all lots of a movement',
    offenders: `SELECT 'movement ' || movement_id FROM posting WHERE place_kind = 'conversion' GROUP BY movement_id
      HAVING sum(weight) <> 0 OR sum(pieces) <> 0 OR sum(cost) <> 0`,
  },
  {
    says: 'each balance is the sum of its postings',
    offenders: `SELECT 'lot ' || coalesce(s.lot_id, b.lot_id) || ' at place ' || coalesce(s.place_id, b.place_id)
      FROM (SELECT lot_id, place_id, sum(weight) AS w, sum(pieces) AS p, sum(cost) AS c FROM posting GROUP BY 1, 2) s
      FULL JOIN balance b ON b.lot_id = s.lot_id AND b.place_id = s.place_id
      WHERE (coalesce(s.w, 0), coalesce(s.p, 0), coalesce(s.c, 0)) IS DISTINCT FROM (coalesce(b.weight, 0)::numeric, coalesce(b.pieces, 0)::numeric, coalesce(b.cost, 0)::numeric)`,
  },
  {
    says: 'no inside place ever held less than nothing, and no more came back than was sold',
    offenders: `SELECT 'lot ' || lot_id || ' at place ' || place_id || ' after movement ' || movement_id FROM (
      SELECT g.lot_id, g.place_id, g.movement_id, sum(g.weight) OVER w AS weight, sum(g.pieces) OVER w AS pieces, sum(g.cost) OVER w AS cost
      FROM posting g JOIN place p ON p.id = g.place_id WHERE p.inside OR p.kind = 'sold'
      WINDOW w AS (PARTITION BY g.lot_id, g.place_id ORDER BY g.movement_id RANGE UNBOUNDED PRECEDING)) x
      WHERE weight < 0 OR pieces < 0 OR cost < 0`,
  },
  {
    says: 'no pieces or cost lie where no carats are, and no carats without a piece',
    offenders: `SELECT 'lot ' || b.lot_id || ' at place ' || b.place_id FROM balance b JOIN place p ON p.id = b.place_id JOIN lot l ON l.id = b.lot_id
      WHERE p.inside AND ((b.weight = 0 AND (b.cost <> 0 OR (b.pieces <> 0 AND p.kind <> 'missing')))
        OR (b.weight > 0 AND b.pieces = 0 AND NOT l.is_estimated AND p.kind NOT IN ('missing', 'quarantine'))
        OR (NOT l.is_estimated AND p.kind <> 'missing' AND b.pieces > b.weight))`,
  },
  {
    says: 'a stone, pair or set lies whole in one place',
    offenders: `SELECT 'lot ' || l.number FROM lot l JOIN balance b ON b.lot_id = l.id JOIN place p ON p.id = b.place_id
      WHERE l.fixed_pieces IS NOT NULL AND p.inside AND b.pieces <> 0 GROUP BY l.number, l.fixed_pieces
      HAVING count(*) > 1 OR max(b.pieces) <> l.fixed_pieces`,
  },
  {
    says: 'the bar of each lot is what its places hold',
    offenders: `SELECT 'lot ' || l.number FROM lot l LEFT JOIN (
        SELECT b.lot_id, sum(b.weight) FILTER (WHERE p.part = 'safe') AS safe, sum(b.weight) FILTER (WHERE p.part = 'out') AS out,
          sum(b.weight) FILTER (WHERE p.part = 'returned') AS returned, sum(b.weight) FILTER (WHERE p.part = 'sold') AS sold,
          sum(b.weight) FILTER (WHERE p.part = 'missing') AS missing, sum(b.pieces) FILTER (WHERE p.part IS NOT NULL) AS pieces
        FROM balance b JOIN place p ON p.id = b.place_id GROUP BY b.lot_id) s ON s.lot_id = l.id
      WHERE (l.part_safe, l.part_out, l.part_returned, l.part_sold, l.part_missing, l.part_pieces) IS DISTINCT FROM
        (coalesce(s.safe, 0)::bigint, coalesce(s.out, 0)::bigint, coalesce(s.returned, 0)::bigint, coalesce(s.sold, 0)::bigint, coalesce(s.missing, 0)::bigint, coalesce(s.pieces, 0)::bigint)`,
  },
  {
    says: 'reserved is within the balance',
    offenders: `SELECT 'lot ' || lot_id FROM balance WHERE reserved_weight < 0 OR reserved_weight > greatest(weight, 0) OR reserved_pieces < 0 OR reserved_pieces > greatest(pieces, 0)`,
  },
  {
    says: 'goods of different owner, origin or treatment never met in a conversion',
    offenders: `SELECT 'movement ' || m.id FROM movement m JOIN posting g ON g.movement_id = m.id AND g.place_kind = 'conversion' JOIN lot l ON l.id = g.lot_id
      GROUP BY m.id, m.kind, m.word HAVING count(DISTINCT l.treatment) > 1
        OR (count(DISTINCT coalesce(l.owner_party_id, 0)) > 1 AND m.kind = 'conversion')
        OR (count(DISTINCT l.origin) > 1 AND (m.word IS DISTINCT FROM 'test result' OR bool_or(g.weight > 0 AND l.origin <> 'not tested')) AND m.kind <> 'reversal')`,
  },
  {
    says: 'goods of a consignor carry no cost',
    offenders: `SELECT 'lot ' || l.number FROM lot l JOIN posting g ON g.lot_id = l.id WHERE l.owner_party_id IS NOT NULL AND g.cost <> 0 GROUP BY l.number`,
  },
  {
    says: 'nothing is dated ahead of today or before what came first at the same place',
    offenders: `SELECT 'movement ' || id FROM (
        SELECT m.id, m.business_date, max(m.business_date) OVER (PARTITION BY g.lot_id, g.place_id ORDER BY m.id ROWS BETWEEN UNBOUNDED PRECEDING AND 1 PRECEDING) AS before
        FROM posting g JOIN movement m ON m.id = g.movement_id JOIN place p ON p.id = g.place_id WHERE p.inside) x
      WHERE business_date < before OR business_date > house_today()`,
  },
  {
    says: 'a movement is undone at most once, and no undoing is undone',
    offenders: `SELECT 'movement ' || m.reverses FROM movement m JOIN movement u ON u.id = m.reverses
      GROUP BY m.reverses HAVING count(*) > 1 OR bool_or(u.kind IN ('reversal', 'sale', 'credit return', 'correction'))`,
  },
  {
    says: 'an undoing is the mirror of what it undoes',
    offenders: `SELECT 'movement ' || m.id FROM movement m JOIN posting g ON g.movement_id IN (m.id, m.reverses) WHERE m.kind = 'reversal'
      GROUP BY m.id, g.lot_id, g.place_id HAVING sum(g.weight) <> 0 OR sum(g.pieces) <> 0 OR sum(g.cost) <> 0`,
  },
  {
    says: 'what was undone was the newest where it had added to',
    offenders: `SELECT DISTINCT 'movement ' || m.id FROM movement m JOIN movement u ON u.id = m.reverses
      JOIN posting mine ON mine.movement_id = u.id JOIN place p ON p.id = mine.place_id
      JOIN posting later ON later.lot_id = mine.lot_id AND later.movement_id > u.id AND later.movement_id < m.id
      WHERE CASE WHEN u.kind IN ('write-off', 'return to supplier', 'return to consignor') THEN true
        ELSE later.place_id = mine.place_id AND p.inside AND (mine.weight > 0 OR mine.pieces > 0 OR mine.cost > 0) END`,
  },
];
