import { expect, test } from 'vitest';

import { formatMoney, formatPercent, formatPrice } from './format-money.js';
import { halfAwayFromZero } from './half-away-from-zero.js';
import { largestRemainder } from './largest-remainder.js';
import { minorDigits, minorUnits } from './minor-units.js';
import { lineAmount, percentAgainst, priceAtPercent, pricePerCarat } from './prices.js';

test('1.02 ct at 6,450 is 6,579.00', () => {
  expect(formatMoney(lineAmount(6_450_00, 1020), 'USD')).toBe('6,579.00 USD');
});

test('9,800 at 32.5 back is 6,615.00 a carat, 9,988.65 for 1.51 ct, and the percentage comes back', () => {
  expect(priceAtPercent(9_800_00, -3250)).toBe(6_615_00);
  expect(lineAmount(6_615_00, 1510)).toBe(9_988_65);
  expect(percentAgainst(6_615_00, 9_800_00)).toBe(-3250);
  expect(priceAtPercent(9_800_00, 400)).toBe(10_192_00);
});

test('without a reference there is no percentage', () => {
  expect(percentAgainst(6_615_00, 0)).toBeNull();
});

test('a sum agreed for a line is shown as a price per carat, rounded', () => {
  expect(pricePerCarat(5_000_00, 1510)).toBe(3_311_26);
  expect(pricePerCarat(5_000_00, 0)).toBeNull();
});

test.each([
  [2345n, 10n, 235n],
  [-2345n, 10n, -235n],
  [2344n, 10n, 234n],
  [0n, 7n, 0n],
])('%i over %i is %i, half away from zero', (n, d, expected) => {
  expect(halfAwayFromZero(n, d)).toBe(expected);
});

test('nothing is divided by nothing', () => {
  expect(() => halfAwayFromZero(1n, 0n)).toThrow(RangeError);
});

test('products beyond 2^53 stay exact', () => {
  expect(lineAmount(90_071_992_547_409, 99_000)).toBe(8_917_127_262_193_491);
});

test('a product that no longer fits is refused, never rounded', () => {
  expect(() => lineAmount(9_007_199_254_740_991, 2000)).toThrow(RangeError);
});

test.each([
  ['100.00 in three equal parts', 100_00, [1, 1, 1], [3334, 3333, 3333]],
  ['a cent among three', 1, [1, 1, 1], [1, 0, 0]],
  ['a loss is shared as a gain', -100_00, [1, 1, 1], [-3334, -3333, -3333]],
  ['relative value', 8_863_75, [806000, 244800, 50820], [6_485_16, 1_969_69, 408_90]],
  ['by weight alone', 8_863_75, [12400, 5100, 2420], [5_517_60, 2_269_33, 1_076_82]],
  ['nothing to share', 0, [0, 0], [0, 0]],
])('largest remainder: %s', (_what, total, weights, parts) => {
  expect(largestRemainder(total, weights)).toEqual(parts);
});

test('something to share and nothing to share it by is a bug, for it would be lost', () => {
  expect(() => largestRemainder(5, [0, 0])).toThrow(RangeError);
  expect(() => largestRemainder(5, [])).toThrow(RangeError);
  expect(() => largestRemainder(5, [3, -1])).toThrow(RangeError);
});

test('20 ct keep their cost, though 443.19 a carat would make 5 cents more', () => {
  expect(pricePerCarat(8_863_75, 20000)).toBe(443_19);
  expect(lineAmount(443_19, 20000)).toBe(8_863_80);
});

test('12,340.00 less 2 % cash discount is 12,093.20; 1 % brokerage is 123.40', () => {
  expect(priceAtPercent(12_340_00, -200)).toBe(12_093_20);
  expect(12_340_00 - priceAtPercent(12_340_00, -100)).toBe(123_40);
});

test.each([
  [387842, 'USD', '3,878.42 USD'],
  [-5, 'USD', '−0.05 USD'],
  [1235, 'JPY', '1,235 JPY'],
  [1234, 'KWD', '1.234 KWD'],
])('%i minor units of %s are %s', (amount, currency, words) => {
  expect(formatMoney(amount, currency)).toBe(words);
});

test('prices drop empty cents, percentages empty decimals', () => {
  expect(formatPrice(420_00, 'USD')).toBe('420 USD/ct');
  expect(formatPrice(420_50, 'USD')).toBe('420.50 USD/ct');
  expect([-3250, 400, 0, 25].map(formatPercent)).toEqual(['−32.5 %', '+4 %', '0 %', '+0.25 %']);
});

test('money is whole minor units of a currency we know', () => {
  expect(() => minorUnits(0.1 + 0.2)).toThrow(RangeError);
  expect(() => minorDigits('ABC')).toThrow(RangeError);
});
