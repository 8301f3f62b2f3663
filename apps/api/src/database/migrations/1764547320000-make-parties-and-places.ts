import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Who we deal with, and every place where carats can be. */
export class MakePartiesAndPlaces1764547320000 implements MigrationInterface {
  readonly name = 'MakePartiesAndPlaces1764547320000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(UP);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP TABLE place;
      ALTER TABLE person DROP CONSTRAINT person_party_known;
      DROP FUNCTION take_customer_number;
      DROP TABLE party;
    `);
  }
}

const UP = String.raw`
CREATE TABLE party (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT party_pkey PRIMARY KEY,
  public_id uuid NOT NULL DEFAULT gen_random_uuid() CONSTRAINT party_public_id_key UNIQUE,
  number bigint NOT NULL CONSTRAINT party_number_key UNIQUE,
  name text NOT NULL CONSTRAINT party_name_given CHECK (length(btrim(name)) BETWEEN 1 AND 200),
  is_customer boolean NOT NULL DEFAULT false,
  is_supplier boolean NOT NULL DEFAULT false,
  is_consignor boolean NOT NULL DEFAULT false,
  is_broker boolean NOT NULL DEFAULT false,
  is_laboratory boolean NOT NULL DEFAULT false,
  is_workshop boolean NOT NULL DEFAULT false,
  town text NOT NULL DEFAULT '',
  country text NOT NULL DEFAULT '',
  address text NOT NULL DEFAULT '',
  email text NOT NULL DEFAULT '',
  phone text NOT NULL DEFAULT '',
  contact text NOT NULL DEFAULT '',
  tax_number text NOT NULL DEFAULT '',
  currency text NOT NULL CONSTRAINT party_currency_known REFERENCES currency,
  memo_days integer NOT NULL DEFAULT 14,
  payment_days integer NOT NULL DEFAULT 30,
  terms text NOT NULL DEFAULT '',
  credit_limit bigint,
  memo_limit bigint,
  identity_papers_until date,
  resale_certificate_until date,
  sanctions_checked_on date,
  sanctions_checked_by bigint CONSTRAINT party_sanctions_person_known REFERENCES person,
  is_muted boolean NOT NULL DEFAULT false,
  note text NOT NULL DEFAULT '',
  version integer NOT NULL DEFAULT 1,
  created_at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT party_limits_not_negative CHECK (coalesce(credit_limit, 0) >= 0 AND coalesce(memo_limit, 0) >= 0),
  CONSTRAINT party_days_sane CHECK (memo_days BETWEEN 0 AND 3650 AND payment_days BETWEEN 0 AND 3650),
  CONSTRAINT party_has_a_part CHECK (
    is_customer OR is_supplier OR is_consignor OR is_broker OR is_laboratory OR is_workshop)
);
CREATE INDEX party_by_name ON party (lower(name));
ALTER TABLE person ADD CONSTRAINT person_party_known FOREIGN KEY (party_id) REFERENCES party;

/* The next customer number, gap-free: the counter row is locked until the caller commits. */
CREATE FUNCTION take_customer_number() RETURNS bigint LANGUAGE sql SECURITY DEFINER
SET search_path = pg_catalog, public, pg_temp AS $$
  UPDATE number_series SET next = next + 1 WHERE series = 'customer' RETURNING next - 1
$$;

CREATE TABLE place (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT place_pkey PRIMARY KEY,
  kind text NOT NULL CONSTRAINT place_kind_known CHECK (kind IN (
    'drawer', 'show', 'person', 'return desk', 'quarantine', 'laboratory', 'workshop', 'memo', 'kept',
    'missing', 'supplier', 'memo in', 'sold', 'loss', 'charges', 'conversion')),
  name text NOT NULL,
  safe text NOT NULL DEFAULT '',
  purpose text NOT NULL DEFAULT '',
  party_id bigint CONSTRAINT place_party_known REFERENCES party,
  person_id bigint CONSTRAINT place_person_known REFERENCES person,
  memo_id bigint,
  -- Due back to the consignor, for what came in on memo.
  due date,
  is_closed boolean NOT NULL DEFAULT false,
  inside boolean NOT NULL GENERATED ALWAYS AS (kind NOT IN (
    'supplier', 'memo in', 'sold', 'loss', 'charges', 'conversion')) STORED,
  part text GENERATED ALWAYS AS (CASE
    WHEN kind IN ('drawer', 'show', 'quarantine') THEN 'safe'
    WHEN kind IN ('memo', 'laboratory', 'workshop', 'person') THEN 'out'
    WHEN kind = 'return desk' THEN 'returned'
    WHEN kind IN ('kept', 'sold') THEN 'sold'
    WHEN kind = 'missing' THEN 'missing' END) STORED,
  CONSTRAINT place_id_kind_key UNIQUE (id, kind),
  CONSTRAINT place_names_its_holder CHECK (
    (kind <> 'person' OR person_id IS NOT NULL)
    AND (kind NOT IN ('laboratory', 'workshop', 'memo in') OR party_id IS NOT NULL)
    AND (kind IN ('memo', 'kept')) = (memo_id IS NOT NULL))
);
CREATE UNIQUE INDEX place_one_of_its_kind ON place (kind) WHERE kind IN (
  'return desk', 'quarantine', 'missing', 'supplier', 'sold', 'loss', 'charges', 'conversion');
CREATE UNIQUE INDEX place_drawer_name ON place (safe, lower(name)) WHERE kind IN ('drawer', 'show');
CREATE UNIQUE INDEX place_of_memo ON place (memo_id, kind) WHERE memo_id IS NOT NULL;
CREATE UNIQUE INDEX place_of_person ON place (person_id) WHERE kind = 'person';
CREATE UNIQUE INDEX place_of_house_of_work ON place (party_id, kind) WHERE kind IN ('laboratory', 'workshop');
INSERT INTO place (kind, name) VALUES
  ('return desk', 'Return desk'), ('quarantine', 'Quarantine'), ('missing', 'Missing'),
  ('supplier', 'Supplier'), ('sold', 'Sold'), ('loss', 'Loss'), ('charges', 'Charges'),
  ('conversion', 'Conversion');
`;
