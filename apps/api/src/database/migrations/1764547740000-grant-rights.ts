import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * What each role may do. `api` reads everything it shows and changes only what carries neither
 * carats nor money; all else goes through write_movement, which runs as the owner.
 */
export class GrantRights1764547740000 implements MigrationInterface {
  readonly name = 'GrantRights1764547740000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(`
      REVOKE ALL ON ALL TABLES IN SCHEMA public FROM PUBLIC;
      REVOKE EXECUTE ON ALL FUNCTIONS IN SCHEMA public FROM PUBLIC;
      GRANT USAGE ON SCHEMA public TO api, worker, counter, reader;
      GRANT SELECT ON ALL TABLES IN SCHEMA public TO api, reader;
      REVOKE SELECT ON session FROM reader;
      GRANT INSERT, UPDATE ON person TO api;
      GRANT SELECT, INSERT, UPDATE, DELETE ON session, throttle TO api;
      GRANT INSERT ON house, currency_rate, audit, lot_change, lot_report, saved_sieve, draft, memo_word, party TO api;
      GRANT UPDATE ON house, party, saved_sieve, draft TO api;
      GRANT UPDATE (rate, person_id, at) ON currency_rate TO api;
      GRANT UPDATE (first, next) ON number_series TO api;
      GRANT DELETE ON saved_sieve, draft TO api;
      GRANT UPDATE (source_party_id, shape, sieve_from, sieve_to, colour_from, colour_to, fancy_colour, clarity_from,
        clarity_to, cut, polish, symmetry, fluorescence, measure_a, measure_b, measure_depth, stated_weight,
        report_laboratory, report_number, report_date, mining_country, mining_evidence, particulars, ask_price,
        floor_price, version) ON lot TO api;
      GRANT UPDATE (asked_at) ON difference TO api;
      GRANT INSERT (kind, name, safe, purpose, party_id, person_id) ON place TO api;
      GRANT UPDATE (name, safe, purpose, is_closed) ON place TO api;
      GRANT EXECUTE ON FUNCTION write_movement, take_customer_number, house_today, party_exposure, memo_line_amount,
        memo_line_came_back_off, convert_money, rate_on, half_away TO api;
      GRANT EXECUTE ON FUNCTION refuse, keep_lot_identity, keep_by_postings, keep_house_fixed, refuse_change TO api;
      GRANT EXECUTE ON FUNCTION house_today, seal_hash, movement_text, document_text, party_exposure, memo_line_amount,
        convert_money, rate_on, half_away TO reader;
      GRANT SELECT ON house, seal, to_seal TO worker;
      GRANT EXECUTE ON FUNCTION seal_waiting, house_today TO worker;
    `);
    await db.query(SERIES_GUARD);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP TRIGGER number_series_used ON number_series;
      DROP TRIGGER place_of_people ON place;
      DROP FUNCTION keep_number_series, keep_places;
      GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA public TO PUBLIC;
      REVOKE ALL ON ALL FUNCTIONS IN SCHEMA public FROM api, worker, counter, reader;
      REVOKE ALL ON ALL TABLES IN SCHEMA public FROM api, worker, counter, reader;
      REVOKE USAGE ON SCHEMA public FROM api, worker, counter, reader;
    `);
  }
}

const SERIES_GUARD = String.raw`
/* A series may be set to begin elsewhere while unused; after that only the writer's acts count on. */
CREATE FUNCTION keep_number_series() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF current_user = 'owner' THEN RETURN NEW; END IF;
  IF OLD.next <> OLD.first OR NEW.next <> NEW.first THEN PERFORM refuse('number_series_used'); END IF;
  RETURN NEW;
END $$;
CREATE TRIGGER number_series_used BEFORE UPDATE ON number_series FOR EACH ROW EXECUTE FUNCTION keep_number_series();

/* Only the writer makes places of papers; people make drawers, shows, persons and houses of work. */
CREATE FUNCTION keep_places() RETURNS trigger LANGUAGE plpgsql
SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF current_user <> 'owner' AND NEW.kind NOT IN ('drawer', 'show', 'person', 'laboratory', 'workshop') THEN
    PERFORM refuse('place_made_by_writer');
  END IF;
  IF TG_OP = 'UPDATE' AND NEW.is_closed AND EXISTS (
      SELECT 1 FROM balance WHERE place_id = NEW.id AND (weight <> 0 OR pieces <> 0)) THEN
    PERFORM refuse('place_closed_when_empty');
  END IF;
  RETURN NEW;
END $$;
CREATE TRIGGER place_of_people BEFORE INSERT OR UPDATE ON place FOR EACH ROW EXECUTE FUNCTION keep_places();
GRANT EXECUTE ON FUNCTION keep_number_series, keep_places TO api;
`;
