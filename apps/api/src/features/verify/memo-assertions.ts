import type { Assertion } from './assertion.js';

/** What memos, their lines and the differences must agree on. */
export const OF_MEMOS: Assertion[] = [
  {
    says: 'the flows of each memo line are the sums of its postings',
    offenders: `SELECT 'line ' || n.id FROM memo_line n LEFT JOIN (
        SELECT memo_line_id, sum(w) FILTER (WHERE flow = 'sent') AS sent_w, sum(p) FILTER (WHERE flow = 'sent') AS sent_p,
          sum(w) FILTER (WHERE flow = 'returned') AS returned_w, sum(p) FILTER (WHERE flow = 'returned') AS returned_p,
          sum(w) FILTER (WHERE flow = 'kept') AS kept_w, sum(p) FILTER (WHERE flow = 'kept') AS kept_p,
          sum(w) FILTER (WHERE flow = 'converted') AS converted_w, sum(p) FILTER (WHERE flow = 'converted') AS converted_p,
          sum(w) FILTER (WHERE flow = 'missing') AS missing_w, sum(p) FILTER (WHERE flow = 'missing') AS missing_p,
          sum(w) FILTER (WHERE flow = 'written_off') AS written_off_w, sum(p) FILTER (WHERE flow = 'written_off') AS written_off_p,
          sum(w) FILTER (WHERE flow = 'restated') AS restated_w, sum(p) FILTER (WHERE flow = 'restated') AS restated_p
        FROM (SELECT memo_line_id, flow,
            CASE WHEN place_kind = 'memo' AND flow <> 'sent' THEN -weight ELSE weight END AS w,
            CASE WHEN place_kind = 'memo' AND flow <> 'sent' THEN -pieces ELSE pieces END AS p
          FROM posting WHERE memo_line_id IS NOT NULL) f GROUP BY memo_line_id) s ON s.memo_line_id = n.id
      WHERE (n.sent_weight, n.sent_pieces,
        n.returned_weight, n.returned_pieces,
        n.kept_weight, n.kept_pieces,
        n.converted_weight, n.converted_pieces,
        n.missing_weight, n.missing_pieces,
        n.written_off_weight, n.written_off_pieces,
        n.restated_weight, n.restated_pieces) IS DISTINCT FROM (
        coalesce(s.sent_w, 0)::bigint, coalesce(s.sent_p, 0)::bigint,
        coalesce(s.returned_w, 0)::bigint, coalesce(s.returned_p, 0)::bigint,
        coalesce(s.kept_w, 0)::bigint, coalesce(s.kept_p, 0)::bigint,
        coalesce(s.converted_w, 0)::bigint, coalesce(s.converted_p, 0)::bigint,
        coalesce(s.missing_w, 0)::bigint, coalesce(s.missing_p, 0)::bigint,
        coalesce(s.written_off_w, 0)::bigint, coalesce(s.written_off_p, 0)::bigint,
        coalesce(s.restated_w, 0)::bigint, coalesce(s.restated_p, 0)::bigint)`,
  },
  {
    says: 'each memo’s place holds what its lines still have out',
    offenders: `SELECT 'M ' || m.number || ', lot ' || coalesce(n.lot_id, b.lot_id) FROM memo m JOIN place p ON p.memo_id = m.id AND p.kind = 'memo'
      LEFT JOIN balance b ON b.place_id = p.id FULL JOIN memo_line n ON n.memo_id = m.id AND n.lot_id = b.lot_id
      WHERE m.id IS NOT NULL AND (coalesce(b.weight, 0), coalesce(b.pieces, 0)) IS DISTINCT FROM (coalesce(n.out_weight, 0), coalesce(n.out_pieces, 0))`,
  },
  {
    says: 'what is kept at memo price is what each line kept',
    offenders: `SELECT 'line ' || n.id FROM memo_line n
      LEFT JOIN (SELECT memo_line_id, sum(weight) AS w FROM memo_keep GROUP BY 1) k ON k.memo_line_id = n.id
      WHERE n.kept_weight <> coalesce(k.w, 0)`,
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
    says: 'no difference was answered by who weighed it',
    isWarning: true,
    offenders: `SELECT 'difference ' || id || ' by person ' || answered_by FROM difference WHERE is_sole_answer`,
  },
];
