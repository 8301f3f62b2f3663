import { type ChildProcess, spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { freePort } from '@foldwell/local-stack';
import { expect, vi } from 'vitest';

import { SECRET } from '../support/house-over-http.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/** The API in a process of its own, on one address, that is killed outright and begun again. */
export class KillableApi {
  #process: ChildProcess | undefined;

  private constructor(
    readonly databaseUrl: string,
    readonly port: number,
  ) {}

  static async on(databaseUrl: string): Promise<KillableApi> {
    return new KillableApi(databaseUrl, await freePort());
  }

  get base(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  async begin(): Promise<void> {
    const env = { PATH: process.env.PATH, NODE_ENV: 'test', TZ: 'UTC', PORT: String(this.port) };
    this.#process = spawn(process.execPath, ['apps/api/dist/main.mjs'], {
      cwd: ROOT,
      stdio: 'ignore',
      env: { ...env, DATABASE_URL: this.databaseUrl, SESSION_SECRET: SECRET },
    });
    await vi.waitFor(
      async () => expect((await fetch(`${this.base}/api/health`)).status).toBe(200),
      { timeout: 30_000, interval: 20 },
    );
  }

  /** SIGKILL: no handler runs, nothing is finished. */
  async kill(): Promise<void> {
    const killed = this.#process;
    if (!killed || killed.exitCode !== null) return;
    const gone = new Promise((resolve) => killed.once('exit', resolve));
    killed.kill('SIGKILL');
    await gone;
  }
}
