import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * The invariants as the database keeps them. Postings move balances, lines and differences by one
 * statement trigger; what only a whole movement can show is judged once, when it commits.
 */
export class GuardLedger1764547500000 implements MigrationInterface {
  readonly name = 'GuardLedger1764547500000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(REFUSE);
    await db.query(APPLY);
    await db.query(JUDGE);
    await db.query(TRIGGERS);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP TRIGGER posting_apply ON posting;
      DROP TRIGGER movement_judged ON movement;
      DROP TRIGGER movement_to_seal ON movement;
      DROP TRIGGER document_to_seal ON document;
      DROP TRIGGER house_fixed ON house;
      DROP TRIGGER lot_identity_fixed ON lot;
      DROP FUNCTION apply_postings, judge_movement, judge_reversal, judge_conversion, queue_for_seal,
        keep_house_fixed, keep_lot_identity;
    `);
    for (const table of APPEND_ONLY) {
      await db.query(`DROP TRIGGER ${table}_append_only ON ${table};
        DROP TRIGGER ${table}_no_truncate ON ${table};`);
    }
    for (const table of KEPT_BY_POSTINGS) {
      await db.query(`DROP TRIGGER ${table}_kept_by_postings ON ${table};
        DROP TRIGGER ${table}_no_truncate ON ${table};`);
    }
    await db.query(`DROP FUNCTION refuse_change, refuse_truncate, keep_by_postings, refuse;`);
  }
}

const APPEND_ONLY = [
  'movement',
  'posting',
  'weighing',
  'document',
  'memo_keep',
  'seal',
  'seal_member',
  'audit',
  'lot_change',
];
const KEPT_BY_POSTINGS = ['balance', 'memo_line', 'difference'];

const REFUSE = String.raw`
/* One way to say no: the rule's name as the constraint, the facts as JSON for the sentence. */
CREATE FUNCTION refuse(rule text, facts jsonb DEFAULT '{}') RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION USING ERRCODE = '23514', CONSTRAINT = rule, MESSAGE = rule, DETAIL = facts::text;
END $$;

CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  PERFORM refuse(TG_TABLE_NAME || '_append_only');
  RETURN NULL;
END $$;

CREATE FUNCTION refuse_truncate() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  PERFORM refuse(TG_TABLE_NAME || '_no_truncate');
  RETURN NULL;
END $$;

/* Balances and what lines and differences hold change only through postings (a trigger's depth). */
CREATE FUNCTION keep_by_postings() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE was jsonb; becomes jsonb; kept text[];
BEGIN
  IF pg_trigger_depth() > 1 THEN RETURN coalesce(NEW, OLD); END IF;
  IF TG_OP = 'DELETE' THEN PERFORM refuse(TG_TABLE_NAME || '_kept_by_postings'); END IF;
  IF TG_TABLE_NAME = 'balance' THEN
    IF TG_OP = 'INSERT' THEN PERFORM refuse('balance_kept_by_postings'); END IF;
    kept := ARRAY['lot_id', 'place_id', 'place_kind', 'inside', 'is_consigned', 'is_estimated',
      'fixed_pieces', 'weight', 'pieces', 'cost', 'last_date', 'last_movement_id'];
  ELSIF TG_TABLE_NAME = 'memo_line' THEN
    kept := ARRAY['sent_weight', 'sent_pieces', 'returned_weight', 'returned_pieces', 'kept_weight',
      'kept_pieces', 'converted_weight', 'converted_pieces', 'missing_weight', 'missing_pieces',
      'written_off_weight', 'written_off_pieces', 'restated_weight', 'restated_pieces'];
  ELSE
    kept := ARRAY['held_weight', 'held_pieces'];
  END IF;
  becomes := to_jsonb(NEW);
  IF TG_OP = 'UPDATE' THEN was := to_jsonb(OLD); ELSE was := '{}'; END IF;
  IF EXISTS (SELECT 1 FROM unnest(kept) AS k(field)
             WHERE coalesce(was -> field, '0'::jsonb) IS DISTINCT FROM coalesce(becomes -> field, '0'::jsonb)) THEN
    PERFORM refuse(TG_TABLE_NAME || '_kept_by_postings');
  END IF;
  RETURN NEW;
END $$;
`;

const APPLY = String.raw`
CREATE FUNCTION apply_postings() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE facts jsonb;
BEGIN
  IF EXISTS (SELECT 1 FROM added a JOIN movement m ON m.id = a.movement_id
             WHERE m.transaction_id <> pg_current_xact_id()) THEN
    PERFORM refuse('posting_in_its_movement');
  END IF;
  IF EXISTS (SELECT 1 FROM added a JOIN lot l ON l.id = a.lot_id
             WHERE l.owner_party_id IS NOT NULL AND a.cost <> 0) THEN
    PERFORM refuse('balance_consigned_no_cost');
  END IF;
  SELECT jsonb_build_object('lot', l.number, 'newest', b.last_date, 'date', m.business_date)
    INTO facts
    FROM added a JOIN movement m ON m.id = a.movement_id
    JOIN balance b ON b.lot_id = a.lot_id AND b.place_id = a.place_id
    JOIN lot l ON l.id = a.lot_id
    WHERE b.inside AND b.last_date > m.business_date LIMIT 1;
  IF FOUND THEN PERFORM refuse('balance_date_in_order', facts); END IF;

