/** The guards that would speak first stand aside, so that the constraint itself is asked. */
const aside = (table: string, sql: string) => `ALTER TABLE ${table} DISABLE TRIGGER USER; ${sql}`;
const movement = (kind: string, more: Record<string, string> = {}) => {
  const columns = ['kind', 'business_date', 'person_id', 'request_id', ...Object.keys(more)];
  const values = [`'${kind}'`, 'house_today()', '1', `'attack'`, ...Object.values(more)];
  return `INSERT INTO movement (${columns.join(', ')}) VALUES (${values.join(', ')})`;
};
const lot = (columns: string, values: string) => `INSERT INTO lot (${columns}) VALUES (${values})`;
const posting = (columns: string, values: string) =>
  `${movement('transfer')}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost, ${columns})
   SELECT currval('movement_id_seq'), 1, id, kind, 1, 0, 0, ${values} FROM place WHERE kind = 'memo'`;
const weighing = (purpose: string, weight: number) =>
  `INSERT INTO weighing (number, lot_id, purpose, weight, person_id, business_date) VALUES (99, 1, '${purpose}', ${weight}, 1, '2026-01-05')`;
const legs = (lotId: string, ...sides: [string, number, number][]) =>
  `${movement('transfer')}; ${sides
    .map(
      ([kind, weight, pieces]) =>
        `INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost)
         SELECT currval('movement_id_seq'), (${lotId.startsWith('SELECT') ? lotId : `SELECT ${lotId}`}), min(id), kind, ${weight}, ${pieces}, 0
         FROM place WHERE kind = '${kind}' GROUP BY kind`,
    )
    .join('; ')}`;
const answered = `answered_by = 1, answered_at = now(), held_weight = 0, held_pieces = 0`;

