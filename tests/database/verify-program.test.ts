import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { ASSERTIONS } from '../../apps/api/src/features/verify/assertions.js';
import { SmallHouse } from './small-house.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

let house: SmallHouse;
beforeAll(async () => {
  house = await SmallHouse.open();
});
afterAll(() => house.close());

function verify(url: string): { status: number | null; lines: string[] } {
  const env = { PATH: process.env.PATH, TZ: 'UTC', READER_DATABASE_URL: url };
  const options = { cwd: ROOT, env, encoding: 'utf8' } as const;
  const { status, stdout } = spawnSync(process.execPath, ['apps/api/dist/verify.mjs'], options);
  return { status, lines: stdout.trim().split('\n') };
}

describe('the verify program', () => {
  it('tells each assertion in a numbered line and ends well when all hold', () => {
    const { status, lines } = verify(house.database.urls.reader);
    expect(lines.slice(0, -1).map((line) => line.split(' ').slice(0, 2).join(' '))).toEqual(
      ASSERTIONS.map((_, index) => `${index + 1} ok`),
    );
    expect(lines.at(-1)).toBe('Every carat is accounted for.');
    expect(status).toBe(0);
  });

  it('fails with the offenders by name when one does not hold', async () => {
    await house.owner.query('ALTER TABLE balance DROP CONSTRAINT balance_never_negative');
    const { status, lines } = verify(house.database.urls.reader);
    expect(lines.join('\n')).toMatch(/\d+ FAIL 1 every guard.*balance_never_negative/);
    expect(status).toBe(1);
  });

  it('fails when the database is down', () => {
    const { status, lines } = verify('postgres://reader:x@127.0.0.1:1/foldwell');
    expect(lines[0]).toMatch(/^FAIL the ledger could not be verified/);
    expect(status).toBe(1);
  });
});
