import { type ChildProcess, spawn } from 'node:child_process';
import { afterAll, describe, expect, inject, it, vi } from 'vitest';
import pg from 'pg';

import { freePort } from '@foldwell/local-stack';
import { freshDatabase } from '../support/database.js';
import { composeCommand, composeEnvironment, ROOT, startCommand } from './images.js';

const NAMES = ['POSTGRES', 'OWNER', 'API', 'WORKER', 'COUNTER', 'READER'] as const;

describe('the images, by the commands that they start with', async () => {
  const database = await freshDatabase();
  const { port, passwords } = inject('cluster');
  const given: Record<string, string> = {
    SESSION_SECRET: 'k'.repeat(64),
    PUBLIC_URL: 'https://house.example',
  };
  for (const name of NAMES) given[`${name}_PASSWORD`] = passwords[name.toLowerCase() as 'api'];
  const children: ChildProcess[] = [];

  /** As in the image, but for the address of the database and the port. */
  function runAs(
    command: string[],
    service: string,
    changed: Record<string, string> = {},
  ): ChildProcess {
    const env = composeEnvironment(service, given);
    for (const [key, value] of Object.entries(env)) {
      env[key] = value.replace('@postgres:5432/foldwell', `@127.0.0.1:${port}/${database.name}`);
    }
    const [program = '', ...args] = command;
    const child = spawn(program, args, {
      cwd: ROOT,
      env: { PATH: process.env.PATH, NODE_ENV: 'production', TZ: 'UTC', ...env, ...changed },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    children.push(child);
    return child;
  }

  function endOf(child: ChildProcess): Promise<number | null> {
    return new Promise((resolve) => child.once('exit', resolve));
  }

  afterAll(async () => {
    for (const child of children.filter(
      ({ exitCode, signalCode }) => exitCode === null && !signalCode,
    )) {
      const end = endOf(child);
      child.kill('SIGKILL');
      await end;
    }
    await database.drop();
  });

  it('migrate ends well', async () => {
    expect(composeCommand('migrate').length).toBeGreaterThan(1);
    expect(await endOf(runAs(composeCommand('migrate'), 'migrate'))).toBe(0);
  });

  it('app opens its door to the network, serves the pages, and stops when asked', async () => {
    const appPort = String(await freePort());
    const app = runAs(startCommand('app'), 'app', { PORT: appPort });
    const address = `http://127.0.0.1:${appPort}`;
    await vi.waitFor(async () => expect((await fetch(`${address}/api/health`)).status).toBe(200), {
      timeout: 20_000,
    });
    expect(await (await fetch(address)).text()).toContain('<!doctype html>');
    const end = endOf(app);
    app.kill('SIGTERM');
    expect(await end).toBe(0);
  });

  it('worker waits for something to seal, and stops when asked', async () => {
    const worker = runAs(startCommand('worker'), 'worker');
    const client = new pg.Client({ connectionString: database.urls.postgres });
    await client.connect();
    await vi.waitFor(
      async () => {
        const { rows } = await client.query(
          "SELECT 1 FROM pg_stat_activity WHERE usename = 'worker' AND datname = current_database()",
        );
        expect(rows.length).toBeGreaterThan(0);
      },
      { timeout: 20_000 },
    );
    await client.end();
    const end = endOf(worker);
    worker.kill('SIGTERM');
    expect(await end).toBe(0);
  });

  it('app and worker do not start without what they need', async () => {
    expect(await endOf(runAs(startCommand('app'), 'app', { SESSION_SECRET: 'short' }))).not.toBe(0);
    expect(
      await endOf(runAs(startCommand('worker'), 'worker', { WORKER_DATABASE_URL: '' })),
    ).not.toBe(0);
  });
});
