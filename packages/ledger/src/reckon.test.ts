import { expect, test } from 'vitest';

import { acceptDifference } from './answers.js';
import { assertBalanced, Unbalanced } from './balanced.js';
import { chargeSeveral, feeGoesIntoCost } from './costs.js';
import type { PlaceRef, Posting } from './leg.js';
import { adjustCount, writeOff } from './losses.js';
import { move, together } from './moves.js';
import { reckon } from './reckon.js';
import { costComingBack } from './selling.js';
import { shareOfCost } from './share-of-cost.js';
import { TestBook } from './test-book.js';

const P = { new: 'P' };
const SAFE: PlaceRef = { new: 'safe' };
const SHOW: PlaceRef = { new: 'show' };
const book = (weight = 3000, pieces = 30, cost = 100_00) =>
  new TestBook().put(P, SAFE, { weight, pieces, cost });
const to = (place: PlaceRef, weight: number, pieces: number) =>
  move({ lot: P, from: SAFE, to: place, weight, pieces });

test('a third of 100.00 leaves as 33.33, then 33.34, and the last weight takes the rest', () => {
  const parcel = book();
  const costs = [1, 2, 3].map(() => parcel.post(to(SHOW, 1000, 10))[1]?.cost);
  expect(costs).toEqual([33_33, 33_34, 33_33]);
});

test('a lot named twice in one movement leaves from what the first left', () => {
  const parcel = book();
  parcel.post(together(to(SHOW, 1000, 10), to({ new: 'other' }, 2000, 20)));
  expect(parcel.has(P, SAFE)).toEqual({ weight: 0, pieces: 0, cost: 0 });
  expect(parcel.has(P, { new: 'other' }).cost).toBe(66_67);
});

test('weight restated away leaves its cost to the rest', () => {
  const parcel = book();
  parcel.post(adjustCount(P, SAFE, { weight: -1000, pieces: 0 }));
  expect(parcel.has(P, SAFE)).toEqual({ weight: 2000, pieces: 30, cost: 100_00 });
  parcel.post(to(SHOW, 1000, 15));
  expect(parcel.has(P, SHOW).cost).toBe(50_00);
});

test('within one movement too: what was restated before a leg is gone for its share', () => {
  const parcel = book();
  parcel.post(together(adjustCount(P, SAFE, { weight: -1000, pieces: 0 }), to(SHOW, 1000, 15)));
  expect(parcel.has(P, SHOW).cost).toBe(50_00);
});

test('more than is there cannot leave', () => {
  expect(() => book().post(to(SHOW, 3001, 30))).toThrow(RangeError);
  expect(() => book().post(together(to(SHOW, 2000, 20), to(SHOW, 2000, 10)))).toThrow(RangeError);
});

test('a pool that waits for itself is a bug, not a cost of nothing', () => {
  const cost = { how: 'allotted', pool: 0, weight: 1 } as const;
  const leg = { lot: P, place: SAFE, weight: 0, pieces: 0, cost };
  expect(() => reckon({ legs: [leg], pools: [{ of: [0] }] }, () => null)).toThrow(/waits/);
});

const posting = (lot: string, place: PlaceRef, [weight, pieces, cost]: number[]): Posting => ({
  lot: { new: lot },
  place,
  weight: weight ?? 0,
  pieces: pieces ?? 0,
  cost: cost ?? 0,
});

test.each([
  ['weight', [1000, 1, 5]],
  ['pieces', [999, 2, 5]],
  ['cost', [999, 1, 6]],
])('a movement that makes %s appear is refused by its lot', (measure, arrives) => {
  const legs = [posting('A', SAFE, [-999, -1, -5]), posting('A', SHOW, arrives)];
  expect(() => assertBalanced(legs)).toThrow(Unbalanced);
  expect(() => assertBalanced(legs)).toThrow(`{"new":"A"} is off by 1 in ${measure}`);
});

test('two lots that each balance still cannot pass different cost through the conversion place', () => {
  const conversion: PlaceRef = { kind: 'conversion' };
  const legs = [
    posting('A', SAFE, [-5, -1, -9]),
    posting('A', conversion, [5, 1, 9]),
    posting('B', conversion, [-5, -1, -8]),
    posting('B', SAFE, [5, 1, 8]),
  ];
  expect(() => assertBalanced(legs)).toThrow('conversion is off by 1 in cost');
});

test('an accepted difference of a lot that weighs nothing anywhere loses its cost with it', () => {
  const missing: PlaceRef = { kind: 'missing' };
  const lost = new TestBook().put(P, missing, { weight: 80, pieces: 5, cost: 30_80 });
  lost.post(acceptDifference({ lot: P, difference: { id: 1 }, weight: 80, pieces: 5 }, null));
  expect(lost.has(P, { kind: 'loss' })).toEqual({ weight: 80, pieces: 5, cost: 30_80 });
});

test('a write-off carries its share of cost', () => {
  const parcel = book();
  parcel.post(writeOff(P, SAFE, { weight: 300, pieces: 3 }));
  expect(parcel.has(P, SAFE)).toEqual({ weight: 2700, pieces: 27, cost: 90_00 });
});

test('duty of 10.00 over three lots of the same weight is 3.34, 3.33 and 3.33', () => {
  const three = ['A', 'B', 'C'].map((name) => ({ lot: { new: name }, at: SAFE, share: 1000 }));
  const lots = new TestBook();
  for (const { lot } of three) lots.put(lot, SAFE, { weight: 1000, pieces: 1, cost: 0 });
  lots.post(chargeSeveral(10_00, three));
  expect(three.map(({ lot }) => lots.has(lot, SAFE).cost)).toEqual([3_34, 3_33, 3_33]);
});

test('a fee is cost only while the lot is ours and weighs something', () => {
  expect(feeGoesIntoCost({ isConsigned: false, weightInside: 10 })).toBe(true);
  expect(feeGoesIntoCost({ isConsigned: true, weightInside: 10 })).toBe(false);
  expect(feeGoesIntoCost({ isConsigned: false, weightInside: 0 })).toBe(false);
});

test('what comes back by credit notes is that sale’s own cost, to the last cent', () => {
  const sold = { weight: 3000, pieces: 30, cost: 100_00 };
  const first = costComingBack({ sold, alreadyBack: { weight: 0, pieces: 0, cost: 0 } }, 1000);
  const alreadyBack = { weight: 1000, pieces: 10, cost: first };
  expect([first, costComingBack({ sold, alreadyBack }, 2000)]).toEqual([33_33, 66_67]);
});

test('a share is rounded half away from zero', () => {
  expect(shareOfCost(5, 1, 2)).toBe(3);
  expect(shareOfCost(-5, 1, 2)).toBe(-3);
});
