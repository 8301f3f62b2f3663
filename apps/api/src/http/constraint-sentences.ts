import { formatCarats, formatMoney, longDate } from '@foldwell/quantities';

type Facts = Record<string, string | number | null | undefined>;
type Sentence = string | ((facts: Facts) => string);

const text = (value: Facts[string]) => String(value ?? '');
const money = (facts: Facts, key: string) => formatMoney(Number(facts[key]), text(facts.currency));
const carats = (value: Facts[string]) => `${formatCarats(Number(value))} ct`;

const LEDGER: Record<string, Sentence> = {
  balance_not_enough: ({ lot, place, has, asked }) =>
    Number(has) > 0
      ? `Only ${carats(has)} of ${lot} is in ${place}; ${carats(asked)} was asked for.`
      : `${lot} is not in ${place} any more.`,
  balance_never_negative: 'There is not that much there. Look again where the goods are.',
  balance_sold_not_negative: 'More would come back than was sold, or at more than it cost.',
  memo_line_sent_once: 'A line is sent once. Write another memo for more of it.',
  balance_nothing_left_over:
    'Pieces or cost would be left where no carats are. Move the whole of it.',
  balance_pieces_weigh:
    'That many pieces can’t weigh so little; each counted piece weighs at least 0.001 ct.',
  balance_weight_has_pieces: 'Carats would be left without a piece. Count the pieces again.',
  balance_stone_whole: 'A stone, pair or set moves whole.',
  balance_stone_in_one_place: 'A stone can’t be in two places at once.',
  balance_consigned_no_cost: 'Goods of a consignor carry no cost of ours.',
  balance_reserved_within: 'Part of it is held for somebody.',
  balance_kept_by_postings: 'Balances change only by booking.',
  balance_date_in_order: ({ lot, newest }) =>
    `${lot} was moved on ${longDate(text(newest))}; nothing about it can be dated before that.`,
  movement_date_not_ahead: ({ today }) => `The date lies ahead of today, ${longDate(text(today))}.`,
  movement_date_after_lock: ({ locked }) =>
    `Nothing is dated on or before ${longDate(text(locked))}; a correction goes in the open month.`,
  movement_conserves: ({ lot }) =>
    `The sides of this booking don’t add up for ${lot}. Nothing was booked.`,
  movement_conversion_conserves: 'What comes out isn’t what went in. Nothing was booked.',
  movement_has_two_legs: 'A booking needs goods that go from one place to another.',
  movement_legs_fit_kind: ({ kind, place }) => `A ${kind} can’t touch ${place ?? 'that place'}.`,
  movement_cost_fits_kind: ({ kind }) => `Cost can’t go that way in a ${kind ?? 'booking'}.`,
  movement_weight_in_step: 'A weight has three decimals; this house’s balance reads to 0.01 ct.',
  movement_says_something: 'There is nothing in it to book.',
  movement_person_active: 'You are no longer active in this house.',
  movement_reason_where_due: 'A reason is needed.',
  movement_reversed_once: 'That was undone already.',
  reversal_not_of_reversal: 'An undoing is never itself undone; book it anew.',
  reversal_of_this_kind: ({ kind }) =>
    `A ${kind} is never undone; it is put right by its own paper.`,
  reversal_mirrors: 'An undoing must be the exact mirror of what it undoes.',
  reversal_of_newest: ({ lot }) => `${lot} was moved again since. What came later is undone first.`,
  conversion_one_owner: 'Goods of different owners never share a lot.',
  conversion_one_origin: 'Natural, laboratory-grown and not tested goods never share a lot.',
  conversion_one_treatment: 'Goods of different treatment never share a lot.',
  posting_in_its_movement: 'Nothing is added to a booking once it is made.',
  posting_line_known: 'That lot is not on this line of the memo.',
  memo_place_is_its_lines: 'The memo’s lines and what lies on it don’t agree. Nothing was booked.',
  memo_line_identity: 'More would come back than is still out on that line.',
  memo_line_closes_together: 'Pieces and carats of a line close together. Count again.',
  memo_line_lot_once: 'A lot stands on one line of a memo only.',
  memo_void_while_unsettled:
    'Part of this memo is already settled, so it can’t be void. Take back what is still out.',
  memo_restated_within_tolerance:
    'Restated weights on this line would pass the memo’s tolerance. It needs an answer.',
  memo_due_after_date: 'Due back lies before the memo’s own date.',
  missing_is_open_differences:
    'What is missing and what the open differences say don’t agree. Nothing was booked.',
  party_credit_limit: (facts) =>
    `Over the limit by ${money(facts, 'over')}. ${facts.party} would owe for ${money(facts, 'exposure')}, the limit is ${money(facts, 'limit')}. An owner may book it with a reason.`,
  party_memo_limit: (facts) =>
    `Over the limit for one memo by ${money(facts, 'over')}; it is ${money(facts, 'limit')}. An owner may book it with a reason.`,
  party_papers_lapsed: ({ party, paper, until }) =>
    `${paper} of ${party} lapsed on ${longDate(text(until))}. Nothing leaves without an owner’s reason.`,
  difference_still_open: ({ by }) =>
    `That difference was answered already${by ? ` by ${by}` : ''}.`,
  difference_not_by_who_weighed: ({ by }) =>
    `${by ?? 'Who weighed it'} weighed it, so somebody else answers.`,
  difference_within_role_limit: ({ answer, limit }) =>
    `Over ${carats(limit)} only an owner answers “${answer}”.`,
  difference_answered_holds_nothing: 'It still holds carats in missing. Say where they are first.',
  idempotency_same_body:
    'The same request was sent again with other contents. Nothing was booked; load the page again.',
  currency_has_rate: ({ currency, date }) =>
    `There is no rate for ${currency} on or before ${longDate(text(date))}. Write one down in House.`,
  lot_report_of_living: 'That report number is on another lot of ours.',
  lot_identity_fixed: 'Number, kind, owner, origin and treatment of a lot never change.',
  house_fixed_once_moved: 'Zone, base currency and step are fixed once the first goods moved.',
  number_series_used: 'That series is in use; numbers run on without gaps.',
  place_made_by_writer: 'Places of papers are made when the paper is booked.',
  place_closed_when_empty: 'There are carats in it. A place is closed when it is empty.',
  place_drawer_name: 'There is a drawer of that name in this safe already.',
  place_of_person: 'There is a place for that person already.',
  person_email_unique: 'Somebody has that e-mail already.',
  party_has_a_part:
    'Say what the party is to us: customer, supplier, consignor, broker, laboratory or workshop.',
  party_limits_not_negative: 'A limit is not negative.',
  saved_sieve_name_key: 'You have a sieve of that name already.',
};

