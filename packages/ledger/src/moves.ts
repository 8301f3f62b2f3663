import type { DifferenceRef, Flow, Leg, Legs, LineRef, LotRef, PlaceRef, Quantity } from './leg.js';

/** Carats that go from one place to another with their share of cost. */
export interface Move extends Quantity {
  lot: LotRef;
  from: PlaceRef;
  to: PlaceRef;
  /** Marks of the two legs, where a memo line or a difference hangs on them. */
  fromMark?: Mark;
  toMark?: Mark;
}

export interface Mark {
  line?: LineRef;
  flow?: Flow;
  difference?: DifferenceRef;
}

/** Joins parts of one act into one list of legs, pools renumbered. */
export function together(...parts: Legs[]): Legs {
  const all: Legs = { legs: [], pools: [] };
  for (const part of parts) {
    const [legsBefore, poolsBefore] = [all.legs.length, all.pools.length];
    all.pools.push(
      ...part.pools.map((pool) => ({ of: pool.of.map((index) => index + legsBefore) })),
    );
    all.legs.push(
      ...part.legs.map(
        (leg): Leg =>
          leg.cost.how === 'allotted'
            ? { ...leg, cost: { ...leg.cost, pool: leg.cost.pool + poolsBefore } }
            : leg,
      ),
    );
  }
  return all;
}

/** Moves carats with their cost: what leaves carries its share, what arrives takes it all. */
export function move(moved: Move): Legs {
  const { lot, from, to, weight, pieces, fromMark, toMark } = moved;
  return {
    legs: [
      { lot, place: from, weight: -weight, pieces: -pieces, cost: { how: 'carried' }, ...fromMark },
      { lot, place: to, weight, pieces, cost: { how: 'allotted', pool: 0, weight: 1 }, ...toMark },
    ],
    pools: [{ of: [0] }],
  };
}

/** Weight found more (positive) or less than booked at a place: no cost goes with it. */
export function restate(
  lot: LotRef,
  at: PlaceRef,
  found: Quantity,
  marks: { at?: Mark; loss?: Mark } = {},
): Legs {
  return {
    legs: [
      {
        lot,
        place: { kind: 'loss' },
        weight: -found.weight,
        pieces: -found.pieces,
        cost: { how: 'none' },
        ...marks.loss,
      },
      {
        lot,
        place: at,
        weight: found.weight,
        pieces: found.pieces,
        cost: { how: 'none' },
        ...marks.at,
      },
    ],
    pools: [],
  };
}
