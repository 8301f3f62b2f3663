import { largestRemainder } from '@foldwell/quantities';
import fc from 'fast-check';
import { expect, test } from 'vitest';

import { convert } from './conversions.js';
import type { PlaceRef } from './leg.js';
import { bringBack, type Line, sendOut } from './memos.js';
import { reversalOf } from './reversal.js';
import { buy } from './taking-in.js';
import { TestBook } from './test-book.js';

const P = { new: 'P' };
const SAFE: PlaceRef = { new: 'safe' };
const DESK: PlaceRef = { kind: 'return desk' };
const LINE_PLACE: PlaceRef = { memoOf: 1 };
const LINE: Line = { lot: P, memoId: 1, lineId: 1 };

const parcel = fc.record({
  weight: fc.integer({ min: 1, max: 5_000_000 }),
  cost: fc.integer({ min: 0, max: 900_000_000_000 }),
});
/** Where a whole is cut, as shares of it. */
const cuts = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 30 });

/** Cuts a whole number into parts that are each at least 1. */
function cutUp(whole: number, at: number[]): number[] {
  const marks = [...new Set(at.map((share) => Math.floor(share * whole)))].sort((a, b) => a - b);
  const inside = marks.filter((mark) => mark > 0 && mark < whole);
  return [...inside, whole].map((mark, index) => mark - (inside[index - 1] ?? 0));
}

test('a parcel that comes back handful by handful brings exactly the cost that went out', () => {
  fc.assert(
    fc.property(parcel, cuts, ({ weight, cost }, at) => {
      const book = new TestBook().put(P, LINE_PLACE, { weight, pieces: weight, cost });
      for (const handful of cutUp(weight, at)) {
        const [, back] = book.post(bringBack(LINE, DESK, { weight: handful, pieces: handful }));
        expect(back?.cost).toBeGreaterThanOrEqual(0);
      }
      expect(book.has(P, DESK)).toEqual({ weight, pieces: weight, cost });
      expect(() => book.post(bringBack(LINE, DESK, { weight: 1, pieces: 1 }))).toThrow(RangeError);
    }),
  );
});

test('sent in several lines of one movement or in several movements, the same cost goes', () => {
  fc.assert(
    fc.property(parcel, cuts, ({ weight, cost }, at) => {
      const lines = cutUp(weight, at).map((part) => ({
        lot: P,
        from: SAFE,
        weight: part,
        pieces: part,
      }));
      const whole = { weight, pieces: weight, cost };
      const [one, many] = [new TestBook().put(P, SAFE, whole), new TestBook().put(P, SAFE, whole)];
      const atOnce = one.post(sendOut(lines)).filter((leg) => leg.weight > 0);
      const oneByOne = lines.flatMap((line) => many.post(sendOut([line])).slice(1));
      expect(atOnce.map((leg) => leg.cost)).toEqual(oneByOne.map((leg) => leg.cost));
    }),
  );
});

test('a lot cut into parts gives each its share to the unit, and all of it', () => {
  fc.assert(
    fc.property(parcel, cuts, fc.nat(5000), ({ weight, cost }, at, worth) => {
      const parts = cutUp(weight, at).map((part, index) => ({
        lot: { new: `part ${index}` },
        to: SAFE,
        weight: part,
        pieces: part,
        share: part * (1 + ((worth + index) % 7)),
      }));
      const book = new TestBook().put(P, SAFE, { weight, pieces: weight, cost });
      book.post(convert([{ lot: P, from: SAFE, weight, pieces: weight }], parts));
      const shares = parts.reduce((sum, { share }) => sum + BigInt(share), 0n);
      for (const { lot, share } of parts) {
        const given = BigInt(book.has(lot, SAFE).cost);
        // Within one unit of the exact share, without leaving whole numbers.
        const off = given * shares - BigInt(cost) * BigInt(share);
        expect(off < shares && -off < shares).toBe(true);
      }
      const inside = Object.values(book.inside());
      expect(inside.reduce((sum, held) => sum + held.cost, 0)).toBe(cost);
      expect(inside.reduce((sum, held) => sum + held.weight, 0)).toBe(weight);
    }),
  );
});

test('a box bought for one price costs what was paid, however it is shared', () => {
  const lots = fc.array(
    fc.record({ weight: fc.integer({ min: 1, max: 1_000_000 }), share: fc.nat(1_000_000) }),
    { minLength: 1, maxLength: 40 },
  );
  fc.assert(
    fc.property(fc.nat(2_000_000_000), lots, (total, box) => {
      const book = new TestBook();
      const arrivals = box.map(({ weight, share }, index) => ({
        lot: { new: `lot ${index}` },
        to: SAFE,
        weight,
        pieces: 1,
        share,
      }));
      book.post(buy(total, arrivals));
      const costs = Object.values(book.inside()).map(({ cost }) => cost);
      expect(costs.reduce((sum, cost) => sum + cost, 0)).toBe(total);
    }),
  );
});

test('a movement and its reversal leave nothing behind', () => {
  fc.assert(
    fc.property(parcel, fc.integer({ min: 1, max: 1000 }), ({ weight, cost }, share) => {
      const part = Math.max(1, Math.floor((weight * share) / 1000));
      const before = { weight, pieces: weight, cost };
      const book = new TestBook().put(P, SAFE, before);
      const sent = book.post(sendOut([{ lot: P, from: SAFE, weight: part, pieces: part }]));
      const back = reversalOf(sent);
      const sums = back.filter(({ place }) => place === SAFE).map(({ cost: back }) => back);
      expect(book.has(P, SAFE).cost + sums.reduce((sum, one) => sum + one, 0)).toBe(cost);
      expect(back.map(({ weight: one }) => one)).toEqual([part, -part]);
    }),
  );
});

test('largest remainder: parts add to the whole, each within one unit, equal weights in order', () => {
  const weights = fc.array(fc.nat(1_000_000_000), { minLength: 1, maxLength: 60 });
  fc.assert(
    fc.property(fc.integer({ min: -1e15, max: 1e15 }), weights, (total, by) => {
      fc.pre(by.some((weight) => weight > 0));
      const parts = largestRemainder(total, by);
      const sum = by.reduce((all, weight) => all + BigInt(weight), 0n);
      expect(parts.reduce((all, part) => all + part, 0)).toBe(total);
      for (const [index, part] of parts.entries()) {
        const off = BigInt(part) * sum - BigInt(total) * BigInt(by[index] ?? 0);
        expect(off < sum && -off < sum).toBe(true);
      }
    }),
  );
});