/** By the end of a constraint's name, for the many that say the same of different tables. */
const ENDINGS: [RegExp, string][] = [
  [
    /_append_only$|_no_truncate$/,
    'What is written down is never changed; a later entry answers it.',
  ],
  [/_kept_by_postings$/, 'That changes only by booking.'],
  [/_known$|_fkey$/, 'Something named in it is not there (any more).'],
  [
    /_pkey$|_key$|_once$|_unique$|_one_first$|_of_memo$|_one_of_its_kind$|_is_one$|_of_house_of_work$/,
    'That is there already.',
  ],
  [/_given$|_is_not_null$|_not_null$/, 'Something that is needed is missing.'],
  [/_form$/, 'It is not written the way it must be.'],
  [
    /_positive$|_not_negative$|_sane$|_in_scale$|_within$|_finite$|_digits$|_runs_on$/,
    'A number lies outside what it can be.',
  ],
];

const REST: Record<string, Sentence> = {
  house_base_currency_known: 'That currency is not one the house can hold.',
  lot_pieces_fit_kind:
    'A stone is one piece, a pair or set two or more; a parcel’s pieces are counted.',
  lot_estimate_is_of_parcel: 'Only a parcel’s pieces are estimated.',
  lot_report_whole: 'A report has both a laboratory and a number.',
  lot_parts_kept_by_postings: 'That changes only by booking.',
  movement_conversion_has_word: 'Say what kind of working it is.',
  movement_reversal_names_one: 'Say which booking is undone.',
  movement_correction_names_one: 'Say which booking is corrected.',
  memo_line_price_or_sum: 'A line has a price per carat or a sum, not both.',
  difference_answered_whole: 'An answer names who gave it and when.',
  difference_not_by_who_weighed_check: 'Who weighed it does not answer it.',
  difference_kind_holds_nothing: 'A difference of this kind holds nothing in missing.',
  posting_line_has_flow: 'A leg of a memo line says what became of it.',
  posting_memo_names_line: 'What lies on a memo names its line.',
  posting_missing_names_difference: 'What is missing names its difference.',
  posting_says_something: 'A leg moves carats, pieces or cost.',
  place_names_its_holder: 'A place says who holds it.',
  document_hash_of_snapshot: 'An issued paper never changes.',
  seal_member_is_one: 'A seal covers one thing at a time.',
};

/** The house's own sentence for a rule of the database; null where none was written (a test finds that). */
export function sentenceOf(rule: string, facts: Facts = {}): string | null {
  const own = LEDGER[rule] ?? REST[rule];
  if (typeof own === 'function') return own(facts);
  return own ?? ENDINGS.find(([ending]) => ending.test(rule))?.[1] ?? null;
}
