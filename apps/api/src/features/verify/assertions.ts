/** One thing that must hold on live data: the query names the offenders, none is right. */
export interface Assertion {
  says: string;
  offenders: string;
  /** Listed, but never a failure. */
  isWarning?: boolean;
}

/** In the order of the invariants of the ledger. Each query gives one text for each offender. */
export const ASSERTIONS: Assertion[] = [
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
    says: 'no inside place ever held less than nothing',
    offenders: `SELECT 'lot ' || lot_id || ' at place ' || place_id || ' after movement ' || movement_id FROM (
      SELECT g.lot_id, g.place_id, g.movement_id, sum(g.weight) OVER w AS weight, sum(g.pieces) OVER w AS pieces, sum(g.cost) OVER w AS cost
      FROM posting g JOIN place p ON p.id = g.place_id WHERE p.inside
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
    says: 'the flows of each memo line are the sums of its postings',
    offenders: `SELECT 'line ' || n.id FROM memo_line n LEFT JOIN (
        SELECT memo_line_id,
          sum(weight) FILTER (WHERE flow = 'sent') AS sent,
          sum(CASE WHEN place_kind = 'memo' THEN -weight ELSE weight END) FILTER (WHERE flow = 'returned') AS returned,
          sum(CASE WHEN place_kind = 'memo' THEN -weight ELSE weight END) FILTER (WHERE flow = 'kept') AS kept,
          sum(CASE WHEN place_kind = 'memo' THEN -weight ELSE weight END) FILTER (WHERE flow = 'missing') AS missing,
          sum(CASE WHEN place_kind = 'memo' THEN -weight ELSE weight END) FILTER (WHERE flow = 'restated') AS restated
        FROM posting WHERE memo_line_id IS NOT NULL GROUP BY memo_line_id) s ON s.memo_line_id = n.id
      WHERE (n.sent_weight, n.returned_weight, n.kept_weight, n.missing_weight, n.restated_weight) IS DISTINCT FROM
        (coalesce(s.sent, 0)::bigint, coalesce(s.returned, 0)::bigint, coalesce(s.kept, 0)::bigint, coalesce(s.missing, 0)::bigint, coalesce(s.restated, 0)::bigint)`,
  },
  {
    says: 'each memo’s place holds what its lines still have out',
    offenders: `SELECT 'M ' || m.number || ', lot ' || coalesce(n.lot_id, b.lot_id) FROM memo m JOIN place p ON p.memo_id = m.id AND p.kind = 'memo'
      LEFT JOIN balance b ON b.place_id = p.id FULL JOIN memo_line n ON n.memo_id = m.id AND n.lot_id = b.lot_id
      WHERE m.id IS NOT NULL AND (coalesce(b.weight, 0), coalesce(b.pieces, 0)) IS DISTINCT FROM (coalesce(n.out_weight, 0), coalesce(n.out_pieces, 0))`,
  },
  {
    says: 'what is missing is what the open differences hold',
    offenders: `SELECT 'lot ' || coalesce(b.lot_id, d.lot_id) FROM (SELECT lot_id, sum(weight) AS w, sum(pieces) AS p FROM balance WHERE place_kind = 'missing' GROUP BY lot_id) b
      FULL JOIN (SELECT lot_id, sum(held_weight) AS w, sum(held_pieces) AS p FROM difference GROUP BY lot_id) d ON d.lot_id = b.lot_id
      WHERE (coalesce(b.w, 0), coalesce(b.p, 0)) IS DISTINCT FROM (coalesce(d.w, 0), coalesce(d.p, 0))`,
  },
  {
    says: 'each difference holds what its postings put in missing',
    offenders: `SELECT 'difference ' || d.id FROM difference d LEFT JOIN (SELECT difference_id, sum(weight) AS w, sum(pieces) AS p FROM posting WHERE difference_id IS NOT NULL GROUP BY 1) s ON s.difference_id = d.id
      WHERE (d.held_weight, d.held_pieces) IS DISTINCT FROM (coalesce(s.w, 0)::bigint, coalesce(s.p, 0)::bigint)`,
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
    says: 'numbers of lots, memos, weighings and customers have no gaps',
    offenders: `SELECT series || ' series' FROM (
        SELECT s.series, s.first, s.next, x.n, x.least, x.most FROM number_series s JOIN LATERAL (
          SELECT count(*) AS n, min(k) AS least, max(k) AS most FROM (
            SELECT number AS k FROM memo WHERE s.series = 'memo' UNION ALL SELECT number FROM weighing WHERE s.series = 'weighing'
            UNION ALL SELECT number FROM party WHERE s.series = 'customer'
            UNION ALL SELECT number::bigint FROM lot WHERE s.series = 'lot' AND number ~ '^[0-9]+$') q) x ON true) y
      WHERE n <> next - first OR (n > 0 AND (least <> first OR most <> next - 1))`,
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
    says: 'nothing is dated ahead of today or before what came first at the same place',
    offenders: `SELECT 'movement ' || id FROM (
        SELECT m.id, m.business_date, max(m.business_date) OVER (PARTITION BY g.lot_id, g.place_id ORDER BY m.id ROWS BETWEEN UNBOUNDED PRECEDING AND 1 PRECEDING) AS before
        FROM posting g JOIN movement m ON m.id = g.movement_id JOIN place p ON p.id = g.place_id WHERE p.inside) x
      WHERE business_date < before OR business_date > house_today()`,
  },
  {
    says: 'each issued paper is as it was issued',
    offenders: `SELECT number FROM document WHERE hash <> sha256(convert_to(snapshot, 'UTF8')) OR snapshot::jsonb ->> 'number' IS DISTINCT FROM number`,
  },
  {
    says: 'each memo has its paper',
    offenders: `SELECT 'M ' || m.number FROM memo m WHERE NOT EXISTS (SELECT 1 FROM document d WHERE d.memo_id = m.id AND d.kind = 'memo')`,
  },
  {
    says: 'the chain of seals is unbroken',
    offenders: `SELECT 'seal ' || s.id FROM seal s WHERE s.hash IS DISTINCT FROM seal_hash(s.id)
        OR (s.previous_id IS NULL AND s.id <> (SELECT min(id) FROM seal)) OR s.previous_id >= s.id
      UNION ALL SELECT 'seal ' || max(id) FROM seal HAVING count(*) > 0 AND count(*) <> count(previous_id) + 1`,
  },
  {
    says: 'all is sealed within the hour',
    offenders: `SELECT 'movement ' || m.id FROM movement m WHERE m.at < clock_timestamp() - interval '1 hour' AND NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.movement_id = m.id)
      UNION ALL SELECT d.number FROM document d WHERE d.at < clock_timestamp() - interval '1 hour' AND NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.document_id = d.id)`,
  },
  {
    says: 'a movement waits to be sealed or is sealed',
    offenders: `SELECT 'movement ' || m.id FROM movement m WHERE NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.movement_id = m.id) AND NOT EXISTS (SELECT 1 FROM to_seal q WHERE q.movement_id = m.id)`,
  },
  {
    says: 'all is sealed within a minute',
    isWarning: true,
    offenders: `SELECT 'movement ' || m.id FROM movement m JOIN to_seal q ON q.movement_id = m.id WHERE m.at < clock_timestamp() - interval '1 minute'`,
  },
  {
    says: 'no difference was answered by who weighed it',
    isWarning: true,
    offenders: `SELECT 'difference ' || id || ' by person ' || answered_by FROM difference WHERE is_sole_answer`,
  },
  {
    says: 'the database keeps what it acknowledges',
    offenders: `SELECT name || ' is ' || setting FROM pg_settings WHERE name IN ('synchronous_commit', 'fsync', 'full_page_writes') AND setting <> 'on'`,
  },
  {
    says: 'every guard stands as it was written',
    offenders: `SELECT * FROM unnest($1::text[]) AS wanted(guard) EXCEPT SELECT guard FROM guards_now UNION ALL
      SELECT 'not validated: ' || conname FROM pg_constraint WHERE NOT convalidated AND connamespace = 'public'::regnamespace UNION ALL
      SELECT 'switched off: ' || tgname FROM pg_trigger t JOIN pg_class c ON c.oid = t.tgrelid WHERE c.relnamespace = 'public'::regnamespace AND tgenabled = 'D'`,
  },
];

/** Every constraint, trigger and function of the ledger, each with a hash of its definition. */
export const GUARDS_NOW = `
  SELECT 'constraint ' || conrelid::regclass || '.' || conname || ' ' || left(md5(pg_get_constraintdef(oid)), 12) AS guard
    FROM pg_constraint WHERE connamespace = 'public'::regnamespace AND contype <> 't'
  UNION ALL SELECT 'index ' || indexname || ' ' || left(md5(indexdef), 12) FROM pg_indexes WHERE schemaname = 'public' AND indexdef LIKE 'CREATE UNIQUE%'
  UNION ALL SELECT 'trigger ' || tgrelid::regclass || '.' || tgname || ' ' || left(md5(pg_get_triggerdef(oid)), 12)
    FROM pg_trigger WHERE NOT tgisinternal AND tgrelid IN (SELECT oid FROM pg_class WHERE relnamespace = 'public'::regnamespace)
  UNION ALL SELECT 'function ' || proname || ' ' || left(md5(prosrc), 12) FROM pg_proc WHERE pronamespace = 'public'::regnamespace AND proname NOT LIKE 'gbt%'
`;

export const usesGuards = (assertion: Assertion) => assertion.offenders.includes('guards_now');
