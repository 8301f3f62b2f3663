import { buy, reckon, sell } from '@foldwell/ledger';
import { largestRemainder } from '@foldwell/quantities';
import { expect, test } from 'vitest';

/**
 * R. Aufmann, J. Lockwood, R. Nation, D. Clegg, Mathematical Excursions, 4th edition, section 4.1,
 * exercise 2 (the United States of 1790, 105 seats by Hamilton's method), as its solution was
 * printed at bartleby.com; the six states whose seats were read.
 */
test('largest remainder gives the states of 1790 the seats that Hamilton’s method gave them', () => {
  const people = {
    Connecticut: 236_841,
    Delaware: 55_540,
    Georgia: 70_835,
    Maryland: 278_514,
    Massachusetts: 475_327,
    Kentucky: 68_705,
    'New Hampshire': 141_822,
    Vermont: 85_533,
    'New York': 331_591,
    'New Jersey': 179_570,
    Pennsylvania: 432_879,
    'North Carolina': 353_523,
    'South Carolina': 206_236,
    Virginia: 630_560,
    'Rhode Island': 68_446,
  };
  expect(Object.values(people).reduce((sum, one) => sum + one, 0)).toBe(3_615_922);
  const seats = largestRemainder(105, Object.values(people));
  expect(seats.slice(0, 6)).toEqual([7, 2, 2, 8, 14, 2]);
  expect(seats.reduce((sum, one) => sum + one, 0)).toBe(105);
});

/**
 * A perpetual moving average from a textbook's inventory chapter (chapter 8, "Waterway Industries"),
 * as a study set at quizlet.com, 634164174, printed its answer: 53,602, to the nearest dollar.
 */
test('a moving average over two purchases and two sales leaves what the textbook says', () => {
  const goods = { new: 'goods' };
  const store = { new: 'store' };
  const held = { weight: 0, pieces: 0, cost: 0 };
  const post = (legs: ReturnType<typeof buy>) => {
    const postings = reckon(legs, (_lot, place) => ('kind' in place ? null : held));
    for (const { place, weight, pieces, cost } of postings.filter(
      ({ place: at }) => at === store,
    )) {
      expect(place).toBe(store);
      held.weight += weight;
      held.pieces += pieces;
      held.cost += cost;
    }
  };
  const bought = (units: number, cents: number) =>
    post(buy(cents, [{ lot: goods, to: store, weight: units, pieces: units, share: 1 }]));
  const sold = (units: number) =>
    post(sell([{ lot: goods, from: store, weight: units, pieces: units }]));
  bought(9200, 89_332_00);
  bought(6300, 64_449_00);
  sold(7400);
  bought(8200, 87_658_00);
  sold(11_100);
  expect(held.weight).toBe(5200);
  expect(Math.round(held.cost / 100)).toBe(53_602);
});
