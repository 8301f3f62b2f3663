import {
  assertBalanced,
  type Legs,
  type LotRef,
  type MovementKind,
  type PlaceRef,
  type Posting,
  reckon,
} from '@foldwell/ledger';
import pg from 'pg';

import { freshDatabase, type TestDatabase } from '../support/database.js';

/** An act as the database's writer takes it, legs made by the ledger's builders. */
export interface Act extends Legs {
  kind: MovementKind;
  [more: string]: unknown;
}

export interface Written {
  movementId: number;
  memoId: number;
  lots: Record<string, { id: number; number: string }>;
  differences: Record<string, number>;
}

/** Postings added up at each lot and place, in an order of its own: `lot 1 at 7: -8000/-120/-308000`. */
type Sums = string[];

/** A house with its places, whose every act is previewed, written, and told side by side. */
export class WritingHouse {
  readonly #database: TestDatabase;
  readonly #owner: pg.Client;
  readonly #api: pg.Client;
  #acts = 0;

  private constructor(database: TestDatabase, owner: pg.Client, api: pg.Client) {
    this.#database = database;
    this.#owner = owner;
    this.#api = api;
  }

  static async open(): Promise<WritingHouse> {
    const database = await freshDatabase();
    const owner = new pg.Client({ connectionString: database.urls.owner });
    const api = new pg.Client({ connectionString: database.urls.api });
    await Promise.all([owner.connect(), api.connect()]);
    await owner.query(`
      INSERT INTO person (email, name, roles) VALUES ('a@example.test', 'Ada', '{owner}'), ('b@example.test', 'Ben', '{owner}');
      INSERT INTO house (name, zone, base_currency, price_currency, books_currency, step)
        VALUES ('House', 'UTC', 'USD', 'USD', 'USD', 1);
      INSERT INTO party (number, name, is_customer, is_supplier, currency, credit_limit)
        VALUES (take_customer_number(), 'Party', true, true, 'USD', 100000000000);
      INSERT INTO place (kind, name, safe) VALUES ('drawer', '1', 'A'), ('show', 'window', 'A');
      INSERT INTO place (kind, name, party_id) SELECT k, k, id FROM party, unnest(ARRAY['laboratory', 'workshop', 'memo in']) k`);
    return new WritingHouse(database, owner, api);
  }

