import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * What carries a stock number. The parts of the balance bar stand on the lot, kept by the
 * posting trigger, so that a list of 200,000 lots is sorted and summed without the ledger.
 */
export class MakeLots1764547380000 implements MigrationInterface {
  readonly name = 'MakeLots1764547380000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(UP);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP TABLE saved_sieve, lot_change, lot_report, lot;
    `);
  }
}

const UP = String.raw`
CREATE TABLE lot (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT lot_pkey PRIMARY KEY,
  public_id uuid NOT NULL DEFAULT gen_random_uuid() CONSTRAINT lot_public_id_key UNIQUE,
  number text NOT NULL CONSTRAINT lot_number_key UNIQUE
    CONSTRAINT lot_number_form CHECK (number ~ '^[1-9][0-9]{0,11}[A-Z]{0,3}$'),
  kind text NOT NULL CONSTRAINT lot_kind_known CHECK (kind IN ('stone', 'pair', 'parcel')),
  owner_party_id bigint CONSTRAINT lot_owner_known REFERENCES party,
  source_party_id bigint CONSTRAINT lot_source_known REFERENCES party,
  -- A stone, pair or set has a fixed number of pieces; a parcel has none.
  fixed_pieces integer,
  is_estimated boolean NOT NULL DEFAULT false,
  origin text NOT NULL CONSTRAINT lot_origin_known
    CHECK (origin IN ('natural', 'laboratory-grown', 'not tested')),
  -- The disclosure, '' for none: goods of different words never share a lot.
  treatment text NOT NULL DEFAULT '',
  shape text NOT NULL DEFAULT '',
  sieve_from text NOT NULL DEFAULT '',
  sieve_to text NOT NULL DEFAULT '',
  -- Ranks: colour D = 1 to Z = 23, clarity FL = 1 to I3 = 11, make Excellent = 1 to Poor = 5.
  colour_from smallint, colour_to smallint, fancy_colour text NOT NULL DEFAULT '',
  clarity_from smallint, clarity_to smallint,
  cut smallint, polish smallint, symmetry smallint,
  fluorescence text NOT NULL DEFAULT '',
  -- Thousandths of a millimetre: least and greatest diameter, or length and width; then depth.
  measure_a integer, measure_b integer, measure_depth integer,
  -- Thousandths of a carat, as the report states it.
  stated_weight bigint,
  report_laboratory text NOT NULL DEFAULT '',
  report_number text NOT NULL DEFAULT '',
  report_date date,
  mining_country text NOT NULL DEFAULT '',
  mining_evidence text NOT NULL DEFAULT '',
  -- Proportions, inscription, shade, milkiness, eye-clean, comments, members, as written by the source.
  particulars jsonb NOT NULL DEFAULT '{}',
  -- Minor units of the house's price currency for one carat.
  ask_price bigint, floor_price bigint,
  taken_in_on date,
  part_safe bigint NOT NULL DEFAULT 0, part_out bigint NOT NULL DEFAULT 0,
  part_returned bigint NOT NULL DEFAULT 0, part_sold bigint NOT NULL DEFAULT 0,
  part_missing bigint NOT NULL DEFAULT 0, part_pieces bigint NOT NULL DEFAULT 0,
  whole bigint NOT NULL GENERATED ALWAYS AS
    (part_safe + part_out + part_returned + part_sold + part_missing) STORED,
  each_weight bigint NOT NULL GENERATED ALWAYS AS (CASE WHEN part_pieces > 0 THEN
    (part_safe + part_out + part_returned + part_sold + part_missing) / part_pieces ELSE 0 END) STORED,
  is_living boolean NOT NULL DEFAULT false,
  version integer NOT NULL DEFAULT 1,
  created_at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT lot_pieces_fit_kind CHECK (CASE kind
    WHEN 'stone' THEN fixed_pieces = 1 WHEN 'pair' THEN fixed_pieces >= 2 ELSE fixed_pieces IS NULL END),
  CONSTRAINT lot_estimate_is_of_parcel CHECK (NOT is_estimated OR kind = 'parcel'),
  CONSTRAINT lot_grades_in_scale CHECK (
    coalesce(colour_from, 1) BETWEEN 1 AND 23 AND coalesce(colour_to, 23) BETWEEN 1 AND 23
    AND coalesce(clarity_from, 1) BETWEEN 1 AND 11 AND coalesce(clarity_to, 11) BETWEEN 1 AND 11
    AND coalesce(colour_from <= colour_to, true) AND coalesce(clarity_from <= clarity_to, true)
    AND coalesce(cut, 1) BETWEEN 1 AND 5 AND coalesce(polish, 1) BETWEEN 1 AND 5
    AND coalesce(symmetry, 1) BETWEEN 1 AND 5),
  CONSTRAINT lot_prices_not_negative CHECK (coalesce(ask_price, 0) >= 0 AND coalesce(floor_price, 0) >= 0),
  CONSTRAINT lot_measures_positive CHECK (
    coalesce(measure_a, 1) > 0 AND coalesce(measure_b, 1) > 0 AND coalesce(measure_depth, 1) > 0
    AND coalesce(stated_weight, 1) > 0),
  CONSTRAINT lot_report_whole CHECK ((report_laboratory = '') = (report_number = ''))
);
CREATE UNIQUE INDEX lot_report_of_living ON lot (lower(report_laboratory), upper(report_number))
  WHERE is_living AND report_number <> '';
CREATE INDEX lot_by_shape ON lot (shape, colour_from, clarity_from, each_weight) WHERE is_living;
CREATE INDEX lot_by_weight ON lot (whole, id);
CREATE INDEX lot_by_each ON lot (each_weight, id);
CREATE INDEX lot_by_ask ON lot (ask_price, id);
CREATE INDEX lot_by_report ON lot (upper(report_number)) WHERE report_number <> '';
CREATE INDEX lot_by_owner ON lot (owner_party_id) WHERE owner_party_id IS NOT NULL;

CREATE TABLE lot_report (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT lot_report_pkey PRIMARY KEY,
  lot_id bigint NOT NULL CONSTRAINT lot_report_lot_known REFERENCES lot,
  laboratory text NOT NULL,
  number text NOT NULL,
  on_date date,
  standing text NOT NULL CONSTRAINT lot_report_standing_known
    CHECK (standing IN ('second', 'superseded', 'claimed', 'member')),
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);
CREATE INDEX lot_report_by_number ON lot_report (upper(number));
CREATE INDEX lot_report_by_lot ON lot_report (lot_id);

CREATE TABLE lot_change (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT lot_change_pkey PRIMARY KEY,
  lot_id bigint NOT NULL CONSTRAINT lot_change_lot_known REFERENCES lot,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  person_id bigint NOT NULL CONSTRAINT lot_change_person_known REFERENCES person,
  field text NOT NULL,
  was jsonb,
  became jsonb
);
CREATE INDEX lot_change_by_lot ON lot_change (lot_id, id);

CREATE TABLE saved_sieve (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT saved_sieve_pkey PRIMARY KEY,
  person_id bigint NOT NULL CONSTRAINT saved_sieve_person_known REFERENCES person,
  name text NOT NULL CONSTRAINT saved_sieve_name_given CHECK (length(btrim(name)) BETWEEN 1 AND 100),
  sieve text NOT NULL,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT saved_sieve_name_key UNIQUE (person_id, name)
);
`;
