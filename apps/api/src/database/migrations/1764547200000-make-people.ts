import type { MigrationInterface, QueryRunner } from 'typeorm';

/** People, their sessions, and how often a name or an address has guessed. */
export class MakePeople1764547200000 implements MigrationInterface {
  readonly name = 'MakePeople1764547200000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(`
      CREATE TABLE person (
        id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT person_pkey PRIMARY KEY,
        email text NOT NULL CONSTRAINT person_email_form CHECK (email ~ '^[^@[:space:]]+@[^@[:space:]]+$' AND length(email) <= 254),
        name text NOT NULL CONSTRAINT person_name_given CHECK (length(btrim(name)) BETWEEN 1 AND 200),
        password_hash text,
        must_change_password boolean NOT NULL DEFAULT false,
        roles text[] NOT NULL CONSTRAINT person_roles_known CHECK (
          roles <@ ARRAY['owner', 'dealer', 'buyer', 'bookkeeper', 'retailer'] AND cardinality(roles) > 0),
        sees_cost boolean NOT NULL DEFAULT false,
        party_id bigint,
        disabled_at timestamptz,
        last_here_at timestamptz,
        preferences jsonb NOT NULL DEFAULT '{}',
        version integer NOT NULL DEFAULT 1,
        created_at timestamptz NOT NULL DEFAULT clock_timestamp()
      );
      CREATE UNIQUE INDEX person_email_unique ON person (lower(email));

      CREATE TABLE session (
        sid varchar CONSTRAINT session_pkey PRIMARY KEY,
        sess json NOT NULL,
        expire timestamp(6) NOT NULL
      );
      CREATE INDEX session_by_expiry ON session (expire);
      CREATE INDEX session_by_person ON session ((sess ->> 'personId'));

      CREATE TABLE throttle (
        key text CONSTRAINT throttle_pkey PRIMARY KEY,
        failures integer NOT NULL DEFAULT 0,
        since timestamptz NOT NULL DEFAULT clock_timestamp(),
        waits_until timestamptz
      );
    `);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query('DROP TABLE throttle, session, person;');
  }
}
