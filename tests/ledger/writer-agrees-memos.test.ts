import {
  acceptDifference,
  acceptOtherWeight,
  bringBackRestated,
  buyFromConsignor,
  creditReturn,
  foundAgain,
  giveBack,
  keep,
  keepsItToo,
  miss,
  move,
  ourShortWeighing,
  sell,
  sellConsigned,
  stillWithThem,
  undoMemo,
  unKeep,
  writeOffMissing,
  writeOffMissingConsigned,
} from '@foldwell/ledger';
import { afterAll, beforeAll, expect, test } from 'vitest';

import {
  answering,
  DESK,
  held,
  KINDS_WITH_MEMOS,
  parcel,
  QUARANTINE,
  type Short,
  Story,
  stone,
} from './story.js';

let story: Story;
beforeAll(async () => {
  story = await Story.begin();
});
afterAll(() => story.house.close());

test.each([
  ['over', 4010],
  ['light', 3990],
])('a parcel back a point %s inside tolerance', async (_how, weight) => {
  const lot = await story.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
  const line = await story.send(lot, 4000, 120);
  const legs = bringBackRestated(
    line,
    DESK,
    { weight: 4000, pieces: 120 },
    { weight, pieces: 120 },
  );
  await story.agree({ kind: 'memo return', memoId: line.memoId, ...legs });
  await story.agree({
    kind: 'put away',
    ...move({ lot, from: DESK, to: story.at.drawer, weight, pieces: 120 }),
  });
});

test('kept, kept no more, kept and sold, and half of it back by a credit note', async () => {
  const lot = await story.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
  const line = await story.send(lot, 4000, 120);
  const { memoId } = line;
  await story.agree({ kind: 'kept', memoId, ...keep(line, { weight: 4000, pieces: 120 }) });
  await story.agree({ kind: 'un-kept', memoId, ...unKeep(line, { weight: 1000, pieces: 30 }) });
  const from = { keptOf: memoId };
  await story.agree({ kind: 'sale', memoId, ...sell([{ lot, from, weight: 3000, pieces: 90 }]) });
  await story.agree({
    kind: 'credit return',
    ...creditReturn(lot, DESK, { weight: 1500, pieces: 45, cost: 150_00 }),
  });
});

test.each([
  ['customer keeps it', (one: Short) => keepsItToo(held(one), one.line)],
  ['accepted', (one: Short) => acceptDifference(held(one), DESK)],
  ['found again', (one: Short) => foundAgain(held(one), DESK)],
  ['record corrected', (one: Short) => stillWithThem(held(one), one.line)],
  ['written off', (one: Short) => writeOffMissing(held(one))],
])('a difference answered: %s', async (answer, legs) => {
  const one = await story.short();
  await story.agree({ ...answering(one, answer), ...legs(one) }, 2);
});

test('a difference accepted where the rest of the lot lies on another memo', async () => {
  const one = await story.short();
  const { lot } = one;
  await story.agree({
    kind: 'put away',
    ...move({ lot, from: DESK, to: story.at.drawer, weight: 3920, pieces: 118 }),
  });
  const other = await story.send(lot, 9920, 298);
  const mark = { line: { id: other.lineId }, flow: 'out' as const };
  const legs = acceptDifference(held(one), { memoOf: other.memoId }, mark);
  await story.agree({ ...answering(one, 'accepted'), ...legs }, 2);
});

test('an excess that we had weighed short, and a stone that weighs otherwise', async () => {
  const lot = await story.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
  const excess = ourShortWeighing(lot, { weight: 100, pieces: 0 });
  await story.agree({ kind: 'difference answered', ...excess });
  const light = await story.takeIn({ weight: 1510, pieces: 1, cost: 9_000_00 }, stone('S'));
  const toQuarantine = {
    lot: light,
    from: story.at.drawer,
    to: QUARANTINE,
    weight: 1510,
    pieces: 1,
  };
  await story.agree({ kind: 'transfer', ...move(toQuarantine) });
  await story.agree({ kind: 'difference answered', ...acceptOtherWeight(light, QUARANTINE, -20) });
});

test('consigned goods bought where they lie, given back, sold and lost', async () => {
  const lot = await story.takeInConsigned({ weight: 5000, pieces: 100 }, parcel('R'));
  const newLots = [parcel('H', { letterOf: lot.id, source_party_id: 1 })];
  const part = { theirs: lot, ours: { new: 'H' }, weight: 1000, pieces: 20, price: 400_00 };
  const bought = buyFromConsignor({ ...part, at: story.at.drawer, to: story.at.drawer });
  await story.agree({ kind: 'bought from consignor', newLots, ...bought });
  await story.agree({
    kind: 'return to consignor',
    ...giveBack(lot, story.at.drawer, story.at['memo in'], { weight: 1000, pieces: 20 }),
  });
  const line = await story.send(lot, 2000, 40);
  const { memoId } = line;
  await story.agree({ kind: 'kept', memoId, ...keep(line, { weight: 1000, pieces: 20 }) });
  await story.agree({
    kind: 'sale',
    memoId,
    newLots,
    ...sellConsigned({ ...part, at: { keptOf: memoId } }),
  });
  const { differences } = await story.agree({
    kind: 'difference opened',
    memoId,
    newDifferences: [
      {
        ref: 'd',
        lot,
        lineId: line.lineId,
        kind: 'not found',
        expectedWeight: 1000,
        foundWeight: 0,
      },
    ],
    ...miss(line, { new: 'd' }, { weight: 1000, pieces: 20 }),
  });
  const one = { line, lot, difference: { id: differences.d ?? 0 } };
  const gone = { ...held(one), weight: 1000, pieces: 20 };
  const lost = writeOffMissingConsigned(gone, { new: 'H' }, 400_00);
  await story.agree({ ...answering(one, 'written off'), newLots, ...lost }, 2);
});

test('a memo booked to the wrong party', async () => {
  const lot = await story.takeIn({ weight: 10000, pieces: 300, cost: 1_000_01 });
  const line = await story.send(lot, 4000, 120);
  const legs = undoMemo([{ line, cameFrom: story.at.drawer, weight: 4000, pieces: 120 }]);
  await story.agree({ kind: 'memo void', reason: 'wrong party', memoId: line.memoId, ...legs });
});

test('every kind of movement that memos and consignors bring was written', () => {
  expect([...story.posted].sort()).toEqual([...KINDS_WITH_MEMOS].sort());
});
