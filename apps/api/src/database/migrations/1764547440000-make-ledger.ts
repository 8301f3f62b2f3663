import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Movements, postings, balances, and the papers and differences that hang on them. */
export class MakeLedger1764547440000 implements MigrationInterface {
  readonly name = 'MakeLedger1764547440000';

  async up(db: QueryRunner): Promise<void> {
    await db.query(PAPERS);
    await db.query(LEDGER);
    await db.query(AROUND);
  }

  async down(db: QueryRunner): Promise<void> {
    await db.query(`
      ALTER TABLE place DROP CONSTRAINT place_memo_known;
      DROP TABLE to_seal, seal_member, seal, idempotency, memo_word, draft, document, weighing,
        memo_keep, balance, posting, difference, memo_line, memo, movement;
    `);
  }
}

const PAPERS = String.raw`
CREATE TABLE movement (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT movement_pkey PRIMARY KEY,
  kind text NOT NULL CONSTRAINT movement_kind_known CHECK (kind IN (
    'opening', 'purchase', 'consignment in', 'bought from consignor', 'return to consignor',
    'return to supplier', 'transfer', 'memo out', 'memo return', 'memo void', 'put away', 'kept',
    'un-kept', 'sale', 'credit return', 'difference opened', 'difference answered', 'restatement',
    'conversion', 'recut', 'laboratory out', 'laboratory back', 'workshop out', 'workshop back',
    'charge', 'write-down', 'count adjustment', 'write-off', 'found again', 'correction', 'reversal')),
  word text CONSTRAINT movement_word_known CHECK (
    word IN ('split', 'pick', 'mix', 'sort', 'test result', 'make', 'break')),
  business_date date NOT NULL CONSTRAINT movement_date_finite CHECK (isfinite(business_date)),
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  person_id bigint NOT NULL CONSTRAINT movement_person_known REFERENCES person,
  party_id bigint CONSTRAINT movement_party_known REFERENCES party,
  memo_id bigint,
  paper text NOT NULL DEFAULT '',
  reason text NOT NULL DEFAULT '',
  request_id text NOT NULL,
  reverses bigint CONSTRAINT movement_reverses_known REFERENCES movement
    CONSTRAINT movement_reversed_once UNIQUE,
  corrects bigint CONSTRAINT movement_corrects_known REFERENCES movement,
  transaction_id xid8 NOT NULL DEFAULT pg_current_xact_id(),
  CONSTRAINT movement_request_key UNIQUE (person_id, request_id),
  CONSTRAINT movement_conversion_has_word CHECK ((kind = 'conversion') = (word IS NOT NULL)),
  CONSTRAINT movement_reversal_names_one CHECK ((kind = 'reversal') = (reverses IS NOT NULL)),
  CONSTRAINT movement_correction_names_one CHECK ((kind = 'correction') = (corrects IS NOT NULL)),
  CONSTRAINT movement_reason_where_due CHECK (
    kind NOT IN ('reversal', 'correction', 'write-off', 'write-down', 'count adjustment', 'memo void')
    OR length(btrim(reason)) > 0)
);

CREATE TABLE memo (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT memo_pkey PRIMARY KEY,
  public_id uuid NOT NULL DEFAULT gen_random_uuid() CONSTRAINT memo_public_id_key UNIQUE,
  number bigint NOT NULL CONSTRAINT memo_number_key UNIQUE,
  party_id bigint NOT NULL CONSTRAINT memo_party_known REFERENCES party,
  person_id bigint NOT NULL CONSTRAINT memo_person_known REFERENCES person,
  business_date date NOT NULL,
  due date NOT NULL,
  prices_until date,
  handed_to text NOT NULL DEFAULT '',
  carried_by text NOT NULL DEFAULT '',
  terms text NOT NULL DEFAULT '',
  remarks text NOT NULL DEFAULT '',
  deposit_percent integer,
  currency text NOT NULL CONSTRAINT memo_currency_known REFERENCES currency,
  rate numeric(20, 8) NOT NULL CONSTRAINT memo_rate_positive CHECK (rate > 0),
  -- Frozen when it is sent, thousandths of a carat.
  step smallint NOT NULL, stone_tolerance integer NOT NULL, parcel_tolerance integer NOT NULL,
  void_movement_id bigint CONSTRAINT memo_void_movement_known REFERENCES movement,
  is_settled boolean NOT NULL DEFAULT false,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT memo_due_after_date CHECK (due >= business_date)
);
CREATE INDEX memo_by_party ON memo (party_id, number DESC);
CREATE INDEX memo_open_by_due ON memo (due, number) WHERE NOT is_settled;
ALTER TABLE place ADD CONSTRAINT place_memo_known FOREIGN KEY (memo_id) REFERENCES memo;
ALTER TABLE movement ADD CONSTRAINT movement_memo_known FOREIGN KEY (memo_id) REFERENCES memo;
CREATE INDEX movement_by_memo ON movement (memo_id, id) WHERE memo_id IS NOT NULL;

CREATE TABLE memo_line (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT memo_line_pkey PRIMARY KEY,
  memo_id bigint NOT NULL CONSTRAINT memo_line_memo_known REFERENCES memo,
  lot_id bigint NOT NULL CONSTRAINT memo_line_lot_known REFERENCES lot,
  position integer NOT NULL,
  -- Minor units of the memo's currency for a carat, or a sum agreed for the whole line.
  price bigint, agreed_sum bigint,
  -- What the price is multiplied by: a graded stone's stated weight, else the weight sent.
  priced_weight bigint NOT NULL CONSTRAINT memo_line_priced_weight_positive CHECK (priced_weight > 0),
  due date, remarks text NOT NULL DEFAULT '',
  is_estimated boolean NOT NULL DEFAULT false,
  sent_weight bigint NOT NULL DEFAULT 0, sent_pieces bigint NOT NULL DEFAULT 0,
  returned_weight bigint NOT NULL DEFAULT 0, returned_pieces bigint NOT NULL DEFAULT 0,
  kept_weight bigint NOT NULL DEFAULT 0, kept_pieces bigint NOT NULL DEFAULT 0,
  converted_weight bigint NOT NULL DEFAULT 0, converted_pieces bigint NOT NULL DEFAULT 0,
  missing_weight bigint NOT NULL DEFAULT 0, missing_pieces bigint NOT NULL DEFAULT 0,
  written_off_weight bigint NOT NULL DEFAULT 0, written_off_pieces bigint NOT NULL DEFAULT 0,
  restated_weight bigint NOT NULL DEFAULT 0, restated_pieces bigint NOT NULL DEFAULT 0,
  out_weight bigint NOT NULL GENERATED ALWAYS AS (sent_weight - returned_weight - kept_weight
    - converted_weight - missing_weight - written_off_weight - restated_weight) STORED,
  out_pieces bigint NOT NULL GENERATED ALWAYS AS (sent_pieces - returned_pieces - kept_pieces
    - converted_pieces - missing_pieces - written_off_pieces - restated_pieces) STORED,
  CONSTRAINT memo_line_lot_once UNIQUE (memo_id, lot_id),
  CONSTRAINT memo_line_position_once UNIQUE (memo_id, position),
  CONSTRAINT memo_line_id_lot_key UNIQUE (id, lot_id),
  CONSTRAINT memo_line_price_or_sum CHECK ((price IS NULL) <> (agreed_sum IS NULL)),
  CONSTRAINT memo_line_price_not_negative CHECK (coalesce(price, agreed_sum) >= 0),
  CONSTRAINT memo_line_identity CHECK (
    out_weight >= 0 AND out_pieces >= 0 AND sent_weight >= 0 AND sent_pieces >= 0
    AND returned_weight >= 0 AND kept_weight >= 0 AND converted_weight >= 0
    AND missing_weight >= 0 AND missing_pieces >= 0 AND written_off_weight >= 0),
  CONSTRAINT memo_line_closes_together CHECK (
    (out_pieces = 0 OR out_weight > 0) AND (out_weight = 0 OR out_pieces > 0 OR is_estimated))
);
CREATE INDEX memo_line_by_lot ON memo_line (lot_id);
CREATE INDEX memo_line_open ON memo_line (memo_id) WHERE out_weight > 0;

CREATE TABLE difference (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT difference_pkey PRIMARY KEY,
  lot_id bigint NOT NULL CONSTRAINT difference_lot_known REFERENCES lot,
  memo_line_id bigint,
  kind text NOT NULL CONSTRAINT difference_kind_known CHECK (kind IN (
    'short', 'pieces short', 'not found', 'excess', 'other weight', 'suspected switch')),
  expected_weight bigint NOT NULL, found_weight bigint NOT NULL,
  expected_pieces bigint NOT NULL DEFAULT 0, found_pieces bigint NOT NULL DEFAULT 0,
  held_weight bigint NOT NULL DEFAULT 0, held_pieces bigint NOT NULL DEFAULT 0,
  came_lot_id bigint CONSTRAINT difference_came_lot_known REFERENCES lot,
  opened_by bigint NOT NULL CONSTRAINT difference_opener_known REFERENCES person,
  opened_at timestamptz NOT NULL DEFAULT clock_timestamp(),
  opened_on date NOT NULL,
  asked_at timestamptz,
  answer text CONSTRAINT difference_answer_known CHECK (answer IN (
    'customer keeps it', 'accepted', 'found again', 'record corrected', 'our short weighing',
    'their short weighing', 'new report', 'damaged', 'written off', 'other stone', 'undone')),
  answered_by bigint CONSTRAINT difference_answerer_known REFERENCES person,
  answered_at timestamptz,
  reason text NOT NULL DEFAULT '',
  -- Nobody else active could answer: allowed with a reason, and listed by verify.
  is_sole_answer boolean NOT NULL DEFAULT false,
  CONSTRAINT difference_line_known FOREIGN KEY (memo_line_id, lot_id) REFERENCES memo_line (id, lot_id),
  CONSTRAINT difference_answered_whole CHECK (
    (answer IS NULL) = (answered_by IS NULL) AND (answer IS NULL) = (answered_at IS NULL)),
  CONSTRAINT difference_not_by_who_weighed CHECK (
    answered_by IS NULL OR answered_by <> opened_by OR answer = 'undone'
    OR (is_sole_answer AND length(btrim(reason)) > 0)),
  CONSTRAINT difference_held_not_negative CHECK (held_weight >= 0 AND held_pieces >= 0),
  CONSTRAINT difference_answered_holds_nothing CHECK (
    answer IS NULL OR (held_weight = 0 AND held_pieces = 0)),
  CONSTRAINT difference_kind_holds_nothing CHECK (
    kind NOT IN ('excess', 'other weight', 'suspected switch') OR (held_weight = 0 AND held_pieces = 0))
);
CREATE INDEX difference_open ON difference (id) WHERE answer IS NULL;
CREATE INDEX difference_open_by_lot ON difference (lot_id) WHERE answer IS NULL;
CREATE INDEX difference_by_line ON difference (memo_line_id);
`;

