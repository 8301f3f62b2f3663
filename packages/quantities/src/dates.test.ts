import { expect, test } from 'vitest';

import { addDays, daysBetween, dueWords, isBusinessDate, longDate, shortDate } from './dates.js';

test('days are said as a dealer says them', () => {
  expect(longDate('2026-12-15')).toBe('Tue 15 Dec 2026');
  expect(shortDate('2026-12-15')).toBe('15 Dec');
  expect(shortDate('2027-01-08', '2026-12-01')).toBe('8 Jan 2027');
  expect(shortDate('2026-12-08', '2026-12-01')).toBe('8 Dec');
});

test.each([
  ['2026-11-19', 'late 12 d'],
  ['2026-12-01', 'today'],
  ['2026-12-04', 'in 3 d'],
])('due %s, on 1 December, is %s', (due, words) => {
  expect(dueWords(due, '2026-12-01')).toBe(words);
});

test.each([
  [30, '2026-10-30'],
  [60, '2026-11-29'],
  [90, '2026-12-29'],
])('net %i from 30 September 2026 is %s', (days, due) => {
  expect(addDays('2026-09-30', days)).toBe(due);
});

test('days between cross months, years and leap days', () => {
  expect(daysBetween('2026-12-01', '2026-09-01')).toBe(-91);
  expect(daysBetween('2024-02-28', '2024-03-01')).toBe(2);
  expect(daysBetween('2026-12-31', '2027-01-01')).toBe(1);
});

test.each(['2026-02-30', '2026-13-01', '2026-1-1', 'today', '', '2026-12-01T00:00', '20261201'])(
  '“%s” is no day of the calendar',
  (text) => {
    expect(isBusinessDate(text)).toBe(false);
  },
);

test('29 February is a day of a leap year', () => {
  expect(isBusinessDate('2024-02-29')).toBe(true);
});
