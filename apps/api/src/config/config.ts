import { readFileSync } from 'node:fs';

/** What the API needs from its environment, read once. */
export interface Config {
  databaseUrl: string;
  host: string;
  port: number;
  webDir: string | null;
  sessionSecrets: string[];
  isCookieSecure: boolean;
  isProduction: boolean;
  trustedProxies: number;
}

const KNOWN_DEFAULTS = ['secret', 'changeme', 'password'];

/** Reads `NAME`, or the file that `NAME_FILE` points to; throws one clear sentence where neither is. */
export function setting(name: string, env = process.env): string {
  const file = env[`${name}_FILE`];
  const value = file ? readFileSync(file, 'utf8').trim() : env[name];
  if (!value) throw new Error(`${name} is not set.`);
  return value;
}

/** The configuration, or an error that says which setting is missing, short or a known default. */
export function readConfig(env = process.env): Config {
  const sessionSecrets = setting('SESSION_SECRET', env).split(',');
  for (const secret of sessionSecrets) {
    if (
      secret.length < 32 ||
      KNOWN_DEFAULTS.some((known) => secret.toLowerCase().startsWith(known))
    ) {
      throw new Error('SESSION_SECRET must be at least 32 random characters.');
    }
  }
  const databaseUrl = setting('DATABASE_URL', env);
  if (['owner', 'postgres'].includes(new URL(databaseUrl).username)) {
    throw new Error('DATABASE_URL must name the role api, never the owner of the tables.');
  }
  return {
    databaseUrl,
    sessionSecrets,
    host: env.HOST ?? '127.0.0.1',
    port: Number(env.PORT ?? 4180),
    webDir: env.WEB_DIR ?? null,
    isCookieSecure: env.COOKIE_SECURE === '1',
    isProduction: env.NODE_ENV === 'production',
    trustedProxies: Number(env.TRUSTED_PROXIES ?? 0),
  };
}
