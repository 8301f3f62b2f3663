import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { SmallHouse } from './small-house.js';

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
  await house.shortReturn();
});
afterAll(() => house.close());

const movement = (more = '') =>
  `INSERT INTO movement (kind, business_date, person_id, request_id${more ? ', reason' : ''})
   VALUES ('transfer', house_today(), 1, gen_random_uuid()::text${more})`;
const posting = (columns: string) =>
  `INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost)
   SELECT currval('movement_id_seq'), ${columns}`;
const place = (kind: string) => `(SELECT id FROM place WHERE kind = '${kind}' ORDER BY id LIMIT 1)`;
const drawer = place('drawer');
const desk = place('return desk');

/** The owner's plain SQL against each invariant: what is tried, and the rule that refuses it. */
const ATTACKS: [string, string, string][] = [
  [
    'a thousandth of a carat from nowhere',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', 1, 0, 0`)}; ${posting(`1, ${desk}, 'return desk', 0, 0, 1`)}`,
    'movement_conserves',
  ],
  [
    'weight that does not sum to zero',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', -10, 0, 0`)}; ${posting(`1, ${desk}, 'return desk', 11, 0, 0`)}`,
    'movement_conserves',
  ],
  [
    'pieces that do not sum to zero',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', -10, -2, 0`)}; ${posting(`1, ${desk}, 'return desk', 10, 1, 0`)}`,
    'movement_conserves',
  ],
  [
    'a cent that does not sum to zero',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', -10, 0, -5`)}; ${posting(`1, ${desk}, 'return desk', 10, 0, 4`)}`,
    'movement_conserves',
  ],
  ['a movement without legs', movement(), 'movement_has_two_legs'],
  [
    'more than a place holds',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', -99999, 0, 0`)}; ${posting(`1, ${desk}, 'return desk', 99999, 0, 0`)}`,
    'balance_never_negative',
  ],
  [
    'half a stone',
    `${movement()}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost) SELECT currval('movement_id_seq'), 3, x.p, x.k, x.w, x.n, 0 FROM (VALUES (${drawer}, 'drawer', -600, 0), (${desk}, 'return desk', 600, 0)) x(p, k, w, n)`,
    'balance_weight_has_pieces',
  ],
  [
    'a stone in two places',
    `${movement()}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost) SELECT currval('movement_id_seq'), 3, x.p, x.k, x.w, x.n, 0 FROM (VALUES (${place('supplier')}, 'supplier', -600, -1), (${desk}, 'return desk', 600, 1)) x(p, k, w, n)`,
    'balance_stone_in_one_place',
  ],
  [
    'two pieces of one stone',
    `${movement()}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost) SELECT currval('movement_id_seq'), 3, x.p, x.k, x.w, x.n, 0 FROM (VALUES (${place('supplier')}, 'supplier', -600, -1), (${drawer}, 'drawer', 600, 1)) x(p, k, w, n)`,
    'balance_stone_whole',
  ],
  [
    'cost on goods of a consignor',
    `${movement()}; ${posting(`3, ${drawer}, 'drawer', 0, 0, 5`)}`,
    'balance_consigned_no_cost',
  ],
  [
    'cost left where no carats are',
    `${movement()}; ${posting(`2, ${drawer}, 'drawer', 0, 0, 5`)}; ${posting(`2, ${place('charges')}, 'charges', 0, 0, -5`)}`,
    'balance_nothing_left_over',
  ],
  [
    'a leg of an old movement',
    `INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost) VALUES (1, 1, ${drawer}, 'drawer', 1, 0, 0)`,
    'posting_in_its_movement',
  ],
  [
    'a memo leg without its line',
    `${movement()}; ${posting(`1, ${place('memo')}, 'memo', 1, 0, 0`)}`,
    'posting_memo_names_line',
  ],
  [
    'a line of another lot',
    `${movement()}; INSERT INTO posting (movement_id, lot_id, place_id, place_kind, weight, pieces, cost, memo_line_id, flow) VALUES (currval('movement_id_seq'), 3, ${place('memo')}, 'memo', 1, 0, 0, 1, 'sent')`,
    'posting_line_known',
  ],
  [
    'missing without a difference',
    `${movement()}; ${posting(`1, ${place('missing')}, 'missing', 1, 0, 0`)}`,
    'posting_missing_names_difference',
  ],
  [
    'a place under a false kind',
    `${movement()}; ${posting(`1, ${drawer}, 'sold', 1, 0, 0`)}`,
    'posting_place_known',
  ],
  [
    'an empty leg',
    `${movement()}; ${posting(`1, ${drawer}, 'drawer', 0, 0, 0`)}`,
    'posting_says_something',
  ],
  [
    'a date ahead of today',
    `INSERT INTO movement (kind, business_date, person_id, request_id) VALUES ('transfer', house_today() + 1, 1, 'x'); ${posting(`1, ${drawer}, 'drawer', -10, -1, 0`)}; ${posting(`1, ${desk}, 'return desk', 10, 1, 0`)}`,
    'movement_date_not_ahead',
  ],
  [
    'a date before the goods came',
    `INSERT INTO movement (kind, business_date, person_id, request_id) VALUES ('transfer', '2025-12-31', 1, 'x'); ${posting(`1, ${drawer}, 'drawer', -10, -1, 0`)}`,
    'balance_date_in_order',
  ],
  [
    'a date without end',
    `INSERT INTO movement (kind, business_date, person_id, request_id) VALUES ('transfer', 'infinity', 1, 'x')`,
    'movement_date_finite',
  ],
  [
    'a date in locked books',
    `UPDATE house SET lock_date = house_today(); ${movement()}; ${posting(`1, ${drawer}, 'drawer', -10, -1, 0`)}; ${posting(`1, ${desk}, 'return desk', 10, 1, 0`)}`,
    'movement_date_after_lock',
  ],
  [
    'a write-off without a reason',
    `INSERT INTO movement (kind, business_date, person_id, request_id) VALUES ('write-off', house_today(), 1, 'x')`,
    'movement_reason_where_due',
  ],
  [
    'a kind nobody knows',
    `INSERT INTO movement (kind, business_date, person_id, request_id) VALUES ('lost it', house_today(), 1, 'x')`,
    'movement_kind_known',
  ],
  [
    'an undoing of nothing',
    `INSERT INTO movement (kind, business_date, person_id, request_id, reason) VALUES ('reversal', house_today(), 1, 'x', 'y')`,
    'movement_reversal_names_one',
  ],
  [
    'an undoing that is no mirror',
    `INSERT INTO movement (kind, business_date, person_id, request_id, reason, reverses) VALUES ('reversal', house_today(), 1, 'x', 'y', 1); ${posting(`1, ${drawer}, 'drawer', -10, -1, 0`)}; ${posting(`1, ${desk}, 'return desk', 10, 1, 0`)}`,
    'reversal_mirrors',
  ],
  [
    'a balance by hand',
    `UPDATE balance SET weight = weight + 1 WHERE lot_id = 1`,
    'balance_kept_by_postings',
  ],
  ['a balance taken away', `DELETE FROM balance`, 'balance_kept_by_postings'],
  ['a memo line by hand', `UPDATE memo_line SET returned_weight = 1`, 'memo_line_kept_by_postings'],
  [
    'a difference emptied by hand',
    `UPDATE difference SET held_weight = 0`,
    'difference_kept_by_postings',
  ],
  ['a lot’s bar by hand', `UPDATE lot SET part_safe = part_safe + 1`, 'lot_parts_kept_by_postings'],
  [
    'another owner for a lot',
    `UPDATE lot SET owner_party_id = 1 WHERE id = 1`,
    'lot_identity_fixed',
  ],
  [
    'another origin for a lot',
    `UPDATE lot SET origin = 'laboratory-grown' WHERE id = 1`,
    'lot_identity_fixed',
  ],
  [
    'an answer by who weighed',
    `UPDATE difference SET answer = 'accepted', answered_by = opened_by, answered_at = now()`,
    'difference_answered_holds_nothing',
  ],
  [
    'another zone for a house that moved goods',
    `UPDATE house SET zone = 'Asia/Tokyo'`,
    'house_fixed_once_moved',
  ],
  [
    'a second house',
    `INSERT INTO house (id, name, zone, base_currency, price_currency, books_currency) VALUES (2, 'x', 'UTC', 'USD', 'USD', 'USD')`,
    'house_is_one',
  ],
  [
    'the same lot twice on a memo',
    `INSERT INTO memo_line (memo_id, lot_id, position, price, priced_weight) VALUES (1, 1, 9, 1, 1)`,
    'memo_line_lot_once',
  ],
  [
    'a snapshot that does not fit its hash',
    `INSERT INTO document (kind, number, person_id, snapshot, hash) VALUES ('memo', 'M 9', 1, 'a', 'b')`,
    'document_hash_of_snapshot',
  ],
  [
    'a rate that is no number',
    `INSERT INTO currency_rate (currency, on_date, rate) VALUES ('EUR', '2026-01-01', 'NaN')`,
    'currency_rate_positive',
  ],
];

describe('the database says no to its own owner', () => {
  it.each(ATTACKS)('%s', async (_what, sql, rule) => {
    expect(await house.attack(sql)).toBe(rule);
  });

  const APPEND_ONLY = ['movement', 'posting', 'weighing', 'document', 'audit'];
  it.each(APPEND_ONLY)('nothing written in %s is changed, taken away or emptied', async (table) => {
    expect(await house.attack(`UPDATE ${table} SET id = id + 0`)).toMatch(/append_only|428C9/);
    expect(await house.attack(`DELETE FROM ${table}`)).toBe(`${table}_append_only`);
    expect(await house.attack(`TRUNCATE ${table} CASCADE`)).toMatch(/_no_truncate$/);
  });

  it('lets a right movement pass', async () => {
    const legs = `${posting(`1, ${drawer}, 'drawer', -10, -1, 0`)}; ${posting(`1, ${desk}, 'return desk', 10, 1, 0`)}`;
    expect(await house.attack(`${movement()}; ${legs}`)).toBe('');
  });
});
