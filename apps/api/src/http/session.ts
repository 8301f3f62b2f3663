import connectPgSimple from 'connect-pg-simple';
import { randomBytes } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import { Pool } from 'pg';

import type { Config } from '../config/config.js';

declare module 'express-session' {
  interface SessionData {
    personId: string;
    startedAt: number;
    csrf: string;
  }
}

/** Idle 30 minutes, 12 hours in all, however busy; the second is kept in the session itself. */
export const IDLE_MS = 30 * 60_000;
export const ABSOLUTE_MS = 12 * 60 * 60_000;

/** Sessions in PostgreSQL, with a pool of their own. */
export function sessions(config: Config): { handler: RequestHandler; close(): Promise<void> } {
  const pool = new Pool({
    connectionString: config.databaseUrl,
    max: 4,
    connectionTimeoutMillis: 3000,
  });
  pool.on('error', () => undefined);
  const Store = connectPgSimple(session);
  const store = new Store({
    pool,
    tableName: 'session',
    createTableIfMissing: false,
    pruneSessionInterval: 900,
    errorLog: () => undefined,
  });
  const handler = session({
    name: config.isCookieSecure ? '__Host-fw' : 'fw',
    secret: config.sessionSecrets,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    unset: 'destroy',
    cookie: {
      httpOnly: true,
      sameSite: 'lax',
      secure: config.isCookieSecure,
      path: '/',
      maxAge: IDLE_MS,
    },
  });
  return {
    handler,
    close: async () => {
      store.close();
      await pool.end();
    },
  };
}

/** Ends a promise the way the session's callback says. */
const settle = (done: () => void, fail: (error: Error) => void) => (error: unknown) => {
  if (error) fail(error instanceof Error ? error : new Error('the session could not be kept'));
  else done();
};

/** A new session under a new id, so that an id planted before sign-in is worth nothing. */
export async function beginSession(req: Request, personId: string): Promise<void> {
  await new Promise<void>((done, fail) => req.session.regenerate(settle(done, fail)));
  Object.assign(req.session, {
    personId,
    startedAt: Date.now(),
    csrf: randomBytes(24).toString('base64url'),
  });
  await new Promise<void>((done, fail) => req.session.save(settle(done, fail)));
}

/** Ends this session; the cookie is worth nothing from now on. */
export async function endSession(req: Request): Promise<void> {
  await new Promise<void>((done, fail) => req.session.destroy(settle(done, fail)));
}
