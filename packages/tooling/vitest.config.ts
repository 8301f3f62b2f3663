import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('../../', import.meta.url));
const env = { TZ: 'UTC' };

/** Two projects: `beside` needs no database; `house` runs against a real one. */
export default defineConfig({
  root,
  test: {
    maxWorkers: 2,
    projects: [
      { root, test: { name: 'beside', env, include: ['{apps,packages}/**/src/**/*.test.{ts,tsx}'] } },
      {
        root,
        test: {
          name: 'house', env, include: ['tests/**/*.test.ts'], exclude: ['tests/outside-programs/**', '**/node_modules/**'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: process.env.FOLDWELL_FULL === '1' ? 3_600_000 : 120_000, hookTimeout: 120_000, teardownTimeout: 30_000,
        },
      },
    ],
  },
});
