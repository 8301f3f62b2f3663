import { isInside, type Lot } from '../book.js';
import { markAt, Plan } from '../plan.js';
import { type Chooser, holding, inOwnHands, lotOf, partOf } from './goods.js';

const isOurs = (lot: Lot, place: string) => !lot.isConsigned && inOwnHands(lot, place);
const isOurParcel = (lot: Lot, place: string) => isOurs(lot, place) && lot.fixedPieces === null;

/** A fee into the cost of a lot, also where it lies on a memo. */
export const charge: Chooser = (book, dice) => {
  const found = holding(
    book,
    dice,
    (lot, place) => isOurs(lot, place) || (!lot.isConsigned && place.startsWith('memo:')),
  );
  if (!found) return null;
  const { index, place } = found;
  const fee = dice.between(1, 20_000);
  return (now) => {
    const plan = new Plan(now, 'charge');
    const lot = lotOf(now, index);
    plan.named(lot, 'charges', -now.rules.fee(fee) || 0, { place, ...markAt(now, lot, place) });
    return plan;
  };
};

/** Cost taken off a lot that is worth less. */
export const writeDown: Chooser = (book, dice) => {
  const found = holding(book, dice, isOurs);
  if (!found || found.has.cost < 1) return null;
  const { index, place, has } = found;
  const amount = dice.between(1, has.cost);
  return (now) => {
    const plan = new Plan(now, 'write-down', { reason: 'worth less' });
    plan.named(lotOf(now, index), 'loss', now.rules.writeDown(amount), { place });
    return plan;
  };
};

/** Goods written off with their share of cost. */
export const writeOff: Chooser = (book, dice) => {
  const found = holding(book, dice, isOurs);
  if (!found) return null;
  const { index, place, lot } = found;
  const goods = partOf(found.has, lot, dice);
  return (now) => {
    const plan = new Plan(now, 'write-off', { reason: 'broken' });
    const one = lotOf(now, index);
    const left = plan.take(one, place, goods);
    const cost = now.rules.writtenOff(-plan.costOf(left) || 0);
    plan.leg({ lot: one, place: 'loss', ...goods, cost }, plan.all(left));
    return plan;
  };
};

/** A count that finds more or less weight, or other pieces of an estimated parcel. */
export const adjustCount: Chooser = (book, dice) => {
  const found = holding(book, dice, isOurParcel);
  if (!found) return null;
  const { index, place, has, lot } = found;
  const weight = 10 * (dice.one([-2, -1, 1, 2, 3]) ?? 1);
  const pieces = lot.isEstimated && has.pieces > 5 ? dice.between(-3, 3) : 0;
  const kind = dice.isLucky(0.5) ? 'count adjustment' : 'restatement';
  return (now) => {
    const plan = new Plan(now, kind, { reason: 'counted' });
    plan.restate(lotOf(now, index), place, { weight, pieces });
    return plan;
  };
};

/** A price found wrong later: over what still lies inside by weight, the rest to expense. */
export const correctCost: Chooser = (book, dice) => {
  const bought = book.movements.flatMap(({ kind, legs, isUndone }, movement) =>
    ['purchase', 'opening'].includes(kind) && !isUndone
      ? legs.flatMap(({ lot, place }) => (place === 'supplier' ? [{ movement, lot }] : []))
      : [],
  );
  const one = dice.one(bought);
  if (!one) return null;
  const { lot, movement } = one;
  const inside = [...lot.places].filter(([place, { weight }]) => isInside(place) && weight > 0);
  if (inside.length === 0 || inside.some(([place]) => place === 'missing')) return null;
  const index = book.lots.indexOf(lot);
  const had = -(book.movements[movement]?.legs.find((leg) => leg.lot === lot)?.weight ?? 0);
  const left = inside.reduce((sum, [, { weight }]) => sum + weight, 0);
  const tooHigh = dice.between(-50_000, 50_000) || 1;
  return (now) => {
    const plan = new Plan(now, 'correction', { corrects: movement, reason: 'other price' });
    const same = lotOf(now, index);
    const still = { lot: same, weight: 0, pieces: 0 };
    const named = plan.leg(
      { ...still, place: 'supplier', cost: tooHigh },
      {
        how: 'given',
        amount: tooHigh,
      },
    );
    const gone = Math.max(0, had - left);
    const [onInside = 0, onGone = 0] = now.rules.corrected(left, gone);
    const weights = [...inside.map(([, { weight }]) => weight), ...(gone > 0 ? [gone] : [])];
    const asked = gone > 0 ? [...weights.slice(0, -1), onGone] : weights;
    const costs = now.rules.allot(-tooHigh, onInside > 0 ? asked : weights);
    const pool = plan.pool(named);
    for (const [at, [place, { weight }]] of inside.entries()) {
      const leg = { ...still, place, cost: costs[at] ?? 0, ...markAt(now, same, place) };
      plan.leg(leg, { how: 'allotted', pool, weight });
    }
    if (gone > 0) {
      const expense = { ...still, place: 'charges', cost: costs.at(-1) ?? 0 };
      plan.leg(expense, { how: 'allotted', pool, weight: gone });
    }
    return plan;
  };
};
