import {
  crownHeightPercent,
  lengthToWidth,
  pavilionAngleOf,
  pavilionDepthPercent,
  totalDepthPercent,
  weightByFormula,
} from '@foldwell/quantities';
import { describe, expect, test } from 'vitest';

/**
 * "Estimating Mounted Diamond Weight", chapter 11 of an anonymous web course on diamonds; the numbers
 * are its sections. It rounds a mean diameter before it squares it, which the measures here repeat.
 */
describe('weight by formula, against a course’s printed examples', () => {
  const mm = (a: number, b: number, depth: number) => ({
    a: Math.round(a * 1000),
    b: Math.round(b * 1000),
    depth: Math.round(depth * 1000),
  });

  test.each([
    ['11.11, round 6.05-6.11 x 3.63', 'Round', mm(6.05, 6.11, 3.63), {}, 0.8185, 0.0001],
    ['11.11, round, mean 7.10 x 4.47', 'Round', mm(7.1, 7.1, 4.47), {}, 1.374, 0.001],
    [
      '11.11, the first, girdle slightly thick',
      'Round',
      mm(6.05, 6.11, 3.63),
      { girdleFactor: 1.02 },
      0.8349,
      0.0001,
    ],
    [
      'oval, example 1, mean 6.98',
      'Oval',
      mm(6.98, 6.98, 3.98),
      { girdleFactor: 1.07, shapeFactor: 1.03 },
      1.325,
      0.0002,
    ],
    ['oval, example 2', 'Oval', mm(4.82, 3.02, 1.92), { girdleFactor: 1.015 }, 0.1856, 0.0002],
    [
      'marquise, example 1',
      'Marquise',
      mm(10.24, 6.11, 4.75),
      { girdleFactor: 1.035 },
      1.753,
      0.0005,
    ],
    [
      '11.21, triangle, example 1',
      'Triangle',
      mm(6.32, 6.02, 2.52),
      { girdleFactor: 1.03 },
      0.5629,
      0.0001,
    ],
    [
      '11.21, triangle, example 2',
      'Triangle',
      mm(7.89, 6.96, 4.04),
      { girdleFactor: 1.045 },
      1.322,
      0.0006,
    ],
  ] as const)('%s', (...[, shape, measured, corrections, carats, tolerance]) => {
    const computed = weightByFormula(shape, measured, corrections) ?? Number.NaN;
    expect(Math.abs(computed - carats)).toBeLessThanOrEqual(tolerance);
  });

  test('11.14, length to width of 7.42 x 3.61 and 10.83 x 4.97', () => {
    expect(lengthToWidth(7.42, 3.61)).toBeCloseTo(2.06, 2);
    expect(lengthToWidth(10.83, 4.97)).toBeCloseTo(2.18, 2);
  });
});

/**
 * I. Reinitz, R. Geurts, A. Gilbertson, "Weight Ratio within the GIA Diamond Cut Grading System"
 * (headed "Weighing In"; trade journal and year not on the copy).
 */
test('table 57, crown 34.0, pavilion 40.7, girdle 2.5: crown 14.5, pavilion 43.0, depth 60.0', () => {
  const stone = { table: 57, crownAngle: 34, pavilionAngle: 40.7, girdle: 2.5 };
  expect(Math.abs(crownHeightPercent(57, 34) - 14.5)).toBeLessThanOrEqual(0.05);
  expect(Math.abs(pavilionDepthPercent(40.7) - 43)).toBeLessThanOrEqual(0.05);
  expect(Math.abs(totalDepthPercent(stone) - 60)).toBeLessThanOrEqual(0.05);
});

/** M. Tolkowsky, Diamond Design, E. & F. N. Spon, London 1919, "Best Proportions of a Brilliant", p. 97. */
test('table 53, crown 34.5, pavilion 40.75: crown height 16.2, pavilion 43.1', () => {
  expect(Math.abs(crownHeightPercent(53, 34.5) - 16.2)).toBeLessThanOrEqual(0.05);
  expect(Math.abs(pavilionDepthPercent(40.75) - 43.1)).toBeLessThanOrEqual(0.05);
});

/** "Diamond Math for the Trig-Challenged", JCK magazine. */
test('without a culet 40.75 degrees make 43.1 %, and 43.1 % are 40.761 degrees', () => {
  expect(pavilionDepthPercent(40.75)).toBeCloseTo(43.083, 3);
  expect(pavilionAngleOf(43.1)).toBeCloseTo(40.761, 3);
});