const LEDGER = String.raw`
CREATE TABLE posting (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT posting_pkey PRIMARY KEY,
  movement_id bigint NOT NULL CONSTRAINT posting_movement_known REFERENCES movement,
  lot_id bigint NOT NULL CONSTRAINT posting_lot_known REFERENCES lot,
  place_id bigint NOT NULL,
  place_kind text NOT NULL,
  weight bigint NOT NULL, pieces bigint NOT NULL, cost bigint NOT NULL,
  memo_line_id bigint,
  flow text CONSTRAINT posting_flow_known CHECK (flow IN (
    'sent', 'out', 'returned', 'kept', 'converted', 'missing', 'written_off', 'restated')),
  difference_id bigint CONSTRAINT posting_difference_known REFERENCES difference,
  CONSTRAINT posting_place_known FOREIGN KEY (place_id, place_kind) REFERENCES place (id, kind),
  CONSTRAINT posting_line_known FOREIGN KEY (memo_line_id, lot_id) REFERENCES memo_line (id, lot_id),
  CONSTRAINT posting_line_has_flow CHECK ((memo_line_id IS NULL) = (flow IS NULL)),
  CONSTRAINT posting_memo_names_line CHECK (place_kind <> 'memo' OR memo_line_id IS NOT NULL),
  CONSTRAINT posting_missing_names_difference CHECK ((place_kind = 'missing') = (difference_id IS NOT NULL)),
  CONSTRAINT posting_says_something CHECK (weight <> 0 OR pieces <> 0 OR cost <> 0)
);
CREATE INDEX posting_by_movement ON posting (movement_id);
CREATE INDEX posting_by_lot_place ON posting (lot_id, place_id, movement_id);
CREATE INDEX posting_by_line ON posting (memo_line_id) WHERE memo_line_id IS NOT NULL;
CREATE INDEX posting_by_difference ON posting (difference_id) WHERE difference_id IS NOT NULL;

CREATE TABLE balance (
  lot_id bigint NOT NULL CONSTRAINT balance_lot_known REFERENCES lot,
  place_id bigint NOT NULL,
  place_kind text NOT NULL,
  -- Copied from the place and the lot, so that one row can be judged alone.
  inside boolean NOT NULL, is_consigned boolean NOT NULL, is_estimated boolean NOT NULL,
  fixed_pieces integer,
  weight bigint NOT NULL DEFAULT 0, pieces bigint NOT NULL DEFAULT 0, cost bigint NOT NULL DEFAULT 0,
  reserved_weight bigint NOT NULL DEFAULT 0, reserved_pieces bigint NOT NULL DEFAULT 0,
  last_date date NOT NULL DEFAULT '-infinity',
  last_movement_id bigint,
  CONSTRAINT balance_pkey PRIMARY KEY (lot_id, place_id),
  CONSTRAINT balance_place_known FOREIGN KEY (place_id, place_kind) REFERENCES place (id, kind),
  CONSTRAINT balance_never_negative CHECK (NOT inside OR (weight >= 0 AND pieces >= 0 AND cost >= 0)),
  -- No more comes back by credit notes than was sold, nor its cost.
  CONSTRAINT balance_sold_not_negative CHECK (place_kind <> 'sold'
    OR (weight >= 0 AND pieces >= 0 AND cost >= 0 AND (weight > 0 OR cost = 0))),
  CONSTRAINT balance_nothing_left_over CHECK (NOT inside OR weight > 0
    OR (cost = 0 AND (pieces = 0 OR place_kind = 'missing'))),
  CONSTRAINT balance_pieces_weigh CHECK (NOT inside OR is_estimated OR place_kind = 'missing' OR pieces <= weight),
  CONSTRAINT balance_weight_has_pieces CHECK (NOT inside OR weight = 0 OR pieces > 0 OR is_estimated
    OR place_kind = 'missing' OR (place_kind = 'quarantine' AND fixed_pieces IS NULL)),
  CONSTRAINT balance_stone_whole CHECK (NOT inside OR fixed_pieces IS NULL OR pieces IN (0, fixed_pieces)),
  CONSTRAINT balance_stone_in_one_place EXCLUDE USING btree (lot_id WITH =)
    WHERE (inside AND fixed_pieces IS NOT NULL AND pieces > 0) DEFERRABLE INITIALLY DEFERRED,
  CONSTRAINT balance_consigned_no_cost CHECK (NOT is_consigned OR cost = 0),
  CONSTRAINT balance_reserved_within CHECK (reserved_weight BETWEEN 0 AND greatest(weight, 0)
    AND reserved_pieces BETWEEN 0 AND greatest(pieces, 0))
);
CREATE INDEX balance_by_place ON balance (place_id) WHERE weight <> 0 OR pieces <> 0;

CREATE TABLE memo_keep (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT memo_keep_pkey PRIMARY KEY,
  movement_id bigint NOT NULL CONSTRAINT memo_keep_movement_known REFERENCES movement,
  memo_line_id bigint NOT NULL CONSTRAINT memo_keep_line_known REFERENCES memo_line,
  weight bigint NOT NULL, pieces bigint NOT NULL,
  price bigint, agreed_sum bigint,
  -- Minor units of the memo's currency; negative where un-kept.
  amount bigint NOT NULL
);
CREATE INDEX memo_keep_by_line ON memo_keep (memo_line_id);

CREATE TABLE weighing (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT weighing_pkey PRIMARY KEY,
  number bigint NOT NULL CONSTRAINT weighing_number_key UNIQUE,
  lot_id bigint NOT NULL CONSTRAINT weighing_lot_known REFERENCES lot,
  purpose text NOT NULL CONSTRAINT weighing_purpose_known
    CHECK (purpose IN ('taken in', 'return', 'again', 'transfer', 'check')),
  weight bigint NOT NULL CONSTRAINT weighing_not_negative CHECK (weight >= 0 AND coalesce(pieces, 0) >= 0),
  pieces bigint,
  report_read text NOT NULL DEFAULT '',
  memo_line_id bigint CONSTRAINT weighing_line_known REFERENCES memo_line,
  movement_id bigint CONSTRAINT weighing_movement_known REFERENCES movement,
  difference_id bigint CONSTRAINT weighing_difference_known REFERENCES difference,
  person_id bigint NOT NULL CONSTRAINT weighing_person_known REFERENCES person,
  business_date date NOT NULL,
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);
CREATE INDEX weighing_by_lot ON weighing (lot_id, id);
CREATE INDEX weighing_by_line ON weighing (memo_line_id);

CREATE TABLE document (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT document_pkey PRIMARY KEY,
  kind text NOT NULL CONSTRAINT document_kind_known CHECK (kind IN (
    'memo', 'extended memo', 're-priced memo', 'transferred memo', 'void memo', 'return slip')),
  number text NOT NULL CONSTRAINT document_number_key UNIQUE,
  memo_id bigint CONSTRAINT document_memo_known REFERENCES memo,
  movement_id bigint CONSTRAINT document_movement_known REFERENCES movement,
  person_id bigint NOT NULL CONSTRAINT document_person_known REFERENCES person,
  -- The canonical snapshot with its number in it, and its SHA-256.
  snapshot text NOT NULL,
  hash bytea NOT NULL CONSTRAINT document_hash_of_snapshot CHECK (hash = sha256(convert_to(snapshot, 'UTF8'))),
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);
CREATE INDEX document_by_memo ON document (memo_id, id);
`;

