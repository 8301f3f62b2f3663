import type { Lot } from '../book.js';
import { NONE, Plan } from '../plan.js';
import { type Chooser, holding, lotOf, partOf } from './goods.js';

const isOurs = (lot: Lot, place: string) => !lot.isConsigned && place.startsWith('drawer');
const isParcel = (lot: Lot, place: string) => isOurs(lot, place) && lot.fixedPieces === null;

interface Part {
  weight: number;
  pieces: number;
  share: number;
}

/** What passes the conversion place comes out as parts that share its cost by largest remainder. */
function comeOut(
  plan: Plan,
  passed: number[],
  parts: Part[],
  { make, to }: { make: () => Lot; to: string },
): void {
  const total = passed.reduce((sum, index) => sum + plan.costOf(index), 0);
  const costs = plan.book.rules.allot(
    total,
    parts.map(({ share }) => share),
  );
  const pool = plan.pool(...passed);
  for (const [index, { weight, pieces, share }] of parts.entries()) {
    const lot = make();
    const cost = costs[index] ?? 0;
    const came = plan.leg(
      { lot, place: 'conversion', weight: -weight, pieces: -pieces, cost: -cost || 0 },
      { how: 'allotted', pool, weight: share },
    );
    plan.leg({ lot, place: to, weight, pieces, cost }, plan.all(came));
  }
}

/** A parcel split in two, or sorted in two with a loss, by weight or by what the parts are worth. */
export const divide: Chooser = (book, dice) => {
  const found = holding(book, dice, (lot, place) => isParcel(lot, place));
  if (!found || found.has.weight < 60 || found.has.pieces < 2) return null;
  const { index, place, has, lot } = found;
  const isSort = dice.isLucky(0.5);
  const mostWithin = 10 * Math.floor((has.weight * 4) / 10_000);
  const isWithin = dice.isLucky(0.6) && mostWithin > 0;
  const lost = isSort ? (isWithin ? mostWithin : mostWithin + 10 * dice.between(1, 3)) : 0;
  const left = { weight: has.weight - lost, pieces: has.pieces };
  const first = partOf(left, lot, dice);
  if (first.weight === left.weight) return null;
  const second = { weight: left.weight - first.weight, pieces: left.pieces - first.pieces };
  const byWorth = dice.isLucky(0.5);
  const parts = [first, second].map((part) => ({
    ...part,
    share: byWorth ? part.weight * dice.between(1, 90_000) : part.weight,
  }));
  return (now) => {
    const plan = new Plan(now, 'conversion', { word: isSort ? 'sort' : 'split' });
    const one = lotOf(now, index);
    const taken = plan.take(one, place, has);
    const all = -plan.costOf(taken) || 0;
    const [, itsShare = 0] = now.rules.allot(all, [left.weight, lost]);
    const gone = lost > 0 ? now.rules.sortingLoss(itsShare, isWithin) : 0;
    const pool = plan.pool(taken);
    const rest = { ...left, cost: all - gone };
    const passed = plan.leg(
      { lot: one, place: 'conversion', ...rest },
      { how: 'allotted', pool, weight: left.weight },
    );
    if (lost > 0) {
      const loss = { lot: one, place: 'loss', weight: lost, pieces: 0, cost: gone };
      plan.leg(loss, isWithin ? NONE : { how: 'allotted', pool, weight: lost });
    }
    comeOut(plan, [passed], parts, {
      make: () => plan.makeLot('parcel', { isEstimated: lot.isEstimated }),
      to: place,
    });
    return plan;
  };
};

/** Two parcels mixed into one, or a pair broken into its stones. */
export const mixOrBreak: Chooser = (book, dice) => {
  if (dice.isLucky(0.4)) return breakPair(book, dice);
  const found = [holding(book, dice, isParcel), holding(book, dice, isParcel)];
  const [a, b] = found;
  if (!a || !b || a.index === b.index) return null;
  const sources = [a, b].map(({ index, place, has, lot }) => ({
    index,
    place,
    goods: partOf(has, lot, dice),
  }));
  const isEstimated = a.lot.isEstimated || b.lot.isEstimated;
  return (now) => {
    const plan = new Plan(now, 'conversion', { word: 'mix' });
    const passed = sources.map(({ index, place, goods }) => {
      const lot = lotOf(now, index);
      const taken = plan.take(lot, place, goods);
      const cost = -plan.costOf(taken) || 0;
      return plan.leg({ lot, place: 'conversion', ...goods, cost }, plan.all(taken));
    });
    const weight = sources.reduce((sum, { goods }) => sum + goods.weight, 0);
    const pieces = sources.reduce((sum, { goods }) => sum + goods.pieces, 0);
    const part = { weight, pieces, share: 1 };
    comeOut(plan, passed, [part], {
      make: () => plan.makeLot('parcel', { isEstimated }),
      to: 'drawer1',
    });
    return plan;
  };
};

const breakPair: Chooser = (book, dice) => {
  const found = holding(book, dice, (lot, place) => isOurs(lot, place) && lot.kind === 'pair');
  if (!found) return null;
  const { index, place, has } = found;
  const first = 10 * dice.between(1, has.weight / 10 - 1);
  const parts = [first, has.weight - first].map((weight) => ({ weight, pieces: 1, share: weight }));
  return (now) => {
    const plan = new Plan(now, 'conversion', { word: 'break' });
    const lot = lotOf(now, index);
    const taken = plan.take(lot, place, has);
    const passes = { ...has, cost: -plan.costOf(taken) || 0 };
    const passed = plan.leg({ lot, place: 'conversion', ...passes }, plan.all(taken));
    comeOut(plan, [passed], parts, { make: () => plan.makeLot('stone'), to: place });
    return plan;
  };
};

/** A stone cut at the workshop: weight goes without cost, labour comes in. */
export const recut: Chooser = (book, dice) => {
  const found = holding(
    book,
    dice,
    (lot, place) => lot.kind === 'stone' && !lot.isConsigned && place === 'workshop',
  );
  if (!found || found.has.weight < 40) return null;
  const { index, has } = found;
  const lost = 10 * dice.between(1, has.weight / 20);
  const labour = dice.between(1, 30_000);
  return (now) => {
    const plan = new Plan(now, 'recut');
    const lot = lotOf(now, index);
    plan.named(lot, 'charges', -labour, { place: 'workshop' });
    const share = now.rules.share(now.at(lot, 'workshop').cost, lost, has.weight);
    const gone = now.rules.cutAway(share);
    plan.leg({ lot, place: 'workshop', weight: -lost, pieces: 0, cost: -gone || 0 }, NONE);
    plan.leg({ lot, place: 'loss', weight: lost, pieces: 0, cost: gone }, NONE);
    return plan;
  };
};
