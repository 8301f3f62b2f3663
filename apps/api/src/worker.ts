import { Client } from 'pg';

import { setting } from './config/config.js';
import { log } from './http/log.js';

// Read before anything else: without it the process does not start.
const url = setting('WORKER_DATABASE_URL');
const RESTS_MS = 1000;
const AWAY_MS = 3000;

let isStopping = false;
let wake: () => void = () => undefined;
const rest = (ms: number) =>
  new Promise<void>((done) => {
    const timer = setTimeout(done, ms);
    wake = () => {
      clearTimeout(timer);
      done();
    };
  });
for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.on(signal, () => {
    isStopping = true;
    wake();
  });
}

/** Seals what waits, first at once and then every second; rests longer while the database is away. */
async function seal(): Promise<void> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 3000 });
  client.on('error', () => undefined);
  try {
    await client.connect();
    while (!isStopping) {
      const { rows } = await client.query<{ n: number }>('SELECT seal_waiting() AS n');
      if (rows[0]?.n) log({ level: 'info', sealed: rows[0].n });
      else await rest(RESTS_MS);
    }
  } finally {
    await client.end().catch(() => undefined);
  }
}

while (!isStopping) {
  await seal().catch((error: unknown) =>
    log({ level: 'error', worker: error instanceof Error ? error.message : 'away' }),
  );
  if (!isStopping) await rest(AWAY_MS);
}
