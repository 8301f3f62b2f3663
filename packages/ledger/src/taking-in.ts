import { largestRemainder } from '@foldwell/quantities';

import type { Leg, Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import { allotted, given, less, move, NO_COST } from './moves.js';

export interface Arrival extends Quantity {
  lot: LotRef;
  to: PlaceRef;
  /** Integer weight by which one sum over several lots is allotted: worth, cost or carats. */
  share: number;
}

/**
 * Opening or purchase: carats and cost come in from the supplier, one sum (minor units) shared by
 * largest remainder; by carats where no share says anything.
 */
export function buy(total: number, arrivals: Arrival[]): Legs {
  const isSaid = arrivals.some(({ share }) => share > 0);
  const shares = arrivals.map(({ share, weight }) => (isSaid ? share : weight));
  const parts = largestRemainder(total, shares);
  const legs = arrivals.flatMap(({ lot, to, weight, pieces }, index): Leg[] => [
    {
      lot,
      place: { kind: 'supplier' },
      ...less({ weight, pieces }),
      cost: given(-(parts[index] ?? 0) || 0),
    },
    { lot, place: to, weight, pieces, cost: allotted(index) },
  ]);
  return { legs, pools: arrivals.map((_, index) => ({ of: [2 * index] })) };
}

/** Consignment in: carats come in from the consignor's memo, without cost. */
export function consignIn(from: PlaceRef, arrivals: Omit<Arrival, 'share'>[]): Legs {
  const legs = arrivals.flatMap(({ lot, to, weight, pieces }): Leg[] => [
    { lot, place: from, ...less({ weight, pieces }), cost: NO_COST },
    { lot, place: to, weight, pieces, cost: NO_COST },
  ]);
  return { legs, pools: [] };
}

/** Goods back to their supplier, at their cost, or to their consignor's memo, which carries none. */
export function giveBack(lot: LotRef, from: PlaceRef, to: PlaceRef, goods: Quantity): Legs {
  return move({ lot, from, to, ...goods });
}
