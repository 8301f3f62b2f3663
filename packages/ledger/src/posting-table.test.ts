import { expect, test } from 'vitest';

import { acceptDifference, acceptOtherWeight, keepsItToo, ourShortWeighing } from './answers.js';
import { sellConsigned } from './consignors.js';
import { conversion, worthShare } from './conversions.js';
import { charge, correctCost, recut } from './costs.js';
import type { Legs, PlaceRef } from './leg.js';
import { adjustCount } from './losses.js';
import { bringBack, bringBackRestated, keep, type Line, miss, sendOut } from './memos.js';
import { together } from './moves.js';
import { postingsAsText } from './postings-as-text.js';
import { creditReturn, sell } from './selling.js';
import { consignIn } from './taking-in.js';
import { TestBook } from './test-book.js';

const lot = (name: string) => ({ new: name });
const SAFE: PlaceRef = { new: 'safe' };
const DESK: PlaceRef = { kind: 'return desk' };
const QUARANTINE: PlaceRef = { kind: 'quarantine' };
const [LABORATORY, WORKSHOP]: [PlaceRef, PlaceRef] = [{ new: 'laboratory' }, { new: 'workshop' }];
const MEMO: PlaceRef = { memoOf: 20587 };
const KEPT: PlaceRef = { keptOf: 20587 };
const line = (name: string): Line => ({ lot: lot(name), memoId: 20587, lineId: 1 });
const d = { new: 'd' };
const held = (weight: number, pieces: number) => ({ lot: lot('P'), difference: d, weight, pieces });

/** What stands before, what is posted, what it posts: weight / pieces / cost. */
type Row = [event: string, before: TestBook, legs: Legs, postings: string[]];

const book = () => new TestBook();
const goods = (weight: number, pieces: number, cost: number) => ({ weight, pieces, cost });

const SORTED = [
  { lot: lot('B'), to: SAFE, weight: 12400, pieces: 184, share: worthShare(12400, 65000) },
  { lot: lot('C'), to: SAFE, weight: 5100, pieces: 90, share: worthShare(5100, 48000) },
  { lot: lot('D'), to: SAFE, weight: 2420, pieces: 51, share: worthShare(2420, 21000) },
];

