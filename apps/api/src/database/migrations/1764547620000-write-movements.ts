import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * The one writer. A caller hands it an act as JSON (packages/ledger makes the legs); it locks,
 * reckons, writes and numbers in one transaction, or refuses by the name of a rule.
 */
export class WriteMovements1764547620000 implements MigrationInterface {
  readonly name = 'WriteMovements1764547620000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(MAKE);
    await db.query(PAPER);
    await db.query(WRITE);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP FUNCTION write_movement, make_lots, make_memo, make_differences, make_weighings, make_document,
        resolve_legs, legs_of_reversal, answer_differences, change_memo, judge_memo_sent, take_numbers, ref_id;
    `);
  }
}

const MAKE = String.raw`
/* {"id": n} or {"new": ref} among what this act made. */
CREATE FUNCTION ref_id(ref jsonb, made jsonb) RETURNS bigint LANGUAGE sql IMMUTABLE
  RETURN CASE WHEN ref ? 'id' THEN (ref ->> 'id')::bigint ELSE (made ->> (ref ->> 'new'))::bigint END;

/* The next n numbers of a series; the counter row stays locked until commit, so there are no gaps. */
CREATE FUNCTION take_numbers(p_series text, n integer) RETURNS bigint LANGUAGE sql
SET search_path = pg_catalog, public, pg_temp AS $$
  UPDATE number_series SET next = next + n WHERE series = p_series RETURNING next - n
$$;

CREATE FUNCTION make_lots(p_act jsonb, p_date date) RETURNS jsonb LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE made jsonb := '{}'; l jsonb; first bigint; n integer; v_lot bigint; k integer := 0; parent lot;
BEGIN
  SELECT count(*) INTO n FROM jsonb_array_elements(coalesce(p_act -> 'newLots', '[]')) x WHERE NOT x ? 'letterOf';
  IF n > 0 THEN first := take_numbers('lot', n); END IF;
  FOR l IN SELECT x FROM jsonb_array_elements(coalesce(p_act -> 'newLots', '[]')) x LOOP
    IF l ? 'letterOf' THEN SELECT * INTO parent FROM lot WHERE id = (l ->> 'letterOf')::bigint; END IF;
    INSERT INTO lot (number, kind, owner_party_id, source_party_id, fixed_pieces, is_estimated, origin, treatment,
      shape, sieve_from, sieve_to, colour_from, colour_to, fancy_colour, clarity_from, clarity_to, cut, polish,
      symmetry, fluorescence, measure_a, measure_b, measure_depth, stated_weight, report_laboratory, report_number,
      report_date, mining_country, mining_evidence, particulars, ask_price, floor_price, taken_in_on)
    SELECT CASE WHEN l ? 'letterOf' THEN
        -- The same number with the next free letter.
        parent.number || (SELECT chr(65 + count(*)::int) FROM lot x WHERE x.number ~ ('^' || parent.number || '[A-Z]$'))
      ELSE (first + k)::text END,
      r.kind, r.owner_party_id, r.source_party_id, r.fixed_pieces, coalesce(r.is_estimated, false), r.origin,
      coalesce(r.treatment, ''), coalesce(r.shape, ''), coalesce(r.sieve_from, ''), coalesce(r.sieve_to, ''),
      r.colour_from, r.colour_to, coalesce(r.fancy_colour, ''), r.clarity_from, r.clarity_to, r.cut, r.polish,
      r.symmetry, coalesce(r.fluorescence, ''), r.measure_a, r.measure_b, r.measure_depth, r.stated_weight,
      coalesce(r.report_laboratory, ''), coalesce(r.report_number, ''), r.report_date,
      coalesce(r.mining_country, ''), coalesce(r.mining_evidence, ''), coalesce(r.particulars, '{}'),
      r.ask_price, r.floor_price, p_date
    FROM jsonb_populate_record(NULL::lot, l) r RETURNING id INTO v_lot;
    IF NOT l ? 'letterOf' THEN k := k + 1; END IF;
    INSERT INTO lot_report (lot_id, laboratory, number, on_date, standing)
      SELECT v_lot, x.laboratory, x.number, x.on_date, x.standing
      FROM jsonb_to_recordset(coalesce(l -> 'reports', '[]')) AS x(laboratory text, number text, on_date date, standing text);
    made := made || jsonb_build_object(l ->> 'ref', v_lot);
  END LOOP;
  RETURN made;
END $$;

/* The memo, its two places and its lines, unsent yet; returns {id, number, memoPlace, keptPlace, lines}. */
CREATE FUNCTION make_memo(p_act jsonb, p_person bigint, p_date date) RETURNS jsonb LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE m jsonb := p_act -> 'newMemo'; h house; v_memo bigint; no bigint; memo_place bigint; kept_place bigint;
  lines bigint[]; v_rate numeric;
BEGIN
  SELECT * INTO h FROM house;
  v_rate := rate_on(m ->> 'currency', p_date);
  IF v_rate IS NULL THEN PERFORM refuse('currency_has_rate', jsonb_build_object('currency', m ->> 'currency', 'date', p_date)); END IF;
  no := take_numbers('memo', 1);
  INSERT INTO memo (number, party_id, person_id, business_date, due, prices_until, handed_to, carried_by, terms,
    remarks, deposit_percent, currency, rate, step, stone_tolerance, parcel_tolerance)
  VALUES (no, (m ->> 'partyId')::bigint, p_person, p_date, (m ->> 'due')::date, (m ->> 'pricesUntil')::date,
    coalesce(m ->> 'handedTo', ''), coalesce(m ->> 'carriedBy', ''), coalesce(m ->> 'terms', ''),
    coalesce(m ->> 'remarks', ''), (m ->> 'depositPercent')::int, m ->> 'currency', v_rate, h.step,
    h.stone_tolerance, h.parcel_tolerance)
  RETURNING id INTO v_memo;
  INSERT INTO place (kind, name, party_id, memo_id) VALUES ('memo', 'M ' || no, (m ->> 'partyId')::bigint, v_memo)
    RETURNING id INTO memo_place;
  INSERT INTO place (kind, name, party_id, memo_id) VALUES ('kept', 'Kept from M ' || no, (m ->> 'partyId')::bigint, v_memo)
    RETURNING id INTO kept_place;
  WITH made AS (
    INSERT INTO memo_line (memo_id, lot_id, position, price, agreed_sum, priced_weight, due, remarks, is_estimated)
    SELECT v_memo, (x ->> 'lotId')::bigint, n, (x ->> 'price')::bigint, (x ->> 'agreedSum')::bigint,
      (x ->> 'pricedWeight')::bigint, (x ->> 'due')::date, coalesce(x ->> 'remarks', ''), l.is_estimated
    FROM jsonb_array_elements(m -> 'lines') WITH ORDINALITY y(x, n) JOIN lot l ON l.id = (x ->> 'lotId')::bigint
    ORDER BY n RETURNING id, position)
  SELECT array_agg(id ORDER BY position) INTO lines FROM made;
  RETURN jsonb_build_object('id', v_memo, 'number', no, 'memoPlace', memo_place, 'keptPlace', kept_place,
    'lines', to_jsonb(coalesce(lines, '{}')));
END $$;

CREATE FUNCTION make_differences(p_act jsonb, p_person bigint, p_date date, lots jsonb) RETURNS jsonb LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE made jsonb := '{}'; d jsonb; new_id bigint;
BEGIN
  FOR d IN SELECT x FROM jsonb_array_elements(coalesce(p_act -> 'newDifferences', '[]')) x LOOP
    INSERT INTO difference (lot_id, memo_line_id, kind, expected_weight, found_weight, expected_pieces, found_pieces,
      came_lot_id, opened_by, opened_on)
    VALUES (ref_id(d -> 'lot', lots), (d ->> 'lineId')::bigint, d ->> 'kind', (d ->> 'expectedWeight')::bigint,
      (d ->> 'foundWeight')::bigint, coalesce((d ->> 'expectedPieces')::bigint, 0),
      coalesce((d ->> 'foundPieces')::bigint, 0), ref_id(d -> 'cameLot', lots), p_person, p_date)
    RETURNING id INTO new_id;
    made := made || jsonb_build_object(d ->> 'ref', new_id);
  END LOOP;
  RETURN made;
END $$;

CREATE FUNCTION make_weighings(p_act jsonb, p_person bigint, p_date date, p_movement bigint, lots jsonb,
  differences jsonb) RETURNS jsonb LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE n integer := jsonb_array_length(coalesce(p_act -> 'weighings', '[]')); first bigint; numbers jsonb;
BEGIN
  IF n = 0 THEN RETURN '[]'; END IF;
  first := take_numbers('weighing', n);
  WITH made AS (
    INSERT INTO weighing (number, lot_id, purpose, weight, pieces, report_read, memo_line_id, movement_id,
      difference_id, person_id, business_date)
    SELECT first + k - 1, ref_id(x -> 'lot', lots), x ->> 'purpose', (x ->> 'weight')::bigint,
      (x ->> 'pieces')::bigint, coalesce(x ->> 'reportRead', ''), (x ->> 'lineId')::bigint, p_movement,
      ref_id(x -> 'difference', differences), p_person, p_date
    FROM jsonb_array_elements(p_act -> 'weighings') WITH ORDINALITY y(x, k) ORDER BY k RETURNING number)
  SELECT jsonb_agg(number ORDER BY number) INTO numbers FROM made;
  RETURN numbers;
END $$;
`;

const PAPER = String.raw`
/* Issues a paper: the number goes into the snapshot handed over, then hash and snapshot are kept. */
CREATE FUNCTION make_document(p_act jsonb, p_person bigint, p_movement bigint, p_memo bigint) RETURNS jsonb LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE d jsonb := p_act -> 'document'; no text; shot text; new_id bigint;
BEGIN
  IF d IS NULL OR d = 'null' THEN RETURN NULL; END IF;
  SELECT 'M ' || m.number || CASE WHEN d ->> 'kind' = 'memo' THEN ''
      ELSE '-' || (SELECT count(*) + 1 FROM document x WHERE x.memo_id = m.id AND x.kind <> 'memo') END
    INTO STRICT no FROM memo m WHERE m.id = p_memo;
  shot := jsonb_set(d -> 'snapshot', '{number}', to_jsonb(no))::text;
  INSERT INTO document (kind, number, memo_id, movement_id, person_id, snapshot, hash)
    VALUES (d ->> 'kind', no, p_memo, p_movement, p_person, shot, sha256(convert_to(shot, 'UTF8')))
    RETURNING id INTO new_id;
  RETURN jsonb_build_object('id', new_id, 'number', no);
END $$;

CREATE FUNCTION change_memo(p_act jsonb) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE c jsonb := p_act -> 'memoChange';
BEGIN
  IF c IS NULL OR c = 'null' THEN RETURN; END IF;
  UPDATE memo SET due = coalesce((c ->> 'due')::date, due),
    prices_until = coalesce((c ->> 'pricesUntil')::date, prices_until) WHERE id = (c ->> 'memoId')::bigint;
  UPDATE memo_line n SET due = coalesce((x ->> 'due')::date, n.due),
      price = CASE WHEN x ? 'agreedSum' THEN NULL WHEN x ? 'price' THEN (x ->> 'price')::bigint ELSE n.price END,
      agreed_sum = CASE WHEN x ? 'price' THEN NULL WHEN x ? 'agreedSum' THEN (x ->> 'agreedSum')::bigint ELSE n.agreed_sum END
    FROM jsonb_array_elements(coalesce(c -> 'lines', '[]')) x
    WHERE n.id = (x ->> 'lineId')::bigint AND n.memo_id = (c ->> 'memoId')::bigint;
END $$;

/* Limits and lapsed papers, judged inside with everything of this act already counted. */
CREATE FUNCTION judge_memo_sent(p_person bigint, p_act jsonb, p_memo bigint) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE y party; worth numeric; exposure bigint; is_owner boolean; today date := house_today();
BEGIN
  SELECT p.* INTO STRICT y FROM party p JOIN memo m ON m.party_id = p.id WHERE m.id = p_memo;
  SELECT 'owner' = ANY (roles) INTO is_owner FROM person WHERE id = p_person;
  -- An owner books it with a reason of his own; that is his release.
  IF is_owner AND length(btrim(coalesce(p_act ->> 'releaseReason', ''))) > 0 THEN RETURN; END IF;
  SELECT convert_money(sum(memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight, n.sent_weight)),
      m.currency, y.currency, today) INTO worth
    FROM memo_line n JOIN memo m ON m.id = n.memo_id WHERE m.id = p_memo GROUP BY m.currency;
  IF worth > y.memo_limit THEN
    PERFORM refuse('party_memo_limit', jsonb_build_object('party', y.name, 'limit', y.memo_limit, 'worth', worth,
      'over', worth - y.memo_limit, 'currency', y.currency));
  END IF;
  exposure := (SELECT total FROM party_exposure(y.id));
  IF exposure > y.credit_limit THEN
    PERFORM refuse('party_credit_limit', jsonb_build_object('party', y.name, 'limit', y.credit_limit,
      'exposure', exposure, 'over', exposure - y.credit_limit, 'currency', y.currency));
  END IF;
  IF y.identity_papers_until < today THEN
    PERFORM refuse('party_papers_lapsed', jsonb_build_object('party', y.name, 'paper', 'Identity papers', 'until', y.identity_papers_until));
  END IF;
  IF y.resale_certificate_until < today THEN
    PERFORM refuse('party_papers_lapsed', jsonb_build_object('party', y.name, 'paper', 'Resale certificate', 'until', y.resale_certificate_until));
  END IF;
