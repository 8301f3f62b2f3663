import { type Book, type Difference, isInside, type Mark } from '../book.js';
import type { Dice } from '../dice.js';
import { markAt, NONE, Plan } from '../plan.js';
import type { Chooser, Operation } from './goods.js';
import { buyInto } from './taking-in.js';

function openDifference(book: Book, dice: Dice): number | null {
  const open = book.differences.flatMap(({ isAnswered, weight }, index) =>
    !isAnswered && weight > 0 ? [index] : [],
  );
  return dice.one(open) ?? null;
}

function answering(book: Book, index: number, answer: string): { plan: Plan; held: Difference } {
  const held = book.differences[index];
  if (!held) throw new Error(`no difference ${index}`);
  const memo = held.line ? { memo: held.line.memo } : {};
  const plan = new Plan(book, 'difference answered', { ...memo, answer });
  plan.answers.push(held);
  held.isAnswered = true;
  return { plan, held };
}

const missingMark = (held: Difference): Mark => ({
  difference: held,
  ...(held.line && { line: held.line, flow: 'missing' }),
});

/** What the difference holds goes somewhere with its cost, and the line says what became of it. */
function goesTo(
  index: number,
  answer: string,
  where: (held: Difference) => { to: string; toMark: Mark },
): Operation {
  return (now) => {
    const { plan, held } = answering(now, index, answer);
    const { lot, weight, pieces } = held;
    const { to, toMark } = where(held);
    const fromMark = missingMark(held);
    plan.move({ lot, from: 'missing', to, goods: { weight, pieces }, fromMark, toMark });
    return plan;
  };
}

const by = (held: Difference, flow: 'kept' | 'returned' | 'out' | 'written_off'): Mark =>
  held.line ? { line: held.line, flow } : {};

/** Found again, whether with us or in the record. */
export const foundAgain: Chooser = (book, dice) => {
  const index = openDifference(book, dice);
  if (index === null) return null;
  const to = dice.one(['return desk', 'drawer1', 'drawer2']) ?? 'return desk';
  const answer = to === 'return desk' ? 'found again' : 'record corrected';
  return goesTo(index, answer, (held) => ({ to, toMark: by(held, 'returned') }));
};

/** The customer keeps it too, or still has it on memo. */
export const staysWithCustomer: Chooser = (book, dice) => {
  const index = openDifference(book, dice);
  const line = book.differences[index ?? -1]?.line;
  if (index === null || !line) return null;
  if (dice.isLucky(0.3)) {
    const to = `memo:${line.memo}`;
    return goesTo(index, 'record corrected', (held) => ({ to, toMark: by(held, 'out') }));
  }
  const to = `kept:${line.memo}`;
  const kept = goesTo(index, 'customer keeps it', (held) => ({ to, toMark: by(held, 'kept') }));
  return (now) => {
    const plan = kept(now);
    const held = plan.answers[0];
    const leg = plan.legs.find(({ place }) => place === to);
    if (held?.line && leg) {
      plan.keeps.push({ line: held.line, weight: leg.weight, pieces: leg.pieces });
    }
    return plan;
  };
};

/** Written off with its cost; a consignor's goods are bought first, then lost. */
export const writeOffMissing: Chooser = (book, dice) => {
  const index = openDifference(book, dice);
  if (index === null) return null;
  const price = dice.between(1, 90_000);
  if (!book.differences[index]?.lot.isConsigned) {
    return (now) => {
      const { plan, held } = answering(now, index, 'written off');
      const { lot, weight, pieces } = held;
      const left = plan.take(lot, 'missing', { weight, pieces }, missingMark(held));
      const cost = now.rules.writtenOff(-plan.costOf(left) || 0);
      plan.leg(
        { lot, place: 'loss', weight, pieces, cost, ...by(held, 'written_off') },
        plan.all(left),
      );
      return plan;
    };
  }
  return (now) => {
    const { plan, held } = answering(now, index, 'written off');
    const { weight, pieces } = held;
    buyInto(plan, {
      theirs: held.lot,
      from: 'missing',
      to: 'loss',
      goods: { weight, pieces },
      price,
      fromMark: missingMark(held),
      becameMark: by(held, 'written_off'),
    });
    return plan;
  };
};

/** Accepted as a weighing difference: weight is lost, its cost goes back to where the lot has weight. */
export const accept: Chooser = (book, dice) => {
  const index = openDifference(book, dice);
  const held = book.differences[index ?? -1];
  if (index === null || !held || held.lot.fixedPieces !== null) return null;
  const holds = [...held.lot.places].filter(
    ([place, { weight }]) => isInside(place) && place !== 'missing' && weight > 0,
  );
  const costTo = dice.one(holds)?.[0];
  return (now) => {
    const { plan, held: one } = answering(now, index, 'accepted');
    const { lot, weight, pieces, line } = one;
    const left = plan.take(lot, 'missing', { weight, pieces }, missingMark(one));
    const all = -plan.costOf(left) || 0;
    const restated: Mark = line ? { line, flow: 'restated' } : {};
    const back = costTo ? now.rules.accepted(all) : 0;
    const lost = { lot, place: 'loss', weight, pieces, cost: all - back, ...restated };
    plan.leg(lost, costTo ? NONE : plan.all(left));
    if (costTo) {
      const still = { lot, place: costTo, weight: 0, pieces: 0, cost: back };
      plan.leg({ ...still, ...markAt(now, lot, costTo) }, plan.all(left));
    }
    return plan;
  };
};
