import { expect, test } from 'vitest';

import { warningsOf } from './checks.js';
import { weightByFormula } from './formula-weight.js';
import { girdleClass, girdleFactor } from './girdle-factor.js';
import {
  crownAngleOf,
  crownHeightPercent,
  depthPercent,
  pavilionAngleOf,
  pavilionDepthPercent,
  totalDepthPercent,
} from './proportions.js';
import { isInSieveRange, plateOpening, readSieve, roundOfDiameter } from './sieve.js';
import type { Stated } from './stated.js';

const round = (more: Partial<Stated> = {}): Stated => ({
  shape: 'Round',
  weight: 820,
  pieces: 1,
  ...more,
});
const measured = { a: 6050, b: 6110, depth: 3630 };
const says = (stated: Stated, formulaPercent?: number) =>
  warningsOf(stated, formulaPercent).map(({ code, sentence }) => `${code}: ${sentence}`);

test('a stone whose numbers agree is not warned about', () => {
  const proportions = { table: 57, crownAngle: 34, pavilionAngle: 40.7, girdle: 2.5 };
  const heights = { crownHeight: 14.5, pavilionDepth: 43, depth: 60 };
  expect(says(round({ measured, ...proportions, ...heights }))).toEqual([]);
});

test('a weight that its measurements don’t make is warned about', () => {
  expect(says(round({ measured, weight: 1020 }))).toEqual([
    'weight by formula: The measurements make about 0.82 ct by formula, 20 % under the 1.02 ct given.',
  ]);
});

test('how far a weight by formula may lie off is the house’s setting', () => {
  const stone = round({ measured, weight: 900 });
  expect(says(stone, 10)).toEqual([]);
  expect(says(stone, 5)).toHaveLength(1);
});

test('a thick girdle explains weight where it is stated', () => {
  const heavy = round({ measured, weight: 915 });
  expect(says(heavy)).toHaveLength(1);
  expect(says({ ...heavy, girdleFactor: 1.05 })).toEqual([]);
});

test('a depth that the measurements don’t make is warned about', () => {
  expect(says(round({ measured, depth: 62.5 }))).toEqual([
    'depth: Depth is given as 62.5 %, the measurements make 59.7 %.',
  ]);
});

test('a fancy shape’s depth is of its width', () => {
  const oval: Stated = {
    shape: 'Oval',
    weight: 1170,
    pieces: 1,
    measured: { a: 8060, b: 5890, depth: 3980 },
  };
  expect(says({ ...oval, depth: 67.6 })).toEqual([]);
  expect(says({ ...oval, depth: 57 })).toHaveLength(1);
});

test('proportions that don’t follow from each other are warned about', () => {
  const odd = { table: 60, crownAngle: 33, pavilionAngle: 41, girdle: 3.5 };
  expect(says(round({ ...odd, depth: 62.5, crownHeight: 14.5, pavilionDepth: 44.5 }))).toEqual([
    'crown height: Crown height is given as 14.5 %, the other proportions make 13.0 %.',
    'pavilion depth: Pavilion depth is given as 44.5 %, the other proportions make 43.5 %.',
    'total depth: Depth is given as 62.5 %, the other proportions make 60.0 %.',
  ]);
});

test('pieces of a stated average that don’t make the weight are warned about', () => {
  const parcel: Stated = { shape: 'Round', weight: 12400, pieces: 184 };
  expect(says({ ...parcel, average: 67 })).toEqual([]);
  expect(says({ ...parcel, average: 100 })).toEqual([
    'average: 184 pieces of 0.1000 ct make 18.40 ct, not the 12.40 ct given.',
  ]);
});

test('stones too heavy for their sieve are warned about, tiny ones never', () => {
  const [sieveOn, sieveThrough] = [1700, 2700];
  expect(says({ shape: 'Round', weight: 4000, pieces: 100, sieveOn, sieveThrough })).toEqual([]);
  expect(says({ shape: 'Round', weight: 9000, pieces: 100, sieveOn, sieveThrough })).toEqual([
    'sieve: 100 pieces average 0.0900 ct; stones of this sieve are about 0.0393 ct.',
  ]);
  const tiny = { sieveOn: 900, sieveThrough: 1000 };
  expect(says({ shape: 'Round', weight: 9000, pieces: 100, ...tiny })).toEqual([]);
});

test('emerald 7 x 5 x 3.4 by the nearest row, and no formula for an unknown shape', () => {
  expect(weightByFormula('Emerald', { a: 7000, b: 5000, depth: 3400 })).toBeCloseTo(1.0948, 4);
  expect(weightByFormula('constructor', measured)).toBeNull();
});

test('a girdle factor follows the girdle and the size of the stone', () => {
  const at = (diameter: number) => girdleFactor('Extremely Thin', diameter);
  expect([at(3500), at(5000), at(7000)]).toEqual([0.97, 0.96, 0.95]);
  expect(girdleFactor('medium', 6080)).toBe(1);
  expect(girdleFactor('wavy', 6080)).toBeNull();
  expect([100, 160, 210, 300, 390, 450].map(girdleClass)).toEqual([
    'thin',
    'medium',
    'slightly thick',
    'thick',
    'very thick',
    'extremely thick',
  ]);
});

test('proportions follow from each other, forth and back', () => {
  expect(crownAngleOf(crownHeightPercent(57, 34.5), 57)).toBeCloseTo(34.5, 9);
  expect(pavilionAngleOf(pavilionDepthPercent(40.8, 1), 1)).toBeCloseTo(40.8, 9);
  expect(pavilionDepthPercent(40.75, 2)).toBeCloseTo(42.221, 3);
  const stone = { table: 57, crownAngle: 34.5, pavilionAngle: 40.8, girdle: 3 };
  expect(totalDepthPercent(stone)).toBeCloseTo(60.935, 3);
  const other = { table: 60, crownAngle: 33, pavilionAngle: 41, girdle: 3.5 };
  expect(totalDepthPercent(other)).toBeCloseTo(59.952, 3);
  expect(depthPercent(6080, 6080, 3630)).toBeCloseTo(59.7, 2);
});

test('plates are numbered in half steps, and other texts are none', () => {
  const plates = ['000', '1', '1.5', '5.5', '6', '6.5', '11', '20'];
  expect(plates.map(plateOpening)).toEqual([900, 1150, 1200, 1600, 1700, 1800, 2700, 4500]);
  expect(['21', '1.25', '', 'x', '0.5', 'constructor'].map(plateOpening)).toEqual([
    null,
    null,
    null,
    null,
    null,
    null,
  ]);
});

test('goods are named by two plates, the smaller first', () => {
  expect(readSieve('+6.5-11')).toEqual({ on: '6.5', through: '11' });
  expect(readSieve('+6.5 −11')).toEqual({ on: '6.5', through: '11' });
  expect(readSieve('-2')).toEqual({ on: null, through: '2' });
  expect(['', '+11-6.5', '+99', 'melee', '+1-1'].map(readSieve)).toEqual([
    null,
    null,
    null,
    null,
    null,
  ]);
  expect(isInSieveRange({ on: '6.5', through: '11' }, '99')).toBeNull();
});

test('a round of 2.00 mm is about 0.0295 ct, of 3.00 mm 0.0996 ct', () => {
  expect(roundOfDiameter(2000)).toBeCloseTo(0.0295, 4);
  expect(roundOfDiameter(3000)).toBeCloseTo(0.0996, 4);
});
