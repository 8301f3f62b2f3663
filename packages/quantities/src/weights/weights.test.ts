import { expect, test } from 'vitest';

import { formatPieces, pieces, piecesFollowing } from '../pieces.js';
import { averageCarats, stonesPerCarat } from './averages.js';
import { formatCarats, formatCaratsColumn, formatPoints } from './format-weight.js';
import { milliCarats, milligrams, sumWeights } from './milli-carats.js';
import { agreesWithReport, statedWeight } from './stated-weight.js';

const w = milliCarats;

test.each([
  [998, 990],
  [999, 1000],
  [1004, 1000],
  [25, 20],
  [125, 120],
  [9, 10],
  [0, 0],
])('a stone of %i thousandths is stated as %i', (weight, stated) => {
  expect(statedWeight(w(weight))).toBe(stated);
});

test('ten stones of 0.998 ct are 9.98 ct on the balance and 9.90 ct as stated', () => {
  const stones = Array.from({ length: 10 }, () => w(998));
  expect(formatCarats(sumWeights(stones))).toBe('9.98');
  expect(formatCarats(sumWeights(stones.map(statedWeight)))).toBe('9.90');
});

test('a house band from 1.00 ct holds 0.999 on the balance, not 0.998', () => {
  expect(statedWeight(w(999)) >= 1000).toBe(true);
  expect(statedWeight(w(998)) >= 1000).toBe(false);
});

test('a stone agrees with its report at one hundredth away only where the step is 0.01', () => {
  expect(agreesWithReport(w(1510), w(1520), 10)).toBe(true);
  expect(agreesWithReport(w(1510), w(1530), 10)).toBe(false);
  expect(agreesWithReport(w(1768), w(1760), 1)).toBe(true);
  expect(agreesWithReport(w(1769), w(1760), 1)).toBe(false);
});

test('weights show two decimals, three where the third is not zero, and a true minus', () => {
  expect(formatCarats(48620)).toBe('48.62');
  expect(formatCarats(1234)).toBe('1.234');
  expect(formatCarats(-80)).toBe('−0.08');
  expect(formatCarats(1612480)).toBe('1,612.48');
  expect(formatCarats(0)).toBe('0.00');
});

test('in a column one third decimal gives all of them three', () => {
  expect(formatCaratsColumn([1000, 2500])).toEqual(['1.00', '2.50']);
  expect(formatCaratsColumn([1000, 1234])).toEqual(['1.000', '1.234']);
});

test.each([
  [-80, '−8 pt'],
  [10, '+1 pt'],
  [0, '0 pt'],
  [-3, '−0.3 pt'],
  [290, '+29 pt'],
])('%i thousandths apart is said as %s', (weight, words) => {
  expect(formatPoints(weight)).toBe(words);
});

test('53.25 ct are 10,650 mg, a thousandth of a carat two tenths of one', () => {
  expect(milligrams(w(53250))).toBe('10650');
  expect(milligrams(w(1))).toBe('0.2');
  expect(milligrams(w(-6))).toBe('−1.2');
});

test('12.40 ct of 184 stones average 0.0674 ct, 14.84 to the carat', () => {
  expect(averageCarats(12400, 184, 4)).toBe('0.0674');
  expect(averageCarats(48620, 3214)).toBe('0.015');
  expect(stonesPerCarat(12400, 184)).toBe('14.84');
  expect(averageCarats(12400, 0)).toBeNull();
  expect(stonesPerCarat(0, 5)).toBeNull();
});

test('pieces of an estimated parcel follow the weight, and the last weight takes all', () => {
  const whole = { weight: 9060, pieces: 598 };
  expect(piecesFollowing(3050, whole)).toBe(201);
  expect(piecesFollowing(9060, whole)).toBe(598);
  expect(piecesFollowing(0, { weight: 0, pieces: 5 })).toBe(5);
  expect(formatPieces(598, true)).toBe('about 598 pcs');
});

test.each([1.5, Number.NaN, Number.POSITIVE_INFINITY, 2 ** 53])(
  'nothing holds %d: not a weight, not a count',
  (value) => {
    expect(() => w(value)).toThrow(RangeError);
    expect(() => pieces(value)).toThrow(RangeError);
  },
);

test('weights whose sum is no longer exact are refused', () => {
  expect(() => sumWeights([w(2 ** 53 - 1), w(2)])).toThrow(RangeError);
});
