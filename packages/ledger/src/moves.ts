import type { CostRule, Leg, Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';

/** Carats that go from one place to another with their share of cost. */
export interface Move extends Quantity {
  lot: LotRef;
  from: PlaceRef;
  to: PlaceRef;
  /** Marks of the two legs, where a memo line or a difference hangs on them. */
  fromMark?: Mark | undefined;
  toMark?: Mark | undefined;
}

export const NO_COST: CostRule = { how: 'none' };
export const CARRIED: CostRule = { how: 'carried' };
/** Nothing moves; cost alone may. */
export const STILL: Quantity = { weight: 0, pieces: 0 };

/** Takes all (or its weight's share) of what a pool gives. */
export function allotted(pool: number, weight = 1): CostRule {
  return { how: 'allotted', pool, weight };
}

/** A sum in minor units named by the caller. */
export function given(amount: number): CostRule {
  return { how: 'given', amount };
}

/** The same quantity leaving. */
export function less({ weight, pieces }: Quantity): Quantity {
  return { weight: -weight || 0, pieces: -pieces || 0 };
}

/** Joins parts of one act into one list of legs, pools renumbered. */
export function together(...parts: Legs[]): Legs {
  const all: Legs = { legs: [], pools: [] };
  for (const part of parts) {
    const [legsBefore, poolsBefore] = [all.legs.length, all.pools.length];
    for (const pool of part.pools) all.pools.push({ of: pool.of.map((at) => at + legsBefore) });
    for (const leg of part.legs) all.legs.push(withPoolsAfter(leg, poolsBefore));
  }
  return all;
}

function withPoolsAfter(leg: Leg, poolsBefore: number): Leg {
  if (leg.cost.how !== 'allotted') return leg;
  return { ...leg, cost: { ...leg.cost, pool: leg.cost.pool + poolsBefore } };
}

/** Moves carats with their cost: what leaves carries its share, what arrives takes it all. */
export function move(moved: Move): Legs {
  const { lot, from, to, weight, pieces, fromMark, toMark } = moved;
  return {
    legs: [
      { lot, place: from, ...less({ weight, pieces }), cost: CARRIED, ...fromMark },
      { lot, place: to, weight, pieces, cost: allotted(0), ...toMark },
    ],
    pools: [{ of: [0] }],
  };
}

/** Weight or pieces found more (positive) or fewer than booked at a place: no cost goes with them. */
export function restate(
  lot: LotRef,
  at: PlaceRef,
  found: Quantity,
  marks: { at?: Mark; loss?: Mark } = {},
): Legs {
  const { weight, pieces } = found;
  return {
    legs: [
      { lot, place: { kind: 'loss' }, ...less(found), cost: NO_COST, ...marks.loss },
      { lot, place: at, weight, pieces, cost: NO_COST, ...marks.at },
    ],
    pools: [],
  };
}
