import pg from 'pg';

import { freshDatabase, type TestDatabase } from '../support/database.js';

type Json = Record<string, unknown>;

/** What the writer answers. */
export interface Written {
  movementId: number;
  memoId: number;
  lots: Record<string, { id: number; number: string }>;
  differences: Record<string, number>;
}

const CARRIED = { how: 'carried' };
const NOTHING = { how: 'none' };
const all = (pool: number) => ({ how: 'allotted', pool, weight: 1 });

/** A house with one parcel, one stone and one consigned stone; parcel and stone are out on a memo in part. */
export class SmallHouse {
  #acts = 0;
  parcel = 0;
  stone = 0;
  theirs = 0;
  drawer = 0;
  memo = 0;
  parcelLine = 0;

  private constructor(
    readonly database: TestDatabase,
    readonly owner: pg.Client,
    readonly api: pg.Client,
    readonly worker: pg.Client,
  ) {}

  static async open(): Promise<SmallHouse> {
    const database = await freshDatabase();
    const clients = (['owner', 'api', 'worker'] as const).map(
      (role) => new pg.Client({ connectionString: database.urls[role] }),
    ) as [pg.Client, pg.Client, pg.Client];
    await Promise.all(clients.map((client) => client.connect()));
    const house = new SmallHouse(database, ...clients);
    await house.#fill();
    return house;
  }

  async close(): Promise<void> {
    await Promise.all([this.owner.end(), this.api.end(), this.worker.end()]);
    await this.database.drop();
  }

  /** One act through the writer, as the role `api`. */
  async write(act: Json, person = 1): Promise<Written> {
    this.#acts += 1;
    const key = `small-house-${String(this.#acts).padStart(9, '0')}`;
    const { rows } = await this.api.query<{ written: Written }>(
      'SELECT write_movement($1, $2, $3, $4) AS written',
      [person, key, 'hash', JSON.stringify(act)],
    );
    return rows[0]?.written as Written;
  }

  /** The rule that refuses an act, by name; empty where it is written. */
  async refusal(act: Json, person = 1): Promise<string> {
    return this.write(act, person).then(
      () => '',
      (error: pg.DatabaseError) => error.constraint ?? `${error.code}: ${error.message}`,
    );
  }

  /** What stops a statement of the owner's: the rule's name, else the SQLSTATE. */
  async attack(sql: string): Promise<string> {
    try {
      await this.owner.query(`BEGIN; ${sql}; COMMIT`);
      return '';
    } catch (error) {
      await this.owner.query('ROLLBACK');
      const { constraint, code } = error as pg.DatabaseError;
      return constraint ?? code ?? 'unknown';
    }
  }

  /** Carats of a lot from one place to another with their cost. */
  move(lot: number, from: Json, to: Json, quantity: { weight: number; pieces: number }): Json {
    const { weight, pieces } = quantity;
    return {
      legs: [
        { lot: { id: lot }, place: from, weight: -weight, pieces: -pieces, cost: CARRIED },
        { lot: { id: lot }, place: to, weight, pieces, cost: all(0) },
      ],
      pools: [{ of: [0] }],
    };
  }

