import { spawn } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import { freePort } from '@foldwell/local-stack';
import { expect, vi } from 'vitest';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

export interface OpenApi {
  /** Asks as the owner; throws what the house says where it refuses. */
  ask<Answer>(method: string, path: string, body?: unknown): Promise<Answer>;
  close(): Promise<void>;
}

/** The built API in a process of its own, on an empty house, with its first owner signed in. */
export async function openApi(databaseUrl: string): Promise<OpenApi> {
  const port = await freePort();
  const base = `http://127.0.0.1:${port}/api`;
  const program = ['--enable-source-maps', 'apps/api/dist/main.mjs'];
  const env = { PATH: process.env.PATH, NODE_ENV: 'production', TZ: 'UTC', PORT: String(port) };
  const api = spawn(process.execPath, program, {
    cwd: ROOT,
    stdio: 'ignore',
    env: { ...env, DATABASE_URL: databaseUrl, SESSION_SECRET: randomUUID() + randomUUID() },
  });
  const answers = async () => expect((await fetch(`${base}/health`)).status).toBe(200);
  await vi.waitFor(answers, { timeout: 20_000 });
  const headers: Record<string, string> = { 'content-type': 'application/json' };

  async function ask<Answer>(method: string, path: string, body?: unknown): Promise<Answer> {
    const response = await fetch(`${base}${path}`, {
      method,
      headers: { ...headers, 'idempotency-key': randomUUID() },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path}: ${response.status} ${text}`);
    const [cookie] = response.headers.getSetCookie();
    if (cookie) headers.cookie = cookie.split(';')[0] ?? '';
    return (text ? JSON.parse(text) : undefined) as Answer;
  }

  await ask('POST', '/first-owner', {
    house: 'Bench',
    town: 'Bench',
    zone: 'UTC',
    baseCurrency: 'USD',
    step: 10,
    name: 'B. Ench',
    email: 'bench@bench.example',
    password: 'four stones weigh more than three',
  });
  headers['x-csrf-token'] = (await ask<{ csrf: string }>('GET', '/me')).csrf;
  const ended = new Promise((resolve) => api.once('exit', resolve));
  return {
    ask,
    close: async () => {
      api.kill('SIGTERM');
      await ended;
    },
  };
}
