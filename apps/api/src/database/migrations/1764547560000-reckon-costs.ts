import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * The arithmetic the writer needs under its own locks: how cost goes with carats, what a line is
 * worth, what a party owes or holds. Every division is exact, half away from zero.
 */
export class ReckonCosts1764547560000 implements MigrationInterface {
  readonly name = 'ReckonCosts1764547560000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(ROUNDING);
    await db.query(RULES);
    await db.query(RECKON);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP FUNCTION reckon_legs, judge_legs, party_exposure, memo_line_came_back_off, memo_line_amount, convert_money, rate_on, half_away;
      DROP TYPE leg;
      DROP TABLE movement_rule;
    `);
  }
}

const ROUNDING = String.raw`
/* n / d to a whole number, half away from zero; d > 0. */
CREATE FUNCTION half_away(n numeric, d numeric) RETURNS numeric LANGUAGE sql IMMUTABLE
  RETURN sign(n) * div(2 * abs(n) + d, 2 * d);

/* What weight w of a line is worth at memo price, in minor units of the memo's currency. */
CREATE FUNCTION memo_line_amount(price bigint, agreed_sum bigint, priced_weight bigint, sent_weight bigint,
  w bigint) RETURNS bigint LANGUAGE sql IMMUTABLE
  RETURN CASE WHEN sent_weight = 0 OR w = 0 THEN 0
    WHEN agreed_sum IS NOT NULL THEN half_away(agreed_sum::numeric * w, sent_weight)
    ELSE half_away(price::numeric * priced_weight * w, sent_weight::numeric * 1000) END;

/*
 * By how much a line's weight was restated as it came back; signed, found less counts as given up.
 * What an answer accepted later is no part of it.
 */
CREATE FUNCTION memo_line_came_back_off(p_line bigint) RETURNS bigint LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT coalesce(sum(CASE WHEN g.place_kind = 'memo' THEN -g.weight ELSE g.weight END), 0)::bigint
  FROM posting g JOIN movement m ON m.id = g.movement_id LEFT JOIN movement u ON u.id = m.reverses
  WHERE g.memo_line_id = p_line AND g.flow = 'restated' AND 'memo return' IN (m.kind, u.kind)
$$;

/* Base-currency units for one unit of a currency, by the newest rate up to a day; 1 for the base. */
CREATE FUNCTION rate_on(code text, day date) RETURNS numeric LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT CASE WHEN code = (SELECT base_currency FROM house) THEN 1 ELSE (
    SELECT rate FROM currency_rate WHERE currency = code AND on_date <= day ORDER BY on_date DESC LIMIT 1) END
$$;

/* Minor units of one currency as minor units of another, at the newest rates up to a day. */
CREATE FUNCTION convert_money(amount numeric, from_code text, to_code text, day date) RETURNS numeric
LANGUAGE sql STABLE SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT CASE WHEN from_code = to_code THEN amount ELSE half_away(
    amount * rate_on(from_code, day) * power(10::numeric, t.minor_digits::numeric), rate_on(to_code, day) * power(10::numeric, f.minor_digits::numeric)) END
  FROM currency f, currency t WHERE f.code = from_code AND t.code = to_code
$$;

/* Exposure now, in minor units of the party's currency: on memo and kept at memo price. */
CREATE FUNCTION party_exposure(p_party bigint, OUT on_memo bigint, OUT kept bigint, OUT total bigint)
LANGUAGE sql STABLE SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT coalesce(sum(out_value), 0)::bigint, coalesce(sum(kept_value), 0)::bigint,
    coalesce(sum(out_value), 0)::bigint + coalesce(sum(kept_value), 0)::bigint
  FROM (
    SELECT convert_money(sum(memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight,
        n.out_weight)), m.currency, y.currency, house_today()) AS out_value,
      convert_money(sum(coalesce(k.amount, 0)), m.currency, y.currency, house_today()) AS kept_value
    FROM memo m JOIN party y ON y.id = m.party_id JOIN memo_line n ON n.memo_id = m.id
    LEFT JOIN LATERAL (SELECT sum(amount) AS amount FROM memo_keep WHERE memo_line_id = n.id) k ON true
    WHERE m.party_id = p_party AND (NOT m.is_settled OR n.kept_weight > 0)
    GROUP BY m.currency, y.currency) x
