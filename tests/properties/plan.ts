import type {
  Book,
  CostRule,
  Difference,
  Leg,
  Line,
  Lot,
  Mark,
  Memo,
  More,
  Movement,
} from './book.js';

export const CARRIED: CostRule = { how: 'carried' };
export const NONE: CostRule = { how: 'none' };

/** One act being written: its legs are on the book's balances at once, the database gets them whole. */
export class Plan implements Movement {
  readonly legs: Leg[] = [];
  readonly pools: { of: number[] }[] = [];
  readonly answers: Movement['answers'] = [];
  readonly newLots: { lot: Lot; letterOf?: Lot }[] = [];
  readonly newDifferences: Difference[] = [];
  readonly keeps: { line: Line; weight: number; pieces: number }[] = [];
  newMemo: Memo | undefined;
  isUndone = false;

  constructor(
    readonly book: Book,
    readonly kind: string,
    readonly more: More = {},
  ) {}

  /** Carats leave an inside place with their share of cost. */
  take(lot: Lot, place: string, { weight, pieces }: { weight: number; pieces: number }, mark = {}) {
    const has = this.book.at(lot, place);
    const cost = this.book.rules.share(has.cost, weight, has.weight);
    return this.leg(
      { lot, place, weight: -weight, pieces: -pieces, cost: -cost || 0, ...mark },
      CARRIED,
    );
  }

  /** Any other leg: its cost as the rules reckon it, and how the database is asked to reckon it. */
  leg(leg: Omit<Leg, 'rule'>, rule: CostRule): number {
    this.book.post(leg);
    return this.legs.push({ ...leg, rule }) - 1;
  }

  costOf(index: number): number {
    return this.legs[index]?.cost ?? 0;
  }

  /** A pool fed by legs; the leg asking for it takes all, or its weight's share. */
  pool(...of: number[]): number {
    return this.pools.push({ of }) - 1;
  }

  all(index: number): CostRule {
    return { how: 'allotted', pool: this.pool(index), weight: 1 };
  }

  /** From one place to another with the cost that goes with it. */
  move(moved: {
    lot: Lot;
    from: string;
    to: string;
    goods: { weight: number; pieces: number };
    fromMark?: Mark;
    toMark?: Mark;
  }): void {
    const { lot, from, to, goods, fromMark, toMark } = moved;
    const left = this.take(lot, from, goods, fromMark);
    const cost = -this.costOf(left) || 0;
    this.leg({ lot, place: to, ...goods, cost, ...toMark }, this.all(left));
  }

  /** A cost named at a boundary place, its counterpart on the lot. */
  named(lot: Lot, boundary: string, amount: number, at: { place: string } & Mark): void {
    const still = { lot, weight: 0, pieces: 0 };
    const source = this.leg({ ...still, place: boundary, cost: amount }, { how: 'given', amount });
    this.leg({ ...still, cost: -amount || 0, ...at }, this.all(source));
  }

  /** Weight or pieces found more (or less) than booked: no cost goes with them. */
  restate(lot: Lot, at: string, found: { weight: number; pieces: number }): void {
    const { weight, pieces } = found;
    const has = this.book.at(lot, at);
    const share = this.book.rules.share(has.cost, Math.abs(weight), Math.max(1, has.weight));
    const cost = Math.sign(weight) * this.book.rules.restated(share) || 0;
    this.leg({ lot, place: 'loss', weight: -weight, pieces: -pieces, cost: -cost || 0 }, NONE);
    this.leg({ lot, place: at, weight, pieces, cost }, NONE);
  }

  makeLot(kind: Lot['kind'], more: Parameters<Book['addLot']>[1] = {}, letterOf?: Lot): Lot {
    const lot = this.book.addLot(kind, more);
    this.newLots.push({ lot, ...(letterOf && { letterOf }) });
    return lot;
  }

  /** A difference that this act opens; what it holds comes with the leg into missing. */
  openDifference(lot: Lot, line: Line | null): Difference {
    const key = `D${this.book.differences.length}`;
    const difference = { key, lot, line, weight: 0, pieces: 0, isAnswered: false };
    this.book.differences.push(difference);
    this.newDifferences.push(difference);
    return difference;
  }
}

/** The line of a lot where its goods lie on a memo, for a leg that names that place. */
export function markAt(book: Book, lot: Lot, place: string): Mark {
  const memo = book.memos.find(({ key }) => place === `memo:${key}`);
  const line: Line | undefined = memo?.lines.find((one) => one.lot === lot);
  return line ? { line, flow: 'out' } : {};
}
