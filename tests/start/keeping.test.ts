import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, describe, expect, it, vi } from 'vitest';

import { type Clone, makeClone, USERS } from './clone.js';
import { expectAllGone, run } from './started.js';

const clones: Clone[] = [];

function cloned(...how: Parameters<typeof makeClone>): Clone {
  const clone = makeClone(...how);
  clones.push(clone);
  return clone;
}

afterEach(() => {
  for (const clone of clones.splice(0)) clone.remove();
});

function elsewhere(): string[] {
  return readdirSync('/var/lib').filter((name) => name.startsWith('foldwell-'));
}

describe('what a start keeps', () => {
  it('is made again where the making was cut short', async () => {
    const clone = cloned('ordinary');
    const cut = run(clone, 'start', { args: ['--empty'] });
    await vi.waitUntil(() => existsSync(join(clone.folder, '.foldwell/postgres/data/base')), {
      interval: 10,
    });
    cut.child.kill('SIGKILL');
    await cut.ended;
    await expectAllGone(clone, []);
    const house = run(clone, 'start', { args: ['--empty'] });
    await house.address();
    house.child.kill('SIGTERM');
    await expectAllGone(clone, []);
  });

  it('is verified and migrated without a start, and beside one', async () => {
    const clone = cloned('ordinary');
    const alone = run(clone, 'verify');
    expect(await alone.ended, alone.said()).toBe(0);
    const house = run(clone, 'start', { args: ['--empty'] });
    await house.address();
    const beside = run(clone, 'migrate', { args: ['show'] });
    expect(await beside.ended, beside.said()).toBe(0);
    expect(beside.said()).toContain('WriteMovements');
    house.child.kill('SIGTERM');
    await expectAllGone(clone, []);
  });

  it('is taken away only after a yes', async () => {
    const clone = cloned('ordinary');
    expect(await run(clone, 'verify').ended).toBe(0);
    const refused = run(clone, 'reset', { answer: 'no\n' });
    expect(await refused.ended).toBe(1);
    expect(refused.said()).toContain('Nothing was taken away.');
    expect(existsSync(join(clone.folder, '.foldwell/postgres/made'))).toBe(true);
    expect(await run(clone, 'reset', { answer: 'yes\n' }).ended).toBe(0);
    expect(existsSync(join(clone.folder, '.foldwell'))).toBe(false);
  });

  it('is not taken away under a house that is open', async () => {
    const clone = cloned('ordinary');
    const house = run(clone, 'start', { args: ['--empty'] });
    await house.address();
    const reset = run(clone, 'reset', { answer: 'yes\n' });
    expect(await reset.ended).toBe(1);
    expect(reset.said()).toContain('stop it first');
    house.child.kill('SIGTERM');
    await expectAllGone(clone, []);
  });
});

describe.each(USERS.filter((user) => user === 'root'))(
  'a clone of %s that the database cannot get into',
  () => {
    it('keeps its database under /var/lib, says so, and a reset takes both away', async () => {
      const before = elsewhere();
      const clone = cloned('root', { mode: 0o700 });
      const first = run(clone, 'verify');
      expect(await first.ended, first.said()).toBe(0);
      const made = elsewhere().filter((name) => !before.includes(name));
      expect(made).toHaveLength(1);
      expect(first.said()).toContain(`/var/lib/${made[0]}`);
      const reset = run(clone, 'reset', { answer: 'yes\n' });
      expect(await reset.ended, reset.said()).toBe(0);
      expect(elsewhere()).toEqual(before);
    });
  },
);

describe('a demo house made by hand', () => {
  it('is the one that the next start opens', async () => {
    const clone = cloned('ordinary');
    const seed = run(clone, 'seed', { args: ['--lots', '40'] });
    expect(await seed.ended, seed.said()).toBe(0);
    expect(seed.said()).toContain('Sign in as ');
    const again = run(clone, 'seed');
    expect(await again.ended).toBe(1);
    expect(again.said()).toContain('There is a house here already.');
    const house = run(clone, 'start');
    await house.address();
    expect(house.said()).not.toContain('Making');
    expect(house.said()).toContain(seed.said().trim().split('\n').at(-1));
    house.child.kill('SIGTERM');
    await expectAllGone(clone, []);
  });
});
