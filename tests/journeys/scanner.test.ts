import type { DifferenceRow, LotPage, MemoDetail, MemoRow } from '@foldwell/contracts';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';

import { ask, DemoInBrowser, watchedIn } from './demo-in-browser.js';
import { scanAtOnce } from './keyboard.js';

describe('a scanner types into whatever has the focus', () => {
  let house: DemoInBrowser;
  let owner: Page;
  let posted: string[];

  beforeAll(async () => {
    house = await DemoInBrowser.open();
    owner = await house.as('r.ostrey');
    owner.on('request', (request) => {
      if (request.method() !== 'GET') posted.push(new URL(request.url()).pathname);
    });
  });

  beforeEach(() => {
    posted = [];
  });

  afterAll(() => house.close());

  /** A memo with two lines that are still out. */
  async function twoOut(): Promise<[memo: string, first: string, second: string]> {
    for (const { number } of await ask<MemoRow[]>(owner, '/api/memos')) {
      const { lines, differenceList } = await ask<MemoDetail>(owner, `/api/memos/${number}`);
      const out = lines.filter((line) => line.flows.out > 0);
      const [first, second] = out;
      if (first && second && differenceList.length === 0) return [number, first.lot, second.lot];
    }
    return expect.fail('The demo has no memo with two lines out.');
  }

  it('and presses no answer of the return desk: digits of a code are not keys', async () => {
    const open = await ask<DifferenceRow[]>(owner, '/api/differences');
    const theirs = open.find((one) => one.memo && one.answerers.includes('R. Ostrey'));
    await owner.goto(`${house.address}/returns/${theirs?.memo}?difference=${theirs?.id}`);
    await owner.waitForSelector('.answers kbd:has-text("3")');
    for (const code of ['3456', '4567', '5678']) {
      await scanAtOnce(owner, code);
      await owner.waitForSelector(`text=${code} is not on M ${theirs?.memo}.`);
    }
    expect(posted).toEqual([]);
    expect(await ask<DifferenceRow[]>(owner, '/api/differences')).toEqual(open);
  });

  it('while an answer is open, its keys and those of the desk both stand in the key line', async () => {
    const keys = await owner.locator('.key-line').textContent();
    expect(keys).toContain('close the return');
    expect(keys).toMatch(/3the customer keeps|3we had weighed|3the weight found|3another stone/);
  });

  it('and a lot scanned into the reading is that lot, not a weight of thousands of carats', async () => {
    const [memo, first, second] = await twoOut();
    await owner.goto(`${house.address}/returns/${memo}`);
    await owner.waitForSelector(`aside h2:has-text("${first}")`);
    await owner.locator('input:focus').waitFor();
    await scanAtOnce(owner, second);
    await owner.waitForSelector(`aside h2:has-text("${second}")`);
    await owner.goto(`${house.address}/returns/${memo}`);
    await owner.waitForSelector(`aside h2:has-text("${first}")`);
    expect(await owner.getByLabel('Found on the balance').inputValue()).toBe('');
    expect(posted).toEqual([]);
  });

  it('and a lot scanned while the remarks of a memo are typed is added, the remarks stay', async () => {
    const stones = await ask<LotPage>(owner, '/api/lots?kind=stone&place=safe');
    const lot = stones.rows.find((row) => row.bar.safe === row.weight)?.number ?? '';
    await owner.goto(`${house.address}/memos/new`);
    await owner.waitForSelector('h1:has-text("Write a memo")');
    await owner.getByLabel('Handed to').pressSequentially('Ilse', { delay: 60 });
    await scanAtOnce(owner, lot);
    await owner.waitForSelector(`td:has-text("${lot}")`);
    expect(await owner.getByLabel('Handed to').inputValue()).toBe('Ilse');
  });

  it('and the keys of a sheet rest while a paper lies over it', async () => {
    await owner.goto(`${house.address}/`);
    await owner.waitForSelector('h1:has-text("First light")');
    await owner.keyboard.press('?');
    await owner.waitForSelector('dialog[open]');
    await owner.keyboard.press('n');
    await owner.keyboard.press('Escape');
    await owner.waitForSelector('dialog', { state: 'detached' });
    expect(new URL(owner.url()).pathname).toBe('/');
    await owner.keyboard.press('n');
    await owner.waitForSelector('h1:has-text("Write a memo")');
    expect((await watchedIn(owner)).faults).toEqual([]);
  });
});
