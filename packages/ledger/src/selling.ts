import type { Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import { allotted, given, less, move, together } from './moves.js';
import { shareOfCost } from './share-of-cost.js';

/** House goods sold, out of stock or out of a memo's kept place, each with its share of cost. */
export function sell(lines: (Quantity & { lot: LotRef; from: PlaceRef })[]): Legs {
  return together(...lines.map((line) => move({ ...line, to: { kind: 'sold' } })));
}

/** What a sale took out of stock, and what of it came back since; costs in minor units. */
export interface Sold {
  sold: Quantity & { cost: number };
  alreadyBack: Quantity & { cost: number };
}

/** The cost that comes back with part of a sale: that sale's own, the last weight taking the rest. */
export function costComingBack({ sold, alreadyBack }: Sold, weight: number): number {
  const left = sold.weight - alreadyBack.weight;
  return shareOfCost(sold.cost - alreadyBack.cost, weight, left);
}

/** Sold goods back by a credit note, at the cost of that sale (`costComingBack`). */
export function creditReturn(lot: LotRef, to: PlaceRef, back: Quantity & { cost: number }): Legs {
  const { weight, pieces, cost } = back;
  const goods = { weight, pieces };
  return {
    legs: [
      { lot, place: { kind: 'sold' }, ...less(goods), cost: given(-cost || 0) },
      { lot, place: to, ...goods, cost: allotted(0) },
    ],
    pools: [{ of: [0] }],
  };
}
