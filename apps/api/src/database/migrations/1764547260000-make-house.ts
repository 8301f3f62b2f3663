import type { MigrationInterface, QueryRunner } from 'typeorm';

/** The house, its currencies and rates, its number series, and the trail of who changed what. */
export class MakeHouse1764547260000 implements MigrationInterface {
  readonly name = 'MakeHouse1764547260000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(UP);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      DROP FUNCTION house_today;
      DROP TABLE audit, number_series, currency_rate, house, currency;
    `);
  }
}

const UP = String.raw`
-- Minor digits of ISO 4217, from memory for those not quoted in the tests.
CREATE TABLE currency (
  code text CONSTRAINT currency_pkey PRIMARY KEY
    CONSTRAINT currency_code_form CHECK (code ~ '^[A-Z]{3}$'),
  minor_digits smallint NOT NULL CONSTRAINT currency_minor_digits CHECK (minor_digits BETWEEN 0 AND 4)
);
INSERT INTO currency (code, minor_digits) VALUES
  ('USD', 2), ('EUR', 2), ('GBP', 2), ('CHF', 2), ('INR', 2), ('ILS', 2), ('AED', 2), ('HKD', 2),
  ('ZAR', 2), ('BWP', 2), ('CAD', 2), ('AUD', 2), ('SGD', 2), ('CNY', 2), ('JPY', 0), ('KRW', 0),
  ('KWD', 3), ('BHD', 3), ('OMR', 3), ('JOD', 3), ('TND', 3);

CREATE TABLE house (
  id smallint NOT NULL DEFAULT 1 CONSTRAINT house_pkey PRIMARY KEY CONSTRAINT house_is_one CHECK (id = 1),
  name text NOT NULL CONSTRAINT house_name_given CHECK (length(btrim(name)) BETWEEN 1 AND 200),
  town text NOT NULL DEFAULT '',
  is_demo boolean NOT NULL DEFAULT false,
  zone text NOT NULL,
  base_currency text NOT NULL CONSTRAINT house_base_currency_known REFERENCES currency,
  price_currency text NOT NULL CONSTRAINT house_price_currency_known REFERENCES currency,
  books_currency text NOT NULL CONSTRAINT house_books_currency_known REFERENCES currency,
  step smallint NOT NULL DEFAULT 10 CONSTRAINT house_step_known CHECK (step IN (1, 10)),
  lock_date date,
  stone_tolerance integer NOT NULL DEFAULT 10,
  parcel_tolerance integer NOT NULL DEFAULT 20,
  formula_percent integer NOT NULL DEFAULT 10,
  sorting_loss_per_mille integer NOT NULL DEFAULT 4,
  accept_limit integer NOT NULL DEFAULT 200,
  write_off_limit integer NOT NULL DEFAULT 100,
  memo_days integer NOT NULL DEFAULT 14,
  invoice_days integer NOT NULL DEFAULT 30,
  deposit_percent integer NOT NULL DEFAULT 0,
  first_limit bigint NOT NULL DEFAULT 0,
  memo_text text NOT NULL DEFAULT '',
  memo_text_version integer NOT NULL DEFAULT 1,
  warranty_text text NOT NULL DEFAULT '',
  insured_to bigint,
  version integer NOT NULL DEFAULT 1,
  CONSTRAINT house_amounts_sane CHECK (
    stone_tolerance BETWEEN 0 AND 1000 AND parcel_tolerance BETWEEN 0 AND 10000
    AND formula_percent BETWEEN 0 AND 100 AND sorting_loss_per_mille BETWEEN 0 AND 1000
    AND accept_limit BETWEEN 0 AND 1000000 AND write_off_limit BETWEEN 0 AND 1000000
    AND memo_days BETWEEN 0 AND 3650 AND invoice_days BETWEEN 0 AND 3650
    AND deposit_percent BETWEEN 0 AND 100 AND first_limit >= 0 AND coalesce(insured_to, 0) >= 0)
);

-- rate: whole base-currency units (major) for one major unit of the currency, on that day.
CREATE TABLE currency_rate (
  currency text NOT NULL CONSTRAINT currency_rate_currency_known REFERENCES currency,
  on_date date NOT NULL CONSTRAINT currency_rate_date_finite CHECK (isfinite(on_date)),
  rate numeric(20, 8) NOT NULL
    CONSTRAINT currency_rate_positive CHECK (rate > 0 AND rate <> 'NaN' AND rate < 1e11),
  person_id bigint CONSTRAINT currency_rate_person_known REFERENCES person,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT currency_rate_pkey PRIMARY KEY (currency, on_date)
);

CREATE TABLE number_series (
  series text CONSTRAINT number_series_pkey PRIMARY KEY,
  mark text NOT NULL,
  first bigint NOT NULL DEFAULT 1 CONSTRAINT number_series_first_positive CHECK (first > 0),
  next bigint NOT NULL DEFAULT 1,
  CONSTRAINT number_series_runs_on CHECK (next >= first)
);
INSERT INTO number_series (series, mark) VALUES
  ('customer', 'C'), ('lot', ''), ('memo', 'M'), ('weighing', 'W');

CREATE TABLE audit (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT audit_pkey PRIMARY KEY,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  person_id bigint CONSTRAINT audit_person_known REFERENCES person,
  action text NOT NULL,
  subject text NOT NULL DEFAULT '',
  detail jsonb NOT NULL DEFAULT '{}'
);
CREATE INDEX audit_by_subject ON audit (subject, id DESC);

/* Today in the house's zone; an empty house has UTC. */
CREATE FUNCTION house_today() RETURNS date LANGUAGE sql STABLE
SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT (clock_timestamp() AT TIME ZONE coalesce((SELECT zone FROM house), 'UTC'))::date
$$;
`;
