import type { DataSource } from 'typeorm';

import { Refusal } from './errors.js';

/** Guesses allowed before a name or an address waits, and how long a window of guesses lasts. */
const ALLOWED = { account: 10, address: 100 } as const;
const WINDOW = "interval '15 minutes'";

/** Refuses while the name or the address waits, telling how long; survives a restart. */
export async function refuseWhileWaiting(db: DataSource, keys: string[]): Promise<void> {
  const [row] = await db.query<{ seconds: number | null }[]>(
    `SELECT ceil(extract(epoch FROM max(waits_until) - clock_timestamp()))::int AS seconds
     FROM throttle WHERE key = ANY ($1) AND waits_until > clock_timestamp()`,
    [keys],
  );
  if (row?.seconds) {
    throw new Refusal(
      429,
      'wait',
      `Too many tries. Wait ${inWords(row.seconds)}, then try again.`,
      { retryAfter: row.seconds },
    );
  }
}

/** Counts a failed guess; past the allowed number each further one doubles the wait. Returns how many tries are left. */
export async function countFailure(
  db: DataSource,
  key: string,
  kind: keyof typeof ALLOWED,
): Promise<number> {
  const [row] = await db.query<{ failures: number }[]>(
    `INSERT INTO throttle AS t (key, failures) VALUES ($1, 1)
     ON CONFLICT (key) DO UPDATE SET
       failures = CASE WHEN t.since < clock_timestamp() - ${WINDOW} AND coalesce(t.waits_until, t.since) < clock_timestamp() THEN 1 ELSE t.failures + 1 END,
       since = CASE WHEN t.since < clock_timestamp() - ${WINDOW} AND coalesce(t.waits_until, t.since) < clock_timestamp() THEN clock_timestamp() ELSE t.since END
     RETURNING failures`,
    [key],
  );
  const failures = row?.failures ?? 1;
  const over = failures - ALLOWED[kind];
  if (over >= 0) {
    // 10 minutes first, doubling to a day at most: a delay, never a lock.
    await db.query(
      `UPDATE throttle SET waits_until = clock_timestamp() + least(interval '10 minutes' * power(2, $2::int), interval '24 hours') WHERE key = $1`,
      [key, Math.min(over, 10)],
    );
  }
  return Math.max(0, -over);
}

/** A right password clears the name's guesses. */
export async function forgetFailures(db: DataSource, key: string): Promise<void> {
  await db.query('DELETE FROM throttle WHERE key = $1', [key]);
}

function inWords(seconds: number): string {
  return seconds < 90 ? `${seconds} s` : `${Math.ceil(seconds / 60)} minutes`;
}
