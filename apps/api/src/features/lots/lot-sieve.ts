import { CLARITIES, COLOURS, rankOf } from '@foldwell/quantities';
import type { Request } from 'express';

import { ValidationFailed } from '../../http/errors.js';

/** A sieve as SQL: conditions on `l` (lot) with numbered parameters. */
export interface Sieve {
  where: string[];
  values: unknown[];
}

/** Reads a sieve from the address: `shape=Round,Oval&colour=D-J&each=0.5-2&clarity=VVS2-SI2&place=…&report=none&supplier=C 118`. */
export function readSieve(query: Request['query']): Sieve {
  const sieve: Sieve = { where: [], values: [] };
  const add = (condition: (at: string) => string, value: unknown) => {
    sieve.values.push(value);
    sieve.where.push(condition(`$${sieve.values.length}`));
  };
  const text = (name: string) =>
    typeof query[name] === 'string' ? String(query[name]).trim().slice(0, 200) : '';

  if (text('shape')) add((at) => `l.shape = ANY (${at})`, text('shape').split(','));
  if (text('kind')) add((at) => `l.kind = ANY (${at})`, text('kind').split(','));
  if (text('origin')) add((at) => `l.origin = ${at}`, text('origin'));
  if (text('owner') === 'house') sieve.where.push('l.owner_party_id IS NULL');
  else if (text('owner') === 'consigned') sieve.where.push('l.owner_party_id IS NOT NULL');
  grades(text('colour'), 'colour', COLOURS, add);
  grades(text('clarity'), 'clarity', CLARITIES, add);
  numbers(text('each'), 'each', 1000, (from, to) => {
    if (from !== null) add((at) => `l.each_weight >= ${at}`, from);
    if (to !== null) add((at) => `l.each_weight <= ${at}`, to);
  });
  numbers(text('ask'), 'ask', 100, (from, to) => {
    if (from !== null) add((at) => `l.ask_price >= ${at}`, from);
    if (to !== null) add((at) => `l.ask_price <= ${at}`, to);
  });
  place(text('place'), add, sieve);
  papers(text('report'), add, sieve);
  if (text('supplier'))
    add(
      (at) => `l.source_party_id = (SELECT y.id FROM party y WHERE y.number::text = ${at})`,
      text('supplier').replace(/^C\s*/i, ''),
    );
  if (text('q')) {
    add(
      (at) =>
        `(l.number LIKE ${at} || '%' OR upper(l.report_number) LIKE upper(${at}) || '%' OR l.shape ILIKE ${at} || '%')`,
      text('q').replace(/[%_\\]/g, '\\$&'),
    );
  }
  if (query.all !== '1') sieve.where.push('l.whole > 0');
  return sieve;
}

type Add = (condition: (at: string) => string, value: unknown) => void;

function grades(text: string, name: string, scale: readonly string[], add: Add): void {
  if (!text) return;
  const [from = '', to = from] = text.split(/[-–]/);
  const [best, least] = [rankOf(scale, from), rankOf(scale, to)];
  if (best === null || least === null) {
    throw new ValidationFailed([
      {
        field: name,
        message: `${text} is not a range of ${name}, such as ${scale[3]}-${scale[6]}.`,
      },
    ]);
  }
  add((at) => `l.${name}_from >= ${at}`, Math.min(best, least));
  add((at) => `coalesce(l.${name}_to, l.${name}_from) <= ${at}`, Math.max(best, least));
}

function numbers(
  text: string,
  name: string,
  scale: number,
  use: (from: number | null, to: number | null) => void,
): void {
  if (!text) return;
  const [from = '', to = ''] = text.includes('-') ? text.split('-') : [text, text];
  const read = (part: string) => (part === '' ? null : Math.round(Number(part) * scale));
  const [low, high] = [read(from), read(to)];
  if ([low, high].some((one) => one !== null && !Number.isSafeInteger(one))) {
    throw new ValidationFailed([
      { field: name, message: `${text} is not a range of numbers, such as 0.50-2.04.` },
    ]);
  }
  use(low, high);
}

/** `report=none` is goods without one, `report=any` with one, else the laboratory's name. */
function papers(text: string, add: Add, sieve: Sieve): void {
  if (text === 'none') sieve.where.push(`l.report_number = ''`);
  else if (text === 'any') sieve.where.push(`l.report_number <> ''`);
  else if (text) add((at) => `lower(l.report_laboratory) = lower(${at})`, text);
}

const PARTS = ['safe', 'out', 'returned', 'sold', 'missing'];

function place(text: string, add: Add, sieve: Sieve): void {
  if (!text) return;
  if (PARTS.includes(text)) sieve.where.push(`l.part_${text} > 0`);
  else if (/^\d{1,18}$/.test(text))
    add(
      (at) =>
        `EXISTS (SELECT 1 FROM balance b WHERE b.lot_id = l.id AND b.place_id = ${at} AND b.weight > 0)`,
      text,
    );
  else {
    add(
      (at) => `EXISTS (SELECT 1 FROM balance b JOIN place p ON p.id = b.place_id
      WHERE b.lot_id = l.id AND b.weight > 0 AND p.kind = 'drawer' AND lower(p.safe || p.name) LIKE lower(${at}) || '%')`,
      text.replace(/^safe\s*/i, '').replace(/[%_\\]/g, '\\$&'),
    );
  }
}
