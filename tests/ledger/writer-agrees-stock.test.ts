import {
  adjustCount,
  backFromWork,
  buy,
  charge,
  conversion,
  correctCost,
  correctQuantity,
  foundAfterWriteOff,
  foundAgain,
  giveBack,
  MOVEMENT_KINDS,
  move,
  openDifference,
  recut,
  sell,
  sendToWork,
  writeDown,
  writeOff,
} from '@foldwell/ledger';
import { afterAll, beforeAll, expect, test } from 'vitest';

import { KINDS_WITH_MEMOS, parcel, Story, stone } from './story.js';

let story: Story;
beforeAll(async () => {
  story = await Story.begin();
});
afterAll(() => story.house.close());

test('a box bought for one price, by worth', async () => {
  const arrivals = ['A', 'B', 'C'].map((ref, index) => ({
    lot: { new: ref },
    to: story.at.drawer,
    weight: 1000 + 10 * index,
    pieces: 7,
    share: 3 + index,
  }));
  const newLots = arrivals.map(({ lot }) => parcel(lot.new));
  await story.agree({ kind: 'purchase', newLots, partyId: 1, ...buy(100_00, arrivals) });
});

test('handfuls between drawers, to the last weight', async () => {
  const lot = await story.takeIn({ weight: 3000, pieces: 30, cost: 100_00 });
  for (const weight of [1000, 1000, 1000]) {
    await story.agree({
      kind: 'transfer',
      ...move({ lot, from: story.at.drawer, to: story.at.show, weight, pieces: 10 }),
    });
  }
});

test('to the laboratory and the workshop and back, with a fee, a recut, a charge and a write-down', async () => {
  const lot = await story.takeIn({ weight: 1530, pieces: 1, cost: 7_956_00 }, stone('S'));
  const whole = { weight: 1530, pieces: 1 };
  await story.agree({
    kind: 'laboratory out',
    ...sendToWork({ lot, from: story.at.drawer, to: story.at.laboratory, ...whole }),
  });
  await story.agree({
    kind: 'laboratory back',
    ...backFromWork({ lot, from: story.at.laboratory, to: story.at.drawer, ...whole }, 85_00),
  });
  await story.agree({
    kind: 'workshop out',
    ...sendToWork({ lot, from: story.at.drawer, to: story.at.workshop, ...whole }),
  });
  await story.agree({ kind: 'recut', ...recut(lot, story.at.workshop, 120, 200_00) });
  const cut = { weight: 1410, pieces: 1 };
  await story.agree({
    kind: 'workshop back',
    ...backFromWork({ lot, from: story.at.workshop, to: story.at.drawer, ...cut }),
  });
  await story.agree({ kind: 'charge', ...charge(lot, story.at.drawer, 12_34) });
  await story.agree({
    kind: 'write-down',
    reason: 'chipped',
    ...writeDown(lot, story.at.drawer, 500_00),
  });
});

