import { expect, test } from 'vitest';

import { conversion, type Part, type Source, worthShare } from './conversions.js';
import type { PlaceRef } from './leg.js';
import { CONVERSION_WORDS, type ConversionWord } from './movement.js';
import { postingsAsText } from './postings-as-text.js';
import { lotName, TestBook } from './test-book.js';

const SAFE: PlaceRef = { new: 'safe' };
const MEMO: PlaceRef = { memoOf: 20587 };
const lot = (name: string) => ({ new: name });

const source = (name: string, weight: number, pieces: number): Source => ({
  lot: lot(name),
  from: SAFE,
  weight,
  pieces,
});
const part = (name: string, weight: number, pieces: number): Part => ({
  lot: lot(name),
  to: SAFE,
  weight,
  pieces,
  share: weight,
});

/** A holds 10.00 ct, 100 pcs, 4,000.00; B holds 5.00 ct, 100 pcs, 1,000.00. */
const book = () =>
  new TestBook()
    .put(lot('A'), SAFE, { weight: 10000, pieces: 100, cost: 4_000_00 })
    .put(lot('B'), SAFE, { weight: 5000, pieces: 100, cost: 1_000_00 });

const WORDS: Record<ConversionWord, [Source[], Part[], string]> = {
  split: [
    [source('A', 4000, 40)],
    [part('C', 3000, 30), part('D', 1000, 10)],
    'C safe +3.00/+30/+1,200.00; D safe +1.00/+10/+400.00',
  ],
  pick: [[source('A', 500, 2)], [part('C', 500, 2)], 'C safe +0.50/+2/+200.00'],
  mix: [
    [source('A', 10000, 100), source('B', 5000, 100)],
    [part('C', 15000, 200)],
    'C safe +15.00/+200/+5,000.00',
  ],
  sort: [
    [source('A', 10000, 100)],
    [part('C', 6000, 50), part('D', 4000, 50)],
    'C safe +6.00/+50/+2,400.00; D safe +4.00/+50/+1,600.00',
  ],
  'test result': [
    [source('A', 10000, 100)],
    [part('natural', 9900, 99), part('grown', 100, 1)],
    'natural safe +9.90/+99/+3,960.00; grown safe +0.10/+1/+40.00',
  ],
  make: [
    [source('A', 1000, 1), source('B', 1000, 1)],
    [part('pair', 2000, 2)],
    'pair safe +2.00/+2/+600.00',
  ],
  break: [
    [source('A', 10000, 100)],
    [part('left', 5000, 50), part('right', 5000, 50)],
    'left safe +5.00/+50/+2,000.00; right safe +5.00/+50/+2,000.00',
  ],
};

test.each(CONVERSION_WORDS)('a %s gives its parts the whole cost', (word) => {
  const [sources, parts, expected] = WORDS[word];
  const made = parts.map((one) => lotName(one.lot));
  const postings = book()
    .post(conversion(word, sources, parts))
    .filter(({ lot: of, place }) => made.includes(lotName(of)) && place === SAFE);
  expect(postingsAsText(postings).join('; ')).toBe(expected);
});

test('a parcel mixed into one that stands raises its average', () => {
  const mixed = book();
  mixed.post(
    conversion('mix', [source('A', 10000, 100), source('B', 5000, 100)], [part('A', 15000, 200)]),
  );
  expect(mixed.has(lot('A'), SAFE)).toEqual({ weight: 15000, pieces: 200, cost: 5_000_00 });
  expect(mixed.has(lot('B'), SAFE)).toEqual({ weight: 0, pieces: 0, cost: 0 });
});

test('mixing 10.50 at 420, 6.25 at 515 and 3.25 at 380 makes 20.00 ct for 8,863.75', () => {
  const three = new TestBook()
    .put(lot('A'), SAFE, { weight: 10500, pieces: 150, cost: 4_410_00 })
    .put(lot('B'), SAFE, { weight: 6250, pieces: 90, cost: 3_218_75 })
    .put(lot('C'), SAFE, { weight: 3250, pieces: 60, cost: 1_235_00 });
  const all = [source('A', 10500, 150), source('B', 6250, 90), source('C', 3250, 60)];
  three.post(conversion('mix', all, [part('D', 20000, 300)]));
  expect(three.has(lot('D'), SAFE)).toEqual({ weight: 20000, pieces: 300, cost: 8_863_75 });
});

test('a sorting loss above tolerance takes its share of cost as expense', () => {
  const loss = { weight: 200, pieces: 0, takesCost: true };
  const sorted = book();
  sorted.post(conversion('sort', [{ ...source('A', 10000, 100), loss }], [part('C', 9800, 100)]));
  expect(sorted.has(lot('C'), SAFE)).toEqual({ weight: 9800, pieces: 100, cost: 3_920_00 });
  expect(sorted.has(lot('A'), { kind: 'loss' })).toEqual({ weight: 200, pieces: 0, cost: 80_00 });
});

test('where nothing is said of worth, cost goes by weight', () => {
  const parts = [part('C', 7500, 50), part('D', 2500, 50)].map((one) => ({ ...one, share: 0 }));
  const split = book();
  split.post(conversion('split', [source('A', 10000, 100)], parts));
  expect(split.has(lot('C'), SAFE).cost).toBe(3_000_00);
  expect(split.has(lot('D'), SAFE).cost).toBe(1_000_00);
});

test('a set broken on a memo: its line is converted, the parts are new lines of that memo', () => {
  const { legs } = conversion(
    'break',
    [{ ...source('A', 10000, 100), from: MEMO, mark: { line: { id: 1 }, flow: 'converted' } }],
    [{ ...part('C', 10000, 100), to: MEMO, mark: { line: { newLine: 0 }, flow: 'sent' } }],
  );
  expect(legs.map(({ place, line, flow }) => ({ place, line, flow }))).toEqual([
    { place: MEMO, line: { id: 1 }, flow: 'converted' },
    { place: { kind: 'conversion' } },
    { place: { kind: 'conversion' } },
    { place: MEMO, line: { newLine: 0 }, flow: 'sent' },
  ]);
});

test.each([
  ['a part too heavy', () => conversion('split', [source('A', 4000, 40)], [part('C', 4010, 40)])],
  ['a stone too few', () => conversion('split', [source('A', 4000, 40)], [part('C', 4000, 39)])],
  [
    'a loss forgotten',
    () =>
      conversion(
        'sort',
        [{ ...source('A', 4000, 40), loss: { weight: 10, pieces: 0, takesCost: false } }],
        [part('C', 4000, 40)],
      ),
  ],
  [
    'two lots in a split',
    () => conversion('split', [source('A', 1, 1), source('B', 1, 1)], [part('C', 2, 2)]),
  ],
  [
    'two lots out of a mix',
    () => conversion('mix', [source('A', 2, 2)], [part('C', 1, 1), part('D', 1, 1)]),
  ],
  ['a worth beyond what is exact', () => worthShare(9_007_199_254_740_991, 2)],
])('a conversion refuses %s', (_what, make) => {
  expect(make).toThrow(RangeError);
});
