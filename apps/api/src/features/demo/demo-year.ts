import type { BookMemoRequest, MemoLineRequest } from '@foldwell/contracts';
import { addDays } from '@foldwell/quantities';

import { databaseError } from '../../http/problem.js';
import { RuleBroken } from '../../http/errors.js';
import type { Key } from '../ledger/post-act.js';
import { moveLines } from '../lots/move-lots.js';
import { takeInLots } from '../lots/take-in.js';
import { keepAct } from '../memos/keep-lines.js';
import { bookOut } from '../memos/book-memo.js';
import { answerDifference } from '../returns/answer.js';
import { weighBackLine } from '../returns/weigh-back.js';
import type { DemoHouse } from './demo-house.js';
import type { Dice } from './dice.js';
import { groupByHome } from './group-by-home.js';
import { makeLot } from './make-lots.js';

/** Bookings in the order of their days, each by the person who would do it, through the acts that people use. */
export class DemoYear {
  #serial = 0;
  #acts = 0;
  readonly #due: { day: string; number: string }[] = [];

  constructor(
    readonly house: DemoHouse,
    readonly dice: Dice,
    readonly today: string,
  ) {}

  #next(): number {
    this.#serial += 1;
    return this.#serial;
  }

  #key(personId: string): Key {
    this.#acts += 1;
    return { personId, key: `demo-act-${String(this.#acts).padStart(9, '0')}`, hash: 'demo' };
  }

  /** So many lots on one day, from nowhere (opening), a supplier or a consignor. */
  async takeIn(
    day: string,
    how: 'opening' | 'purchase' | 'consignment in',
    count: number,
  ): Promise<void> {
    const ctx = this.house.as('S. Vareld');
    const party =
      how === 'purchase'
        ? this.dice.pick(this.house.suppliers)
        : how === 'opening'
          ? undefined
          : this.dice.pick(this.house.consignors);
    const lots = Array.from({ length: count }, () =>
      makeLot(
        this.dice,
        this.dice.pick(this.house.drawers),
        this.#next(),
        how !== 'consignment in',
      ),
    );
    await takeInLots(ctx, this.#key(ctx.person.id), {
      how,
      lots,
      businessDate: day,
      paper: how === 'opening' ? '' : `${how === 'purchase' ? 'INV' : 'CN'} ${2000 + this.#serial}`,
      ...(party && { party }),
    });
  }

  /** A memo of a few free lots; where the limit says no, the owner lets it pass now and then. */
  async send(day: string): Promise<void> {
    const lines = await this.#freeLines(this.dice.between(2, 8));
    if (lines.length === 0) return;
    const due = addDays(day, this.dice.pick([7, 14, 14, 14, 21]));
    const request: BookMemoRequest = {
      party: this.dice.pick(this.house.customers),
      due,
      businessDate: day,
      carriedBy: 'Hand, signed for',
      handedTo: 'the counter',
      lines,
    };
    const dealer = this.house.as('I. Tarn');
    try {
      const { number } = await bookOut(dealer, this.#key(dealer.person.id), request);
      this.#due.push({ day: addDays(due, this.dice.between(-4, 5)), number });
    } catch (error) {
      if (databaseError(error).constraint !== 'party_credit_limit') throw error;
      if (!this.dice.percent(15)) return;
      const owner = this.house.as('R. Ostrey');
      const { number } = await bookOut(owner, this.#key(owner.person.id), {
        ...request,
        releaseReason: 'Known to us for years; pays on the day.',
      });
      this.#due.push({ day: addDays(due, this.dice.between(-4, 5)), number });
    }
  }

  async #freeLines(count: number): Promise<MemoLineRequest[]> {
    const rows = await this.house.as('I. Tarn').db.query<
      {
        number: string;
        kind: string;
        weight: string;
        pieces: string;
        ask: string | null;
        place: string;
        is_estimated: boolean;
      }[]
    >(
      `SELECT * FROM (
         SELECT DISTINCT ON (l.id) l.number, l.kind, b.weight, b.pieces, l.ask_price AS ask, b.place_id AS place, l.is_estimated
         FROM balance b JOIN place p ON p.id = b.place_id JOIN lot l ON l.id = b.lot_id
         WHERE p.kind = 'drawer' AND b.weight > 0 AND l.ask_price IS NOT NULL ORDER BY l.id, b.weight DESC) x
       ORDER BY md5(x.number || $1) LIMIT $2`,
      [String(this.#acts), count],
    );
    return rows.map((row) => {
      const [weight, pieces] = [Number(row.weight), Number(row.pieces)];
      const isPart = row.kind === 'parcel' && weight > 400 && pieces > 10;
      const part = isPart
        ? Math.max(10, Math.round((weight * this.dice.between(15, 60)) / 1000) * 10)
        : weight;
      return {
        lot: row.number,
        place: row.place,
        price: Number(row.ask),
        weight: part,
        pieces: isPart
          ? Math.max(1, Math.min(pieces - 1, Math.floor((pieces * part) / weight)))
          : pieces,
      };
    });
  }

  /** What is due to come back by a day, weighed at the desk; the last days leave some late. */
  async takeBack(day: string): Promise<void> {
    const back = this.#due.filter((memo) => memo.day <= day);
    for (const memo of back) {
      this.#due.splice(this.#due.indexOf(memo), 1);
      await this.#weighMemo(memo.number, day);
    }
  }

  async #weighMemo(number: string, day: string): Promise<void> {
    const desk = this.house.as('J. Mavvin');
    const lines = await desk.db.query<
      {
        lot: string;
        kind: string;
        out: string;
        pieces: string;
        is_estimated: boolean;
        report: string;
      }[]
    >(
      `SELECT l.number AS lot, l.kind, n.out_weight AS out, n.out_pieces AS pieces, l.is_estimated, l.report_number AS report FROM memo_line n JOIN memo m ON m.id = n.memo_id JOIN lot l ON l.id = n.lot_id
       WHERE m.number = $1 AND n.out_weight > 0 ORDER BY n.position`,
      [number],
    );
    for (const line of lines) {
      const [out, pieces] = [Number(line.out), Number(line.pieces)];
      if (this.dice.percent(14))
        await keepAct(desk, this.#key(desk.person.id), number, {
          businessDate: day,
          lines: [{ lot: line.lot, weight: out, pieces }],
        });
      else await this.#weighLine(number, day, { ...line, weight: out, count: pieces });
    }
  }

  async #weighLine(
    number: string,
    day: string,
    line: {
      lot: string;
      kind: string;
      weight: number;
      count: number;
      is_estimated: boolean;
      report: string;
    },
  ): Promise<void> {
    const desk = this.house.as('J. Mavvin');
    const isParcel = line.kind === 'parcel';
    const off = !isParcel
      ? 0
      : this.dice.percent(5) && line.weight > 500
        ? -this.dice.between(3, 9) * 10
        : this.dice.pick([0, 0, 0, -10, 10]);
    const weight = Math.max(10, line.weight + off);
    const outcome = await weighBackLine(desk, this.#key(desk.person.id), number, {
      lot: line.lot,
      weight,
      businessDate: day,
      ...(isParcel
        ? line.is_estimated
          ? {}
          : { pieces: line.count }
        : { reportRead: line.report }),
    });
    if (outcome.outcome === 'short' && day < addDays(this.today, -4))
      await this.#answer(line.lot, day, line.is_estimated);
  }

  async #answer(lot: string, day: string, isEstimated: boolean): Promise<void> {
    const owner = this.house.as('R. Ostrey');
    const [difference] = await owner.db.query<{ id: string }[]>(
      'SELECT d.id FROM difference d JOIN lot l ON l.id = d.lot_id WHERE l.number = $1 AND d.answer IS NULL ORDER BY d.id DESC LIMIT 1',
      [lot],
    );
    if (!difference) return;
    await answerDifference(owner, this.#key(owner.person.id), difference.id, {
      // Of counted goods all pieces are back; weight alone is a weighing difference.
      answer: isEstimated
        ? this.dice.pick(['accepted', 'accepted', 'customer keeps it', 'found again'])
        : 'accepted',
      reason: 'seen with the customer',
      businessDate: day,
    });
  }

  /** Everything on the desk goes to a drawer, but for what came back today. */
  async putAway(day: string): Promise<void> {
    const desk = this.house.as('J. Mavvin');
    const lines = await desk.db.query<
      { lot: string; from: string; weight: string; pieces: string; home: string | null }[]
    >(
      `SELECT l.number AS lot, b.place_id AS "from", b.weight, b.pieces, (SELECT d.place_id FROM balance d WHERE d.lot_id = l.id AND d.place_kind = 'drawer' ORDER BY d.weight DESC, d.place_id LIMIT 1) AS home
       FROM balance b JOIN place p ON p.id = b.place_id JOIN lot l ON l.id = b.lot_id
       WHERE p.kind = 'return desk' AND b.weight > 0 AND b.pieces > 0 ORDER BY l.id LIMIT 200`,
    );
    const byHome = groupByHome(lines);
    for (const [home, together] of byHome) {
      await moveLines(desk, this.#key(desk.person.id), {
        kind: 'put away',
        to: home || this.dice.pick(this.house.drawers),
        businessDate: day,
        lines: together.map(({ lot, from, weight, pieces }) => ({
          lot,
          from,
          weight: Number(weight),
          pieces: Number(pieces),
        })),
      });
    }
  }

  /** On the last day something does not agree: the desk found it light. */
  async findDifferences(count: number): Promise<void> {
    const desk = this.house.as('J. Mavvin');
    const lines = await desk.db.query<
      { number: string; lot: string; out: string; pieces: string }[]
    >(
      `SELECT m.number, l.number AS lot, n.out_weight AS out, n.out_pieces AS pieces FROM memo_line n JOIN memo m ON m.id = n.memo_id JOIN lot l ON l.id = n.lot_id
       WHERE n.out_weight > 300 AND l.kind = 'parcel' AND l.is_estimated ORDER BY m.due, n.id LIMIT $1`,
      [count],
    );
    for (const [index, line] of lines.entries()) {
      await weighBackLine(desk, this.#key(desk.person.id), line.number, {
        lot: line.lot,
        weight: Number(line.out) - ([80, 30, 50][index % 3] ?? 0),
        businessDate: this.today,
      });
    }
    if (lines.length === 0)
      throw new RuleBroken('demo', 'Nothing is out that could come back light.');
  }
}