  -- At zero first, then updated: an upsert of signed sums would meet the checks too early.
  INSERT INTO balance (lot_id, place_id, place_kind, inside, is_consigned, is_estimated, fixed_pieces)
    SELECT DISTINCT a.lot_id, a.place_id, a.place_kind, p.inside, l.owner_party_id IS NOT NULL,
      l.is_estimated, l.fixed_pieces
    FROM added a JOIN place p ON p.id = a.place_id JOIN lot l ON l.id = a.lot_id
    ON CONFLICT (lot_id, place_id) DO NOTHING;
  UPDATE balance b SET weight = b.weight + s.weight, pieces = b.pieces + s.pieces, cost = b.cost + s.cost,
      last_date = greatest(b.last_date, s.business_date), last_movement_id = s.movement_id
    FROM (SELECT a.lot_id, a.place_id, sum(a.weight) AS weight, sum(a.pieces) AS pieces,
            sum(a.cost) AS cost, max(m.business_date) AS business_date, max(a.movement_id) AS movement_id
          FROM added a JOIN movement m ON m.id = a.movement_id GROUP BY a.lot_id, a.place_id) s
    WHERE b.lot_id = s.lot_id AND b.place_id = s.place_id;

  UPDATE memo_line n SET
      sent_weight = n.sent_weight + s.sent_w, sent_pieces = n.sent_pieces + s.sent_p,
      returned_weight = n.returned_weight + s.ret_w, returned_pieces = n.returned_pieces + s.ret_p,
      kept_weight = n.kept_weight + s.kept_w, kept_pieces = n.kept_pieces + s.kept_p,
      converted_weight = n.converted_weight + s.conv_w, converted_pieces = n.converted_pieces + s.conv_p,
      missing_weight = n.missing_weight + s.miss_w, missing_pieces = n.missing_pieces + s.miss_p,
      written_off_weight = n.written_off_weight + s.off_w, written_off_pieces = n.written_off_pieces + s.off_p,
      restated_weight = n.restated_weight + s.rest_w, restated_pieces = n.restated_pieces + s.rest_p
    FROM (SELECT f.memo_line_id,
        sum(w) FILTER (WHERE flow = 'sent') AS sent_w, sum(p) FILTER (WHERE flow = 'sent') AS sent_p,
        sum(w) FILTER (WHERE flow = 'returned') AS ret_w, sum(p) FILTER (WHERE flow = 'returned') AS ret_p,
        sum(w) FILTER (WHERE flow = 'kept') AS kept_w, sum(p) FILTER (WHERE flow = 'kept') AS kept_p,
        sum(w) FILTER (WHERE flow = 'converted') AS conv_w, sum(p) FILTER (WHERE flow = 'converted') AS conv_p,
        sum(w) FILTER (WHERE flow = 'missing') AS miss_w, sum(p) FILTER (WHERE flow = 'missing') AS miss_p,
        sum(w) FILTER (WHERE flow = 'written_off') AS off_w, sum(p) FILTER (WHERE flow = 'written_off') AS off_p,
        sum(w) FILTER (WHERE flow = 'restated') AS rest_w, sum(p) FILTER (WHERE flow = 'restated') AS rest_p
      FROM (
        -- A leg on the line's own memo place counts against its flow, any other leg for it.
        SELECT a.memo_line_id, a.flow,
          CASE WHEN a.place_kind = 'memo' AND a.flow <> 'sent' THEN -a.weight ELSE a.weight END AS w,
          CASE WHEN a.place_kind = 'memo' AND a.flow <> 'sent' THEN -a.pieces ELSE a.pieces END AS p
        FROM added a WHERE a.memo_line_id IS NOT NULL
        -- Every flow once at zero, so that a sum is never null.
        UNION ALL SELECT DISTINCT a.memo_line_id, g.flow, 0, 0 FROM added a,
          unnest(ARRAY['sent', 'returned', 'kept', 'converted', 'missing', 'written_off', 'restated']) AS g(flow)
        WHERE a.memo_line_id IS NOT NULL) f
      GROUP BY f.memo_line_id) s
    WHERE n.id = s.memo_line_id;
  UPDATE memo m SET is_settled = NOT EXISTS (
      SELECT 1 FROM memo_line n WHERE n.memo_id = m.id AND (n.out_weight > 0 OR n.missing_weight > 0 OR n.missing_pieces > 0))
    WHERE m.id IN (SELECT n.memo_id FROM added a JOIN memo_line n ON n.id = a.memo_line_id);

