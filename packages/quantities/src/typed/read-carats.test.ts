import { expect, test } from 'vitest';

import { readCarats } from './read-carats.js';

const why = (text: string, step: 1 | 10 = 10) => {
  const reading = readCarats(text, step);
  return reading.kind === 'ok' ? `read as ${reading.value}` : reading.why;
};

test.each([
  ['4', 4000],
  ['4.00', 4000],
  ['4,5', 4500],
  ['.5', 500],
  [',5', 500],
  ['4.00 ct', 4000],
  ['4.00ct', 4000],
  ['48.62 carats', 48620],
  ['0.29', 290],
  ['4.35', 4350],
  ['1.15', 1150],
  ['29 pt', 290],
  ['29 points', 290],
  ['1,234.56', 1234560],
  ['1.234,56', 1234560],
  ['1 234,56', 1234560],
  ["1'234.5", 1234500],
  ['1,234,567', 1234567000],
  ['  2.01  ', 2010],
  ['1.010', 1010],
])('“%s” is a weight of %i thousandths', (text, weight) => {
  expect(readCarats(text, 10)).toEqual({ kind: 'ok', value: weight });
});

test('at step 0.001 a third decimal and half a point are read', () => {
  expect(readCarats('1.234', 1)).toEqual({ kind: 'ok', value: 1234 });
  expect(readCarats('0.5 pt', 1)).toEqual({ kind: 'ok', value: 5 });
});

test.each([1, 10] as const)('“1,234” is asked about, not guessed, at step %i', (step) => {
  expect(readCarats('1,234', step)).toEqual({
    kind: 'ambiguous',
    readings: [1234000, 1234],
    why: 'Weight “1,234” can be 1234 ct or 1.234 ct. Write it so that it can be only one.',
  });
});

test('a comma that can be only one thing is read', () => {
  expect(readCarats('0,123', 1)).toEqual({ kind: 'ok', value: 123 });
  expect(readCarats('1234,567', 1)).toEqual({ kind: 'ok', value: 1234567 });
});

test.each([
  ['', 'Weight is empty.'],
  ['   ', 'Weight is empty.'],
  ['0', 'Weight is zero; it needs carats.'],
  ['0.00 ct', 'Weight is zero; it needs carats.'],
  ['-5', 'Weight is less than nothing; it needs carats.'],
  ['-1,234', 'Weight is less than nothing; it needs carats.'],
  ['−0.08', 'Weight is less than nothing; it needs carats.'],
  ['1.234', 'Weight has three decimals; this house’s balance reads to 0.01 ct.'],
  ['1.2345', 'Weight “1.2345” has more than 3 decimals.'],
  ['NaN', 'Weight reads “NaN”; a number is needed.'],
  ['Infinity', 'Weight reads “Infinity”; a number is needed.'],
  ['1e5', 'Weight reads “1e5”; a number is needed.'],
  ['0x10', 'Weight reads “0x10”; a number is needed.'],
  ['４', 'Weight reads “４”; a number is needed.'],
  ['9007199254740992', 'Weight “9007199254740992” is more than can be kept exactly.'],
  ['900000000', 'Weight is more than a house can hold.'],
  ['1 2', 'Weight reads “1 2”; its points, commas and spaces don’t make one number.'],
  ['1.2.3', 'Weight reads “1.2.3”; its points, commas and spaces don’t make one number.'],
  ['1,23,456', 'Weight reads “1,23,456”; its points, commas and spaces don’t make one number.'],
  ['4.', 'Weight reads “4.”; its points, commas and spaces don’t make one number.'],
  ['4\u00005', 'Weight reads “45”; a number is needed.'],
  ['\u202e4', 'Weight reads “4”; a number is needed.'],
])('“%s” is refused in words', (text, sentence) => {
  expect(why(text)).toBe(sentence);
});

test.each([
  ['letters', 'x'],
  ['spaces', ' '],
  ['digits', '9'],
  ['commas', ','],
])('a hundred thousand %s are refused before they are read', (_what, character) => {
  expect(why(character.repeat(100_000))).toBe('Weight is too long to be a number.');
});

test('the field is named as the person knows it', () => {
  expect(readCarats('', 10, 'Found')).toEqual({ kind: 'bad', why: 'Found is empty.' });
});