  async close(): Promise<void> {
    await Promise.all([this.#owner.end(), this.#api.end()]);
    await this.#database.drop();
  }

  /** The id of the one row that a query finds. */
  async id(sql: string, ...values: unknown[]): Promise<number> {
    const { rows } = await this.#owner.query<{ id: string }>(sql, values);
    return Number(rows[0]?.id);
  }

  get urls() {
    return this.#database.urls;
  }

  /** What a lot holds inside, over all places. */
  async inside(lot: { id: number }): Promise<{ weight: number; pieces: number; cost: number }> {
    const { rows } = await this.#owner.query<{ weight: string; pieces: string; cost: string }>(
      `SELECT sum(weight) AS weight, sum(pieces) AS pieces, sum(cost) AS cost
       FROM balance WHERE inside AND lot_id = $1`,
      [lot.id],
    );
    const { weight, pieces, cost } = rows[0] ?? { weight: 0, pieces: 0, cost: 0 };
    return { weight: Number(weight), pieces: Number(pieces), cost: Number(cost) };
  }

  /** A drawer, the laboratory and so on, by id. */
  async place(kind: string): Promise<{ id: number }> {
    return { id: await this.id('SELECT id FROM place WHERE kind = $1', kind) };
  }

  /** Previews an act on the balances as they are, writes it as `api`, and gives both. */
  async act(act: Act, person = 1): Promise<Written & { previewed: Sums; posted: Sums }> {
    const before = await this.#found(act);
    this.#acts += 1;
    const key = `act-${String(this.#acts).padStart(20, '0')}`;
    const { rows } = await this.#api.query<{ written: Written }>(
      'SELECT write_movement($1, $2, $3, $4) AS written',
      [person, key, 'hash', JSON.stringify(act)],
    );
    const written = rows[0]?.written as Written;
    const after = await this.#found(act, written);
    const previewed = reckon(act, (lot, place) =>
      before.held(after.lotId(lot), after.placeId(place)),
    );
    assertBalanced(previewed);
    return { ...written, previewed: sums(previewed, after), posted: await this.#posted(written) };
  }

  async #posted({ movementId }: Written): Promise<Sums> {
    const { rows } = await this.#owner.query<{ row: string }>(
      `SELECT format('lot %s at %s: %s/%s/%s', lot_id, place_id, sum(weight), sum(pieces), sum(cost)) AS row
       FROM posting WHERE movement_id = $1 GROUP BY lot_id, place_id
       HAVING sum(weight) <> 0 OR sum(pieces) <> 0 OR sum(cost) <> 0`,
      [movementId],
    );
    return rows.map(({ row }) => row).sort();
  }

  /** Places, and balances of the lots of an act, as they are now; and how refs are found among them. */
  async #found({ legs }: Act, written?: Written): Promise<Found> {
    const places = await this.#owner.query<PlaceRow>('SELECT id, kind, memo_id, inside FROM place');
    const lots = legs.flatMap(({ lot }) => ('id' in lot ? [lot.id] : []));
    const balances = await this.#owner.query<BalanceRow>(
      'SELECT lot_id, place_id, weight, pieces, cost FROM balance WHERE lot_id = ANY ($1)',
      [lots],
    );
    return new Found(places.rows, balances.rows, written);
  }
}

interface PlaceRow {
  id: string;
  kind: string;
  memo_id: string | null;
  inside: boolean;
}
interface BalanceRow {
  lot_id: string;
  place_id: string;
  weight: string;
  pieces: string;
  cost: string;
}

class Found {
  constructor(
    readonly places: PlaceRow[],
    readonly balances: BalanceRow[],
    readonly written: Written | undefined,
  ) {}

  lotId(lot: LotRef): number {
    return 'id' in lot ? lot.id : (this.written?.lots[lot.new]?.id ?? 0);
  }

  placeId(place: PlaceRef): number {
    if ('id' in place) return place.id;
    const memo = 'memoOf' in place ? place.memoOf : 'keptOf' in place ? place.keptOf : null;
    const kind = 'kind' in place ? place.kind : 'memoOf' in place ? 'memo' : 'kept';
    const memoId = memo === 'new' ? (this.written?.memoId ?? null) : memo;
    const row = this.places.find(
      (one) => one.kind === kind && (memoId === null || Number(one.memo_id) === memoId),
    );
    return Number(row?.id);
  }

  /** What a lot has at a place; null at the boundary. A place this act made has nothing yet. */
  held(lotId: number, placeId: number) {
    if (this.places.some(({ id, inside }) => Number(id) === placeId && !inside)) return null;
    const row = this.balances.find(
      (one) => Number(one.lot_id) === lotId && Number(one.place_id) === placeId,
    );
    const [weight, pieces, cost] = [row?.weight, row?.pieces, row?.cost].map((one) =>
      Number(one ?? 0),
    );
    return { weight: weight ?? 0, pieces: pieces ?? 0, cost: cost ?? 0 };
  }
}

function sums(postings: Posting[], found: Found): Sums {
  const rows = new Map<string, [number, number, number]>();
  for (const { lot, place, weight, pieces, cost } of postings) {
    const key = `lot ${found.lotId(lot)} at ${found.placeId(place)}`;
    const [w, p, c] = rows.get(key) ?? [0, 0, 0];
    rows.set(key, [w + weight, p + pieces, c + cost]);
  }
  return [...rows]
    .filter(([, sum]) => sum.some((one) => one !== 0))
    .map(([key, sum]) => `${key}: ${sum.join('/')}`)
    .sort();
}
