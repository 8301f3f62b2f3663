import pg from 'pg';

import { freshDatabase, type TestDatabase } from '../support/database.js';
import { asAct, type Ids, lineKey } from './as-act.js';
import { type Book, FLOWS } from './book.js';
import type { Plan } from './plan.js';

interface Written {
  movementId: number;
  memoId: number | null;
  lots: Record<string, { id: number }>;
  differences: Record<string, number>;
}

type Role = 'owner' | 'api' | 'worker' | 'reader';

/** The same house in the database, written through the one writer as the role `api`. */
export class LedgerHouse {
  #acts = 0;
  readonly ids: Ids = {
    lots: new Map(),
    memos: new Map(),
    lines: new Map(),
    differences: new Map(),
    movements: [],
    places: new Map(),
  };

  private constructor(
    readonly database: TestDatabase,
    readonly clients: Record<Role, pg.Client>,
  ) {}

  static async open(): Promise<LedgerHouse> {
    const database = await freshDatabase();
    const client = (role: Role) => new pg.Client({ connectionString: database.urls[role] });
    const [owner, api, worker, reader] = [
      client('owner'),
      client('api'),
      client('worker'),
      client('reader'),
    ];
    await Promise.all([owner, api, worker, reader].map((one) => one.connect()));
    const house = new LedgerHouse(database, { owner, api, worker, reader });
    await house.#fill();
    return house;
  }

  async close(): Promise<void> {
    await Promise.all(Object.values(this.clients).map((one) => one.end()));
    await this.database.drop();
  }

  async #fill(): Promise<void> {
    await this.clients.owner.query(`
      INSERT INTO person (email, name, roles) VALUES ('a@house.test', 'Ada', '{owner}'), ('b@house.test', 'Ben', '{owner}');
      INSERT INTO house (name, zone, base_currency, price_currency, books_currency) VALUES ('House', 'UTC', 'USD', 'USD', 'USD');
      INSERT INTO party (number, name, is_customer, is_supplier, is_consignor, currency)
        VALUES (take_customer_number(), 'Party', true, true, true, 'USD');
      INSERT INTO place (kind, name, safe) VALUES ('drawer', 'drawer1', 'A'), ('drawer', 'drawer2', 'A'), ('show', 'show', 'A');
      INSERT INTO place (kind, name, person_id) VALUES ('person', 'person', 1);
      INSERT INTO place (kind, name, party_id) SELECT k, k, 1 FROM unnest(ARRAY['laboratory', 'workshop', 'memo in']) k`);
    const { rows } = await this.clients.owner.query<{ id: string; name: string; kind: string }>(
      'SELECT id, name, kind FROM place',
    );
    for (const { id, name, kind } of rows) {
      this.ids.places.set(['drawer', 'show', 'person'].includes(kind) ? name : kind, Number(id));
    }
  }

  /** Writes a plan; the name of the rule where it is refused, empty where it stands. */
  async write(plan: Plan): Promise<string> {
    this.#acts += 1;
    const key = `history-${String(this.#acts).padStart(12, '0')}`;
    const person = plan.answers.length > 0 ? 2 : 1;
    try {
      const { rows } = await this.clients.api.query<{ written: Written }>(
        'SELECT write_movement($1, $2, $3, $4) AS written',
        [person, key, 'hash', JSON.stringify(asAct(plan, this.ids))],
      );
      await this.#remember(plan, rows[0]?.written as Written);
      return '';
    } catch (error) {
      const { constraint, code, message } = error as pg.DatabaseError;
      if (!constraint) throw new Error(`${code ?? 'no code'}: ${message}`, { cause: error });
      return constraint;
    }
  }

  async #remember(plan: Plan, written: Written): Promise<void> {
    this.ids.movements.push(written.movementId);
    for (const [key, { id }] of Object.entries(written.lots)) this.ids.lots.set(key, id);
    for (const [key, id] of Object.entries(written.differences)) this.ids.differences.set(key, id);
    if (!plan.newMemo || !written.memoId) return;
    this.ids.memos.set(plan.newMemo.key, written.memoId);
    const { rows } = await this.clients.api.query<{ id: string }>(
      'SELECT id FROM memo_line WHERE memo_id = $1 ORDER BY position',
      [written.memoId],
    );
    for (const [at, line] of plan.newMemo.lines.entries()) {
      this.ids.lines.set(lineKey(line), Number(rows[at]?.id));
    }
  }

  /** All that lies anywhere, one row a lot and place; lines and differences with what they hold. */
  async state(): Promise<string[]> {
    const { rows } = await this.clients.owner.query<{ row: string }>(`
      SELECT format('lot %s at %s %s: %s/%s/%s', lot_id, place_id, place_kind, weight, pieces, cost) AS row
        FROM balance WHERE weight <> 0 OR pieces <> 0 OR cost <> 0
      UNION ALL SELECT format('line %s: ', id) || concat_ws(' ', ${FLOWS.flatMap((flow) => [`${flow}_weight`, `${flow}_pieces`]).join(', ')}) FROM memo_line
      UNION ALL SELECT format('difference %s: %s/%s %s', id, held_weight, held_pieces, answer IS NOT NULL) FROM difference`);
    return rows.map(({ row }) => row).sort();
  }

  /** What a book and the database don't agree on, each side's rows. */
  async disagreements(book: Book): Promise<{ onlyModel: string[]; onlyDatabase: string[] }> {
    const [model, database] = [await this.stateOf(book), await this.state()];
    const [modelled, written] = [new Set(model), new Set(database)];
    return {
      onlyModel: model.filter((row) => !written.has(row)),
      onlyDatabase: database.filter((row) => !modelled.has(row)),
    };
  }

  /** The same rows as a book has them, under the database's ids. */
  async stateOf(book: Book): Promise<string[]> {
    const { rows: memoPlaces } = await this.clients.owner.query<{
      id: string;
      kind: string;
      memo: string;
    }>('SELECT id, kind, memo_id AS memo FROM place WHERE memo_id IS NOT NULL');
    const placeIds = new Map([...this.ids.places].map(([key, id]) => [key, String(id)]));
    const keys = new Map([...this.ids.memos].map(([key, id]) => [String(id), key]));
    for (const { id, kind, memo } of memoPlaces) placeIds.set(`${kind}:${keys.get(memo)}`, id);
    const lots = book.lots.flatMap((lot) =>
      [...lot.places].flatMap(([place, { weight, pieces, cost }]) => {
        const kind = place.replace(/:.*|[12]$/, '');
        const where = `lot ${this.ids.lots.get(lot.key)} at ${placeIds.get(place)} ${kind}`;
        return weight || pieces || cost ? [`${where}: ${weight}/${pieces}/${cost}`] : [];
      }),
    );
    const lines = book.memos.flatMap((memo) =>
      memo.lines.map((line) => {
        const flows = FLOWS.map((flow) => `${line.flows[flow].weight} ${line.flows[flow].pieces}`);
        return `line ${this.ids.lines.get(lineKey(line))}: ${flows.join(' ')}`;
      }),
    );
    const differences = book.differences.map(({ key, weight, pieces, isAnswered }) => {
      const id = this.ids.differences.get(key);
      return `difference ${id}: ${weight}/${pieces} ${isAnswered ? 't' : 'f'}`;
    });
    return [...lots, ...lines, ...differences].sort();
  }
}
