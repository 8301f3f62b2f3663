import { loseConsigned } from './consignors.js';
import type { DifferenceRef, Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';
import type { Line } from './memos.js';
import { allotted, CARRIED, less, move, NO_COST, restate, STILL } from './moves.js';

/** What an open difference holds in missing, and the memo line it hangs on, if any. */
export interface Held extends Quantity {
  lot: LotRef;
  difference: DifferenceRef;
  line?: Line | undefined;
}

const MISSING: PlaceRef = { kind: 'missing' };

function becameOf(line: Line | undefined, flow: NonNullable<Mark['flow']>): Mark {
  return line ? { line: { id: line.lineId }, flow } : {};
}

const missingMark = ({ difference, line }: Held): Mark => ({
  difference,
  ...becameOf(line, 'missing'),
});

function outOfMissing(held: Held, to: PlaceRef, toMark: Mark): Legs {
  const { lot, weight, pieces } = held;
  return move({ lot, from: MISSING, to, weight, pieces, fromMark: missingMark(held), toMark });
}

/** The customer keeps it too: missing to kept. */
export function keepsItToo(held: Held, line: Line): Legs {
  return outOfMissing(held, { keptOf: line.memoId }, becameOf(line, 'kept'));
}

/** Found again: missing to the desk (or a drawer), at its cost. */
export function foundAgain(held: Held, to: PlaceRef): Legs {
  return outOfMissing(held, to, becameOf(held.line, 'returned'));
}

/** The record is corrected: it was never sent, so missing goes back to the place that still has it. */
export function recordCorrected(held: Held, to: PlaceRef): Legs {
  return foundAgain(held, to);
}

/** The customer still has it: missing back on his memo, out as before. */
export function stillWithThem(held: Held, line: Line): Legs {
  return outOfMissing(held, { memoOf: line.memoId }, becameOf(line, 'out'));
}

/**
 * Accepted as a weighing difference: the weight goes to loss without cost, and the cost goes back to
 * a place of the lot that holds weight; without one it is lost with the weight. Where that place is a
 * memo's, `costMark` names the line of the lot there.
 */
export function acceptDifference(held: Held, costTo: PlaceRef | null, costMark: Mark = {}): Legs {
  const { lot, weight, pieces } = held;
  const gone = { weight, pieces };
  const restated = becameOf(held.line, 'restated');
  const leaves = { lot, place: MISSING, ...less(gone), cost: CARRIED, ...missingMark(held) };
  const lost = { lot, place: { kind: 'loss' } as const, ...gone, ...restated };
  const pools = [{ of: [0] }];
  if (costTo === null) return { legs: [leaves, { ...lost, cost: allotted(0) }], pools };
  const takesCost = { lot, place: costTo, ...STILL, cost: allotted(0), ...costMark };
  return { legs: [leaves, { ...lost, cost: NO_COST }, takesCost], pools };
}

/** Written off: missing to loss with its share of cost. */
export function writeOffMissing(held: Held): Legs {
  return outOfMissing(held, { kind: 'loss' }, becameOf(held.line, 'written_off'));
}

/** Consigned goods written off: bought at the agreed price, then lost. */
export function writeOffMissingConsigned(held: Held, ours: LotRef, price: number): Legs {
  const { lot: theirs, weight, pieces, line } = held;
  return loseConsigned({
    theirs,
    ours,
    at: MISSING,
    weight,
    pieces,
    price,
    fromMark: missingMark(held),
    becameMark: becameOf(line, 'written_off'),
  });
}

/** An excess that we had weighed short: it comes out of loss onto the lot, in quarantine. */
export function ourShortWeighing(lot: LotRef, excess: Quantity): Legs {
  return restate(lot, { kind: 'quarantine' }, excess);
}

/**
 * A stone of ours that weighs otherwise, accepted as it is (the same stone with a new report, or
 * damaged, charged or not): weight alone is restated where it lies, cost stays.
 */
export function acceptOtherWeight(lot: LotRef, at: PlaceRef, change: number): Legs {
  return restate(lot, at, { weight: change, pieces: 0 });
}
