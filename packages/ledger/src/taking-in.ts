import { largestRemainder } from '@foldwell/quantities';
import type { Leg, Legs, LotRef, PlaceRef, Quantity } from './leg.js';

export interface Arrival extends Quantity {
  lot: LotRef;
  to: PlaceRef;
  /** Integer weight by which one sum over several lots is allotted: worth, cost or carats. */
  share: number;
}

/** Opening or purchase: carats and cost come in from the supplier, one sum shared by largest remainder. */
export function buy(total: number, arrivals: Arrival[]): Legs {
  const parts = largestRemainder(
    total,
    arrivals.map((arrival) => arrival.share),
  );
  const legs = arrivals.flatMap((arrival, index): Leg[] => [
    {
      ...outOf({ kind: 'supplier' }, arrival),
      cost: { how: 'given', amount: -(parts[index] ?? 0) },
    },
    { ...into(arrival.to, arrival), cost: { how: 'allotted', pool: index, weight: 1 } },
  ]);
  return { legs, pools: arrivals.map((_, index) => ({ of: [2 * index] })) };
}

/** Consignment in: carats come in from the consignor's memo, without cost. */
export function consignIn(from: PlaceRef, arrivals: Omit<Arrival, 'share'>[]): Legs {
  const legs = arrivals.flatMap((arrival): Leg[] => [
    { ...outOf(from, arrival), cost: { how: 'none' } },
    { ...into(arrival.to, arrival), cost: { how: 'none' } },
  ]);
  return { legs, pools: [] };
}

/** A consignor's goods bought where they lie (or on their way to `sold`): his lot becomes one of ours at the agreed price. */
export function buyFromConsignor(
  bought: Quantity & { theirs: LotRef; ours: LotRef; at: PlaceRef; to: PlaceRef; price: number },
): Legs {
  const { theirs, ours, at, to, weight, pieces, price } = bought;
  const legs: Leg[] = [
    { lot: theirs, place: at, weight: -weight, pieces: -pieces, cost: { how: 'carried' } },
    { lot: theirs, place: { kind: 'conversion' }, weight, pieces, cost: { how: 'none' } },
    {
      lot: ours,
      place: { kind: 'conversion' },
      weight: -weight,
      pieces: -pieces,
      cost: { how: 'none' },
    },
    {
      lot: ours,
      place: { kind: 'supplier' },
      weight: 0,
      pieces: 0,
      cost: { how: 'given', amount: -price },
    },
    { lot: ours, place: to, weight, pieces, cost: { how: 'allotted', pool: 0, weight: 1 } },
  ];
  return { legs, pools: [{ of: [3] }] };
}

const outOf = (place: PlaceRef, { lot, weight, pieces }: Omit<Arrival, 'share'>) => ({
  lot,
  place,
  weight: -weight,
  pieces: -pieces,
});
const into = (place: PlaceRef, { lot, weight, pieces }: Omit<Arrival, 'share'>) => ({
  lot,
  place,
  weight,
  pieces,
});