/** One statement for each rule that a single row can break, by the rule's name. */
export const CHECK_ATTACKS: Record<string, string> = {
  balance_reserved_within: 'UPDATE balance SET reserved_weight = -1',
  currency_code_form: `INSERT INTO currency VALUES ('usd', 2)`,
  currency_minor_digits: `INSERT INTO currency VALUES ('XXA', 9)`,
  currency_rate_date_finite: `INSERT INTO currency_rate (currency, on_date, rate) VALUES ('EUR', 'infinity', 1)`,
  difference_answer_known: aside(
    'difference',
    `UPDATE difference SET answer = 'shrug', ${answered}`,
  ),
  difference_answered_whole: aside(
    'difference',
    `UPDATE difference SET answer = 'accepted', held_weight = 0, held_pieces = 0`,
  ),
  difference_held_not_negative: aside('difference', 'UPDATE difference SET held_weight = -1'),
  difference_kind_holds_nothing: aside('difference', `UPDATE difference SET kind = 'excess'`),
  difference_kind_known: aside('difference', `UPDATE difference SET kind = 'odd'`),
  document_kind_known: `INSERT INTO document (kind, number, person_id, snapshot, hash) VALUES ('letter', 'X', 1, 'a', sha256('a'))`,
  draft_kind_known: `INSERT INTO draft (kind, person_id) VALUES ('poem', 1)`,
  house_amounts_sane: 'UPDATE house SET memo_days = -1',
  house_name_given: `UPDATE house SET name = ' '`,
  house_step_known: aside('house', 'UPDATE house SET step = 7'),
  idempotency_key_form: `INSERT INTO idempotency (person_id, key, body_hash) VALUES (1, 'short', 'h')`,
  lot_estimate_is_of_parcel: lot(
    'number, kind, fixed_pieces, is_estimated, origin',
    `'999', 'stone', 1, true, 'natural'`,
  ),
  lot_grades_in_scale: 'UPDATE lot SET colour_from = 99',
  lot_kind_known: lot('number, kind, origin', `'999', 'heap', 'natural'`),
  lot_measures_positive: 'UPDATE lot SET measure_a = 0',
  lot_number_form: lot('number, kind, origin', `'x1', 'parcel', 'natural'`),
  lot_origin_known: lot('number, kind, origin', `'999', 'parcel', 'moon'`),
  lot_pieces_fit_kind: lot('number, kind, fixed_pieces, origin', `'999', 'stone', 2, 'natural'`),
  lot_prices_not_negative: 'UPDATE lot SET ask_price = -1',
  lot_report_whole: `UPDATE lot SET report_number = '1'`,
  lot_report_standing_known: `INSERT INTO lot_report (lot_id, laboratory, number, standing) VALUES (1, 'L', '1', 'odd')`,
  memo_due_after_date: `UPDATE memo SET due = business_date - 1`,
  memo_rate_positive: 'UPDATE memo SET rate = 0',
  memo_line_closes_together: aside(
    'memo_line',
    'UPDATE memo_line SET returned_weight = sent_weight WHERE id = 2',
  ),
  memo_line_identity: aside(
    'memo_line',
    'UPDATE memo_line SET kept_weight = -1, returned_weight = 1 WHERE id = 2',
  ),
  memo_line_price_not_negative: 'UPDATE memo_line SET price = -1',
  memo_line_price_or_sum: 'UPDATE memo_line SET price = NULL',
  memo_line_priced_weight_positive: 'UPDATE memo_line SET priced_weight = 0',
  memo_word_given: `INSERT INTO memo_word (memo_id, words) VALUES (1, ' ')`,
  movement_conversion_has_word: movement('conversion'),
  movement_correction_names_one: movement('correction', { reason: `'x'` }),
  movement_word_known: movement('conversion', { word: `'melt'` }),
  number_series_first_positive: `UPDATE number_series SET first = 0`,
  number_series_runs_on: `UPDATE number_series SET next = 0`,
  party_days_sane: 'UPDATE party SET memo_days = -1',
  party_has_a_part: 'UPDATE party SET is_customer = false, is_consignor = false',
  party_limits_not_negative: 'UPDATE party SET credit_limit = -1',
  party_name_given: `UPDATE party SET name = ' '`,
  person_email_form: `UPDATE person SET email = 'nobody' WHERE id = 1`,
  person_name_given: `UPDATE person SET name = ' '`,
  person_roles_known: `UPDATE person SET roles = '{king}'`,
  place_kind_known: `INSERT INTO place (kind, name) VALUES ('attic', 'x')`,
  place_names_its_holder: `INSERT INTO place (kind, name) VALUES ('person', 'x')`,
  posting_flow_known: posting('memo_line_id, flow', `1, 'gone'`),
  posting_line_has_flow: posting('memo_line_id', '1'),
  saved_sieve_name_given: `INSERT INTO saved_sieve (person_id, name, sieve) VALUES (1, ' ', 'x')`,
  seal_member_is_one: 'INSERT INTO seal_member (seal_id, position) VALUES (1, 99)',
  weighing_not_negative: weighing('check', -1),
  weighing_purpose_known: weighing('fun', 1),
  difference_answerer_known: aside(
    'difference',
    `UPDATE difference SET answer = 'undone', answered_by = -1, answered_at = now(), held_weight = 0, held_pieces = 0`,
  ),
  // What only the goods around it show.
  place_closed_when_empty: `UPDATE place SET is_closed = true WHERE kind = 'drawer'`,
  balance_pieces_weigh: `${lot('number, kind, origin', `'999', 'parcel', 'natural'`)}; ${legs(`SELECT max(id) FROM lot`, ['supplier', -5, -10], ['drawer', 5, 10])}`,
  movement_conversion_conserves: legs('1', ['drawer', -10, -1], ['conversion', 10, 1]),
  missing_is_open_differences: `${movement('difference opened')}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost, difference_id)
    SELECT currval('movement_id_seq'), 3, x.place, x.kind, x.weight, x.pieces, 0, x.difference FROM (VALUES
      ((SELECT min(id) FROM place WHERE kind = 'drawer'), 'drawer', -1200, -1, NULL::bigint),
      ((SELECT id FROM place WHERE kind = 'missing'), 'missing', 1200, 1, 1)) x(place, kind, weight, pieces, difference)`,
  // What only one row may have.
  seal_one_first: `INSERT INTO seal (hash) VALUES ('x')`,
  seal_previous_once: `INSERT INTO seal (previous_id, hash) VALUES (1, 'x'); INSERT INTO seal (previous_id, hash) VALUES (1, 'y')`,
  seal_member_movement_once:
    'INSERT INTO seal_member (seal_id, position, movement_id) VALUES (1, 99, 1)',
  seal_member_document_once:
    'INSERT INTO seal_member (seal_id, position, document_id) VALUES (1, 99, 1)',
  lot_number_key: lot('number, kind, origin', `'1', 'parcel', 'natural'`),
  lot_report_of_living: `UPDATE lot SET report_laboratory = 'L', report_number = '1' WHERE id IN (1, 2)`,
  memo_line_position_once: 'UPDATE memo_line SET position = 1',
  document_number_key: `INSERT INTO document (kind, number, person_id, snapshot, hash) SELECT kind, number, 1, snapshot, hash FROM document`,
  movement_request_key: `${movement('transfer')}; ${movement('transfer')}`,
  weighing_number_key: weighing('check', 1).replace('99', '1'),
  person_email_unique: `INSERT INTO person (email, name, roles) VALUES ('O@HOUSE.TEST', 'x', '{owner}')`,
  party_number_key: `INSERT INTO party (number, name, is_broker, currency) SELECT number, 'x', true, 'USD' FROM party`,
  place_one_of_its_kind: `INSERT INTO place (kind, name) VALUES ('sold', 'x')`,
  place_of_memo: `INSERT INTO place (kind, name, memo_id) VALUES ('memo', 'x', 1)`,
  place_of_person: `INSERT INTO place (kind, name, person_id) VALUES ('person', 'x', 1), ('person', 'y', 1)`,
  place_of_house_of_work: `INSERT INTO place (kind, name, party_id) VALUES ('workshop', 'x', 1), ('workshop', 'y', 1)`,
  place_drawer_name: `INSERT INTO place (kind, name, safe) VALUES ('drawer', '1', 'A')`,
  saved_sieve_name_key: `INSERT INTO saved_sieve (person_id, name, sieve) VALUES (1, 'mine', 'x')`,
  to_seal_movement_once: 'INSERT INTO to_seal (movement_id) VALUES (1), (1)',
  to_seal_document_once: 'INSERT INTO to_seal (document_id) VALUES (1), (1)',
};
