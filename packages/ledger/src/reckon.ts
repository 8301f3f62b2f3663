import { halfAwayFromZero, largestRemainder } from '@foldwell/quantities';
import type { Leg, Legs, LotRef, PlaceRef, Quantity } from './leg.js';

/** A leg with the cost it will have, in minor units. */
export interface Posting extends Quantity {
  lot: LotRef;
  place: PlaceRef;
  cost: number;
}

/** What a lot has at a place, for a preview. */
export type BalanceOf = (lot: LotRef, place: PlaceRef) => Quantity & { cost: number };

/**
 * What the writer would post, for previews and tests: the same rules, on balances as last read.
 * Throws where a pool waits for itself.
 */
export function reckon({ legs, pools }: Legs, balanceOf: BalanceOf): Posting[] {
  const costs = legs.map((leg) =>
    leg.cost.how === 'given' ? leg.cost.amount : leg.cost.how === 'none' ? 0 : null,
  );
  carry(legs, costs, balanceOf);
  for (const [index, pool] of pools.entries()) {
    const total = -pool.of.reduce((sum, at) => sum + known(costs[at]), 0);
    const members = legs.flatMap((leg, at) =>
      leg.cost.how === 'allotted' && leg.cost.pool === index
        ? [{ at, weight: leg.cost.weight }]
        : [],
    );
    largestRemainder(
      total,
      members.map(({ weight }) => weight),
    ).forEach((cost, member) => {
      costs[members[member]?.at ?? -1] = cost;
    });
  }
  return legs.map(({ lot, place, weight, pieces }, at) => ({
    lot,
    place,
    weight,
    pieces,
    cost: known(costs[at]),
  }));
}

function carry(legs: Leg[], costs: (number | null)[], balanceOf: BalanceOf): void {
  const left = new Map<string, Quantity & { cost: number }>();
  legs.forEach((leg, at) => {
    if (leg.cost.how !== 'carried') return;
    const key = JSON.stringify([leg.lot, leg.place]);
    const held = left.get(key) ?? { ...balanceOf(leg.lot, leg.place) };
    const leaving = -leg.weight;
    const cost = leaving === held.weight ? held.cost : share(held.cost, leaving, held.weight);
    costs[at] = -cost || 0;
    left.set(key, {
      weight: held.weight - leaving,
      pieces: held.pieces + leg.pieces,
      cost: held.cost - cost,
    });
  });
}

/** Cost of a part by share of weight, half away from zero. */
function share(cost: number, weight: number, whole: number): number {
  if (weight === 0) return 0;
  return Number(halfAwayFromZero(BigInt(cost) * BigInt(weight), BigInt(whole)));
}

function known(cost: number | null | undefined): number {
  if (cost === null || cost === undefined)
    throw new Error('a pool waits for a cost that is not reckoned yet');
  return cost;
}

/** Every lot of a movement sums to zero in weight, pieces and cost, and the conversion place over all lots. */
export function isBalanced(postings: Posting[]): boolean {
  const sums = new Map<string, [number, number, number]>();
  for (const { lot, place, weight, pieces, cost } of postings) {
    for (const key of [
      JSON.stringify(lot),
      ...('kind' in place && place.kind === 'conversion' ? ['conversion'] : []),
    ]) {
      const [w, p, c] = sums.get(key) ?? [0, 0, 0];
      sums.set(key, [w + weight, p + pieces, c + cost]);
    }
  }
  return [...sums.values()].every((sum) => sum.every((part) => part === 0));
}