END $$;

CREATE FUNCTION answer_differences(p_act jsonb, p_person bigint) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE a jsonb; d difference; is_owner boolean; accept_most integer; write_off_most integer; off bigint; is_sole boolean;
BEGIN
  SELECT 'owner' = ANY (roles) INTO is_owner FROM person WHERE id = p_person;
  SELECT accept_limit, write_off_limit INTO accept_most, write_off_most FROM house;
  FOR a IN SELECT x FROM jsonb_array_elements(coalesce(p_act -> 'answers', '[]')) x LOOP
    SELECT * INTO d FROM difference WHERE id = (a ->> 'differenceId')::bigint FOR NO KEY UPDATE;
    IF NOT FOUND OR d.answer IS NOT NULL THEN
      PERFORM refuse('difference_still_open', jsonb_build_object('difference', a ->> 'differenceId', 'answer', d.answer,
        'by', (SELECT name FROM person WHERE id = d.answered_by)));
    END IF;
    off := abs(d.expected_weight - d.found_weight);
    IF NOT is_owner AND (a ->> 'answer' = 'accepted' AND off > accept_most
        OR a ->> 'answer' = 'written off' AND off > write_off_most) THEN
      PERFORM refuse('difference_within_role_limit', jsonb_build_object('answer', a ->> 'answer', 'weight', off,
        'limit', CASE WHEN a ->> 'answer' = 'accepted' THEN accept_most ELSE write_off_most END));
    END IF;
    is_sole := d.opened_by = p_person;
    IF is_sole AND EXISTS (SELECT 1 FROM person WHERE id <> p_person AND disabled_at IS NULL
        AND roles && ARRAY['owner', 'bookkeeper']) THEN
      PERFORM refuse('difference_not_by_who_weighed', jsonb_build_object(
        'by', (SELECT name FROM person WHERE id = d.opened_by)));
    END IF;
    UPDATE difference SET answer = a ->> 'answer', answered_by = p_person, answered_at = clock_timestamp(),
      reason = coalesce(a ->> 'reason', ''), is_sole_answer = is_sole WHERE id = d.id;
  END LOOP;