$$;
`;

const RULES = String.raw`
-- Which places a kind of movement may take from and give to, and how cost may go in it.
CREATE TABLE movement_rule (
  kind text CONSTRAINT movement_rule_pkey PRIMARY KEY,
  giving text[] NOT NULL,
  taking text[] NOT NULL,
  -- Boundary places at which the caller names a cost (a price paid, a fee, a write-down).
  naming text[] NOT NULL,
  -- Weight may leave without its cost (restated or lost on the lot: the rest takes all).
  may_leave_cost boolean NOT NULL DEFAULT false
);
INSERT INTO movement_rule (kind, giving, taking, naming, may_leave_cost)
SELECT kind, string_to_array(replace(giving, 'own', own), ','), string_to_array(replace(taking, 'own', own), ','),
  string_to_array(named, ','), leaves
FROM (SELECT 'drawer,show,person,return desk,quarantine,laboratory,workshop') o(own), (VALUES
  ('opening', 'supplier', 'own', 'supplier', false),
  ('purchase', 'supplier', 'own', 'supplier', false),
  ('consignment in', 'memo in', 'own', '', false),
  ('bought from consignor', 'own,memo,kept,missing,conversion,supplier', 'own,memo,kept,missing,conversion,loss', 'supplier', false),
  ('return to consignor', 'own', 'memo in', '', false),
  ('return to supplier', 'own', 'supplier', '', false),
  ('transfer', 'own', 'own', '', false),
  ('memo out', 'own,memo', 'memo', '', false),
  ('memo return', 'memo,loss', 'return desk,quarantine,missing,loss', '', true),
  ('memo void', 'memo', 'own', '', false),
  ('put away', 'return desk,quarantine', 'own', '', false),
  ('kept', 'memo', 'kept', '', false),
  ('un-kept', 'kept', 'memo', '', false),
  ('sale', 'own,kept,conversion,supplier', 'sold,conversion,kept,own', 'supplier', false),
  ('credit return', 'sold', 'own', 'sold', false),
  ('difference opened', 'memo,own', 'missing,quarantine', '', false),
  ('difference answered', 'missing,loss,own,memo,memo in,supplier,conversion', 'kept,loss,own,memo,conversion,sold', 'supplier', true),
  ('restatement', 'loss,own', 'loss,own', '', true),
  ('conversion', 'own,memo,conversion', 'own,memo,conversion,loss', '', true),
  ('recut', 'own,charges', 'own,loss', 'charges', true),
  ('laboratory out', 'own', 'laboratory', '', false),
  ('laboratory back', 'laboratory,charges', 'own', 'charges', false),
  ('workshop out', 'own', 'workshop', '', false),
  ('workshop back', 'workshop,charges', 'own', 'charges', false),
  ('charge', 'charges', 'own,memo,charges', 'charges', false),
  ('write-down', 'own,memo,kept', 'loss', 'loss', false),
  ('count adjustment', 'loss,own', 'loss,own,missing', '', true),
  ('write-off', 'own,missing,memo', 'loss', '', false),
  ('found again', 'missing,loss', 'own', '', false),
  ('correction', 'supplier,memo in,own,memo,kept,charges', 'supplier,memo in,own,memo,kept,charges', 'supplier', true)
) AS r(kind, giving, taking, named, leaves);

CREATE TYPE leg AS (
  idx integer, lot_id bigint, place_id bigint, place_kind text, inside boolean, is_consigned boolean,
  weight bigint, pieces bigint, how text, given bigint, pool integer, share numeric,
  line_id bigint, flow text, difference_id bigint, cost bigint
);

