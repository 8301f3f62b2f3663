import { spawnSync } from 'node:child_process';
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  databaseUrls,
  databaseUser,
  findOrInstallPostgres,
  makeCluster,
  makePasswords,
  runCluster,
} from '@foldwell/local-stack';
import pg from 'pg';

import { migrate } from '../support/make-test-cluster.js';

type Running = Awaited<ReturnType<typeof runCluster>>;

/** A cluster of its own on a disk, stopped as by a power cut and started again. */
export class CrashCluster {
  readonly #passwords = makePasswords();
  #running: Running | undefined;

  private constructor(
    readonly bin: string,
    readonly folder: string,
    readonly settings: string[],
  ) {}

  /** With `settings` as name=value besides those that the house runs with. */
  static async make(settings: string[] = []): Promise<CrashCluster> {
    const bin = await findOrInstallPostgres(() => undefined);
    const base = mkdtempSync(join(tmpdir(), 'foldwell-crash-'));
    chmodSync(base, 0o755);
    const cluster = new CrashCluster(bin, join(base, 'postgres'), settings);
    await makeCluster({ bin, folder: cluster.folder, passwords: cluster.#passwords });
    await cluster.start();
    migrate(cluster.urls.owner);
    return cluster;
  }

  get urls() {
    return databaseUrls({ port: this.#running?.port ?? 0, passwords: this.#passwords });
  }

  async start(): Promise<void> {
    const { bin, folder, settings } = this;
    this.#running = await runCluster({ bin, folder, settings });
  }

  /** `pg_ctl stop -m immediate`: no checkpoint, no goodbye; waits until the last backend is gone. */
  async stopAtOnce(): Promise<void> {
    const data = join(this.folder, 'data');
    const ended = this.#running?.ended;
    spawnSync(join(this.bin, 'pg_ctl'), ['-D', data, '-m', 'immediate', '-w', 'stop'], {
      ...databaseUser(this.folder),
      stdio: 'ignore',
    });
    await ended;
  }

  async remove(): Promise<void> {
    await this.#running?.stop();
    rmSync(join(this.folder, '..'), { recursive: true, force: true });
  }

  async withClient<T>(
    role: 'owner' | 'reader' | 'api',
    work: (client: pg.Client) => Promise<T>,
  ): Promise<T> {
    const client = new pg.Client({ connectionString: this.urls[role] });
    await client.connect();
    try {
      return await work(client);
    } finally {
      await client.end();
    }
  }
}
