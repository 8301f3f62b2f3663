import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('../../', import.meta.url));
const env = { TZ: 'UTC' };

/** `beside` needs no database; `house` runs against a real one; `outside` asks other programs; `bench` measures. */
export default defineConfig({
  root,
  test: {
    maxWorkers: 2,
    teardownTimeout: 30_000,
    projects: [
      {
        root,
        test: { name: 'beside', env, include: ['{apps,packages}/**/src/**/*.test.{ts,tsx}'] },
      },
      {
        root,
        test: {
          name: 'house',
          env,
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/{outside-programs,bench}/**', '**/node_modules/**'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: process.env.FOLDWELL_FULL === '1' ? 3_600_000 : 120_000,
          hookTimeout: 120_000,
        },
      },
      {
        root,
        test: {
          name: 'outside',
          env,
          include: ['tests/outside-programs/**/*.test.ts'],
          globalSetup: [
            'tests/support/install-outside-programs.ts',
            'tests/support/global-setup.ts',
          ],
          testTimeout: 300_000,
          hookTimeout: 300_000,
        },
      },
      {
        root,
        test: {
          name: 'bench',
          env,
          include: ['tests/bench/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 600_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
});
