import { adjustCount, conversion, move, type Part, together } from '@foldwell/ledger';
import fc from 'fast-check';
import { afterAll, beforeAll, test } from 'vitest';

import { scale } from '../support/scale.js';
import { parcel, Story } from './story.js';

let story: Story;
beforeAll(async () => {
  story = await Story.begin();
});
afterAll(() => story.house.close());

const goods = fc.record({
  weight: fc.integer({ min: 20, max: 2_000_000_000 }),
  cost: fc.integer({ min: 0, max: 9_000_000_000_000 }),
});
/** Small shares, so that equal remainders are common and the order of ties is seen. */
const shares = fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 1, maxLength: 12 });

/** Cuts a whole into so many parts, each at least 1, all but the last of one size. */
function cut(whole: number, into: number): number[] {
  const size = Math.floor(whole / into);
  return Array.from({ length: into }, (_, at) =>
    at < into - 1 ? size : whole - size * (into - 1),
  );
}

test('whatever is split by whatever shares, the database and the preview agree to the unit', async () => {
  await fc.assert(
    fc.asyncProperty(goods, shares, async ({ weight, cost }, by) => {
      const lot = await story.takeIn({ weight, pieces: 12, cost });
      const pieces = cut(12, by.length);
      const parts = cut(weight, by.length).map(
        (part, index): Part => ({
          lot: { new: `part ${index}` },
          to: story.at.drawer,
          weight: part,
          pieces: pieces[index] ?? 0,
          share: by[index] ?? 0,
        }),
      );
      await story.agree({
        newLots: by.map((_, index) => parcel(`part ${index}`)),
        ...conversion('split', [{ lot, from: story.at.drawer, weight, pieces: 12 }], parts),
      });
    }),
    { numRuns: scale(1000) },
  );
});

test('whatever leaves in whatever handfuls, restated on the way, the two agree to the unit', async () => {
  const { drawer, show } = story.at;
  await fc.assert(
    fc.asyncProperty(goods, fc.integer({ min: 1, max: 6 }), async ({ weight, cost }, into) => {
      const lot = await story.takeIn({ weight, pieces: 12, cost });
      const handfuls = cut(weight - 1, into).map((part) =>
        move({ lot, from: drawer, to: show, weight: part, pieces: 1 }),
      );
      // No kind of movement both restates and moves; each is an act of its own.
      await story.agree({
        kind: 'restatement',
        ...adjustCount(lot, drawer, { weight: -1, pieces: -(12 - into) }),
      });
      await story.agree({ kind: 'transfer', ...together(...handfuls) });
    }),
    { numRuns: scale(500) },
  );
});