/* Refuses legs that a movement of this kind can't have, whoever made them up. */
CREATE FUNCTION judge_legs(p_kind text, legs leg[]) RETURNS void LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE rule movement_rule; wrong leg;
BEGIN
  IF p_kind = 'reversal' THEN RETURN; END IF;
  SELECT * INTO STRICT rule FROM movement_rule WHERE kind = p_kind;
  SELECT l.* INTO wrong FROM unnest(legs) l WHERE l.lot_id IS NULL OR l.place_id IS NULL
    OR (l.weight < 0 OR l.pieces < 0) AND NOT l.place_kind = ANY (rule.giving)
    OR (l.weight > 0 OR l.pieces > 0) AND NOT l.place_kind = ANY (rule.taking)
    OR NOT l.place_kind = ANY (rule.giving || rule.taking) LIMIT 1;
  IF FOUND THEN
    PERFORM refuse('movement_legs_fit_kind', jsonb_build_object('kind', p_kind, 'place', wrong.place_kind));
  END IF;
  SELECT l.* INTO wrong FROM unnest(legs) l
    WHERE l.how = 'given' AND NOT l.place_kind = ANY (rule.naming)
      OR l.inside AND l.weight < 0 AND l.how <> 'carried' AND NOT (rule.may_leave_cost AND l.how = 'none')
      OR l.how = 'carried' AND NOT (l.inside AND l.weight <= 0)
      OR l.how NOT IN ('none', 'carried', 'given', 'allotted') OR l.how IS NULL LIMIT 1;
  IF FOUND THEN
    PERFORM refuse('movement_cost_fits_kind', jsonb_build_object('kind', p_kind, 'place', wrong.place_kind));
  END IF;
  -- In these a price is paid only for what becomes ours out of a consignor's lot.
  SELECT l.* INTO wrong FROM unnest(legs) l WHERE l.how = 'given'
    AND p_kind IN ('sale', 'bought from consignor', 'difference answered') AND NOT EXISTS (
      SELECT 1 FROM unnest(legs) o WHERE o.lot_id = l.lot_id AND o.place_kind = 'conversion') LIMIT 1;
  IF FOUND THEN
    PERFORM refuse('movement_cost_fits_kind', jsonb_build_object('kind', p_kind, 'place', wrong.place_kind));
  END IF;
  SELECT l.* INTO wrong FROM unnest(legs) l
    WHERE p_kind IN ('consignment in', 'return to consignor') AND NOT l.is_consigned
      OR p_kind IN ('opening', 'purchase', 'return to supplier') AND l.is_consigned
      OR l.flow = 'sent' AND p_kind NOT IN ('memo out', 'conversion')
      OR l.place_kind = 'kept' AND p_kind IN ('kept', 'un-kept') AND l.flow IS DISTINCT FROM 'kept' LIMIT 1;
  IF FOUND THEN
    PERFORM refuse('movement_legs_fit_kind', jsonb_build_object('kind', p_kind, 'place', wrong.place_kind));
  END IF;
  -- A stone, pair or set moves at its ledger weight; only lost or restated weight moves alone.
  IF p_kind NOT IN ('recut', 'correction', 'difference answered', 'restatement') AND EXISTS (
      SELECT 1 FROM unnest(legs) l JOIN lot t ON t.id = l.lot_id
      WHERE l.weight <> 0 AND l.pieces = 0 AND t.fixed_pieces IS NOT NULL) THEN
    PERFORM refuse('balance_stone_whole');
  END IF;
END $$;
`;

const RECKON = String.raw`
/*
 * Gives every leg its cost. Cost leaves a lot and place by share of weight from the balance as it is
 * now, in the order of the legs, the last weight taking all; pools share what their sources gave by
 * largest remainder, ties to the first leg. The caller holds the lots' locks.
 */
CREATE FUNCTION reckon_legs(legs leg[], pools jsonb) RETURNS leg[] LANGUAGE plpgsql
-- Arrays have no statistics: the planner takes ten legs for granted, and thousands would loop in loops.
SET enable_nestloop = off SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  r record; lot_now bigint := 0; place_now bigint := 0; weight_left numeric; cost_left numeric; taken numeric;
  any_done boolean;
  -- Apart from the legs: assigning into an array of rows copies it whole each time.
  costs bigint[]; hows text[];
