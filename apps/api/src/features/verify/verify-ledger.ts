import type { Client } from 'pg';

import { ASSERTIONS } from './assertions.js';
import { GUARDS_NOW } from './guards-now.js';
import { guards } from './guards.js';

const NAMED = 10;

export interface Verdict {
  lines: string[];
  failed: number;
  ran: number;
}

/** Runs every assertion in one read-only snapshot; a line for each, offenders by name. */
export async function verifyLedger(client: Client): Promise<Verdict> {
  await client.query('BEGIN TRANSACTION ISOLATION LEVEL REPEATABLE READ READ ONLY');
  const verdict: Verdict = { lines: [], failed: 0, ran: 0 };
  try {
    for (const [index, assertion] of ASSERTIONS.entries()) {
      const sql = assertion.usesGuards
        ? `WITH guards_now AS (${GUARDS_NOW}) ${assertion.offenders}`
        : assertion.offenders;
      const { rows } = await client.query<string[]>({
        text: sql,
        rowMode: 'array',
        ...(assertion.usesGuards && { values: [guards] }),
      });
      const number = index + 1;
      const names =
        rows
          .slice(0, NAMED)
          .map(([name]) => name)
          .join('; ') + (rows.length > NAMED ? ' …' : '');
      verdict.ran += 1;
      if (rows.length === 0) verdict.lines.push(`${number} ok ${assertion.says}`);
      else if (assertion.isWarning)
        verdict.lines.push(`${number} ok ${assertion.says}, but see ${rows.length}: ${names}`);
      else {
        verdict.failed += 1;
        verdict.lines.push(`${number} FAIL ${rows.length} ${assertion.says}: ${names}`);
      }
    }
  } finally {
    await client.query('ROLLBACK');
  }
  return verdict;
}
