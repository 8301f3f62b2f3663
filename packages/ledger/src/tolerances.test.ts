import { expect, test } from 'vitest';

import {
  lotAgrees,
  PARCEL_TOLERANCE,
  parcelAgrees,
  sortingLossAgrees,
  stoneAgrees,
  stoneTolerance,
} from './tolerances.js';

test('a 1.02 ct stone at step 0.01 may come back at 1.01, not at 1.00', () => {
  expect(stoneAgrees(1020, 1010, stoneTolerance(10))).toBe(true);
  expect(stoneAgrees(1020, 1000, stoneTolerance(10))).toBe(false);
});

test('at step 0.001 a stone may be three thousandths off', () => {
  expect(stoneAgrees(1020, 1023, stoneTolerance(1))).toBe(true);
  expect(stoneAgrees(1020, 1016, stoneTolerance(1))).toBe(false);
});

test.each([
  ['4.01 back of 4.00', 4010, 0, true],
  ['3.98 back of 4.00', 3980, 0, true],
  ['3.97 back of 4.00', 3970, 0, false],
  ['3.99 back after 0.01 was restated', 3990, 10, true],
  ['3.98 back after 0.01 was restated', 3980, 10, false],
  ['4.02 back after 0.01 was restated: the signs cancel', 4020, 10, true],
])('a parcel, %s', (_what, found, restatedBefore, agrees) => {
  expect(parcelAgrees({ expected: 4000, restatedBefore }, found, PARCEL_TOLERANCE)).toBe(agrees);
});

test('a lot may drift by its tolerance each weighing, or by a thousandth of what was weighed', () => {
  expect(lotAgrees(60, { weighings: 3, weightWeighed: 12000 }, PARCEL_TOLERANCE)).toBe(true);
  expect(lotAgrees(-61, { weighings: 3, weightWeighed: 12000 }, PARCEL_TOLERANCE)).toBe(false);
  expect(lotAgrees(200, { weighings: 3, weightWeighed: 200000 }, PARCEL_TOLERANCE)).toBe(true);
});

test('0.08 lost of 20.00 ct sorted is 0.4 %, and inside; a gain never is', () => {
  expect(sortingLossAgrees(80, 20000)).toBe(true);
  expect(sortingLossAgrees(90, 20000)).toBe(false);
  expect(sortingLossAgrees(-10, 20000)).toBe(false);
});
