import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

import { ORDINARY } from './clone.js';

const FIND = fileURLToPath(
  new URL('../../packages/local-stack/src/postgres/find.mjs', import.meta.url),
);

describe('a machine without PostgreSQL', () => {
  it('tells an ordinary person in one sentence what to ask for', () => {
    const program = `
      const { findOrInstallPostgres } = await import(${JSON.stringify(FIND)});
      await findOrInstallPostgres(console.log, '/nowhere').catch((error) => console.log(error.message));`;
    const isRoot = process.getuid?.() === 0;
    const { stdout, stderr } = spawnSync(
      process.execPath,
      ['--input-type=module', '--eval', program],
      { ...(isRoot && ORDINARY), cwd: '/', encoding: 'utf8' },
    );
    expect(stderr).toBe('');
    expect(stdout).toBe(
      'PostgreSQL 15 is not installed: ask for "apt-get install postgresql-15", or start once as root.\n',
    );
  });
});
