import { Plan } from '../plan.js';
import { type Chooser, holding, inOwnHands, lotOf, OWN, partOf } from './goods.js';

/** From one of our places to another. */
export const transfer: Chooser = (book, dice) => {
  const found = holding(book, dice, inOwnHands);
  const to = dice.one(OWN);
  if (!found || !to || to === found.place) return null;
  const { index, place, has, lot } = found;
  const goods = partOf(has, lot, dice);
  return (now) => {
    const plan = new Plan(now, 'transfer');
    plan.move({ lot: lotOf(now, index), from: place, to, goods });
    return plan;
  };
};

/** What came back, put away. */
export const putAway: Chooser = (book, dice) => {
  const found = holding(book, dice, (_lot, place) => ['return desk', 'quarantine'].includes(place));
  if (!found) return null;
  const { index, place, has, lot } = found;
  const goods = partOf(has, lot, dice);
  const to = dice.one(['drawer1', 'drawer2', 'show']) ?? 'drawer1';
  return (now) => {
    const plan = new Plan(now, 'put away');
    plan.move({ lot: lotOf(now, index), from: place, to, goods });
    return plan;
  };
};

/** More than lies there, or half of a stone: what must be refused. */
export const tooMuch: Chooser = (book, dice) => {
  const found = holding(book, dice, inOwnHands);
  if (!found) return null;
  const { index, place, has, lot } = found;
  const isHalf = lot.fixedPieces !== null && has.weight > 20 && dice.isLucky(0.5);
  const goods = isHalf
    ? { weight: 10 * dice.between(1, has.weight / 10 - 1), pieces: dice.between(0, 1) }
    : { weight: has.weight + 10 * dice.between(1, 500), pieces: has.pieces };
  const to = place === 'show' ? 'person' : 'show';
  return (now) => {
    const plan = new Plan(now, 'transfer');
    plan.move({ lot: lotOf(now, index), from: place, to, goods });
    return plan;
  };
};

/** To a laboratory or workshop. */
export const sendToWork: Chooser = (book, dice) => {
  const found = holding(book, dice, inOwnHands);
  if (!found) return null;
  const { index, place, has, lot } = found;
  const goods = partOf(has, lot, dice);
  const to = dice.isLucky(0.5) ? 'laboratory' : 'workshop';
  return (now) => {
    const plan = new Plan(now, `${to} out`);
    plan.move({ lot: lotOf(now, index), from: place, to, goods });
    return plan;
  };
};

/** Back from there, with the fee where the goods are ours. */
export const backFromWork: Chooser = (book, dice) => {
  const found = holding(book, dice, (_lot, place) => ['laboratory', 'workshop'].includes(place));
  if (!found) return null;
  const { index, place, has, lot } = found;
  const goods = partOf(has, lot, dice);
  const fee = lot.isConsigned || dice.isLucky(0.3) ? 0 : dice.between(1, 20_000);
  return (now) => {
    const plan = new Plan(now, `${place} back`);
    const one = lotOf(now, index);
    plan.move({ lot: one, from: place, to: 'drawer1', goods });
    if (fee > 0) plan.named(one, 'charges', -now.rules.fee(fee) || 0, { place: 'drawer1' });
    return plan;
  };
};
