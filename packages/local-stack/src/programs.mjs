import { join } from 'node:path';

import { API_DIST, WEB_DIST } from './build.mjs';
import { databaseUrls } from './postgres/roles.mjs';

/** @typedef {import('./state/secrets.mjs').Secrets} Secrets */

/**
 * The command line of one of the API's programs.
 * @param {'main' | 'worker' | 'migrate' | 'verify' | 'seed'} name
 */
export function programArgs(name) {
  return ['--enable-source-maps', join(API_DIST, `${name}.mjs`)];
}

/**
 * What the API's programs read from their environment; each is given no more than it uses.
 * @param {{ port: number, secrets: Secrets }} given the database's port
 */
export function programEnv({ port, secrets }) {
  const urls = databaseUrls({ port, passwords: secrets.passwords });
  const base = {
    PATH: process.env.PATH ?? '',
    TZ: 'UTC',
    NODE_ENV: 'production',
    HOST: '127.0.0.1',
  };
  return {
    main: {
      ...base,
      DATABASE_URL: urls.api,
      SESSION_SECRET: secrets.sessionSecret,
      WEB_DIR: WEB_DIST,
    },
    worker: { ...base, WORKER_DATABASE_URL: urls.worker },
    migrate: { ...base, OWNER_DATABASE_URL: urls.owner },
    verify: { ...base, READER_DATABASE_URL: urls.reader },
    seed: {
      ...base,
      DATABASE_URL: urls.api,
      OWNER_DATABASE_URL: urls.owner,
      WORKER_DATABASE_URL: urls.worker,
    },
  };
}
