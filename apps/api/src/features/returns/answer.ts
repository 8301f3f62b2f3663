import { AnswerRequest } from '@foldwell/contracts';
import {
  acceptDifference,
  acceptOtherWeight,
  foundAgain,
  type Held,
  keepsItToo,
  type Legs,
  type Line,
  ourShortWeighing,
  recordCorrected,
  writeOffMissing,
} from '@foldwell/ledger';
import { halfAwayFromZero } from '@foldwell/quantities';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { NotFound, RuleBroken } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import type { Act, Written } from '../ledger/act.js';
import { answeredBefore, type Key, keyOf, postAct } from '../ledger/post-act.js';

interface Difference {
  id: string;
  lot_id: string;
  memo_line_id: string | null;
  memo_id: string | null;
  kind: string;
  answer: string | null;
  answered_by_name: string | null;
  expected_weight: string;
  found_weight: string;
  held_weight: string;
  held_pieces: string;
  came_lot_id: string | null;
  price: string | null;
  agreed_sum: string | null;
  priced_weight: string | null;
  sent_weight: string | null;
  party_id: string | null;
  part_place: string | null;
  part_line: string | null;
  origin: string;
  treatment: string;
}

/** Closes a difference by somebody else than who weighed; each answer posts through the ledger. */
export async function answer(req: Request, ctx: Context): Promise<Answer> {
  const request = await readBody(req, AnswerRequest);
  return {
    status: 201,
    body: await answerDifference(ctx, keyOf(req, ctx), String(req.params.id), request),
  };
}

/** The act itself, as people and the demo house do it. */
export async function answerDifference(
  ctx: Context,
  key: Key,
  id: string,
  { answer: word, reason, businessDate }: AnswerRequest,
): Promise<{ movementId: string | null }> {
  const before = await answeredBefore(ctx, key);
  if (before) return postedBy(before);
  const difference = await differenceById(ctx, id);
  if (NEEDS_REASON.includes(word) && !reason?.trim())
    throw new RuleBroken('movement_reason_where_due', `“${word}” needs a reason.`);
  const act = actOf(difference, word);
  const written = await postAct(ctx, key, {
    ...act,
    businessDate,
    reason,
    ...(difference.memo_id && { memoId: Number(difference.memo_id) }),
    answers: [{ differenceId: Number(difference.id), answer: word, reason }],
  });
  return postedBy(written);
}

const postedBy = ({ movementId }: Written) => ({
  movementId: movementId === null ? null : String(movementId),
});

async function differenceById({ db }: Context, id: string): Promise<Difference> {
  const [difference] = await db.query<Difference[]>(
    `SELECT d.*, w.name AS answered_by_name, n.memo_id, n.price, n.agreed_sum, n.priced_weight, n.sent_weight, m.party_id, l.origin, l.treatment,
       part.place_id AS part_place, part.line_id AS part_line
     FROM difference d JOIN lot l ON l.id = d.lot_id LEFT JOIN memo_line n ON n.id = d.memo_line_id LEFT JOIN memo m ON m.id = n.memo_id
     LEFT JOIN person w ON w.id = d.answered_by
     -- Cost that comes back goes to a place of the lot that holds weight: the desk first, then the safe.
     LEFT JOIN LATERAL (SELECT b.place_id, x.id AS line_id FROM balance b JOIN place p ON p.id = b.place_id
       LEFT JOIN memo_line x ON p.kind = 'memo' AND x.memo_id = p.memo_id AND x.lot_id = b.lot_id
       WHERE b.lot_id = d.lot_id AND b.inside AND b.weight > 0 AND p.kind <> 'missing'
       ORDER BY array_position(ARRAY['return desk', 'drawer', 'show', 'quarantine', 'person', 'memo'], p.kind) NULLS LAST LIMIT 1) part ON true
     WHERE d.id::text = $1`,
    [id],
  );
  if (!difference) throw new NotFound('There is no such difference.');
  if (difference.answer !== null)
    throw new RuleBroken(
      'difference_still_open',
      `That difference was answered already by ${difference.answered_by_name}: ${difference.answer}.`,
    );
  return difference;
}

const NEEDS_REASON = ['written off', 'record corrected', 'other stone'];
const SHORT = ['short', 'pieces short', 'not found'];

