import type { Leg, Legs, LotRef, PlaceRef } from './leg.js';

const still = { weight: 0, pieces: 0 };

/** A fee into the cost of a lot at a place of it that holds weight; a null place makes it expense only. */
export function charge(lot: LotRef, at: PlaceRef, fee: number): Legs {
  return {
    legs: [
      { lot, place: { kind: 'charges' }, ...still, cost: { how: 'given', amount: -fee } },
      { lot, place: at, ...still, cost: { how: 'allotted', pool: 0, weight: 1 } },
    ],
    pools: [{ of: [0] }],
  };
}

/** A recut: weight lost at the workshop without cost, labour into it. */
export function recut(lot: LotRef, at: PlaceRef, lost: number, labour: number): Legs {
  const weight: Leg[] = [
    { lot, place: at, weight: -lost, pieces: 0, cost: { how: 'none' } },
    { lot, place: { kind: 'loss' }, weight: lost, pieces: 0, cost: { how: 'none' } },
  ];
  if (labour === 0) return { legs: weight, pools: [] };
  const fee = charge(lot, at, labour);
  return { legs: [...fee.legs, ...weight], pools: fee.pools };
}

/** A write-down: cost leaves the lot for expense, carats stay. */
export function writeDown(lot: LotRef, at: PlaceRef, amount: number): Legs {
  return {
    legs: [
      { lot, place: { kind: 'loss' }, ...still, cost: { how: 'given', amount } },
      { lot, place: at, ...still, cost: { how: 'allotted', pool: 0, weight: 1 } },
    ],
    pools: [{ of: [0] }],
  };
}

/**
 * A purchase found at another price later: the difference (positive where it was booked too high)
 * goes by share of weight onto what still lies inside, the rest to expense.
 */
export function correctCost(
  lot: LotRef,
  tooHigh: number,
  inside: { at: PlaceRef; weight: number }[],
  gone: number,
): Legs {
  const legs: Leg[] = [
    { lot, place: { kind: 'supplier' }, ...still, cost: { how: 'given', amount: tooHigh } },
    ...inside.map(
      ({ at, weight }): Leg => ({
        lot,
        place: at,
        ...still,
        cost: { how: 'allotted', pool: 0, weight },
      }),
    ),
  ];
  if (gone > 0)
    legs.push({
      lot,
      place: { kind: 'charges' },
      ...still,
      cost: { how: 'allotted', pool: 0, weight: gone },
    });
  return { legs, pools: [{ of: [0] }] };
}
