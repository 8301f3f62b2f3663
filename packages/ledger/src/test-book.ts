import { assertBalanced } from './balanced.js';
import type { Legs, LotRef, PlaceRef, Posting, Quantity } from './leg.js';
import { reckon } from './reckon.js';

/** Weight, pieces and cost: thousandths of a carat, stones, minor units. */
export type Held = Quantity & { cost: number };

const BOUNDARY = ['supplier', 'memo in', 'sold', 'loss', 'charges', 'conversion'];
const NOTHING: Held = { weight: 0, pieces: 0, cost: 0 };

/** A place's name in a test: `safe`, `sold`, `memo`, `kept`. */
export function placeName(place: PlaceRef): string {
  if ('kind' in place) return place.kind === 'return desk' ? 'desk' : place.kind;
  if ('memoOf' in place) return place.memoOf === 'new' ? 'new memo' : 'memo';
  if ('keptOf' in place) return 'kept';
  return 'new' in place ? place.new : `place ${place.id}`;
}

export const lotName = (lot: LotRef) => ('new' in lot ? lot.new : `lot ${lot.id}`);

/**
 * For tests only: balances in memory that take movements by `reckon` and refuse what the database
 * would: what doesn't sum to zero, what leaves less than nothing or something without weight.
 */
export class TestBook {
  readonly #held = new Map<string, Held>();

  has(lot: LotRef, place: PlaceRef): Held {
    return this.#held.get(this.#key(lot, place)) ?? NOTHING;
  }

  /** Puts goods somewhere without a movement, as a test's beginning. */
  put(lot: LotRef, place: PlaceRef, held: Held): this {
    this.#held.set(this.#key(lot, place), held);
    return this;
  }

  post(legs: Legs): Posting[] {
    const postings = reckon(legs, (lot, place) =>
      BOUNDARY.includes(placeName(place)) ? null : this.has(lot, place),
    );
    assertBalanced(postings);
    for (const posting of postings) this.#add(posting);
    for (const { lot, place } of postings) this.#judge(lot, place);
    return postings;
  }

  /** Sums over all places inside, lot by lot name. */
  inside(): Record<string, Held> {
    const sums: Record<string, Held> = {};
    for (const [key, held] of this.#held) {
      const [lot = '', place = ''] = key.split('|');
      if (BOUNDARY.includes(place)) continue;
      sums[lot] = add(sums[lot] ?? NOTHING, held);
    }
    return sums;
  }

  #key(lot: LotRef, place: PlaceRef): string {
    return `${lotName(lot)}|${placeName(place)}`;
  }

  #add({ lot, place, ...moved }: Posting): void {
    this.put(lot, place, add(this.has(lot, place), moved));
  }

  #judge(lot: LotRef, place: PlaceRef): void {
    const { weight, pieces, cost } = this.has(lot, place);
    const name = placeName(place);
    if (BOUNDARY.includes(name)) return;
    const isLess = weight < 0 || pieces < 0 || cost < 0;
    const isLeftOver = weight === 0 && (cost !== 0 || (pieces !== 0 && name !== 'missing'));
    if (isLess || isLeftOver) {
      throw new Error(`${lotName(lot)} at ${name} is ${weight}/${pieces}/${cost}`);
    }
  }
}

function add(one: Held, other: Held): Held {
  return {
    weight: one.weight + other.weight,
    pieces: one.pieces + other.pieces,
    cost: one.cost + other.cost,
  };
}
