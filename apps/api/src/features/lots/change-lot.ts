import { ParticularsRequest } from '@foldwell/contracts';
import type { Request } from 'express';

import { changedMeanwhile, readBody, requireVersion } from '../../http/body.js';
import { NotFound, Refusal } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { columnsOf, particularsOf } from './particulars-columns.js';

/** Edits what is written about a lot, with history; weights change only through the ledger. */
export async function changeLot(req: Request, { db, person }: Context): Promise<Answer> {
  const version = requireVersion(req);
  const request = await readBody(req, ParticularsRequest);
  if (request.floor !== undefined && !person.roles.includes('owner')) {
    throw new Refusal(403, 'not_yours', 'The floor price is for owner. Ask an owner.');
  }
  const next = await db.transaction(async (tx) => {
    const [was] = await tx.query<
      (Record<string, unknown> & { id: string; version: number; particulars: object })[]
    >('SELECT * FROM lot WHERE number = $1', [String(req.params.number).toUpperCase()]);
    if (!was) throw new NotFound(`There is no lot ${String(req.params.number).slice(0, 20)}.`);
    const { particulars, ...columns } = columnsOf(request);
    const loose = { ...was.particulars, ...(particulars as object) };
    const names = Object.keys(columns);
    const set = names.map((name, index) => `${name} = $${index + 4}`);
    const [updated] = await tx
      .query<[unknown, number]>(
        `UPDATE lot SET ${['version = version + 1', 'particulars = $3', ...set].join(', ')} WHERE id = $1 AND version = $2`,
        [was.id, version, loose, ...Object.values(columns)],
      )
      .then(([, count]) => [count]);
    if (updated === 0)
      throw changedMeanwhile({ version: was.version, particulars: particularsOf(was) });
    const changes = [
      ...names.map((name) => [name, was[name], columns[name]] as const),
      ...Object.entries(particulars as object).map(
        ([name, value]) =>
          [name, (was.particulars as Record<string, unknown>)[name], value] as const,
      ),
    ];
    for (const [field, before, after] of changes) {
      if (JSON.stringify(plain(before)) === JSON.stringify(plain(after))) continue;
      await tx.query(
        'INSERT INTO lot_change (lot_id, person_id, field, was, became) VALUES ($1, $2, $3, $4, $5)',
        [was.id, person.id, field, JSON.stringify(plain(before)), JSON.stringify(plain(after))],
      );
    }
    return version + 1;
  });
  return { body: { version: next }, headers: { ETag: `"v${next}"` } };
}

// bigint columns come back as text, dates as dates; both are compared as what was sent.
function plain(value: unknown): unknown {
  if (value instanceof Date) return value.toISOString().slice(0, 10);
  if (typeof value === 'string' && /^\d{1,15}$/.test(value)) return Number(value);
  return value ?? null;
}
