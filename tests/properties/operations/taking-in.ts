import type { Lot } from '../book.js';
import type { Dice } from '../dice.js';
import { NONE, Plan } from '../plan.js';
import { type Chooser, holding, inOwnHands, lotOf, OWN, partOf } from './goods.js';

interface Arrival {
  kind: Lot['kind'];
  isEstimated: boolean;
  weight: number;
  pieces: number;
  to: string;
  share: number;
}

function arrival(dice: Dice): Arrival {
  const kind = dice.isLucky(0.35) ? 'stone' : dice.isLucky(0.15) ? 'pair' : 'parcel';
  const to = OWN[dice.between(0, 3)] ?? 'drawer1';
  const share = dice.between(1, 9999);
  if (kind !== 'parcel') {
    const weight = 10 * dice.between(20, 400);
    return { kind, isEstimated: false, weight, pieces: kind === 'stone' ? 1 : 2, to, share };
  }
  const weight = 10 * dice.between(100, 6000);
  const pieces = Math.max(2, Math.floor(weight / dice.between(15, 300)));
  return { kind, isEstimated: dice.isLucky(0.6), weight, pieces, to, share };
}

/** Opening stock, or several lots bought for one sum. */
export const takeIn: Chooser = (_book, dice) => {
  const kind = dice.isLucky(0.4) ? 'opening' : 'purchase';
  const arrivals = Array.from({ length: dice.between(1, 3) }, () => arrival(dice));
  const total = dice.between(0, 4_000_000);
  return (book) => {
    const plan = new Plan(book, kind);
    const costs = book.rules.allot(
      total,
      arrivals.map(({ share }) => share),
    );
    for (const [index, { kind: lotKind, isEstimated, weight, pieces, to }] of arrivals.entries()) {
      const lot = plan.makeLot(lotKind, { isEstimated });
      const cost = costs[index] ?? 0;
      const left = plan.leg(
        { lot, place: 'supplier', weight: -weight, pieces: -pieces, cost: -cost || 0 },
        { how: 'given', amount: -cost || 0 },
      );
      plan.leg({ lot, place: to, weight, pieces, cost }, plan.all(left));
    }
    return plan;
  };
};

/** Goods in from a consignor, without cost. */
export const consignIn: Chooser = (_book, dice) => {
  const { kind, isEstimated, weight, pieces, to } = arrival(dice);
  return (book) => {
    const plan = new Plan(book, 'consignment in');
    const lot = plan.makeLot(kind, { isEstimated, isConsigned: true });
    plan.leg({ lot, place: 'memo in', weight: -weight, pieces: -pieces, cost: 0 }, NONE);
    plan.leg({ lot, place: to, weight, pieces, cost: 0 }, NONE);
    return plan;
  };
};

/** Goods back to whom they came from. */
export const giveBack: Chooser = (book, dice) => {
  const found = holding(book, dice, inOwnHands);
  if (!found) return null;
  const { index, place, lot } = found;
  const goods = partOf(found.has, lot, dice);
  const kind = lot.isConsigned ? 'return to consignor' : 'return to supplier';
  const to = lot.isConsigned ? 'memo in' : 'supplier';
  return (now) => {
    const plan = new Plan(now, kind);
    plan.move({ lot: lotOf(now, index), from: place, to, goods });
    return plan;
  };
};

/** A consignor's goods bought where they lie, for a price of their own. */
export const buyConsigned: Chooser = (book, dice) => {
  const found = holding(book, dice, (lot, place) => lot.isConsigned && inOwnHands(lot, place));
  if (!found) return null;
  const { index, place, lot } = found;
  const goods = partOf(found.has, lot, dice);
  const price = dice.between(1, 900_000);
  return (now) => {
    const plan = new Plan(now, 'bought from consignor');
    buyInto(plan, { theirs: lotOf(now, index), from: place, to: place, goods, price });
    return plan;
  };
};

/** His lot passes the conversion place without cost, ours comes out of it at the price. */
export function buyInto(
  plan: Plan,
  bought: {
    theirs: Lot;
    from: string;
    to: string;
    goods: { weight: number; pieces: number };
    price: number;
    fromMark?: object;
    becameMark?: object;
  },
): void {
  const { theirs, from, to, goods, price, fromMark, becameMark } = bought;
  const { weight, pieces } = goods;
  plan.take(theirs, from, goods, fromMark);
  plan.leg({ lot: theirs, place: 'conversion', ...goods, cost: 0, ...becameMark }, NONE);
  const ours = plan.makeLot(theirs.kind, { isEstimated: theirs.isEstimated }, theirs);
  plan.leg({ lot: ours, place: 'conversion', weight: -weight, pieces: -pieces, cost: 0 }, NONE);
  const cost = plan.book.rules.bought(price);
  const paid = plan.leg(
    { lot: ours, place: 'supplier', weight: 0, pieces: 0, cost: -cost || 0 },
    { how: 'given', amount: -cost || 0 },
  );
  plan.leg({ lot: ours, place: to, weight, pieces, cost }, plan.all(paid));
}