  UPDATE difference d SET held_weight = d.held_weight + s.weight, held_pieces = d.held_pieces + s.pieces
    FROM (SELECT difference_id, sum(weight) AS weight, sum(pieces) AS pieces FROM added
          WHERE difference_id IS NOT NULL GROUP BY difference_id) s
    WHERE d.id = s.difference_id;

  UPDATE lot l SET part_safe = s.safe, part_out = s.out, part_returned = s.returned, part_sold = s.sold,
      part_missing = s.missing, part_pieces = s.pieces, is_living = s.living
    FROM (SELECT b.lot_id,
        coalesce(sum(b.weight) FILTER (WHERE p.part = 'safe'), 0) AS safe,
        coalesce(sum(b.weight) FILTER (WHERE p.part = 'out'), 0) AS out,
        coalesce(sum(b.weight) FILTER (WHERE p.part = 'returned'), 0) AS returned,
        coalesce(sum(b.weight) FILTER (WHERE p.part = 'sold'), 0) AS sold,
        coalesce(sum(b.weight) FILTER (WHERE p.part = 'missing'), 0) AS missing,
        coalesce(sum(b.pieces) FILTER (WHERE p.part IS NOT NULL), 0) AS pieces,
        coalesce(bool_or(b.inside AND (b.weight > 0 OR b.pieces > 0)), false) AS living
      FROM balance b JOIN place p ON p.id = b.place_id
      WHERE b.lot_id IN (SELECT lot_id FROM added) GROUP BY b.lot_id) s
    WHERE l.id = s.lot_id;
  RETURN NULL;
END $$;
`;

const JUDGE = String.raw`
CREATE FUNCTION judge_reversal(this movement) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE undone movement; facts jsonb;
BEGIN
  SELECT * INTO undone FROM movement WHERE id = this.reverses;
  IF undone.kind = 'reversal' THEN PERFORM refuse('reversal_not_of_reversal'); END IF;
  IF undone.kind IN ('sale', 'credit return', 'correction') OR (undone.kind = 'bought from consignor'
      AND EXISTS (SELECT 1 FROM posting WHERE movement_id = undone.id AND place_kind = 'sold')) THEN
    PERFORM refuse('reversal_of_this_kind', jsonb_build_object('kind', undone.kind));
  END IF;
  IF EXISTS ((SELECT lot_id, place_id, sum(weight), sum(pieces), sum(cost) FROM posting
              WHERE movement_id = undone.id GROUP BY 1, 2
              HAVING sum(weight) <> 0 OR sum(pieces) <> 0 OR sum(cost) <> 0)
             EXCEPT
             (SELECT lot_id, place_id, -sum(weight), -sum(pieces), -sum(cost) FROM posting
              WHERE movement_id = this.id GROUP BY 1, 2)) THEN
    PERFORM refuse('reversal_mirrors');
  END IF;
  -- Newest on every lot and inside place it added to; a write-off or giving back: on the lot at all.
  SELECT jsonb_build_object('movement', later.movement_id, 'lot', l.number) INTO facts
    FROM posting mine JOIN place p ON p.id = mine.place_id
    JOIN posting later ON later.lot_id = mine.lot_id AND later.movement_id > undone.id
      AND later.movement_id <> this.id
      AND (undone.kind IN ('write-off', 'return to supplier', 'return to consignor')
           OR later.place_id = mine.place_id)
    JOIN lot l ON l.id = mine.lot_id
    WHERE mine.movement_id = undone.id
      AND (undone.kind IN ('write-off', 'return to supplier', 'return to consignor')
           OR (p.inside AND (mine.weight > 0 OR mine.pieces > 0 OR mine.cost > 0)))
    ORDER BY later.movement_id LIMIT 1;
  IF FOUND THEN PERFORM refuse('reversal_of_newest', facts); END IF;
END $$;

/* Goods of different owner, origin or disclosure never share a lot. */
CREATE FUNCTION judge_conversion(this movement) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE owners bigint; treatments bigint; origins bigint; is_test boolean;
BEGIN
  SELECT count(DISTINCT coalesce(l.owner_party_id, 0)), count(DISTINCT l.treatment), count(DISTINCT l.origin)
    INTO owners, treatments, origins
    FROM posting g JOIN lot l ON l.id = g.lot_id
    WHERE g.movement_id = this.id AND g.place_kind = 'conversion';
  IF owners > 1 AND this.kind NOT IN ('bought from consignor', 'sale', 'reversal', 'difference answered') THEN
    PERFORM refuse('conversion_one_owner');
  END IF;
  IF treatments > 1 THEN PERFORM refuse('conversion_one_treatment'); END IF;
  is_test := this.word = 'test result' OR this.kind = 'reversal';
  IF origins > 1 AND NOT is_test THEN PERFORM refuse('conversion_one_origin'); END IF;
  -- Only what is not tested may be sorted by a test; nothing tested goes back.
  IF origins > 1 AND this.kind <> 'reversal' AND EXISTS (
      SELECT 1 FROM posting g JOIN lot l ON l.id = g.lot_id
      WHERE g.movement_id = this.id AND g.place_kind = 'conversion' AND g.weight > 0
        AND l.origin <> 'not tested') THEN
    PERFORM refuse('conversion_one_origin');
  END IF;
END $$;

/* What only the whole movement can show, judged once when it commits, as the owner of the tables. */
CREATE FUNCTION judge_movement() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE legs bigint; has_conversion boolean; facts jsonb; locked date;
BEGIN
  SELECT count(*), bool_or(place_kind = 'conversion') INTO legs, has_conversion
    FROM posting WHERE movement_id = NEW.id;
  IF legs < 2 THEN PERFORM refuse('movement_has_two_legs'); END IF;
  SELECT jsonb_build_object('lot', l.number) INTO facts
    FROM posting g JOIN lot l ON l.id = g.lot_id WHERE g.movement_id = NEW.id GROUP BY l.number
    HAVING sum(weight) <> 0 OR sum(pieces) <> 0 OR sum(cost) <> 0 LIMIT 1;
  IF FOUND THEN PERFORM refuse('movement_conserves', facts); END IF;
  IF has_conversion THEN
    IF EXISTS (SELECT 1 FROM posting WHERE movement_id = NEW.id AND place_kind = 'conversion'
               HAVING sum(weight) <> 0 OR sum(pieces) <> 0 OR sum(cost) <> 0) THEN
      PERFORM refuse('movement_conversion_conserves');
    END IF;
    PERFORM judge_conversion(NEW);
  END IF;
  IF NEW.business_date > house_today() THEN
    PERFORM refuse('movement_date_not_ahead', jsonb_build_object('date', NEW.business_date, 'today', house_today()));
  END IF;
  SELECT lock_date INTO locked FROM house;
  IF NEW.business_date <= locked THEN
    PERFORM refuse('movement_date_after_lock', jsonb_build_object('date', NEW.business_date, 'locked', locked));
  END IF;
  -- Wherever a leg lies that names a line, the place of that line's memo must hold what is still out.
  IF EXISTS (SELECT 1 FROM (SELECT g.lot_id, g.place_id FROM posting g
               WHERE g.movement_id = NEW.id AND g.place_kind = 'memo'
               UNION SELECT g.lot_id, p.id FROM posting g JOIN memo_line n ON n.id = g.memo_line_id
               JOIN place p ON p.memo_id = n.memo_id AND p.kind = 'memo' WHERE g.movement_id = NEW.id) t
             JOIN place p ON p.id = t.place_id
             LEFT JOIN balance b ON b.lot_id = t.lot_id AND b.place_id = t.place_id
             LEFT JOIN memo_line n ON n.memo_id = p.memo_id AND n.lot_id = t.lot_id
             WHERE coalesce(b.weight, 0) <> coalesce(n.out_weight, 0)
               OR coalesce(b.pieces, 0) <> coalesce(n.out_pieces, 0)) THEN
    PERFORM refuse('memo_place_is_its_lines');
  END IF;
  IF EXISTS (SELECT 1 FROM posting g JOIN memo_line n ON n.id = g.memo_line_id
             JOIN place p ON p.id = g.place_id
             WHERE g.movement_id = NEW.id AND g.place_kind IN ('memo', 'kept') AND p.memo_id <> n.memo_id) THEN
    PERFORM refuse('memo_place_is_its_lines');
  END IF;
  IF EXISTS (SELECT 1 FROM (SELECT DISTINCT lot_id, place_id FROM posting
               WHERE movement_id = NEW.id AND place_kind = 'missing') t
             JOIN balance b ON b.lot_id = t.lot_id AND b.place_id = t.place_id
             CROSS JOIN LATERAL (SELECT coalesce(sum(d.held_weight), 0) AS weight,
               coalesce(sum(d.held_pieces), 0) AS pieces FROM difference d WHERE d.lot_id = t.lot_id) h
             WHERE b.weight <> h.weight OR b.pieces <> h.pieces) THEN
    PERFORM refuse('missing_is_open_differences');
  END IF;
  -- What is sent is sent by its own paper, judged against the limits; nothing is added to it after.
  IF NEW.kind = 'memo out' AND EXISTS (SELECT 1 FROM posting g JOIN posting e ON e.memo_line_id = g.memo_line_id
             WHERE g.movement_id = NEW.id AND g.flow = 'sent' AND e.flow = 'sent' AND e.movement_id <> NEW.id) THEN
    PERFORM refuse('memo_line_sent_once');
  END IF;
  IF NEW.kind = 'reversal' THEN PERFORM judge_reversal(NEW); END IF;
  RETURN NULL;
END $$;

CREATE FUNCTION queue_for_seal() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF TG_TABLE_NAME = 'movement' THEN INSERT INTO to_seal (movement_id) VALUES (NEW.id);
  ELSE INSERT INTO to_seal (document_id) VALUES (NEW.id); END IF;
  RETURN NULL;
END $$;

CREATE FUNCTION keep_house_fixed() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF (NEW.zone, NEW.base_currency, NEW.step) IS DISTINCT FROM (OLD.zone, OLD.base_currency, OLD.step)
     AND EXISTS (SELECT 1 FROM movement) THEN
    PERFORM refuse('house_fixed_once_moved');
  END IF;
  RETURN NEW;
END $$;

CREATE FUNCTION keep_lot_identity() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF (NEW.number, NEW.kind, NEW.owner_party_id, NEW.origin, NEW.treatment, NEW.fixed_pieces, NEW.is_estimated)
     IS DISTINCT FROM
     (OLD.number, OLD.kind, OLD.owner_party_id, OLD.origin, OLD.treatment, OLD.fixed_pieces, OLD.is_estimated) THEN
    PERFORM refuse('lot_identity_fixed');
  END IF;
  IF pg_trigger_depth() = 1 AND (NEW.part_safe, NEW.part_out, NEW.part_returned, NEW.part_sold, NEW.part_missing,
      NEW.part_pieces, NEW.is_living) IS DISTINCT FROM (OLD.part_safe, OLD.part_out, OLD.part_returned,
      OLD.part_sold, OLD.part_missing, OLD.part_pieces, OLD.is_living) THEN
    PERFORM refuse('lot_parts_kept_by_postings');
  END IF;
  RETURN NEW;
END $$;
`;

const TRIGGERS = [
  String.raw`
CREATE TRIGGER posting_apply AFTER INSERT ON posting REFERENCING NEW TABLE AS added
  FOR EACH STATEMENT EXECUTE FUNCTION apply_postings();
CREATE CONSTRAINT TRIGGER movement_judged AFTER INSERT ON movement
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION judge_movement();
CREATE TRIGGER movement_to_seal AFTER INSERT ON movement FOR EACH ROW EXECUTE FUNCTION queue_for_seal();
CREATE TRIGGER document_to_seal AFTER INSERT ON document FOR EACH ROW EXECUTE FUNCTION queue_for_seal();
CREATE TRIGGER house_fixed BEFORE UPDATE ON house FOR EACH ROW EXECUTE FUNCTION keep_house_fixed();
CREATE TRIGGER lot_identity_fixed BEFORE UPDATE ON lot FOR EACH ROW EXECUTE FUNCTION keep_lot_identity();
`,
  ...APPEND_ONLY.map(
    (table) => `
CREATE TRIGGER ${table}_append_only BEFORE UPDATE OR DELETE ON ${table}
  FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER ${table}_no_truncate BEFORE TRUNCATE ON ${table}
  FOR EACH STATEMENT EXECUTE FUNCTION refuse_truncate();`,
  ),
  ...KEPT_BY_POSTINGS.map(
    (table) => `
CREATE TRIGGER ${table}_kept_by_postings BEFORE INSERT OR UPDATE OR DELETE ON ${table}
  FOR EACH ROW EXECUTE FUNCTION keep_by_postings();
CREATE TRIGGER ${table}_no_truncate BEFORE TRUNCATE ON ${table}
  FOR EACH STATEMENT EXECUTE FUNCTION refuse_truncate();`,
  ),
].join('\n');
