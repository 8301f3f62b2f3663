import { type ChildProcess, spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { freePort } from '@foldwell/local-stack';
import { type Browser, chromium, type Page } from 'playwright-core';
import { expect, vi } from 'vitest';

import type { TestDatabase } from '../support/database.js';
import { demoDatabase } from '../support/demo-database.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const PASSWORD = 'north light on white paper';
const QUIET = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'];
const ALONE = ['--disable-background-networking', '--disable-component-update', '--disable-sync'];

export const DESK = { width: 1440, height: 900 };
export const PHONE = { width: 390, height: 844 };

/** What a page did that it should not have: kept by the page itself, read with `faultsOf`. */
interface Watched {
  faults: string[];
  pointers: number;
}

/** The demo house from its built files, in Chromium. */
export class DemoInBrowser {
  private constructor(
    readonly address: string,
    private readonly browser: Browser,
    private readonly api: ChildProcess,
    private readonly database: TestDatabase,
  ) {}

  static async open(): Promise<DemoInBrowser> {
    const database = await demoDatabase();
    const env = { PATH: process.env.PATH, NODE_ENV: 'production', TZ: 'UTC' };
    const port = String(await freePort());
    const session = {
      SESSION_SECRET: 'a session secret for journeys only',
      WEB_DIR: 'apps/web/dist',
    };
    const api = spawn(process.execPath, ['--enable-source-maps', 'apps/api/dist/main.mjs'], {
      cwd: ROOT,
      stdio: 'ignore',
      env: { ...env, ...session, PORT: port, DATABASE_URL: database.urls.api },
    });
    const address = `http://127.0.0.1:${port}`;
    const answers = async () => expect((await fetch(`${address}/api/health`)).status).toBe(200);
    await vi.waitFor(answers, { timeout: 20_000 });
    const args = [...QUIET, ...ALONE];
    const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args });
    return new DemoInBrowser(address, browser, api, database);
  }

  /** Somebody of the house, signed in, with a browser of his own. */
  async as(name: string, { viewport = DESK, theme = 'light' } = {}): Promise<Page> {
    const context = await this.browser.newContext({ viewport });
    await context.addInitScript(watch);
    await context.addInitScript((chosen) => localStorage.setItem('foldwell theme', chosen), theme);
    const page = await context.newPage();
    page.setDefaultTimeout(15_000);
    await page.goto(`${this.address}/sign-in`);
    await page.getByLabel('E-mail').fill(`${name}@ostrey-tarn.example`);
    await page.getByLabel('Password').fill(PASSWORD);
    await page.keyboard.press('Enter');
    await page.waitForSelector('h1:has-text("First light")');
    return page;
  }

  async close(): Promise<void> {
    await this.browser.close();
    const ended = new Promise((resolve) => this.api.once('exit', resolve));
    this.api.kill('SIGTERM');
    await ended;
    await this.database.drop();
  }
}

/** Runs in the page, before anything of ours. */
function watch(): void {
  const watched: Watched = { faults: [], pointers: 0 };
  Object.assign(globalThis, { watched });
  addEventListener('securitypolicyviolation', (event) => {
    watched.faults.push(`${event.violatedDirective} ${event.blockedURI}`);
  });
  addEventListener('error', (event) => watched.faults.push(event.message));
  addEventListener('unhandledrejection', (event) => watched.faults.push(String(event.reason)));
  addEventListener('pointerdown', () => {
    watched.pointers += 1;
  });
}

/** What the page noted since it was loaded: broken rules of the content policy, errors, presses of a pointer. */
export function watchedIn(page: Page): Promise<Watched> {
  return page.evaluate(() => (globalThis as unknown as { watched: Watched }).watched);
}

/** Asks the API as whoever is signed in on the page. */
export function ask<Answer>(page: Page, path: string): Promise<Answer> {
  return page.evaluate(async (asked) => (await (await fetch(asked)).json()) as Answer, path);
}
