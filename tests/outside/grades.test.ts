import {
  CLARITIES,
  clarityFromInternational,
  INTERNATIONAL_CLARITIES,
  internationalColour,
  isInSieveRange,
  isPermittedOriginWording,
  rankOf,
} from '@foldwell/quantities';
import { describe, expect, test } from 'vitest';

/** International Diamond Council, IDC Rule Book, 3.1.1.2, internationaldiamondcouncil.org/books/idc-rule-book. */
test.each([
  ['H', 'white'],
  ['D', 'exceptional white+'],
  ['P', 'tinted colour'],
])('the international name of %s is %s', (letter, name) => {
  expect(internationalColour(letter)).toBe(name);
});

/** International Diamond Council, IDC Rule Book, 2.3. */
describe('international clarity', () => {
  test('has ten ranks from loupe-clean to P3', () => {
    expect(INTERNATIONAL_CLARITIES.join(' ')).toBe(
      'Loupe-clean VVS1 VVS2 VS1 VS2 SI1 SI2 P1 P2 P3',
    );
  });

  test('P1, P2 and P3 mean I1, I2 and I3, and the order is kept', () => {
    expect(['P1', 'P2', 'P3'].map(clarityFromInternational)).toEqual(['I1', 'I2', 'I3']);
    const ranks = INTERNATIONAL_CLARITIES.map((grade) =>
      rankOf(CLARITIES, clarityFromInternational(grade) ?? ''),
    );
    expect(ranks).toEqual([2, 3, 4, 5, 6, 7, 8, 9, 10, 11]);
  });
});

/** Polished Diamond Grading, a diamond school's course book in English, undated, p. 24. */
test('goods named +6.5-11 hold what stays on plate 7, not on 11.5; -6.5 ends below plate 6.5', () => {
  const melee = { on: '6.5', through: '11' };
  expect(isInSieveRange(melee, '7')).toBe(true);
  expect(isInSieveRange(melee, '11.5')).toBe(false);
  const star = { on: '2', through: '6.5' };
  expect(isInSieveRange(star, '6')).toBe(true);
  expect(isInSieveRange(star, '6.5')).toBe(false);
});

/** ISO 18323:2015, notes to the definition of synthetic diamond. */
test.each([
  ['lab grown diamond', false],
  ['lab diamond', false],
  ['laboratory-grown diamond', true],
  ['laboratory-created diamond', true],
  ['synthetic diamond', true],
  ['cultured diamond', false],
  ['genuine laboratory-grown diamond', false],
])('a paper may say “%s”: %s', (text, isPermitted) => {
  expect(isPermittedOriginWording(text)).toBe(isPermitted);
});
