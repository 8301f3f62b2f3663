import { expect, test } from 'vitest';

import { foundAgain, type Held as Missing } from './answers.js';
import { buyFromConsignor } from './consignors.js';
import { conversion } from './conversions.js';
import { charge, correctQuantity, recut, writeDown } from './costs.js';
import type { Legs, PlaceRef } from './leg.js';
import { adjustCount, openDifference, writeOff } from './losses.js';
import { bringBack, keep, type Line, sendOut, undoMemo, unKeep } from './memos.js';
import { canBeReversed, MOVEMENT_KINDS, type MovementKind } from './movement.js';
import { move } from './moves.js';
import { backFromWork, sendToWork } from './outside-work.js';
import { postingsAsText } from './postings-as-text.js';
import { reversalOf } from './reversal.js';
import { creditReturn, sell } from './selling.js';
import { buy, consignIn, giveBack } from './taking-in.js';
import { type Held, TestBook } from './test-book.js';

const P = { new: 'P' };
const safe: PlaceRef = { new: 'safe' };
const show: PlaceRef = { new: 'show' };
const work: PlaceRef = { new: 'work' };
const theirs: PlaceRef = { new: 'memo in' };
const DESK: PlaceRef = { kind: 'return desk' };
const LINE: Line = { lot: P, memoId: 20587, lineId: 1 };
const MISSING: Missing = { lot: P, difference: { id: 7 }, weight: 1000, pieces: 20 };
/** Four carats, eighty stones, 1,600.00: each carat 20 stones and 400.00. */
const WHOLE: Held = { weight: 4000, pieces: 80, cost: 1_600_00 };
const ONE = { weight: 1000, pieces: 20 };
const ALL = { weight: 4000, pieces: 80 };

/** Consigned goods carry no cost. */
const CONSIGNED: Held = { ...WHOLE, cost: 0 };

/** Where the whole lies before, and what the movement posts. */
type Row = [at: PlaceRef | null, legs: Legs, postings: string, before?: Held];

const part = (name: string) => ({ lot: { new: name }, to: safe, ...ONE, share: 1000 });

