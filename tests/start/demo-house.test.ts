import { afterAll, describe, expect, it } from 'vitest';

import { isFull } from '../support/scale.js';
import { type Clone, makeClone, USERS } from './clone.js';
import { expectAllGone, portsOf, run, type Started } from './started.js';

/** In the long run nothing is installed beforehand, not even a package. */
const PACKAGES = isFull ? 'cold' : 'warm';

describe.each(isFull ? USERS : USERS.slice(0, 1))('npm start on a fresh clone as %s', (user) => {
  const clone: Clone = makeClone(user, { packages: PACKAGES });
  let house: Started;
  let address = '';

  afterAll(() => clone.remove());

  it('opens the demo house and says where and how to sign in, in one line', async () => {
    const began = Date.now();
    house = run(clone, 'start');
    address = await house.address();
    process.stdout.write(
      `${PACKAGES} start as ${user}: ${Math.round((Date.now() - began) / 1000)} s\n`,
    );
    const last = house.said().trim().split('\n').at(-1);
    expect(last).toMatch(/^Foldwell is open at http:.*owner.*password/i);
  });

  it('lets the owner in with the words that it says', async () => {
    const [, email] = /Sign in as (\S+@\S+) /.exec(house.said()) ?? [];
    const [, password] = /password of all is "(.+)"/.exec(house.said()) ?? [];
    const answer = await fetch(`${address}/api/sign-in`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ email, password }),
    });
    expect(answer.status).toBe(204);
  });

  it('serves its pages with headers that keep other sites out', async () => {
    const page = await fetch(address);
    expect(page.status).toBe(200);
    expect(page.headers.get('content-security-policy')).toMatch(
      /default-src 'none'.*script-src 'self' 'nonce-/,
    );
    expect(await page.text()).toContain('<!doctype html>');
  });

  it('holds books that verify finds nothing wrong with', async () => {
    const verify = run(clone, 'verify');
    expect(await verify.ended, verify.said()).toBe(0);
    expect(verify.said()).not.toContain('FAIL');
  });

  it('opens the same house when it is started again', async () => {
    const ports = portsOf(clone);
    const said = house.said().trim().split('\n').at(-1);
    house.child.kill('SIGINT');
    expect(await house.ended).toBe(0);
    await expectAllGone(clone, ports);
    house = run(clone, 'start', { env: { PORT: new URL(address).port } });
    await house.address();
    expect(house.said().trim()).toBe(said);
    house.child.kill('SIGTERM');
    await house.ended;
    await expectAllGone(clone, ports);
  });
});
