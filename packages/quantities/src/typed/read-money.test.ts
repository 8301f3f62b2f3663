import { expect, test } from 'vitest';

import { readMillimetres } from './read-millimetres.js';
import { readMoney, readPrice } from './read-money.js';
import { readPercent } from './read-percent.js';
import { readPieces } from './read-pieces.js';

test.each([
  ['5,280', 'USD', 528000],
  ['5280.00 USD', 'USD', 528000],
  ['3,878.42', 'USD', 387842],
  ['3.878,42', 'EUR', 387842],
  ['0', 'USD', 0],
  ['12.5', 'USD', 1250],
  ['1,235', 'JPY', 1235],
  ['1235 jpy', 'JPY', 1235],
  ['1.234', 'KWD', 1234],
  ['1234.567', 'KWD', 1234567],
])('“%s” in %s is %i minor units', (text, currency, amount) => {
  expect(readMoney(text, currency)).toEqual({ kind: 'ok', value: amount });
});

test('“1,234” of a currency with three decimals is asked about', () => {
  const reading = readMoney('1,234', 'KWD');
  expect(reading).toMatchObject({ kind: 'ambiguous', readings: [1234000, 1234] });
});

test('“1.230” of a currency with cents is asked about', () => {
  expect(readMoney('1.230', 'USD')).toMatchObject({ kind: 'ambiguous', readings: [123000, 123] });
});

test.each([
  [
    '1.234',
    'USD',
    'Amount “1.234” has three digits after its point. Write it without thousands marks.',
  ],
  [
    '12.345',
    'JPY',
    'Amount “12.345” has three digits after its point. Write it without thousands marks.',
  ],
  ['12.50', 'JPY', 'Amount “12.50” is not a whole number.'],
  ['12.505', 'KWD', 'read as 12505'],
  ['100 EUR', 'USD', 'Amount is in EUR; USD is needed here.'],
  ['-4', 'USD', 'Amount is less than nothing.'],
  ['$5', 'USD', 'Amount reads “$5”; a number is needed.'],
  ['9007199254740992', 'USD', 'Amount “9007199254740992” is more than can be kept exactly.'],
  ['NaN', 'USD', 'Amount reads “NaN”; a number is needed.'],
])('“%s” in %s: %s', (text, currency, sentence) => {
  const reading = readMoney(text, currency);
  expect(reading.kind === 'ok' ? `read as ${reading.value}` : reading.why).toBe(sentence);
});

test('a currency the house can’t hold is a bug, not a zero', () => {
  expect(() => readMoney('5', 'XXX')).toThrow(RangeError);
  expect(() => readMoney('5', 'constructor')).toThrow(RangeError);
});

test.each(['420', '@420', '420/ct', '420 USD/ct', '@ 420.00 USD / ct', '420 per carat'])(
  '“%s” is a price of 420 USD/ct',
  (text) => {
    expect(readPrice(text, 'USD')).toEqual({ kind: 'ok', value: 42000 });
  },
);

test.each([
  ['-32.5', -3250],
  ['−32,5 %', -3250],
  ['32.5 back', -3250],
  ['4 over', 400],
  ['+4 %', 400],
  ['flat', 0],
  ['even', 0],
  ['0.25', 25],
  ['1,000 %', 100000],
])('“%s” against the reference is %i hundredths of a percent', (text, percent) => {
  expect(readPercent(text)).toEqual({ kind: 'ok', value: percent });
});

test.each([
  ['-100', 'Percentage takes the whole price away; more than −100 % is needed.'],
  ['1,001 %', 'Percentage is over 1,000 %.'],
  ['-5 back', 'Percentage has a sign before it; write the number alone.'],
  ['cheap', 'Percentage reads “cheap”; a number is needed.'],
  ['back', 'Percentage is empty.'],
])('“%s” is no percentage', (text, sentence) => {
  expect(readPercent(text)).toEqual({ kind: 'bad', why: sentence });
});

test.each([
  ['13', 13],
  ['13p', 13],
  ['13 pcs', 13],
  ['1 piece', 1],
  ['1,151', 1151],
  ['1,000', 1000],
  ['3 214 stones', 3214],
])('“%s” is %i stones', (text, count) => {
  expect(readPieces(text)).toEqual({ kind: 'ok', value: count });
});

test.each([
  ['1.000', 'Count “1.000” can be 1000 pcs or 1 pcs. Write it so that it can be only one.'],
  ['0', 'Count is zero; at least one stone is needed.'],
  ['-2', 'Count is less than nothing; at least one stone is needed.'],
  ['-1.000', 'Count is less than nothing; at least one stone is needed.'],
  ['1.5', 'Count “1.5” is not a whole number.'],
  ['2000000000', 'Count is more than a parcel can hold.'],
  ['a few', 'Count reads “a few”; a number is needed.'],
])('“%s” is no count, or none we can be sure of', (text, sentence) => {
  expect(readPieces(text)).toMatchObject({ why: sentence });
});

test('millimetres are read to a thousandth, within what a stone can measure', () => {
  expect(readMillimetres('6.42')).toEqual({ kind: 'ok', value: 6420 });
  expect(readMillimetres('6,42 mm')).toEqual({ kind: 'ok', value: 6420 });
  expect(readMillimetres('6,420')).toEqual({ kind: 'ok', value: 6420 });
  expect(readMillimetres('0.05').kind).toBe('bad');
  expect(readMillimetres('201').kind).toBe('bad');
});
