import type { DifferenceRow, MemoLine } from '@foldwell/contracts';

/** What a line shows of its weighing, in thousandths of a carat; nulls where nothing is weighed of what is out. */
export interface LineReading {
  expected: number;
  found: number | null;
  off: number | null;
}

/** An open difference speaks first; what is still out waits for its own reading; a settled line sums its parts. */
export function readingOf(line: MemoLine, difference: DifferenceRow | undefined): LineReading {
  if (difference) {
    const { expected, found } = difference;
    return { expected, found, off: found - expected };
  }
  const { out, sent, kept, returned, restated } = line.flows;
  if (out > 0 || line.found === null) return { expected: out, found: null, off: null };
  // A stone moves at its ledger weight, so its reading says more than what came back.
  if (line.lotKind !== 'parcel')
    return { expected: sent - kept, found: line.found, off: line.found - (sent - kept) };
  return { expected: sent - kept, found: returned, off: -restated };
}
