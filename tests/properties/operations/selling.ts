import { type Book, isInside, type Lot } from '../book.js';
import { Plan } from '../plan.js';
import { type Chooser, holding, inOwnHands, lotOf, partOf } from './goods.js';
import { buyInto } from './taking-in.js';

const isSaleable = (lot: Lot, place: string) =>
  place.startsWith('kept:') || (!lot.isConsigned && inOwnHands(lot, place));

/** Sold out of stock or out of what a customer keeps; a consignor's goods are bought and sold at once. */
export const sell: Chooser = (book, dice) => {
  const found = holding(book, dice, isSaleable);
  if (!found) return null;
  const { index, place, lot } = found;
  const goods = partOf(found.has, lot, dice);
  const price = dice.between(1, 900_000);
  return (now) => {
    const plan = new Plan(now, 'sale');
    const one = lotOf(now, index);
    if (!one.isConsigned) plan.move({ lot: one, from: place, to: 'sold', goods });
    else buyInto(plan, { theirs: one, from: place, to: 'sold', goods, price });
    return plan;
  };
};

interface Sale {
  movement: number;
  lot: Lot;
  weight: number;
  pieces: number;
  cost: number;
}

/** What of each sale has not come back yet. */
function sales(book: Book): Sale[] {
  const found = book.movements.flatMap(({ kind, legs }, movement): Sale[] =>
    kind === 'sale'
      ? legs.flatMap(({ lot, place, weight, pieces, cost }) =>
          place === 'sold' ? [{ movement, lot, weight, pieces, cost }] : [],
        )
      : [],
  );
  for (const { kind, legs, more } of book.movements) {
    const sale = found.find(({ movement }) => kind === 'credit return' && movement === more.sale);
    for (const leg of legs) {
      if (sale && leg.place === 'sold') {
        sale.weight += leg.weight;
        sale.pieces += leg.pieces;
        sale.cost += leg.cost;
      }
    }
  }
  return found.filter(({ weight }) => weight > 0);
}

/** Part of a sale back by a credit note, at that sale's own cost. */
export const credit: Chooser = (book, dice) => {
  const sale = dice.one(sales(book));
  if (!sale) return null;
  const goods = partOf(sale, sale.lot, dice);
  const index = book.lots.indexOf(sale.lot);
  return (now) => {
    const lot = lotOf(now, index);
    const own = sales(now).find(({ movement }) => movement === sale.movement) ?? sale;
    const plan = new Plan(now, 'credit return', { sale: sale.movement });
    const inside = [...lot.places].filter(([place]) => isInside(place));
    const weight = inside.reduce((sum, [, has]) => sum + has.weight, 0);
    const cost = inside.reduce((sum, [, has]) => sum + has.cost, 0);
    const average = now.rules.share(cost, goods.weight, Math.max(1, weight));
    const back = now.rules.credited(now.rules.share(own.cost, goods.weight, own.weight), average);
    const left = { lot, place: 'sold', weight: -goods.weight, pieces: -goods.pieces };
    const from = plan.leg({ ...left, cost: -back || 0 }, { how: 'given', amount: -back || 0 });
    plan.leg({ lot, place: 'return desk', ...goods, cost: back }, plan.all(from));
    return plan;
  };
};