const KINDS: Record<Exclude<MovementKind, 'reversal'>, Row> = {
  opening: [
    null,
    buy(1_600_00, [{ lot: P, to: safe, ...ALL, share: 1 }]),
    'P supplier -4.00/-80/-1,600.00; P safe +4.00/+80/+1,600.00',
  ],
  purchase: [
    null,
    buy(100_00, [part('A'), part('B'), part('C')]),
    'A supplier -1.00/-20/-33.34; A safe +1.00/+20/+33.34; B supplier -1.00/-20/-33.33; ' +
      'B safe +1.00/+20/+33.33; C supplier -1.00/-20/-33.33; C safe +1.00/+20/+33.33',
  ],
  'consignment in': [
    null,
    consignIn(theirs, [{ lot: P, to: safe, ...ONE }]),
    'P memo in -1.00/-20/0; P safe +1.00/+20/0',
  ],
  'bought from consignor': [
    safe,
    buyFromConsignor({ theirs: P, ours: { new: 'PA' }, at: safe, to: safe, ...ONE, price: 5_00 }),
    'P safe -1.00/-20/0; P conversion +1.00/+20/0; PA conversion -1.00/-20/0; ' +
      'PA supplier 0/0/-5.00; PA safe +1.00/+20/+5.00',
    CONSIGNED,
  ],
  'return to consignor': [
    safe,
    giveBack(P, safe, theirs, ONE),
    'P safe -1.00/-20/0; P memo in +1.00/+20/0',
    CONSIGNED,
  ],
  'return to supplier': [
    safe,
    giveBack(P, safe, { kind: 'supplier' }, ONE),
    'P safe -1.00/-20/-400.00; P supplier +1.00/+20/+400.00',
  ],
  transfer: [
    safe,
    move({ lot: P, from: safe, to: show, ...ONE }),
    'P safe -1.00/-20/-400.00; P show +1.00/+20/+400.00',
  ],
  'memo out': [
    safe,
    sendOut([{ lot: P, from: safe, ...ONE }]),
    'P safe -1.00/-20/-400.00; P new memo +1.00/+20/+400.00',
  ],
  'memo return': [
    { memoOf: 20587 },
    bringBack(LINE, DESK, ONE),
    'P memo -1.00/-20/-400.00; P desk +1.00/+20/+400.00',
  ],
  'memo void': [
    { memoOf: 20587 },
    undoMemo([{ line: LINE, cameFrom: safe, ...ALL }]),
    'P memo -4.00/-80/-1,600.00; P safe +4.00/+80/+1,600.00',
  ],
  'put away': [
    DESK,
    move({ lot: P, from: DESK, to: safe, ...ONE }),
    'P desk -1.00/-20/-400.00; P safe +1.00/+20/+400.00',
  ],
  kept: [{ memoOf: 20587 }, keep(LINE, ONE), 'P memo -1.00/-20/-400.00; P kept +1.00/+20/+400.00'],
  'un-kept': [
    { keptOf: 20587 },
    unKeep(LINE, ONE),
    'P kept -1.00/-20/-400.00; P memo +1.00/+20/+400.00',
  ],
  sale: [
    safe,
    sell([{ lot: P, from: safe, ...ONE }]),
    'P safe -1.00/-20/-400.00; P sold +1.00/+20/+400.00',
  ],
  'credit return': [
    null,
    creditReturn(P, DESK, { ...ONE, cost: 400_00 }),
    'P sold -1.00/-20/-400.00; P desk +1.00/+20/+400.00',
  ],
  'difference opened': [
    safe,
    openDifference(P, safe, { new: 'd' }, ONE),
    'P safe -1.00/-20/-400.00; P missing +1.00/+20/+400.00',
  ],
  'difference answered': [
    { kind: 'missing' },
    foundAgain(MISSING, DESK),
    'P missing -1.00/-20/-400.00; P desk +1.00/+20/+400.00',
  ],
  restatement: [
    safe,
    adjustCount(P, safe, { weight: -10, pieces: 0 }),
    'P loss +0.01/0/0; P safe -0.01/0/0',
  ],
  conversion: [
    safe,
    conversion('pick', [{ lot: P, from: safe, ...ONE }], [part('A')]),
    'P safe -1.00/-20/-400.00; P conversion +1.00/+20/+400.00; ' +
      'A conversion -1.00/-20/-400.00; A safe +1.00/+20/+400.00',
  ],
  recut: [work, recut(P, work, 120, 0), 'P work -0.12/0/0; P loss +0.12/0/0'],
  'laboratory out': [
    safe,
    sendToWork({ lot: P, from: safe, to: work, ...ONE }),
    'P safe -1.00/-20/-400.00; P work +1.00/+20/+400.00',
  ],
  'laboratory back': [
    work,
    backFromWork({ lot: P, from: work, to: DESK, ...ONE }, 85_00),
    'P work -1.00/-20/-400.00; P desk +1.00/+20/+485.00; P charges 0/0/-85.00',
  ],
  'workshop out': [
    safe,
    sendToWork({ lot: P, from: safe, to: work, ...ALL }),
    'P safe -4.00/-80/-1,600.00; P work +4.00/+80/+1,600.00',
  ],
  'workshop back': [
    work,
    backFromWork({ lot: P, from: work, to: DESK, ...ALL }),
    'P work -4.00/-80/-1,600.00; P desk +4.00/+80/+1,600.00',
  ],
  charge: [safe, charge(P, safe, 12_50), 'P charges 0/0/-12.50; P safe 0/0/+12.50'],
  'write-down': [safe, writeDown(P, safe, 250_00), 'P loss 0/0/+250.00; P safe 0/0/-250.00'],
  'count adjustment': [
    safe,
    adjustCount(P, safe, { weight: 20, pieces: 0 }),
    'P loss -0.02/0/0; P safe +0.02/0/0',
  ],
  'write-off': [safe, writeOff(P, safe, ONE), 'P safe -1.00/-20/-400.00; P loss +1.00/+20/+400.00'],
  'found again': [
    { kind: 'missing' },
    foundAgain(MISSING, safe),
    'P missing -1.00/-20/-400.00; P safe +1.00/+20/+400.00',
  ],
  correction: [
    safe,
    correctQuantity(P, { kind: 'supplier' }, safe, { weight: -500, pieces: -10 }),
    'P supplier +0.50/+10/0; P safe -0.50/-10/0',
  ],
};

function bookFor([at, , , before = WHOLE]: Row): TestBook {
  const book = new TestBook();
  return at === null ? book : book.put(P, at, before);
}

test.each(Object.entries(KINDS))('%s moves carats, pieces and cost', (_kind, row) => {
  const [, legs, postings] = row;
  expect(postingsAsText(bookFor(row).post(legs)).join('; ')).toBe(postings);
});

test('a reversal is the mirror image of a movement', () => {
  const sent = bookFor(KINDS['memo out']).post(KINDS['memo out'][1]);
  expect(postingsAsText(reversalOf(sent))).toEqual([
    'P safe +1.00/+20/+400.00',
    'P new memo -1.00/-20/-400.00',
  ]);
});

test('a sale, a credit return, a correction and a reversal are never reversed', () => {
  expect(MOVEMENT_KINDS.filter((kind) => !canBeReversed(kind))).toEqual([
    'sale',
    'credit return',
    'correction',
    'reversal',
  ]);
});
