import type { Page } from 'playwright-core';
import { expect } from 'vitest';

/** Presses Tab until what has the focus is called so, by its label or its words. */
export async function tabTo(page: Page, name: RegExp): Promise<void> {
  for (let presses = 0; presses < 120; presses += 1) {
    const focused = await page.evaluate(() => {
      const element = document.activeElement;
      const label = element instanceof HTMLInputElement ? element.labels?.[0] : null;
      const select = element instanceof HTMLSelectElement ? element.labels?.[0] : null;
      const own = element?.tagName === 'BODY' ? '' : element?.textContent;
      return (
        element?.getAttribute('aria-label') ??
        label?.textContent ??
        select?.textContent ??
        own ??
        ''
      );
    });
    if (name.test(focused.trim())) return;
    await page.keyboard.press('Tab');
  }
  expect.fail(`Nothing called ${name} can be reached with Tab.`);
}

/** A scanner types a whole code at once and ends it with Enter. */
export async function scan(page: Page, code: string): Promise<void> {
  await page.keyboard.type(code);
  await page.keyboard.press('Enter');
}

/**
 * The same as a scanner does it where nothing waits for a code: the characters follow each other
 * faster than anybody types, however busy this machine is.
 */
export async function scanAtOnce(page: Page, code: string): Promise<void> {
  const devtools = await page.context().newCDPSession(page);
  const keys = [...code].map((key) => ({ key, text: key }));
  await Promise.all(
    [...keys, { key: 'Enter', text: '\r' }].flatMap(({ key, text }) => [
      devtools.send('Input.dispatchKeyEvent', { type: 'keyDown', key, text }),
      devtools.send('Input.dispatchKeyEvent', { type: 'keyUp', key }),
    ]),
  );
  await devtools.detach();
}
