import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { AxeResults } from 'axe-core';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { ask, DemoInBrowser, PHONE, watchedIn } from './demo-in-browser.js';

const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Address, or how to find it from what the demo holds. */
const SCREENS = {
  'First light': () => '/',
  Lots: () => '/lots',
  'a lot': ({ lot }: Held) => `/lots/${lot}`,
  'take in a lot': () => '/lots/take-in',
  Customers: () => '/customers',
  'a customer': ({ customer }: Held) => `/customers/${customer}`,
  Memos: () => '/memos',
  'a memo': ({ memo }: Held) => `/memos/${memo}`,
  'write a memo': () => '/memos/new',
  'Return desk': () => '/returns',
  'a return': ({ memo }: Held) => `/returns/${memo}`,
  House: () => '/house',
  password: () => '/password',
  'a memo on paper': ({ memo }: Held) => `/print/memos/${memo}`,
} as const;
type Screen = keyof typeof SCREENS;

interface Held {
  memo: string;
  customer: string;
  lot: string;
}

describe('every screen', () => {
  let house: DemoInBrowser;
  let held: Held;

  beforeAll(async () => {
    house = await DemoInBrowser.open();
    const page = await house.as('r.ostrey');
    const [memo] = await ask<{ number: string; partyNumber: string }[]>(page, '/api/memos');
    const lots = await ask<{ rows: { number: string }[] }>(page, '/api/lots');
    held = {
      memo: memo?.number ?? '',
      customer: memo?.partyNumber ?? '',
      lot: lots.rows[0]?.number ?? '',
    };
    await page.context().close();
  });

  afterAll(() => house.close());

  async function open(page: Page, screen: Screen): Promise<void> {
    await page.goto(house.address + SCREENS[screen](held));
    await page.waitForLoadState('networkidle');
    await page.waitForSelector('h1');
  }

  describe.each(['light', 'dark'])('in the %s theme', (theme) => {
    let page: Page;

    beforeAll(async () => {
      page = await house.as('r.ostrey', { theme });
    });

    it.each(Object.keys(SCREENS) as Screen[])(
      '%s can be read by everybody and breaks no content policy',
      async (screen) => {
        await open(page, screen);
        await page.evaluate(AXE);
        const { violations, passes } = await page.evaluate(() =>
          (globalThis as unknown as { axe: { run(): Promise<AxeResults> } }).axe.run(),
        );
        expect(passes.length).toBeGreaterThan(10);
        expect(await page.evaluate(() => document.documentElement.dataset.theme)).toBe(theme);
        const serious = violations.filter(
          ({ impact }) => impact === 'serious' || impact === 'critical',
        );
        expect(
          serious.map(
            ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
          ),
        ).toEqual([]);
        expect((await watchedIn(page)).faults).toEqual([]);
      },
    );
  });

  it('would note a script that is not ours', async () => {
    const page = await house.as('r.ostrey');
    await page.evaluate(() => {
      const script = document.createElement('script');
      script.textContent = 'document.title = "taken over"';
      document.head.append(script);
    });
    expect((await watchedIn(page)).faults.join()).toContain('script-src');
    expect(await page.title()).not.toBe('taken over');
  });

  describe('on a phone', () => {
    let page: Page;

    beforeAll(async () => {
      page = await house.as('i.tarn', { viewport: PHONE });
    });

    it.each(['First light', 'a lot', 'a memo', 'write a memo', 'Memos', 'Customers'] as const)(
      '%s is no wider than the glass',
      async (screen) => {
        await open(page, screen);
        const [wide, glass] = await page.evaluate(() => [
          document.documentElement.scrollWidth,
          innerWidth,
        ]);
        expect(wide).toBeLessThanOrEqual(glass ?? 0);
        expect((await watchedIn(page)).faults).toEqual([]);
      },
    );
  });
});
