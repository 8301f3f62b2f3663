import { largestRemainder } from '@foldwell/quantities';

import type { Leg, Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';
import { allotted, given, less, NO_COST, STILL, together } from './moves.js';

const CHARGES: PlaceRef = { kind: 'charges' };

/** Cost alone: a named sum at a boundary place, its counterpart at a place of the lot. */
function costOnly(
  lot: LotRef,
  named: { place: PlaceRef; amount: number },
  at: PlaceRef,
  mark: Mark,
): Legs {
  return {
    legs: [
      { lot, place: named.place, ...STILL, cost: given(named.amount || 0) },
      { lot, place: at, ...STILL, cost: allotted(0), ...mark },
    ],
    pools: [{ of: [0] }],
  };
}

/** A fee (minor units) into the cost of a lot, at a place of it that holds weight. */
export function charge(lot: LotRef, at: PlaceRef, fee: number, mark: Mark = {}): Legs {
  return costOnly(lot, { place: CHARGES, amount: -fee }, at, mark);
}

/** One sum over several lots (duty, freight), allotted by worth, cost or weight with largest remainder. */
export function chargeSeveral(
  total: number,
  lots: { lot: LotRef; at: PlaceRef; share: number; mark?: Mark }[],
): Legs {
  const fees = largestRemainder(
    total,
    lots.map(({ share }) => share),
  );
  return together(
    ...lots.map(({ lot, at, mark }, index) => charge(lot, at, fees[index] ?? 0, mark)),
  );
}

/**
 * Where a fee goes: into cost while weight remains and the lot is ours and unsold, else it is
 * expense, and the ledger of stones has nothing to post.
 */
export function feeGoesIntoCost(lot: { isConsigned: boolean; weightInside: number }): boolean {
  return !lot.isConsigned && lot.weightInside > 0;
}

/** A recut: weight lost at the workshop without cost, labour (minor units) into it. */
export function recut(lot: LotRef, at: PlaceRef, lost: number, labour: number): Legs {
  const gone = { weight: lost, pieces: 0 };
  const weight: Leg[] = [
    { lot, place: at, ...less(gone), cost: NO_COST },
    { lot, place: { kind: 'loss' }, ...gone, cost: NO_COST },
  ];
  const cut: Legs = { legs: weight, pools: [] };
  return labour === 0 ? cut : together(charge(lot, at, labour), cut);
}

/** A write-down: cost (minor units) leaves the lot for expense, carats stay. */
export function writeDown(lot: LotRef, at: PlaceRef, amount: number, mark: Mark = {}): Legs {
  return costOnly(lot, { place: { kind: 'loss' }, amount }, at, mark);
}

/** What of a corrected lot still lies inside, place by place, and what of it is gone, in thousandths of a carat. */
export interface Whereabouts {
  inside: { at: PlaceRef; weight: number; mark?: Mark }[];
  gone: number;
}

/**
 * A purchase or opening found at another price later: the difference (minor units, positive where it
 * was booked too high) goes by share of weight onto what still lies inside, the rest to expense.
 */
export function correctCost(lot: LotRef, tooHigh: number, { inside, gone }: Whereabouts): Legs {
  const legs: Leg[] = [{ lot, place: { kind: 'supplier' }, ...STILL, cost: given(tooHigh) }];
  for (const { at, weight, mark } of inside) {
    legs.push({ lot, place: at, ...STILL, cost: allotted(0, weight), ...mark });
  }
  if (gone > 0) legs.push({ lot, place: CHARGES, ...STILL, cost: allotted(0, gone) });
  return { legs, pools: [{ of: [0] }] };
}

/**
 * Goods booked in at another weight or count: only the difference is posted, against the place they
 * came from (supplier, or the consignor's memo), on a named place. Cost stays with what is there.
 */
export function correctQuantity(
  lot: LotRef,
  cameFrom: PlaceRef,
  at: PlaceRef,
  change: Quantity,
): Legs {
  const { weight, pieces } = change;
  return {
    legs: [
      { lot, place: cameFrom, ...less(change), cost: NO_COST },
      { lot, place: at, weight, pieces, cost: NO_COST },
    ],
    pools: [],
  };
}
