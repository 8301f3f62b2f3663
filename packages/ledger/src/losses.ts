import type { DifferenceRef, Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import { move, restate } from './moves.js';

/** Goods written off where they lie: to loss with their share of cost. */
export function writeOff(lot: LotRef, from: PlaceRef, gone: Quantity): Legs {
  return move({ lot, from, to: { kind: 'loss' }, ...gone });
}

/** Something short in a drawer at a count lies in missing, held by its difference. */
export function openDifference(
  lot: LotRef,
  from: PlaceRef,
  difference: DifferenceRef,
  short: Quantity,
): Legs {
  return move({ lot, from, to: { kind: 'missing' }, ...short, toMark: { difference } });
}

/** What was written off is found again: carats come back out of loss, their cost is spent already. */
export function foundAfterWriteOff(lot: LotRef, to: PlaceRef, found: Quantity): Legs {
  return restate(lot, to, found);
}

/**
 * A count that finds more or less weight than booked, or a recount of estimated pieces: restated
 * where it lies, cost stays.
 */
export function adjustCount(lot: LotRef, at: PlaceRef, found: Quantity): Legs {
  return restate(lot, at, found);
}
