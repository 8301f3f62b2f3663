import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Seals: each hashes the one before it and all it covers, members listed one by one. */
export class SealLedger1764547680000 implements MigrationInterface {
  readonly name = 'SealLedger1764547680000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(UP);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query('DROP FUNCTION seal_waiting, seal_hash, movement_text, document_text;');
  }
}

const UP = String.raw`
/* All of a movement with its postings, as one text that never depends on plan or settings. */
CREATE FUNCTION movement_text(p_movement bigint) RETURNS text LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT jsonb_build_array('movement', m.id, m.kind, m.word, m.business_date::text,
    (extract(epoch FROM m.at) * 1000000)::bigint, m.person_id, m.party_id, m.memo_id, m.paper, m.reason, m.request_id,
    m.reverses, m.corrects, (
      SELECT jsonb_agg(jsonb_build_array(g.id, g.lot_id, g.place_id, g.place_kind, g.weight, g.pieces, g.cost,
        g.memo_line_id, g.flow, g.difference_id) ORDER BY g.id)
      FROM posting g WHERE g.movement_id = m.id))::text
  FROM movement m WHERE m.id = p_movement
$$;

CREATE FUNCTION document_text(p_document bigint) RETURNS text LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT jsonb_build_array('document', d.id, d.kind, d.number, d.memo_id, d.movement_id, d.person_id,
    (extract(epoch FROM d.at) * 1000000)::bigint, encode(d.hash, 'hex'),
    encode(sha256(convert_to(d.snapshot, 'UTF8')), 'hex'))::text
  FROM document d WHERE d.id = p_document
$$;

/* The hash a seal must have: the previous hash, then each member's text in order. */
CREATE FUNCTION seal_hash(p_seal bigint) RETURNS bytea LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT sha256(coalesce((SELECT hash FROM seal WHERE id = s.previous_id), '\x')
    || convert_to(coalesce((SELECT string_agg(
      coalesce(movement_text(t.movement_id), document_text(t.document_id), 'gone'), E'\n' ORDER BY t.position)
      FROM seal_member t WHERE t.seal_id = s.id), ''), 'UTF8'))
  FROM seal s WHERE s.id = p_seal
$$;

/*
 * Seals all that is visible and not yet sealed, at most p_most members; returns how many.
 * A lower id that commits later waits for the next seal, since members are listed, not ranged.
 */
CREATE FUNCTION seal_waiting(p_most integer DEFAULT 5000) RETURNS integer LANGUAGE plpgsql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE last_seal bigint; new_seal bigint; n integer; taken bigint[];
BEGIN
  PERFORM pg_advisory_xact_lock(hashtext('foldwell seal'));
  SELECT array_agg(id ORDER BY id) INTO taken FROM (SELECT id FROM to_seal ORDER BY id LIMIT p_most) x;
  n := coalesce(array_length(taken, 1), 0);
  IF n = 0 THEN RETURN 0; END IF;
  SELECT s.id INTO last_seal FROM seal s WHERE NOT EXISTS (SELECT 1 FROM seal t WHERE t.previous_id = s.id);
  -- The members first by the seal's coming id, the hash from them: a seal row never changes.
  new_seal := nextval(pg_get_serial_sequence('seal', 'id'));
  INSERT INTO seal (id, previous_id, hash) OVERRIDING SYSTEM VALUE
    SELECT new_seal, last_seal, sha256(coalesce((SELECT hash FROM seal WHERE id = last_seal), '\x')
      || convert_to(string_agg(coalesce(movement_text(q.movement_id), document_text(q.document_id)), E'\n' ORDER BY q.id), 'UTF8'))
    FROM to_seal q WHERE q.id = ANY (taken);
  INSERT INTO seal_member (seal_id, position, movement_id, document_id)
    SELECT new_seal, row_number() OVER (ORDER BY q.id), q.movement_id, q.document_id
    FROM to_seal q WHERE q.id = ANY (taken);
  DELETE FROM to_seal WHERE id = ANY (taken);
  RETURN n;
END $$;
`;
