import type { DifferenceRef, Legs, LotRef, PlaceRef, Quantity } from './leg.js';
import { move, together } from './moves.js';

/** A line of a memo that stands: its lot, its memo, its id. */
export interface Line {
  lot: LotRef;
  memoId: number;
  lineId: number;
}

const out = (line: Line) => ({ line: { id: line.lineId }, flow: 'out' as const });
const memoOf = (line: Line): PlaceRef => ({ memoOf: line.memoId });

/** Goods out on a new memo; lines in the order of the paper. */
export function sendOut(lines: (Quantity & { lot: LotRef; from: PlaceRef })[]): Legs {
  return together(
    ...lines.map(({ lot, from, weight, pieces }, index) =>
      move({
        lot,
        from,
        to: { memoOf: 'new' },
        weight,
        pieces,
        toMark: { line: { newLine: index }, flow: 'sent' },
      }),
    ),
  );
}

/** Lines of one memo back and out on a new one in one act. */
export function handOver(lines: (Quantity & { line: Line })[]): Legs {
  return together(
    ...lines.map(({ line, weight, pieces }, index) =>
      move({
        lot: line.lot,
        from: memoOf(line),
        to: { memoOf: 'new' },
        weight,
        pieces,
        fromMark: { line: { id: line.lineId }, flow: 'returned' },
        toMark: { line: { newLine: index }, flow: 'sent' },
      }),
    ),
  );
}

/** Goods back at the desk, or in quarantine, as they were expected. */
export function bringBack(line: Line, to: PlaceRef, back: Quantity): Legs {
  return move({
    lot: line.lot,
    from: memoOf(line),
    to,
    ...back,
    fromMark: out(line),
    toMark: { line: { id: line.lineId }, flow: 'returned' },
  });
}

/**
 * A parcel back inside tolerance: what was expected closes the line at its cost, and the weight
 * over or short is restated on the lot without cost (the rest takes all).
 */
export function bringBackRestated(
  line: Line,
  to: PlaceRef,
  expected: Quantity,
  found: Quantity,
): Legs {
  const mark = { line: { id: line.lineId } };
  const short = { weight: expected.weight - found.weight, pieces: expected.pieces - found.pieces };
  return {
    legs: [
      {
        lot: line.lot,
        place: memoOf(line),
        weight: -expected.weight,
        pieces: -expected.pieces,
        cost: { how: 'carried' },
        ...out(line),
      },
      // One leg at what was found: a lighter weight taken off in a leg of its own would find nothing there yet.
      {
        lot: line.lot,
        place: to,
        ...found,
        cost: { how: 'allotted', pool: 0, weight: 1 },
        ...mark,
        flow: 'returned',
      },
      {
        lot: line.lot,
        place: { kind: 'loss' },
        ...short,
        cost: { how: 'none' },
        ...mark,
        flow: 'restated',
      },
    ],
    pools: [{ of: [0] }],
  };
}

/** What didn't come back lies in missing, held by its difference. */
export function miss(line: Line, difference: DifferenceRef, short: Quantity): Legs {
  return move({
    lot: line.lot,
    from: memoOf(line),
    to: { kind: 'missing' },
    ...short,
    fromMark: out(line),
    toMark: { line: { id: line.lineId }, flow: 'missing', difference },
  });
}

/** The customer keeps it: to the memo's kept place, not yet invoiced. */
export function keep(line: Line, kept: Quantity): Legs {
  return move({
    lot: line.lot,
    from: memoOf(line),
    to: { keptOf: line.memoId },
    ...kept,
    fromMark: out(line),
    toMark: { line: { id: line.lineId }, flow: 'kept' },
  });
}

/** A kept line is on memo again. */
export function unKeep(line: Line, back: Quantity): Legs {
  return move({
    lot: line.lot,
    from: { keptOf: line.memoId },
    to: memoOf(line),
    ...back,
    fromMark: { line: { id: line.lineId }, flow: 'kept' },
    toMark: out(line),
  });
}

/** A memo booked to the wrong party: each line back where it came from, at carried cost. */
export function undoMemo(lines: (Quantity & { line: Line; cameFrom: PlaceRef })[]): Legs {
  return together(
    ...lines.map(({ line, cameFrom, weight, pieces }) =>
      move({
        lot: line.lot,
        from: memoOf(line),
        to: cameFrom,
        weight,
        pieces,
        fromMark: { line: { id: line.lineId }, flow: 'returned' },
      }),
    ),
  );
}