/** Which answers fit which difference, and what each posts. */
function actOf(difference: Difference, word: AnswerRequest['answer']): Act {
  const act = SHORT.includes(difference.kind)
    ? shortAct(difference, word)
    : otherAct(difference, word);
  if (act) return act;
  const named = difference.kind === 'excess' ? 'an excess' : `“${difference.kind}”`;
  throw new RuleBroken('answer_fits', `“${word}” is not an answer to ${named}.`);
}

const kind = 'difference answered';

/** What is short lies in missing; each answer says where it goes from there. */
function shortAct(difference: Difference, word: AnswerRequest['answer']): Act | null {
  const held = heldBy(difference);
  switch (word) {
    case 'customer keeps it':
      if (!held.line) return null;
      return { kind, ...keepsItToo(held, held.line), keeps: [keepOf(difference, held)] };
    case 'accepted':
      return { kind, ...acceptedLegs(difference, held) };
    case 'found again':
      return { kind, ...foundAgain(held, { kind: 'return desk' }) };
    case 'record corrected':
      return { kind, ...recordCorrected(held, { kind: 'return desk' }) };
    case 'written off':
      return { kind, ...writeOffMissing(held) };
    default:
      return null;
  }
}

/** An excess or a stone in quarantine holds nothing in missing; some answers post nothing. */
function otherAct(difference: Difference, word: AnswerRequest['answer']): Act | null {
  const change = Number(difference.found_weight) - Number(difference.expected_weight);
  const lot = { id: Number(difference.lot_id) };
  switch (`${difference.kind}: ${word}`) {
    case 'excess: our short weighing':
      return { kind, ...ourShortWeighing(lot, { weight: change, pieces: 0 }) };
    case 'excess: their short weighing':
      return theirExcess(difference, change);
    case 'other weight: accepted':
      return { kind, ...acceptOtherWeight(lot, { kind: 'quarantine' }, change) };
    case 'other weight: found again':
    case 'suspected switch: other stone':
    case 'suspected switch: found again':
      return { kind: null };
    default:
      return null;
  }
}

/** The cost goes back to the rest of the lot, also where that lies on a memo. */
function acceptedLegs({ part_place: place, part_line: line }: Difference, held: Held): Legs {
  const mark = line === null ? {} : { line: { id: Number(line) }, flow: 'out' as const };
  return acceptDifference(held, place === null ? null : { id: Number(place) }, mark);
}

function heldBy(difference: Difference): Held {
  const lot = { id: Number(difference.lot_id) };
  const line: Line | undefined = difference.memo_line_id
    ? { lot, memoId: Number(difference.memo_id), lineId: Number(difference.memo_line_id) }
    : undefined;
  return {
    lot,
    difference: { id: Number(difference.id) },
    weight: Number(difference.held_weight),
    pieces: Number(difference.held_pieces),
    line,
  };
}

/** An excess that is theirs: a lot of that party's, without cost, in quarantine. */
function theirExcess(difference: Difference, weight: number): Act {
  const theirs = { new: 'theirs' };
  const legs: Legs['legs'] = [
    { lot: theirs, place: { new: 'in' }, weight: -weight, pieces: -1, cost: { how: 'none' } },
    { lot: theirs, place: { kind: 'quarantine' }, weight, pieces: 1, cost: { how: 'none' } },
  ];
  return {
    kind: 'consignment in',
    partyId: difference.party_id ?? undefined,
    legs,
    pools: [],
    newPlaces: [
      { ref: 'in', kind: 'memo in', name: 'Came over', partyId: difference.party_id ?? '' },
    ],
    newLots: [
      {
        ref: 'theirs',
        kind: 'parcel',
        is_estimated: true,
        origin: difference.origin,
        treatment: difference.treatment,
        owner_party_id: difference.party_id,
        source_party_id: difference.party_id,
      },
    ],
  };
}

function keepOf(difference: Difference, held: Held): NonNullable<Act['keeps']>[number] {
  const [w, sent] = [BigInt(held.weight), BigInt(difference.sent_weight ?? 1)];
  const amount =
    difference.agreed_sum === null
      ? halfAwayFromZero(
          BigInt(difference.price ?? 0) * BigInt(difference.priced_weight ?? 0) * w,
          sent * 1000n,
        )
      : halfAwayFromZero(BigInt(difference.agreed_sum) * w, sent);
  return {
    lineId: Number(difference.memo_line_id),
    weight: held.weight,
    pieces: held.pieces,
    price: difference.price === null ? null : Number(difference.price),
    amount: Number(amount),
  };
}
