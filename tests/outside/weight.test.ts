import {
  decimalsHold,
  formatCarats,
  GRAINS_PER_CARAT,
  MILLIGRAMS_PER_CARAT,
  milliCarats,
  milligrams,
  POINTS_PER_CARAT,
  statedWeight,
  weightStatementProblems,
} from '@foldwell/quantities';
import { describe, expect, test } from 'vitest';

/** Gemological Institute of America, FAQ "How is diamond carat weight rounded?", undated. */
describe('the laboratory habit of rounding', () => {
  test.each([
    [1768, '1.76'],
    [1769, '1.77'],
  ])('a stone of %i thousandths is stated as %s ct', (weight, stated) => {
    expect(formatCarats(statedWeight(milliCarats(weight)))).toBe(stated);
  });
});

/**
 * US Federal Trade Commission, Guides for the Jewelry, Precious Metals, and Pewter Industries,
 * 16 CFR 23.18, 83 FR 40665, 16 August 2018.
 */
describe('weights as 16 CFR 23.18 has them stated', () => {
  test('note to (b): a carat is 200 mg, a point a hundredth of it', () => {
    expect(MILLIGRAMS_PER_CARAT).toBe(200);
    expect(milligrams(milliCarats(1000))).toBe('200');
    expect(milligrams(milliCarats(1000 / POINTS_PER_CARAT))).toBe('2');
  });

  test.each([
    [495, true],
    [504, true],
    [494, false],
    [505, false],
  ])('(c): “.5 carat” for %i thousandths holds: %s', (weight, holds) => {
    expect(decimalsHold('.5 carat', milliCarats(weight))).toBe(holds);
    expect(decimalsHold('0.5 ct', milliCarats(weight))).toBe(holds);
  });

  test('(b): points alone are refused, points with decimal carats are not', () => {
    expect(weightStatementProblems('25 points')).toHaveLength(1);
    expect(weightStatementProblems('25 points or .25 carat')).toEqual([]);
  });

  test('(d): a fraction needs to say that it is not exact, and its range', () => {
    expect(weightStatementProblems('1/2 ct')).toHaveLength(2);
    expect(weightStatementProblems('1/2 ct, not exact')).toHaveLength(1);
    expect(weightStatementProblems('1/2 ct, not exact, .45 to .58 ct')).toEqual([]);
  });
});

/** G. F. Herbert Smith, Gem-Stones and their Distinctive Characters, London 1912, chapter XI. */
test('four grains of the gem trade make a carat', () => {
  expect(GRAINS_PER_CARAT).toBe(4);
});