const AROUND = String.raw`
CREATE TABLE draft (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT draft_pkey PRIMARY KEY,
  kind text NOT NULL DEFAULT 'memo' CONSTRAINT draft_kind_known CHECK (kind IN ('memo')),
  person_id bigint NOT NULL CONSTRAINT draft_person_known REFERENCES person,
  party_id bigint CONSTRAINT draft_party_known REFERENCES party,
  body jsonb NOT NULL DEFAULT '{}',
  -- Why it waits for an owner; empty while it doesn't.
  waits_because text NOT NULL DEFAULT '',
  version integer NOT NULL DEFAULT 1,
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);

CREATE TABLE memo_word (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT memo_word_pkey PRIMARY KEY,
  memo_id bigint NOT NULL CONSTRAINT memo_word_memo_known REFERENCES memo,
  person_id bigint CONSTRAINT memo_word_person_known REFERENCES person,
  is_theirs boolean NOT NULL DEFAULT false,
  words text NOT NULL CONSTRAINT memo_word_given CHECK (length(btrim(words)) BETWEEN 1 AND 2000),
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);
CREATE INDEX memo_word_by_memo ON memo_word (memo_id, id);

CREATE TABLE idempotency (
  person_id bigint NOT NULL CONSTRAINT idempotency_person_known REFERENCES person,
  key text NOT NULL CONSTRAINT idempotency_key_form CHECK (length(key) BETWEEN 16 AND 255),
  body_hash text NOT NULL,
  answer jsonb,
  at timestamptz NOT NULL DEFAULT clock_timestamp(),
  CONSTRAINT idempotency_pkey PRIMARY KEY (person_id, key)
);
CREATE INDEX idempotency_by_age ON idempotency (at);

CREATE TABLE seal (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT seal_pkey PRIMARY KEY,
  previous_id bigint CONSTRAINT seal_previous_known REFERENCES seal CONSTRAINT seal_previous_once UNIQUE,
  hash bytea NOT NULL,
  at timestamptz NOT NULL DEFAULT clock_timestamp()
);
CREATE UNIQUE INDEX seal_one_first ON seal ((previous_id IS NULL)) WHERE previous_id IS NULL;
CREATE TABLE seal_member (
  seal_id bigint NOT NULL CONSTRAINT seal_member_seal_known REFERENCES seal,
  position integer NOT NULL,
  movement_id bigint CONSTRAINT seal_member_movement_known REFERENCES movement
    CONSTRAINT seal_member_movement_once UNIQUE,
  document_id bigint CONSTRAINT seal_member_document_known REFERENCES document
    CONSTRAINT seal_member_document_once UNIQUE,
  CONSTRAINT seal_member_pkey PRIMARY KEY (seal_id, position),
  CONSTRAINT seal_member_is_one CHECK (num_nonnulls(movement_id, document_id) = 1)
);
-- What is written and not yet sealed; a queue, so that the worker never scans the whole history.
CREATE TABLE to_seal (
  id bigint GENERATED ALWAYS AS IDENTITY CONSTRAINT to_seal_pkey PRIMARY KEY,
  movement_id bigint CONSTRAINT to_seal_movement_once UNIQUE
    CONSTRAINT to_seal_movement_known REFERENCES movement,
  document_id bigint CONSTRAINT to_seal_document_once UNIQUE
    CONSTRAINT to_seal_document_known REFERENCES document
);
`;
