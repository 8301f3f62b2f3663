import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { DemoInBrowser } from './demo-in-browser.js';

describe('two people at one desk', () => {
  let house: DemoInBrowser;

  beforeAll(async () => {
    house = await DemoInBrowser.open();
  });

  afterAll(() => house.close());

  it('what one typed is there after a reload, and is not shown to the other', async () => {
    const page = await house.as('s.vareld');
    const cost = page.getByLabel('What it cost', { exact: true });
    await page.goto(`${house.address}/lots/take-in`);
    await cost.fill('4321.55');
    await page.reload();
    await cost.waitFor();
    expect(await cost.inputValue()).toBe('4321.55');

    await page.locator('.who summary').click();
    await page.getByRole('button', { name: 'Sign out', exact: true }).click();
    await page.getByLabel('E-mail').fill('r.ostrey@ostrey-tarn.example');
    await page.getByLabel('Password').fill('north light on white paper');
    await page.keyboard.press('Enter');
    await page.waitForSelector('h1:has-text("First light")');
    await page.goto(`${house.address}/lots/take-in`);
    await cost.waitFor();
    expect(await cost.inputValue()).toBe('');
  });
});
