import type { House, LotPage, PartyDetail, PartyRow } from '@foldwell/contracts';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { ask, DemoInBrowser, watchedIn } from './demo-in-browser.js';

describe('two people change the same thing', () => {
  let house: DemoInBrowser;
  let first: Page;
  let second: Page;

  beforeAll(async () => {
    house = await DemoInBrowser.open();
    [first, second] = await Promise.all([house.as('r.ostrey'), house.as('r.ostrey')]);
  });

  afterAll(() => house.close());

  /** Both have it open and type; the second keeps his first. */
  async function bothType(path: string, field: string, typed: [string, string]): Promise<void> {
    for (const [index, page] of [first, second].entries()) {
      await page.goto(house.address + path);
      await page.getByLabel(field, { exact: true }).fill(typed[index] ?? '');
    }
    await second.getByRole('button', { name: /^Keep / }).click();
    await second.waitForResponse((one) => one.request().method() === 'GET' && one.ok());
    await first.getByRole('button', { name: /^Keep / }).click();
    await first.waitForSelector('text=Changed meanwhile');
  }

  it('of the house: both versions are shown, also after a reload, and the later is asked for', async () => {
    await bothType('/house', 'Memo terms', ['9', '12']);
    expect(await first.locator('.note.warn').textContent()).toContain(
      'Memo terms: theirs now 12, yours 9.',
    );
    expect((await ask<House>(first, '/api/house')).memoDays).toBe(12);
    await first.reload();
    const field = first.getByLabel('Memo terms', { exact: true });
    await field.waitFor();
    expect(await field.inputValue()).toBe('9');
    await first.getByRole('button', { name: 'Keep 1 change' }).click();
    await expect.poll(async () => (await ask<House>(first, '/api/house')).memoDays).toBe(9);
    expect((await watchedIn(first)).faults).toEqual([]);
  });

  it('of a customer: both versions are shown, and nothing typed is lost', async () => {
    const [party] = await ask<PartyRow[]>(first, '/api/parties?part=customer');
    const path = `/customers/${party?.number}`;
    await bothType(path, 'Contact', ['Mine', 'Theirs']);
    expect(await first.locator('.note.warn').textContent()).toContain(
      'Contact: theirs now Theirs, yours Mine.',
    );
    await first.getByRole('button', { name: 'Keep changes' }).click();
    const kept = () => ask<PartyDetail>(first, `/api/parties/${party?.number}`);
    await expect.poll(async () => (await kept()).particulars.contact).toBe('Mine');
  });

  it('of a lot: what was begun before a colleague’s change does not overwrite it unseen', async () => {
    const { rows } = await ask<LotPage>(first, '/api/lots?kind=stone&place=safe');
    const path = `/lots/${rows[0]?.number}`;
    for (const page of [first, second]) {
      await page.goto(house.address + path);
      await page.getByRole('button', { name: /^Edit/ }).click();
    }
    await first.getByLabel('Comments', { exact: true }).fill('begun first');
    await second.getByLabel('Comments', { exact: true }).fill('kept first');
    await second.getByRole('button', { name: /^Keep changes/ }).click();
    await second.waitForSelector('h2:has-text("Edit")', { state: 'detached' });
    await first.reload();
    await first.getByRole('button', { name: /^Edit/ }).click();
    await first.getByRole('button', { name: /^Keep changes/ }).click();
    await first.waitForSelector('text=theirs now kept first, yours begun first');
  });

  it('a number that can be two, or is too fine, is asked under its field and not sent', async () => {
    await first.goto(`${house.address}/house`);
    await first.getByLabel('Parcel, each weighing', { exact: true }).fill('1.25');
    await first.getByRole('button', { name: 'Keep 1 change' }).click();
    await first.waitForSelector('text=/Parcel, each weighing “1.25” has more than 1 decimals/');
    await first.getByLabel('Currency', { exact: true }).fill('EUR');
    await first.getByLabel('USD for one', { exact: true }).fill('1,234');
    await first.getByRole('button', { name: 'Write down rate' }).click();
    await first.waitForSelector('text=/Rate “1,234” can be 1234 or 1.234/');
    expect(await first.getByLabel('USD for one', { exact: true }).inputValue()).toBe('1,234');
  });
});
