import { createServer, type Server } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';

import { type Clone, makeClone, USERS } from './clone.js';
import { expectAllGone, portsOf, processesOf, run } from './started.js';

const clones: Clone[] = [];

function cloned(...how: Parameters<typeof makeClone>): Clone {
  const clone = makeClone(...how);
  clones.push(clone);
  return clone;
}

afterEach(() => {
  for (const clone of clones.splice(0)) clone.remove();
});

describe.each(USERS)('a start as %s', (user) => {
  it('opens an empty house, again after a stop, and says where it is open meanwhile', async () => {
    const clone = cloned(user);
    for (const time of ['first', 'second']) {
      const house = run(clone, 'start', { args: time === 'first' ? ['--empty'] : [] });
      const address = await house.address();
      expect((await fetch(`${address}/api/health`)).status).toBe(200);
      expect(await (await fetch(`${address}/api/first-owner`)).text()).toMatch(/^[{]/);
      const ports = portsOf(clone);

      const another = run(clone, 'start');
      expect(await another.ended).toBe(0);
      expect(another.said()).toContain(`open already at ${address}`);

      house.child.kill('SIGINT');
      expect(await house.ended).toBe(0);
      await expectAllGone(clone, ports);
    }
  });

  it.each(['SIGTERM', 'SIGHUP', 'SIGKILL'] as const)(
    'leaves nothing behind after %s',
    async (signal) => {
      const clone = cloned(user);
      const house = run(clone, 'start', { args: ['--empty'] });
      await house.address();
      const ports = portsOf(clone);
      house.child.kill(signal);
      await house.ended;
      await expectAllGone(clone, ports);
    },
  );

  it('leaves nothing behind when whoever started it is killed', async () => {
    const clone = cloned(user);
    const house = run(clone, 'start', { args: ['--empty'], hasParent: true });
    await house.address();
    const ports = portsOf(clone);
    expect(processesOf(clone).length).toBeGreaterThan(3);
    house.child.kill('SIGKILL');
    await expectAllGone(clone, ports);
  });
});

describe('two clones started at once', () => {
  it('open at two addresses, each with its own house', async () => {
    const both = [cloned('ordinary'), cloned('ordinary')];
    const houses = both.map((clone) => run(clone, 'start', { args: ['--empty'] }));
    const addresses = await Promise.all(houses.map((house) => house.address()));
    expect(new Set(addresses).size).toBe(2);
    const ports = both.map(portsOf);
    for (const house of houses) house.child.kill('SIGTERM');
    await Promise.all(both.map((clone, index) => expectAllGone(clone, ports[index] ?? [])));
  });
});

describe('a port asked for', () => {
  async function occupied(): Promise<Server> {
    const server = createServer();
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    return server;
  }

  it('is said to be taken where it is, in one sentence', async () => {
    const clone = cloned('ordinary');
    const server = await occupied();
    const { port } = server.address() as { port: number };
    const house = run(clone, 'start', { args: ['--empty'], env: { PORT: String(port) } });
    expect(await house.ended).toBe(1);
    expect(house.said()).toBe(`Port ${port} is taken. Choose another with PORT.\n`);
    await new Promise((resolve) => server.close(resolve));
    await expectAllGone(clone, []);
  });

  it.each(['0', '65536', '80a', '-1'])('is refused where it is no port: %s', async (PORT) => {
    const house = run(cloned('ordinary'), 'start', { env: { PORT } });
    expect(await house.ended).toBe(1);
    expect(house.said()).toBe(`PORT must be a number from 1 to 65535, not ${PORT}.\n`);
  });

  it('is where the house opens', async () => {
    const clone = cloned('ordinary');
    const server = await occupied();
    const { port } = server.address() as { port: number };
    await new Promise((resolve) => server.close(resolve));
    const house = run(clone, 'start', { args: ['--empty'], env: { PORT: String(port) } });
    expect(await house.address()).toBe(`http://127.0.0.1:${port}`);
    house.child.kill('SIGTERM');
    await expectAllGone(clone, [port]);
  });
});