  async #fill(): Promise<void> {
    await this.owner.query(`
      INSERT INTO person (email, name, roles) VALUES ('o@house.test', 'Olga', '{owner}'), ('d@house.test', 'Dov', '{dealer}'), ('b@house.test', 'Bea', '{bookkeeper}');
      INSERT INTO house (name, zone, base_currency, price_currency, books_currency) VALUES ('House', 'UTC', 'USD', 'USD', 'USD');
      INSERT INTO party (number, name, is_customer, is_consignor, currency, credit_limit) VALUES (take_customer_number(), 'Customer', true, true, 'USD', 100000000);
      INSERT INTO place (kind, name, safe) VALUES ('drawer', '1', 'A'), ('drawer', '2', 'A')`);
    const { rows } = await this.owner.query<{ id: string }>(
      `SELECT id FROM place WHERE kind = 'drawer' ORDER BY id`,
    );
    this.drawer = Number(rows[0]?.id);
    const drawer = { id: this.drawer };
    const supplier = { kind: 'supplier' };
    const given = (amount: number) => ({ how: 'given', amount });
    const bought = await this.write({
      kind: 'opening',
      businessDate: '2026-01-05',
      newLots: [
        { ref: 'p', kind: 'parcel', origin: 'natural', is_estimated: true },
        { ref: 's', kind: 'stone', fixed_pieces: 1, origin: 'natural' },
      ],
      legs: [
        {
          lot: { new: 'p' },
          place: supplier,
          weight: -48_620,
          pieces: -3214,
          cost: given(-1_871_870),
        },
        { lot: { new: 'p' }, place: drawer, weight: 48_620, pieces: 3214, cost: all(0) },
        { lot: { new: 's' }, place: supplier, weight: -1020, pieces: -1, cost: given(-500_000) },
        { lot: { new: 's' }, place: drawer, weight: 1020, pieces: 1, cost: all(1) },
      ],
      pools: [{ of: [0] }, { of: [2] }],
      weighings: [{ lot: { new: 'p' }, purpose: 'taken in', weight: 48_620 }],
    });
    this.parcel = bought.lots.p?.id ?? 0;
    this.stone = bought.lots.s?.id ?? 0;
    const consigned = await this.write({
      kind: 'consignment in',
      businessDate: '2026-01-05',
      newPlaces: [{ ref: 'in', kind: 'memo in', name: 'In', partyId: '1' }],
      newLots: [{ ref: 'q', kind: 'stone', fixed_pieces: 1, origin: 'natural', owner_party_id: 1 }],
      legs: [
        { lot: { new: 'q' }, place: { new: 'in' }, weight: -1200, pieces: -1, cost: NOTHING },
        { lot: { new: 'q' }, place: drawer, weight: 1200, pieces: 1, cost: NOTHING },
      ],
    });
    this.theirs = consigned.lots.q?.id ?? 0;
    await this.#send();
  }

  async #send(): Promise<void> {
    const sent = await this.write({
      kind: 'memo out',
      businessDate: '2026-02-02',
      newMemo: {
        partyId: 1,
        due: '2026-02-16',
        currency: 'USD',
        lines: [
          { lotId: this.parcel, price: 42_000, pricedWeight: 9060 },
          { lotId: this.stone, price: 528_000, pricedWeight: 1020 },
        ],
      },
      document: { kind: 'memo', snapshot: { says: 'memo' } },
      legs: [
        {
          lot: { id: this.parcel },
          place: { id: this.drawer },
          weight: -9060,
          pieces: -598,
          cost: CARRIED,
        },
        {
          lot: { id: this.parcel },
          place: { memoOf: 'new' },
          weight: 9060,
          pieces: 598,
          cost: all(0),
          line: { newLine: 0 },
          flow: 'sent',
        },
        {
          lot: { id: this.stone },
          place: { id: this.drawer },
          weight: -1020,
          pieces: -1,
          cost: CARRIED,
        },
        {
          lot: { id: this.stone },
          place: { memoOf: 'new' },
          weight: 1020,
          pieces: 1,
          cost: all(1),
          line: { newLine: 1 },
          flow: 'sent',
        },
      ],
      pools: [{ of: [0] }, { of: [2] }],
    });
    this.memo = sent.memoId;
    const { rows } = await this.owner.query<{ id: string }>(
      'SELECT id FROM memo_line WHERE memo_id = $1 ORDER BY position',
      [this.memo],
    );
    this.parcelLine = Number(rows[0]?.id);
  }

  /** A parcel back 0.08 ct short: a difference in missing; returns its id. */
  async shortReturn(): Promise<number> {
    const line = { line: { id: this.parcelLine } };
    const lot = { id: this.parcel };
    const memo = { memoOf: this.memo };
    const written = await this.write(
      {
        kind: 'memo return',
        businessDate: '2026-02-16',
        memoId: this.memo,
        newDifferences: [
          {
            ref: 'd',
            lot,
            lineId: this.parcelLine,
            kind: 'short',
            expectedWeight: 9060,
            foundWeight: 8980,
            expectedPieces: 598,
            foundPieces: 593,
          },
        ],
        legs: [
          { lot, place: memo, weight: -8980, pieces: -593, cost: CARRIED, ...line, flow: 'out' },
          {
            lot,
            place: { kind: 'return desk' },
            weight: 8980,
            pieces: 593,
            cost: all(0),
            ...line,
            flow: 'returned',
          },
          { lot, place: memo, weight: -80, pieces: -5, cost: CARRIED, ...line, flow: 'out' },
          {
            lot,
            place: { kind: 'missing' },
            weight: 80,
            pieces: 5,
            cost: all(1),
            ...line,
            flow: 'missing',
            difference: { new: 'd' },
          },
        ],
        pools: [{ of: [0] }, { of: [2] }],
      },
      3,
    );
    return written.differences.d ?? 0;
  }
}
