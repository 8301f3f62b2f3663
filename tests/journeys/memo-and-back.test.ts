import type { LotPage, MemoDetail, PartyRow } from '@foldwell/contracts';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { ask, DemoInBrowser, watchedIn } from './demo-in-browser.js';
import { scan, tabTo } from './keyboard.js';

describe('goods sent and taken back, by keyboard and scanner alone', () => {
  let house: DemoInBrowser;
  let dealer: Page;
  let memo: string;
  let parcel: string;

  beforeAll(async () => {
    house = await DemoInBrowser.open();
    dealer = await house.as('i.tarn');
  });

  afterAll(() => house.close());

  it('a dealer puts ten stones and a parcel on a memo in under thirty seconds', async () => {
    const stones = await ask<LotPage>(dealer, '/api/lots?kind=stone&place=safe');
    const parcels = await ask<LotPage>(dealer, '/api/lots?kind=parcel&place=safe');
    const cheap = stones.rows
      .filter((row) => row.bar.safe === row.weight && row.total)
      .sort((a, b) => (a.total ?? 0) - (b.total ?? 0));
    parcel = parcels.rows.find((row) => row.isEstimated && row.bar.safe > 5000)?.number ?? '';
    const customer = await roomiest(dealer);
    const began = Date.now();
    await dealer.keyboard.press('n');
    await dealer.waitForSelector('h1:has-text("Write a memo")');
    await tabTo(dealer, /^Customer(?!s$)/);
    await dealer.waitForSelector(`option:has-text("${customer.name}")`, { state: 'attached' });
    await dealer.keyboard.type(customer.name);
    await tabTo(dealer, /^Scan or type a lot/);
    for (const { number } of cheap.slice(0, 10)) await scan(dealer, number);
    await scan(dealer, `${parcel} 2.00 @1`);
    await dealer.waitForSelector(`text=${parcel}`);
    await dealer.keyboard.press('Control+Enter');
    await dealer.waitForSelector('text=booked out.');
    const seconds = (Date.now() - began) / 1000;
    process.stdout.write(`Ten stones and a parcel on a memo: ${seconds.toFixed(1)} s\n`);
    memo = /memos[/](\d+)/.exec(dealer.url())?.[1] ?? '';
    const booked = await ask<MemoDetail>(dealer, `/api/memos/${memo}`);
    expect(booked.lines).toHaveLength(11);
    expect(seconds).toBeLessThan(30);
    expect((await watchedIn(dealer)).pointers).toBe(0);
  });

  it('the parcel comes back 8 points light and is a difference', async () => {
    await dealer.goto(`${house.address}/returns/${memo}`);
    await dealer.waitForSelector('h1');
    await tabTo(dealer, new RegExp(parcel));
    await dealer.keyboard.press('Enter');
    await tabTo(dealer, /^Found on the balance/);
    await scan(dealer, '1.92');
    await dealer.waitForSelector('text=/not by who weighed|owner and bookkeeper only/');
    const { differenceList } = await ask<MemoDetail>(dealer, `/api/memos/${memo}`);
    expect(differenceList).toMatchObject([
      { lot: parcel, kind: 'short', expected: 2000, found: 1920 },
    ]);
    expect((await watchedIn(dealer)).pointers).toBe(0);
  });

  it('the bookkeeper answers it, and every carat of the parcel is somewhere', async () => {
    const bookkeeper = await house.as('j.mavvin');
    await bookkeeper.goto(`${house.address}/returns/${memo}`);
    await bookkeeper.waitForSelector('h1');
    await tabTo(bookkeeper, new RegExp(parcel));
    await bookkeeper.keyboard.press('Enter');
    await bookkeeper.waitForSelector('text=Weighing difference accepted');
    await tabTo(bookkeeper, /Weighing difference accepted/);
    await bookkeeper.keyboard.press('Enter');
    await bookkeeper.waitForSelector('text=Weighing difference accepted', { state: 'detached' });
    const after = await ask<MemoDetail>(bookkeeper, `/api/memos/${memo}`);
    expect(
      after.differenceList.filter(
        (one) => one.lot === parcel && one.kind === 'short' && !('answer' in one),
      ),
    ).toEqual([]);
    const line = after.lines.find((one) => one.lot === parcel);
    expect(line?.flows).toMatchObject({ out: 0, missing: 0 });
    expect((await watchedIn(bookkeeper)).pointers).toBe(0);
  });
});

/** The customer with the most room under the limit. */
async function roomiest(page: Page): Promise<PartyRow> {
  const parties = await ask<PartyRow[]>(page, '/api/parties?part=customer');
  const room = ({ exposure }: PartyRow) => (exposure.limit ?? 0) - exposure.total;
  const [first] = [...parties].sort((a, b) => room(b) - room(a));
  if (!first) throw new Error('The demo has no customer.');
  return first;
}