BEGIN
  SELECT array_agg(CASE WHEN l.how = 'given' THEN l.given WHEN l.how = 'none' OR l.is_consigned THEN 0
      WHEN l.how = 'carried' AND l.weight = 0 THEN 0 END ORDER BY l.idx), array_agg(l.how ORDER BY l.idx)
    INTO costs, hows FROM unnest(legs) l;
  FOR r IN
    SELECT l.idx, l.lot_id, l.place_id, l.weight, l.is_consigned, coalesce(b.weight, 0) AS has,
      coalesce(b.cost, 0) AS cost
    FROM unnest(legs) l LEFT JOIN balance b ON b.lot_id = l.lot_id AND b.place_id = l.place_id
    WHERE l.inside AND l.weight < 0 ORDER BY l.lot_id, l.place_id, l.idx
  LOOP
    IF r.lot_id <> lot_now OR r.place_id <> place_now THEN
      lot_now := r.lot_id; place_now := r.place_id; weight_left := r.has; cost_left := r.cost;
    END IF;
    IF -r.weight > weight_left THEN
      PERFORM refuse('balance_not_enough', jsonb_build_object('lotId', r.lot_id,
        'lot', (SELECT number FROM lot WHERE id = r.lot_id), 'placeId', r.place_id,
        'place', (SELECT name FROM place WHERE id = r.place_id),
        'has', r.has, 'asked', -r.weight));
    END IF;
    IF hows[r.idx] = 'carried' THEN
      taken := CASE WHEN -r.weight = weight_left THEN cost_left ELSE half_away(cost_left * -r.weight, weight_left) END;
      costs[r.idx] := -taken;
      cost_left := cost_left - taken;
    END IF;
    weight_left := weight_left + r.weight;
  END LOOP;
  LOOP
    any_done := false;
    FOR r IN
      WITH known AS (SELECT c.cost, c.idx FROM unnest(costs) WITH ORDINALITY c(cost, idx)),
      source AS MATERIALIZED (
        SELECT (p.n - 1)::int AS pool, -sum(k.cost) AS total, bool_and(k.cost IS NOT NULL) AS is_ready
        FROM jsonb_array_elements(coalesce(pools, '[]')) WITH ORDINALITY p(pool, n)
        CROSS JOIN LATERAL jsonb_array_elements_text(p.pool -> 'of') s(idx)
        JOIN known k ON k.idx = s.idx::int + 1 GROUP BY p.n),
      member AS (
        SELECT l.idx, l.pool, s.total, l.share, sum(l.share) OVER (PARTITION BY l.pool) AS shares
        FROM unnest(legs) l JOIN source s ON s.pool = l.pool AND s.is_ready
        JOIN known k ON k.idx = l.idx WHERE l.how = 'allotted' AND k.cost IS NULL),
      part AS (
        SELECT idx, pool, total, CASE WHEN shares = 0 THEN 0 ELSE div(abs(total) * share, shares) END AS base,
          CASE WHEN shares = 0 THEN 0 ELSE mod(abs(total) * share, shares) END AS remainder, shares
        FROM member),
      ranked AS (
        SELECT idx, total, base, shares, row_number() OVER (PARTITION BY pool ORDER BY remainder DESC, idx) AS rank,
          abs(total) - sum(base) OVER (PARTITION BY pool) AS odd
        FROM part)
      SELECT idx, sign(total) * (base + CASE WHEN shares > 0 AND rank <= odd THEN 1 ELSE 0 END) AS cost FROM ranked
    LOOP
      costs[r.idx] := r.cost;
      any_done := true;
    END LOOP;
    EXIT WHEN NOT any_done OR array_position(costs, NULL) IS NULL;
  END LOOP;
  IF array_position(costs, NULL) IS NOT NULL THEN PERFORM refuse('movement_cost_fits_kind'); END IF;
  RETURN (SELECT array_agg(ROW(l.idx, l.lot_id, l.place_id, l.place_kind, l.inside, l.is_consigned, l.weight, l.pieces,
      l.how, l.given, l.pool, l.share, l.line_id, l.flow, l.difference_id, costs[l.idx])::leg ORDER BY l.idx)
    FROM unnest(legs) l);
END $$;
`;
