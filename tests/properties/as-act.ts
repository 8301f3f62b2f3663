import type { Difference, Leg, Line, Lot, Memo } from './book.js';
import type { Plan } from './plan.js';

/** What the database calls what the book knows by key. */
export interface Ids {
  lots: Map<string, number>;
  memos: Map<string, number>;
  lines: Map<string, number>;
  differences: Map<string, number>;
  movements: number[];
  places: Map<string, number>;
}

const PRICE = 100_00;

/** What a line goes by: its memo and its lot, the same in each book that lived the same. */
export const lineKey = ({ memo, lot }: Line) => `${memo}/${lot.key}`;

/** A plan as the database's writer takes it. */
export function asAct(plan: Plan, ids: Ids): Record<string, unknown> {
  const { kind, more, pools, newMemo } = plan;
  return {
    kind,
    legs: plan.legs.map((leg) => asLeg(leg, plan, ids)),
    pools,
    ...(more.word !== undefined && { word: more.word }),
    ...(more.reason !== undefined && { reason: more.reason }),
    ...(more.memo !== undefined && { memoId: ids.memos.get(more.memo) }),
    ...(more.reverses !== undefined && { reverses: ids.movements[more.reverses] }),
    ...(more.corrects !== undefined && { corrects: ids.movements[more.corrects] }),
    newLots: plan.newLots.map(({ lot, letterOf }) => asLot(lot, letterOf, ids)),
    ...(newMemo && {
      newMemo: asMemo(newMemo, plan, ids),
      document: { kind: 'memo', snapshot: {} },
    }),
    newDifferences: plan.newDifferences.map((one) => asDifference(one, ids)),
    answers: plan.answers.map(({ key }) => ({
      differenceId: ids.differences.get(key),
      answer: more.answer,
      reason: 'weighed again',
    })),
    keeps: plan.keeps.map(({ line, weight, pieces }) => ({
      lineId: ids.lines.get(lineKey(line)),
      weight,
      pieces,
      price: PRICE,
      amount: (PRICE / 1000) * weight,
    })),
  };
}

function asLeg(leg: Leg, plan: Plan, ids: Ids): Record<string, unknown> {
  const { lot, place, weight, pieces, rule, line, flow, difference } = leg;
  const newLine = plan.newMemo && line ? plan.newMemo.lines.indexOf(line) : -1;
  return {
    lot: lotRef(lot, plan, ids),
    place: placeRef(place, plan, ids),
    weight,
    pieces,
    cost: rule,
    ...(line && { line: newLine >= 0 ? { newLine } : { id: ids.lines.get(lineKey(line)) }, flow }),
    ...(difference && { difference: differenceRef(difference, plan, ids) }),
  };
}

function lotRef(lot: Lot, plan: Plan, ids: Ids): Record<string, unknown> {
  const isNew = plan.newLots.some((one) => one.lot === lot);
  return isNew ? { new: lot.key } : { id: ids.lots.get(lot.key) };
}

function differenceRef(difference: Difference, plan: Plan, ids: Ids): Record<string, unknown> {
  const isNew = plan.newDifferences.includes(difference);
  return isNew ? { new: difference.key } : { id: ids.differences.get(difference.key) };
}

function placeRef(place: string, plan: Plan, ids: Ids): Record<string, unknown> {
  const [kind, memo = ''] = place.split(':');
  if (memo === '') return { id: ids.places.get(place) };
  const id = plan.newMemo?.key === memo ? 'new' : ids.memos.get(memo);
  return kind === 'memo' ? { memoOf: id } : { keptOf: id };
}

function asLot(lot: Lot, letterOf: Lot | undefined, ids: Ids): Record<string, unknown> {
  return {
    ref: lot.key,
    kind: lot.kind,
    fixed_pieces: lot.fixedPieces,
    is_estimated: lot.isEstimated,
    origin: 'natural',
    ...(lot.isConsigned && { owner_party_id: 1, source_party_id: 1 }),
    ...(letterOf && { letterOf: ids.lots.get(letterOf.key) }),
  };
}

function asMemo({ lines }: Memo, plan: Plan, ids: Ids): Record<string, unknown> {
  return {
    partyId: 1,
    due: '2099-12-31',
    currency: 'USD',
    lines: lines.map((line) => ({
      lotId: ids.lots.get(line.lot.key),
      price: PRICE,
      pricedWeight: plan.legs.find((leg) => leg.line === line)?.weight,
    })),
  };
}

function asDifference({ key, lot, line }: Difference, ids: Ids): Record<string, unknown> {
  return {
    ref: key,
    lot: { id: ids.lots.get(lot.key) },
    lineId: line ? ids.lines.get(lineKey(line)) : null,
    kind: 'short',
    expectedWeight: 100,
    foundWeight: 0,
  };
}
