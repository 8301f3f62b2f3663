import type { DifferenceRef, Leg, Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import type { Line } from './memos.js';
import { move, restate } from './moves.js';

/** What an open difference holds in missing, and the memo line it hangs on, if any. */
export interface Held extends Quantity {
  lot: LotRef;
  difference: DifferenceRef;
  line?: Line | undefined;
}

const missingMark = ({ difference, line }: Held) => ({
  difference,
  ...(line && { line: { id: line.lineId }, flow: 'missing' as const }),
});

/** The customer keeps it too: missing to kept. */
export function keepsItToo(held: Held, line: Line): Legs {
  return move({
    lot: held.lot,
    from: { kind: 'missing' },
    to: { keptOf: line.memoId },
    weight: held.weight,
    pieces: held.pieces,
    fromMark: missingMark(held),
    toMark: { line: { id: line.lineId }, flow: 'kept' },
  });
}

/** Found again: missing to the desk, at its cost. */
export function foundAgain(held: Held, to: PlaceRef): Legs {
  return move({
    lot: held.lot,
    from: { kind: 'missing' },
    to,
    weight: held.weight,
    pieces: held.pieces,
    fromMark: missingMark(held),
    toMark: held.line && { line: { id: held.line.lineId }, flow: 'returned' },
  });
}

/** Never sent: missing back on the place that still has it, so that the memo's record is put right. */
export function recordCorrected(held: Held, to: PlaceRef): Legs {
  return foundAgain(held, to);
}

/**
 * Accepted as a weighing difference: the weight goes to loss without cost, and the cost goes back to
 * a place of the lot that holds weight; without one it is lost with the weight.
 */
export function acceptDifference(held: Held, costTo: PlaceRef | null): Legs {
  const gone: Leg = {
    lot: held.lot,
    place: { kind: 'loss' },
    weight: held.weight,
    pieces: held.pieces,
    cost: costTo ? { how: 'none' } : { how: 'allotted', pool: 0, weight: 1 },
    ...(held.line && { line: { id: held.line.lineId }, flow: 'restated' }),
  };
  const legs: Leg[] = [
    {
      lot: held.lot,
      place: { kind: 'missing' },
      weight: -held.weight,
      pieces: -held.pieces,
      cost: { how: 'carried' },
      ...missingMark(held),
    },
    gone,
  ];
  if (costTo)
    legs.push({
      lot: held.lot,
      place: costTo,
      weight: 0,
      pieces: 0,
      cost: { how: 'allotted', pool: 0, weight: 1 },
    });
  return { legs, pools: [{ of: [0] }] };
}

/** Written off: missing to loss with its share of cost. */
export function writeOffMissing(held: Held): Legs {
  return move({
    lot: held.lot,
    from: { kind: 'missing' },
    to: { kind: 'loss' },
    weight: held.weight,
    pieces: held.pieces,
    fromMark: missingMark(held),
    toMark: held.line && { line: { id: held.line.lineId }, flow: 'written_off' },
  });
}

/** An excess that we had weighed short: it comes out of loss onto the lot, in quarantine. */
export function ourShortWeighing(lot: LotRef, excess: Quantity): Legs {
  return restate(lot, { kind: 'quarantine' }, excess);
}

/** A stone of ours that weighs otherwise, accepted: weight alone is restated, cost stays. */
export function acceptOtherWeight(lot: LotRef, at: PlaceRef, change: number): Legs {
  return restate(lot, at, { weight: change, pieces: 0 });
}