END $$;

/* The mirror image of a movement, leg by leg, at its own costs. */
CREATE FUNCTION legs_of_reversal(p_movement bigint) RETURNS leg[] LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT array_agg(ROW(n, lot_id, place_id, place_kind, false, false, -weight, -pieces, 'given', -cost, NULL, NULL,
    memo_line_id, flow, difference_id, -cost)::leg ORDER BY n)
  FROM (SELECT g.*, row_number() OVER (ORDER BY g.id)::int AS n FROM posting g WHERE g.movement_id = p_movement) x
$$;
`;

const WRITE = String.raw`
CREATE FUNCTION resolve_legs(p_act jsonb, lots jsonb, places jsonb, differences jsonb, memo jsonb) RETURNS leg[]
LANGUAGE sql STABLE SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT array_agg(ROW(n::int, t.id, p.id, p.kind, p.inside, t.owner_party_id IS NOT NULL,
      coalesce((x ->> 'weight')::bigint, 0), coalesce((x ->> 'pieces')::bigint, 0), x #>> '{cost,how}',
      (x #>> '{cost,amount}')::bigint, (x #>> '{cost,pool}')::int, coalesce((x #>> '{cost,weight}')::numeric, 1),
      CASE WHEN x -> 'line' ? 'newLine' THEN (memo -> 'lines' ->> (x #>> '{line,newLine}')::int)::bigint
        ELSE (x #>> '{line,id}')::bigint END,
      x ->> 'flow', ref_id(x -> 'difference', differences), NULL)::leg ORDER BY n)
  FROM jsonb_array_elements(p_act -> 'legs') WITH ORDINALITY y(x, n)
  LEFT JOIN lot t ON t.id = ref_id(x -> 'lot', lots)
  LEFT JOIN place p ON CASE
    WHEN x -> 'place' ? 'kind' THEN p.kind = x #>> '{place,kind}' AND p.memo_id IS NULL
    WHEN x -> 'place' ? 'memoOf' THEN p.id = CASE WHEN x #>> '{place,memoOf}' = 'new' THEN (memo ->> 'memoPlace')::bigint
      ELSE (SELECT q.id FROM place q WHERE q.kind = 'memo' AND q.memo_id = (x #>> '{place,memoOf}')::bigint) END
    WHEN x -> 'place' ? 'keptOf' THEN p.id = (SELECT q.id FROM place q WHERE q.kind = 'kept' AND q.memo_id = (x #>> '{place,keptOf}')::bigint)
    ELSE p.id = ref_id(x -> 'place', places) END
$$;

/*
 * Writes one act. Locks in this order: the idempotency row, parties by id, lots by id, counters by id.
 * The same key and body again gives the same answer; another body under the key is refused.
 */
CREATE FUNCTION write_movement(p_person bigint, p_key text, p_body_hash text, p_act jsonb) RETURNS jsonb
LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  seen idempotency; day date := coalesce((p_act ->> 'businessDate')::date, house_today()); v_kind text := p_act ->> 'kind';
  lots jsonb; places jsonb := '{}'; differences jsonb; memo_made jsonb; legs leg[]; v_movement bigint; v_memo bigint;
  undone movement; q jsonb; new_place bigint; weighings jsonb; paper jsonb; result jsonb; lot_ids bigint[];
BEGIN
  INSERT INTO idempotency (person_id, key, body_hash) VALUES (p_person, p_key, p_body_hash)
    ON CONFLICT (person_id, key) DO NOTHING;
  IF NOT FOUND THEN
    SELECT * INTO seen FROM idempotency WHERE person_id = p_person AND key = p_key;
    IF seen.body_hash <> p_body_hash THEN PERFORM refuse('idempotency_same_body'); END IF;
    RETURN seen.answer;
  END IF;
  IF NOT EXISTS (SELECT 1 FROM person WHERE id = p_person AND disabled_at IS NULL) THEN
    PERFORM refuse('movement_person_active');
  END IF;
  v_memo := (p_act ->> 'memoId')::bigint;
  PERFORM 1 FROM party WHERE id IN ((p_act #>> '{newMemo,partyId}')::bigint, (p_act ->> 'partyId')::bigint,
    (SELECT party_id FROM memo WHERE id = v_memo)) ORDER BY id FOR NO KEY UPDATE;
  IF v_kind = 'reversal' THEN
    SELECT * INTO undone FROM movement WHERE id = (p_act ->> 'reverses')::bigint;
    IF NOT FOUND THEN PERFORM refuse('movement_reversal_names_one'); END IF;
    v_memo := undone.memo_id;
    SELECT array_agg(DISTINCT lot_id) INTO lot_ids FROM posting WHERE posting.movement_id = undone.id;
  ELSE
    SELECT array_agg(DISTINCT (x #>> '{lot,id}')::bigint) INTO lot_ids
      FROM jsonb_array_elements(coalesce(p_act -> 'legs', '[]')) x WHERE x -> 'lot' ? 'id';
  END IF;
  PERFORM 1 FROM lot WHERE id = ANY (lot_ids) ORDER BY id FOR NO KEY UPDATE;

  -- Counters by name: customer, lot, memo, weighing.
  lots := make_lots(p_act, day);
  FOR q IN SELECT x FROM jsonb_array_elements(coalesce(p_act -> 'newPlaces', '[]')) x LOOP
    INSERT INTO place (kind, name, party_id, due)
      VALUES (q ->> 'kind', q ->> 'name', (q ->> 'partyId')::bigint, (q ->> 'due')::date)
      RETURNING id INTO new_place;
    places := places || jsonb_build_object(q ->> 'ref', new_place);
  END LOOP;
  IF p_act ? 'newMemo' THEN
    memo_made := make_memo(p_act, p_person, day);
    v_memo := (memo_made ->> 'id')::bigint;
  END IF;
  differences := make_differences(p_act, p_person, day, lots);

  IF v_kind IS NOT NULL THEN
    INSERT INTO movement (kind, word, business_date, person_id, party_id, memo_id, paper, reason, request_id,
      reverses, corrects)
    VALUES (v_kind, p_act ->> 'word', day, p_person,
      coalesce((p_act #>> '{newMemo,partyId}')::bigint, (p_act ->> 'partyId')::bigint, undone.party_id),
      v_memo, coalesce(p_act ->> 'paper', ''), coalesce(p_act ->> 'reason', ''), p_key, undone.id,
      (p_act ->> 'corrects')::bigint)
    RETURNING id INTO v_movement;
    IF v_kind = 'reversal' THEN legs := legs_of_reversal(undone.id);
    ELSE
      legs := resolve_legs(p_act, lots, places, differences, memo_made);
      PERFORM judge_legs(v_kind, legs);
      IF EXISTS (SELECT 1 FROM unnest(legs) l, house h WHERE l.weight % h.step <> 0) THEN
        PERFORM refuse('movement_weight_in_step');
      END IF;
      legs := reckon_legs(legs, p_act -> 'pools');
    END IF;
    IF v_kind = 'memo void' AND EXISTS (SELECT 1 FROM memo_line n WHERE n.memo_id = v_memo AND (
        n.returned_weight, n.kept_weight, n.converted_weight, n.missing_weight, n.missing_pieces, n.written_off_weight)
        <> (0, 0, 0, 0, 0, 0)) THEN
      PERFORM refuse('memo_void_while_unsettled');
    END IF;
    -- What an answer holds on to is let go before it is closed; an undone answer opens again first.
    IF v_kind = 'reversal' THEN
      UPDATE difference SET answer = NULL, answered_by = NULL, answered_at = NULL, reason = '', is_sole_answer = false
        WHERE id IN (SELECT g.difference_id FROM posting g WHERE g.movement_id = undone.id) AND answer IS NOT NULL;
    END IF;
    INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost, memo_line_id, flow, difference_id)
      SELECT v_movement, l.lot_id, l.place_id, l.place_kind, sum(l.weight), sum(l.pieces), sum(l.cost), l.line_id, l.flow,
        l.difference_id
      FROM unnest(legs) l
      GROUP BY l.lot_id, l.place_id, l.place_kind, l.line_id, l.flow, l.difference_id
      HAVING sum(l.weight) <> 0 OR sum(l.pieces) <> 0 OR sum(l.cost) <> 0
      ORDER BY min(l.idx);
    IF v_kind = 'reversal' THEN
      UPDATE difference SET answer = 'undone', answered_by = p_person, answered_at = clock_timestamp(),
          reason = p_act ->> 'reason'
        WHERE id IN (SELECT g.difference_id FROM posting g WHERE g.movement_id = undone.id AND g.weight + g.pieces > 0)
          AND held_weight = 0 AND held_pieces = 0 AND answer IS NULL;
      UPDATE memo SET void_movement_id = NULL WHERE id = v_memo AND undone.kind = 'memo void';
      INSERT INTO memo_keep (movement_id, memo_line_id, weight, pieces, price, agreed_sum, amount)
        SELECT v_movement, k.memo_line_id, -k.weight, -k.pieces, k.price, k.agreed_sum, -k.amount
        FROM memo_keep k WHERE k.movement_id = undone.id;
    END IF;
    IF v_kind = 'memo void' THEN UPDATE memo SET void_movement_id = v_movement WHERE id = v_memo; END IF;
    IF v_kind = 'memo return' AND EXISTS (SELECT 1 FROM memo_line n JOIN memo m ON m.id = n.memo_id
        WHERE m.id = v_memo AND abs(memo_line_came_back_off(n.id)) > m.parcel_tolerance
          AND n.id IN (SELECT g.memo_line_id FROM posting g WHERE g.movement_id = v_movement AND g.flow = 'restated')) THEN
      PERFORM refuse('memo_restated_within_tolerance');
    END IF;
    INSERT INTO memo_keep (movement_id, memo_line_id, weight, pieces, price, agreed_sum, amount)
      SELECT v_movement, n.id, (x ->> 'weight')::bigint, (x ->> 'pieces')::bigint, (x ->> 'price')::bigint,
        (x ->> 'agreedSum')::bigint, (x ->> 'amount')::bigint
      FROM jsonb_array_elements(coalesce(p_act -> 'keeps', '[]')) x
      JOIN memo_line n ON n.id = (x ->> 'lineId')::bigint AND n.memo_id = v_memo;
  END IF;
  PERFORM answer_differences(p_act, p_person);
  PERFORM change_memo(p_act);
  IF p_act ? 'newMemo' THEN PERFORM judge_memo_sent(p_person, p_act, v_memo); END IF;
  IF p_act ? 'draftId' THEN DELETE FROM draft WHERE id = (p_act ->> 'draftId')::bigint; END IF;
  weighings := make_weighings(p_act, p_person, day, v_movement, lots, differences);
  paper := make_document(p_act, p_person, v_movement, v_memo);
  IF v_movement IS NULL AND paper IS NULL AND weighings = '[]' AND differences = '{}'
      AND jsonb_array_length(coalesce(p_act -> 'answers', '[]')) = 0 THEN
    PERFORM refuse('movement_says_something');
  END IF;

  SELECT jsonb_build_object('movementId', v_movement, 'memoId', v_memo, 'memoNumber', memo_made -> 'number',
      'businessDate', day, 'at', clock_timestamp(),
      'lots', coalesce((SELECT jsonb_object_agg(k.key, jsonb_build_object('id', t.id, 'number', t.number))
        FROM jsonb_each_text(lots) k JOIN lot t ON t.id = k.value::bigint), '{}'),
      'differences', differences, 'weighings', weighings, 'document', paper) INTO result;
  INSERT INTO audit (person_id, action, subject, detail)
    VALUES (p_person, coalesce(p_act #>> '{audit,action}', v_kind, 'paper'),
      coalesce(p_act #>> '{audit,subject}', paper ->> 'number', ''),
      coalesce(p_act #> '{audit,detail}', '{}') || jsonb_strip_nulls(jsonb_build_object('movement', v_movement,
        'release', p_act -> 'releaseReason')));
  UPDATE idempotency SET answer = result WHERE person_id = p_person AND key = p_key;
  RETURN result;
END $$;
`;
