import { afterAll, beforeAll, expect, test } from 'vitest';

import { verifyLedger } from '../../apps/api/src/features/verify/verify-ledger.js';
import { isFull } from '../support/scale.js';
import { type History, liveThrough, relive } from './history.js';
import { LedgerHouse } from './ledger-house.js';
import { BROKEN, RULES } from './rules.js';

// 20 histories of 10,000 acts in the long run; a twentieth of the acts otherwise.
const ACTS = isFull ? 10_000 : 2500;
const FIRST = Number(process.env.FOLDWELL_SEED ?? Date.now() % 1_000_000);
const SEEDS = Array.from({ length: isFull ? 20 : 4 }, (_, index) => FIRST + index);

const NONE = { onlyModel: [], onlyDatabase: [] };

async function agree(house: LedgerHouse, book: History['book']): Promise<void> {
  expect(await house.disagreements(book)).toEqual(NONE);
  await house.clients.worker.query('SELECT seal_waiting()');
  const { lines } = await verifyLedger(house.clients.reader);
  expect(lines.filter((line) => line.includes(' FAIL '))).toEqual([]);
}

test.each(SEEDS)(
  'weight, pieces and cost agree everywhere after a random history, seed %i',
  async (seed) => {
    const house = await LedgerHouse.open();
    try {
      const { kinds, refused } = await liveThrough(house, { seed, acts: ACTS }, (book) =>
        agree(house, book),
      );
      expect(kinds.size).toBeGreaterThan(20);
      expect(refused.size).toBeGreaterThan(1);
      const told = [...kinds, ...refused].map(([what, often]) => `${what} ${often}`).join(', ');
      process.stdout.write(`seed ${seed}, ${ACTS} acts: ${told}\n`);
    } finally {
      await house.close();
    }
  },
  isFull ? 3_600_000 : 240_000,
);

let house: LedgerHouse;
let lived: History;
beforeAll(async () => {
  house = await LedgerHouse.open();
  lived = await liveThrough(house, { seed: 20_261_201, acts: 1500 });
}, 120_000);
afterAll(() => house.close());

test('the same history, lived again by the same rules, ends the same', async () => {
  expect(await house.disagreements(relive(lived.done, RULES))).toEqual(NONE);
});

test.each(Object.keys(BROKEN))('it is noticed when %s', async (name) => {
  const broken = relive(lived.done, { ...RULES, ...BROKEN[name] });
  const { onlyModel } = await house.disagreements(broken);
  // Cost alone: the weights and pieces of both go the same way.
  expect(onlyModel.length).toBeGreaterThan(0);
  expect(onlyModel.every((row) => row.startsWith('lot '))).toBe(true);
});
