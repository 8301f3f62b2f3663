import type { DifferenceRef, Legs, LotRef, Mark, PlaceRef, Quantity } from './leg.js';
import { allotted, CARRIED, less, move, NO_COST, together } from './moves.js';

/** A line of a memo that stands: its lot, its memo, its id. */
export interface Line {
  lot: LotRef;
  memoId: number;
  lineId: number;
}

const out = (line: Line): Mark => ({ line: { id: line.lineId }, flow: 'out' });
const memoOf = (line: Line): PlaceRef => ({ memoOf: line.memoId });
const became = (line: Line, flow: NonNullable<Mark['flow']>): Mark => ({
  line: { id: line.lineId },
  flow,
});

/** Goods out on a new memo; lines in the order of the paper. */
export function sendOut(lines: (Quantity & { lot: LotRef; from: PlaceRef })[]): Legs {
  const sent = lines.map((line, index) =>
    move({ ...line, to: { memoOf: 'new' }, toMark: { line: { newLine: index }, flow: 'sent' } }),
  );
  return together(...sent);
}

/** Lines of one memo back and out on a new one in one act. */
export function handOver(lines: (Quantity & { line: Line })[]): Legs {
  const handed = lines.map(({ line, weight, pieces }, index) =>
    move({
      lot: line.lot,
      from: memoOf(line),
      to: { memoOf: 'new' },
      weight,
      pieces,
      fromMark: became(line, 'returned'),
      toMark: { line: { newLine: index }, flow: 'sent' },
    }),
  );
  return together(...handed);
}

/** Goods back at the desk, or in quarantine, as they were expected. */
export function bringBack(line: Line, to: PlaceRef, back: Quantity): Legs {
  const toMark = became(line, 'returned');
  return move({ lot: line.lot, from: memoOf(line), to, ...back, fromMark: out(line), toMark });
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
  const { lot } = line;
  const short = {
    weight: expected.weight - found.weight,
    pieces: expected.pieces - found.pieces,
  };
  return {
    legs: [
      { lot, place: memoOf(line), ...less(expected), cost: CARRIED, ...out(line) },
      // One leg at what was found: less taken off in a leg of its own would find nothing there yet.
      { lot, place: to, ...found, cost: allotted(0), ...became(line, 'returned') },
      { lot, place: { kind: 'loss' }, ...short, cost: NO_COST, ...became(line, 'restated') },
    ],
    pools: [{ of: [0] }],
  };
}

/** What didn't come back lies in missing, held by its difference. */
export function miss(line: Line, difference: DifferenceRef, short: Quantity): Legs {
  const toMark = { ...became(line, 'missing'), difference };
  const to: PlaceRef = { kind: 'missing' };
  return move({ lot: line.lot, from: memoOf(line), to, ...short, fromMark: out(line), toMark });
}

/** The customer keeps it: to the memo's kept place, not yet invoiced. */
export function keep(line: Line, kept: Quantity): Legs {
  const [from, to] = [memoOf(line), { keptOf: line.memoId }];
  const toMark = became(line, 'kept');
  return move({ lot: line.lot, from, to, ...kept, fromMark: out(line), toMark });
}

/** A kept line is on memo again. */
export function unKeep(line: Line, back: Quantity): Legs {
  const [from, to] = [{ keptOf: line.memoId }, memoOf(line)];
  const fromMark = became(line, 'kept');
  return move({ lot: line.lot, from, to, ...back, fromMark, toMark: out(line) });
}

/** A memo booked to the wrong party: each line back where it came from, at carried cost. */
export function undoMemo(lines: (Quantity & { line: Line; cameFrom: PlaceRef })[]): Legs {
  const undone = lines.map(({ line, cameFrom, weight, pieces }) =>
    move({
      lot: line.lot,
      from: memoOf(line),
      to: cameFrom,
      weight,
      pieces,
      fromMark: became(line, 'returned'),
    }),
  );
  return together(...undone);
}
