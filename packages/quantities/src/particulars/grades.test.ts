import { expect, test } from 'vitest';

import { rangeHolds, rangeWords, readGradeRange } from './grade-range.js';
import {
  CLARITIES,
  COLOURS,
  CULET_MARKS,
  CULETS,
  FANCY_INTENSITIES,
  FLUORESCENCES,
  GIRDLE_MARKS,
  GIRDLES,
  makeRank,
  rankOf,
} from './grades.js';
import { clarityFromInternational } from './international-grades.js';
import { careNote, isPermittedOriginWording, originWords } from './origin.js';

test('colours run from D to Z, 23 of them; clarities from FL to I3, 11', () => {
  expect(COLOURS).toHaveLength(23);
  expect([COLOURS[0], COLOURS.at(-1)]).toEqual(['D', 'Z']);
  expect(CLARITIES.map((grade) => rankOf(CLARITIES, grade))).toEqual([
    1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11,
  ]);
});

test('every culet, girdle and fluorescence word has its rank', () => {
  expect(CULETS).toHaveLength(CULET_MARKS.length);
  expect(GIRDLES).toHaveLength(GIRDLE_MARKS.length);
  expect(rankOf(FLUORESCENCES, 'very strong')).toBe(5);
  expect(rankOf(FANCY_INTENSITIES, 'Fancy Vivid')).toBe(7);
});

test('a make is read by word or mark', () => {
  expect([makeRank('Excellent'), makeRank('vg'), makeRank('Ideal')]).toEqual([1, 2, null]);
});

test.each([
  ['D-J', 1, 7],
  ['g', 4, 4],
  ['J–D', 1, 7],
  ['G to H', 4, 5],
  ['G/H', 4, 5],
])('“%s” is a range of colours', (text, from, to) => {
  expect(readGradeRange(COLOURS, text)).toEqual({ kind: 'ok', value: { from, to } });
});

test('“VVS2-SI2” is a range of clarities', () => {
  expect(readGradeRange(CLARITIES, 'VVS2-SI2')).toEqual({ kind: 'ok', value: { from: 4, to: 8 } });
});

test.each(['A', 'D-J-K', '', 'River', 'D-'])('“%s” is no range of colours', (text) => {
  expect(readGradeRange(COLOURS, text, 'Colour').kind).toBe('bad');
});

test('G-H holds G and H, not F and not I', () => {
  const range = { from: 4, to: 5 };
  expect([3, 4, 5, 6].map((rank) => rangeHolds(range, rank))).toEqual([false, true, true, false]);
  expect(rangeWords(COLOURS, 4, 5)).toBe('G–H');
  expect(rangeWords(COLOURS, 4, 4)).toBe('G');
  expect(rangeWords(COLOURS, null, null)).toBe('');
});

test('a commercial grade such as SI3 stays as written', () => {
  expect(clarityFromInternational('SI3')).toBeNull();
  expect(clarityFromInternational('vs1')).toBe('VS1');
});

test('origin and treatment stand on every line in full words that we permit ourselves', () => {
  expect(originWords('natural', '')).toBe('natural diamond, no treatment disclosed to us');
  expect(originWords('laboratory-grown', 'HPHT')).toBe('laboratory-grown diamond, treated: HPHT');
  for (const origin of ['natural', 'laboratory-grown', 'not tested'] as const) {
    expect(isPermittedOriginWording(originWords(origin, 'laser drilling'))).toBe(true);
  }
});

test('filled and coated stones ask for care', () => {
  expect(careNote('fracture filling')).toContain('no heat');
  expect(careNote('coating')).toContain('no abrasive');
  expect(careNote('laser drilling')).toBeNull();
});
