import { type Book, isInside, type Leg, type Movement } from '../book.js';
import { Plan } from '../plan.js';
import type { Chooser } from './goods.js';

const NEVER = ['reversal', 'sale', 'credit return', 'correction'];
const UNTOUCHED = ['write-off', 'return to supplier', 'return to consignor'];

/** Why a movement may not be undone any more; null where it may. */
export function whyNotUndone(book: Book, index: number): string | null {
  const undone = book.movements[index] as Movement;
  if (undone.isUndone) return 'undone before';
  if (NEVER.includes(undone.kind)) return 'never undone';
  const isSold = undone.legs.some(({ place }) => place === 'sold');
  if (undone.kind === 'bought from consignor' && isSold) return 'bought with a sale';
  const later = book.movements.slice(index + 1).flatMap(({ legs }) => legs);
  const isTouched = (leg: Leg) =>
    UNTOUCHED.includes(undone.kind)
      ? later.some(({ lot }) => lot === leg.lot)
      : isInside(leg.place) &&
        (leg.weight > 0 || leg.pieces > 0 || leg.cost > 0) &&
        later.some(({ lot, place }) => lot === leg.lot && place === leg.place);
  return undone.legs.some(isTouched) ? 'not the newest' : null;
}

/** Undoes one of the last movements, whether that is possible or not. */
export const undo: Chooser = (book, dice) => {
  if (book.movements.length === 0) return null;
  const reach = dice.isLucky(0.6) ? 3 : 40;
  const index = book.movements.length - dice.between(1, Math.min(reach, book.movements.length));
  return (now) => {
    const undone = now.movements[index] as Movement;
    const refusedFor = whyNotUndone(now, index);
    const plan = new Plan(now, 'reversal', {
      reverses: index,
      reason: 'a mistake',
      ...(refusedFor && { refusedFor }),
    });
    if (refusedFor) return plan;
    for (const { lot, place, weight, pieces, cost, line, flow, difference } of undone.legs) {
      const has = now.at(lot, place);
      const shareNow = now.rules.share(has.cost, Math.abs(weight), Math.max(1, has.weight));
      const back = Math.sign(-cost) * now.rules.undone(Math.abs(cost), shareNow) || 0;
      const mark = {
        ...(line && { line }),
        ...(flow && { flow }),
        ...(difference && { difference }),
      };
      const mirrored = { lot, place, weight: -weight || 0, pieces: -pieces || 0, cost: back };
      plan.leg({ ...mirrored, ...mark }, { how: 'given', amount: back });
      if (undone.kind === 'memo return' && flow === 'restated' && line) line.cameBackOff -= weight;
    }
    undone.isUndone = true;
    for (const difference of undone.answers) difference.isAnswered = false;
    for (const difference of undone.newDifferences) difference.isAnswered = true;
    return plan;
  };
};
