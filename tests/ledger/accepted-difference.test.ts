import { makeDataSource } from '@foldwell/api/src/database/data-source.js';
import { answerDifference } from '@foldwell/api/src/features/returns/answer.js';
import { move } from '@foldwell/ledger';
import { afterAll, beforeAll, expect, test } from 'vitest';

import { DESK, Story } from './story.js';

let story: Story;
beforeAll(async () => {
  story = await Story.begin();
});
afterAll(() => story.house.close());

test('the cost of an accepted difference goes back to the lot where all of it lies on another memo', async () => {
  const { lot, difference } = await story.short();
  const back = { weight: 3920, pieces: 118 };
  await story.agree({
    kind: 'put away',
    ...move({ lot, from: DESK, to: story.at.drawer, ...back }),
  });
  await story.send(lot, 9920, 298);
  const db = await makeDataSource(story.house.urls.api, 1).initialize();
  const person = { id: '2', name: 'Ben', roles: ['owner'], seesCost: true };
  const key = { personId: '2', key: 'an-answer-of-its-own', hash: 'hash' };
  const request = { answer: 'accepted', reason: 'weighed again' } as const;
  await answerDifference({ db, person } as never, key, String(difference.id), request);
  await db.destroy();
  expect(await story.house.inside(lot)).toEqual({ weight: 9920, pieces: 298, cost: 1_000_01 });
});
