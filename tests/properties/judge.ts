import { type Book, FLOWS, isInside, stillOut } from './book.js';
import type { Plan } from './plan.js';

/** Why what a plan leaves behind may not stand; null where it may. */
export function whyRefused(book: Book, plan: Plan): string | null {
  if (plan.more.refusedFor) return plan.more.refusedFor;
  for (const { lot, place, line } of plan.legs) {
    if (!book.mayLie(lot, place, book.at(lot, place))) return `${lot.key} at ${place}`;
    if (lot.isConsigned && book.at(lot, place).cost !== 0) return 'consigned goods carry no cost';
    const holders = [...lot.places].filter(([at, { pieces }]) => isInside(at) && pieces > 0);
    if (lot.fixedPieces !== null && holders.length > 1) return `${lot.key} in two places`;
    if (line && stillOut(line).weight < 0) return 'more than was sent';
    if (line && FLOWS.some((flow) => flow !== 'restated' && line.flows[flow].weight < 0)) {
      return 'a flow below nothing';
    }
  }
  return null;
}

/** Counts of what a book holds, before a plan that may have to be taken back. */
export const sizeOf = ({ lots, memos, differences }: Book) => ({
  lots: lots.length,
  memos: memos.length,
  differences: differences.length,
});

/** Takes a refused plan off the book again, as the database does by rolling back. */
export function takeBack(book: Book, plan: Plan, before: ReturnType<typeof sizeOf>): void {
  const undone = plan.kind === 'reversal' ? book.movements[plan.more.reverses ?? -1] : undefined;
  for (const leg of plan.legs) {
    const { weight, pieces, cost } = leg;
    book.post({ ...leg, weight: -weight, pieces: -pieces, cost: -cost });
    const isOff = leg.flow === 'restated' && (undone ?? plan).kind === 'memo return';
    if (isOff && leg.line) leg.line.cameBackOff -= weight;
  }
  for (const answered of plan.answers) answered.isAnswered = false;
  if (undone && !plan.more.refusedFor) {
    undone.isUndone = false;
    for (const answered of undone.answers) answered.isAnswered = true;
    for (const opened of undone.newDifferences) opened.isAnswered = false;
  }
  book.lots.length = before.lots;
  book.memos.length = before.memos;
  book.differences.length = before.differences;
}