const ROWS: Row[] = [
  [
    'split of a parcel, 8.00 of 48.62 ct',
    book().put(lot('A'), SAFE, goods(48620, 729, 18_718_70)),
    conversion(
      'split',
      [{ lot: lot('A'), from: SAFE, weight: 8000, pieces: 120 }],
      [{ lot: lot('B'), to: SAFE, weight: 8000, pieces: 120, share: 8000 }],
    ),
    [
      'A safe -8.00/-120/-3,080.00',
      'A conversion +8.00/+120/+3,080.00',
      'B conversion -8.00/-120/-3,080.00',
      'B safe +8.00/+120/+3,080.00',
    ],
  ],
  [
    'sort of 20.00 ct into 12.40, 5.10, 2.42, 0.08 lost in tolerance',
    book().put(lot('A'), SAFE, goods(20000, 325, 8_863_75)),
    conversion(
      'sort',
      [
        {
          lot: lot('A'),
          from: SAFE,
          weight: 20000,
          pieces: 325,
          loss: { weight: 80, pieces: 0, takesCost: false },
        },
      ],
      SORTED,
    ),
    [
      'A safe -20.00/-325/-8,863.75',
      'A conversion +19.92/+325/+8,863.75',
      'A loss +0.08/0/0',
      'B conversion -12.40/-184/-6,485.16',
      'B safe +12.40/+184/+6,485.16',
      'C conversion -5.10/-90/-1,969.69',
      'C safe +5.10/+90/+1,969.69',
      'D conversion -2.42/-51/-408.90',
      'D safe +2.42/+51/+408.90',
    ],
  ],
  [
    'recut 1.53 to 1.41, labour 200.00',
    book().put(lot('S'), WORKSHOP, goods(1530, 1, 7_956_00)),
    recut(lot('S'), WORKSHOP, 120, 200_00),
    ['S charges 0/0/-200.00', 'S workshop -0.12/0/+200.00', 'S loss +0.12/0/0'],
  ],
  [
    'memo out, 9.06 of a parcel',
    book().put(lot('P'), SAFE, goods(48620, 3214, 18_718_70)),
    sendOut([{ lot: lot('P'), from: SAFE, weight: 9060, pieces: 598 }]),
    ['P safe -9.06/-598/-3,488.10', 'P new memo +9.06/+598/+3,488.10'],
  ],
  [
    'back 3.05, 0.08 short',
    book().put(lot('P'), MEMO, goods(3130, 206, 1_205_05)),
    together(
      bringBack(line('P'), DESK, { weight: 3050, pieces: 201 }),
      miss(line('P'), d, { weight: 80, pieces: 5 }),
    ),
    ['P memo -3.13/-206/-1,205.05', 'P desk +3.05/+201/+1,174.25', 'P missing +0.08/+5/+30.80'],
  ],
  [
    'answer: the customer keeps it too',
    book().put(lot('P'), { kind: 'missing' }, goods(80, 5, 30_80)),
    keepsItToo({ ...held(80, 5), line: line('P') }, line('P')),
    ['P missing -0.08/-5/-30.80', 'P kept +0.08/+5/+30.80'],
  ],
  [
    'answer: weighing difference accepted, its cost back to the lot at the desk',
    book()
      .put(lot('P'), { kind: 'missing' }, goods(80, 5, 30_80))
      .put(lot('P'), DESK, goods(3050, 201, 1_174_25)),
    acceptDifference({ ...held(80, 5), line: line('P') }, DESK),
    ['P missing -0.08/-5/-30.80', 'P loss +0.08/+5/0', 'P desk 0/0/+30.80'],
  ],
  [
    '4.01 back of 4.00, inside tolerance',
    book().put(lot('P'), MEMO, goods(4000, 264, 1_540_00)),
    bringBackRestated(
      line('P'),
      DESK,
      { weight: 4000, pieces: 264 },
      { weight: 4010, pieces: 264 },
    ),
    ['P memo -4.00/-264/-1,540.00', 'P desk +4.01/+264/+1,540.00', 'P loss -0.01/0/0'],
  ],
  [
    '3.99 back of 4.00, inside tolerance',
    book().put(lot('P'), MEMO, goods(4000, 264, 1_540_00)),
    bringBackRestated(
      line('P'),
      DESK,
      { weight: 4000, pieces: 264 },
      { weight: 3990, pieces: 264 },
    ),
    ['P memo -4.00/-264/-1,540.00', 'P desk +3.99/+264/+1,540.00', 'P loss +0.01/0/0'],
  ],
  [
    'kept',
    book().put(lot('P'), MEMO, goods(4000, 264, 1_540_00)),
    keep(line('P'), { weight: 4000, pieces: 264 }),
    ['P memo -4.00/-264/-1,540.00', 'P kept +4.00/+264/+1,540.00'],
  ],
  [
    'kept, then invoiced',
    book().put(lot('P'), KEPT, goods(4000, 264, 1_540_00)),
    sell([{ lot: lot('P'), from: KEPT, weight: 4000, pieces: 264 }]),
    ['P kept -4.00/-264/-1,540.00', 'P sold +4.00/+264/+1,540.00'],
  ],
  [
    'credit note, 2.00 back at the cost of that sale',
    book().put(lot('P'), { kind: 'sold' }, goods(4000, 264, 1_540_00)),
    creditReturn(lot('P'), DESK, { weight: 2000, pieces: 130, cost: 770_00 }),
    ['P sold -2.00/-130/-770.00', 'P desk +2.00/+130/+770.00'],
  ],
  [
    'consigned 1.20 kept, then invoiced, agreed 5,000 (what passes our kept place comes to nothing)',
    book().put(lot('Q'), KEPT, goods(1200, 1, 0)),
    sellConsigned({
      theirs: lot('Q'),
      ours: lot('H'),
      at: KEPT,
      weight: 1200,
      pieces: 1,
      price: 5_000_00,
    }),
    [
      'Q kept -1.20/-1/0',
      'Q conversion +1.20/+1/0',
      'H conversion -1.20/-1/0',
      'H supplier 0/0/-5,000.00',
      'H sold +1.20/+1/+5,000.00',
    ],
  ],
  [
    'correction, 48.62 ct bought at 420 instead of 380, 30.00 still in the safe',
    book().put(lot('A'), SAFE, goods(30000, 450, 12_600_00)),
    correctCost(lot('A'), 1_944_80, { inside: [{ at: SAFE, weight: 30000 }], gone: 18620 }),
    ['A supplier 0/0/+1,944.80', 'A safe 0/0/-1,200.00', 'A charges 0/0/-744.80'],
  ],
  [
    'excess of 0.10 answered as our short weighing',
    book(),
    ourShortWeighing(lot('P'), { weight: 100, pieces: 0 }),
    ['P loss -0.10/0/0', 'P quarantine +0.10/0/0'],
  ],
  [
    'excess of 0.10 answered as theirs',
    book(),
    consignIn({ new: 'memo in' }, [{ lot: lot('T'), to: QUARANTINE, weight: 100, pieces: 1 }]),
    ['T memo in -0.10/-1/0', 'T quarantine +0.10/+1/0'],
  ],
  [
    'a lighter stone accepted, 1.51 found 1.49',
    book().put(lot('S'), QUARANTINE, goods(1510, 1, 9_000_00)),
    acceptOtherWeight(lot('S'), QUARANTINE, -20),
    ['S loss +0.02/0/0', 'S quarantine -0.02/0/0'],
  ],
  [
    'laboratory fee 85.00',
    book().put(lot('S'), LABORATORY, goods(1510, 1, 9_000_00)),
    charge(lot('S'), LABORATORY, 85_00),
    ['S charges 0/0/-85.00', 'S laboratory 0/0/+85.00'],
  ],
  [
    'count gain 0.02',
    book().put(lot('P'), SAFE, goods(4000, 264, 1_540_00)),
    adjustCount(lot('P'), SAFE, { weight: 20, pieces: 0 }),
    ['P loss -0.02/0/0', 'P safe +0.02/0/0'],
  ],
  [
    'pieces of an estimated parcel found to be three more',
    book().put(lot('P'), SAFE, goods(4000, 264, 1_540_00)),
    adjustCount(lot('P'), SAFE, { weight: 0, pieces: 3 }),
    ['P loss 0/-3/0', 'P safe 0/+3/0'],
  ],
];

test.each(ROWS)('%s', (_event, before, legs, postings) => {
  expect(postingsAsText(before.post(legs))).toEqual(postings);
});
