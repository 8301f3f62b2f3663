import { largestRemainder } from '@foldwell/quantities';

import type { Leg, Legs, LotRef, PlaceRef, Posting, Quantity } from './leg.js';
import { shareOfCost } from './share-of-cost.js';

/** What a lot has at an inside place, for a preview; null for a boundary place, which never runs out. */
export type BalanceOf = (lot: LotRef, place: PlaceRef) => (Quantity & { cost: number }) | null;

/**
 * What the writer would post, for previews and tests: the same rules, on balances as last read.
 * Throws a RangeError where more leaves a place than is there, an Error where a pool waits for itself.
 */
export function reckon({ legs, pools }: Legs, balanceOf: BalanceOf): Posting[] {
  const costs = legs.map(costKnownAtOnce);
  carry(legs, costs, balanceOf);
  for (const [index, pool] of pools.entries()) {
    const total = -pool.of.reduce((sum, at) => sum + known(costs[at]), 0);
    share(membersOf(legs, index), total, costs);
  }
  return legs.map(({ lot, place, weight, pieces }, at) => ({
    lot,
    place,
    weight,
    pieces,
    cost: known(costs[at]),
  }));
}

function costKnownAtOnce({ cost, weight }: Leg): number | null {
  if (cost.how === 'given') return cost.amount;
  return cost.how === 'none' || (cost.how === 'carried' && weight === 0) ? 0 : null;
}

/** Cost leaves by share of weight in the order of the legs; what restates a weight leaves its cost. */
function carry(legs: Leg[], costs: (number | null)[], balanceOf: BalanceOf): void {
  const left = new Map<string, { weight: number; cost: number }>();
  for (const [at, { lot, place, weight, cost }] of legs.entries()) {
    if (weight >= 0) continue;
    const key = JSON.stringify([lot, place]);
    const held = left.get(key) ?? balanceOf(lot, place);
    if (held === null) continue;
    const leaves = shareOfCost(held.cost, -weight, held.weight);
    if (cost.how === 'carried') costs[at] = -leaves || 0;
    const costLeft = cost.how === 'carried' ? held.cost - leaves : held.cost;
    left.set(key, { weight: held.weight + weight, cost: costLeft });
  }
}

interface Member {
  at: number;
  weight: number;
}

function membersOf(legs: Leg[], pool: number): Member[] {
  return legs.flatMap(({ cost }, at) =>
    cost.how === 'allotted' && cost.pool === pool ? [{ at, weight: cost.weight }] : [],
  );
}

function share(members: Member[], total: number, costs: (number | null)[]): void {
  const weights = members.map(({ weight }) => weight);
  const parts = largestRemainder(total, weights);
  for (const [index, { at }] of members.entries()) costs[at] = parts[index] ?? 0;
}

function known(cost: number | null | undefined): number {
  if (cost === null || cost === undefined) {
    throw new Error('a pool waits for a cost that is not reckoned yet');
  }
  return cost;
}
