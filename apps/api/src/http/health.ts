import type { RequestHandler } from 'express';
import type { DataSource } from 'typeorm';

import { migrations } from '../database/migrations/index.js';
import { sendProblem } from './problem.js';

/** 200 with the state of database and migrations; 503 with Retry-After where the database is away. */
export function health(db: DataSource): RequestHandler {
  return async (_req, res) => {
    res.locals.route = '/health';
    try {
      const [row] = await db.query<{ n: number }[]>('SELECT count(*)::int AS n FROM migrations');
      const waiting = migrations.length - (row?.n ?? 0);
      res.json({
        status: 'ok',
        database: 'ok',
        migrations: waiting === 0 ? 'all applied' : `${waiting} to apply`,
      });
    } catch {
      sendProblem(res, {
        status: 503,
        code: 'not_now',
        detail: 'The ledger can’t be reached just now.',
        extra: {
          database: 'away',
        },
      });
    }
  };
}