test('a split, a sort with a loss either side of tolerance, a mix, a test result', async () => {
  const lot = await story.takeIn({ weight: 20000, pieces: 325, cost: 8_863_75 });
  const into = (ref: string, weight: number, pieces: number, share = weight) => ({
    lot: { new: ref },
    to: story.at.drawer,
    weight,
    pieces,
    share,
  });
  const all = { lot, from: story.at.drawer, weight: 20000, pieces: 325 };
  const parts = [into('B', 12400, 184, 806), into('C', 5100, 90, 244), into('D', 2420, 51, 50)];
  const loss = { weight: 80, pieces: 0, takesCost: false };
  const { lots } = await story.agree({
    newLots: parts.map((part) => parcel(part.lot.new)),
    ...conversion('sort', [{ ...all, loss }], parts),
  });
  const [b, c, d] = ['B', 'C', 'D'].map((ref) => ({ id: lots[ref]?.id ?? 0 })) as [
    typeof lot,
    typeof lot,
    typeof lot,
  ];
  const heavy = { weight: 400, pieces: 0, takesCost: true };
  const source = { lot: b, from: story.at.drawer, weight: 12400, pieces: 184, loss: heavy };
  await story.agree({
    newLots: [parcel('E')],
    ...conversion('sort', [source], [into('E', 12000, 184)]),
  });
  const mixed = [
    { lot: c, from: story.at.drawer, weight: 5100, pieces: 90 },
    { lot: d, from: story.at.drawer, weight: 2420, pieces: 51 },
  ];
  await story.agree({
    newLots: [parcel('F')],
    ...conversion('mix', mixed, [into('F', 7520, 141)]),
  });
  const untested = await story.takeIn(
    { weight: 3000, pieces: 30, cost: 1_000_00 },
    parcel('U', { origin: 'not tested' }),
  );
  await story.agree({
    newLots: [parcel('N'), parcel('G', { origin: 'laboratory-grown' })],
    ...conversion(
      'test result',
      [{ lot: untested, from: story.at.drawer, weight: 3000, pieces: 30 }],
      [into('N', 2900, 29), into('G', 100, 1)],
    ),
  });
});

test('counts, losses and finds in a drawer, goods back to their supplier', async () => {
  const lot = await story.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
  await story.agree({
    kind: 'restatement',
    ...adjustCount(lot, story.at.drawer, { weight: 0, pieces: 3 }),
  });
  await story.agree({
    kind: 'count adjustment',
    reason: 'count',
    ...adjustCount(lot, story.at.drawer, { weight: -20, pieces: 0 }),
  });
  const gone = { weight: 500, pieces: 10 };
  await story.agree({ kind: 'write-off', reason: 'lost', ...writeOff(lot, story.at.drawer, gone) });
  await story.agree({ kind: 'found again', ...foundAfterWriteOff(lot, story.at.drawer, gone) });
  const { differences } = await story.agree({
    kind: 'difference opened',
    newDifferences: [{ ref: 'd', lot, kind: 'short', expectedWeight: 9980, foundWeight: 9480 }],
    ...openDifference(lot, story.at.drawer, { new: 'd' }, gone),
  });
  const answer = { differenceId: differences.d, answer: 'found again' };
  const legs = foundAgain(
    { lot, difference: { id: differences.d ?? 0 }, ...gone },
    story.at.drawer,
  );
  await story.agree({ kind: 'difference answered', answers: [answer], ...legs }, 2);
  const back = giveBack(lot, story.at.drawer, { kind: 'supplier' }, { weight: 1000, pieces: 30 });
  await story.agree({ kind: 'return to supplier', ...back });
});

test('a purchase corrected in price, what is gone to expense, and in weight', async () => {
  const lot = await story.takeIn({ weight: 48620, pieces: 729, cost: 20_420_40 });
  await story.agree({
    kind: 'sale',
    ...sell([{ lot, from: story.at.drawer, weight: 18620, pieces: 279 }]),
  });
  const corrects = await story.house.id(
    'SELECT movement_id AS id FROM posting WHERE lot_id = $1 ORDER BY id LIMIT 1',
    lot.id,
  );
  const inside = [{ at: story.at.drawer, weight: 30000 }];
  const cost = correctCost(lot, 1_944_80, { inside, gone: 18620 });
  await story.agree({ kind: 'correction', reason: 'typed wrong', corrects, ...cost });
  const weight = correctQuantity(lot, { kind: 'supplier' }, story.at.drawer, {
    weight: -500,
    pieces: -5,
  });
  await story.agree({ kind: 'correction', reason: 'typed wrong', corrects, ...weight });
});

test('with those of memos and consignors, every kind but the reversal (the database makes it) was written', () => {
  const written = [...story.posted, ...KINDS_WITH_MEMOS];
  expect(MOVEMENT_KINDS.filter((kind) => !written.includes(kind))).toEqual(['reversal']);
});
