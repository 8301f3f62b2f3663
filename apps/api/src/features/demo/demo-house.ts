import type { DataSource } from 'typeorm';

import type { Asker, Context } from '../../http/route.js';
import { hashPassword } from '../people/passwords.js';
import { CONSIGNORS, CUSTOMERS, HOUSE, PEOPLE, RETAILER, SUPPLIERS, WORKSHOPS } from './names.js';

/** Everybody of the demo signs in with the same words. */
export const DEMO_PASSWORD = 'north light on white paper';

const MEMO_TEXT =
  'The goods stay the property of {house} until we invoice them. They are sent for inspection only, to be kept or returned by {due date}. {customer} carries loss and damage from hand to hand. Prices are per carat, held until {price date}.';

export interface DemoHouse {
  as(name: (typeof PEOPLE)[number]['name']): Context;
  customers: string[];
  suppliers: string[];
  consignors: string[];
  drawers: string[];
}

/** The house, its people, parties and drawers, before the first carat. */
export async function openDemoHouse(db: DataSource): Promise<DemoHouse> {
  await db.query(
    `INSERT INTO house (name, town, zone, base_currency, price_currency, books_currency, step, is_demo, memo_text, warranty_text, insured_to)
     VALUES ($1, $2, $3, 'USD', 'USD', 'USD', 10, true, $4, 'EXAMPLE, NOT A WARRANTY: the house’s counsel gives the text.', 50000000)`,
    [HOUSE.name, HOUSE.town, HOUSE.zone, MEMO_TEXT],
  );
  await db.query(
    `UPDATE number_series SET first = x.first, next = x.first FROM (VALUES ('lot', 3801), ('memo', 20481), ('weighing', 29001), ('customer', 101)) x(series, first) WHERE number_series.series = x.series`,
  );
  const people = new Map<string, Asker>();
  const hash = await hashPassword(DEMO_PASSWORD);
  for (const { name, roles } of PEOPLE) {
    const email = `${name.toLowerCase().replace('. ', '.')}@ostrey-tarn.example`;
    const [row] = await db.query<{ id: string }[]>(
      'INSERT INTO person (name, email, roles, password_hash) VALUES ($1, $2, $3, $4) RETURNING id',
      [name, email, roles, hash],
    );
    people.set(name, {
      id: row?.id ?? '',
      name,
      roles: [...roles],
      seesCost: roles[0] !== 'dealer',
    });
  }
  const customers = await addParties(db, CUSTOMERS, 'is_customer');
  const suppliers = await addParties(db, SUPPLIERS, 'is_supplier');
  const consignors = await addParties(db, CONSIGNORS, 'is_consignor');
  await addParties(db, WORKSHOPS, 'is_workshop');
  await db.query(
    `INSERT INTO person (name, email, roles, password_hash, party_id) VALUES ($1, $2, '{retailer}', $3, (SELECT id FROM party WHERE name = $4))`,
    [RETAILER.name, RETAILER.email, hash, RETAILER.customer],
  );
  await db.query(
    `INSERT INTO currency_rate (currency, on_date, rate, person_id) VALUES ('EUR', house_today() - 400, 1.08, $1), ('GBP', house_today() - 400, 1.27, $1)`,
    [people.get('R. Ostrey')?.id],
  );
  const drawers = await addDrawers(db);
  await db.query(`INSERT INTO place (kind, name, person_id) VALUES ('person', 'I. Tarn', $1)`, [
    people.get('I. Tarn')?.id,
  ]);
  return {
    as: (name) => ({ db, person: people.get(name) as Asker }),
    customers,
    suppliers,
    consignors,
    drawers,
  };
}

async function addDrawers(db: DataSource): Promise<string[]> {
  const drawers: string[] = [];
  for (const [safe, count] of [
    ['A', 10],
    ['B', 12],
    ['C', 6],
  ] as const) {
    for (let name = 1; name <= count; name += 1) {
      const [row] = await db.query<{ id: string }[]>(
        `INSERT INTO place (kind, name, safe) VALUES ('drawer', $1, $2) RETURNING id`,
        [String(name), safe],
      );
      drawers.push(row?.id ?? '');
    }
  }
  return drawers;
}

async function addParties(
  db: DataSource,
  names: readonly (readonly [string, string])[],
  part: string,
): Promise<string[]> {
  const numbers: string[] = [];
  for (const [index, [name, town]] of names.entries()) {
    const limit = part === 'is_customer' ? (60_000 + (index % 7) * 45_000) * 100 : null;
    const [row] = await db.query<{ number: string }[]>(
      `INSERT INTO party (number, name, town, currency, ${part}, credit_limit) VALUES (take_customer_number(), $1, $2, $3, true, $4) RETURNING number`,
      [name, town, name === 'Lindgate Rings' ? 'EUR' : 'USD', limit],
    );
    numbers.push(row?.number ?? '');
  }
  return numbers;
}
