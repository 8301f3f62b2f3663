/** A lot that stands, by id, or one this act makes, by its ref. */
export type LotRef = { id: number } | { new: string };

/** Places of which the house has one. */
export type SinglePlace =
  | 'return desk'
  | 'quarantine'
  | 'missing'
  | 'supplier'
  | 'sold'
  | 'loss'
  | 'charges'
  | 'conversion';

/** A place by id, one this act makes, one of its kind, or the memo or kept place of a memo. */
export type PlaceRef =
  | { id: number }
  | { new: string }
  | { kind: SinglePlace }
  | { memoOf: number | 'new' }
  | { keptOf: number };

export type LineRef = { id: number } | { newLine: number };
export type DifferenceRef = { id: number } | { new: string };

/** What became of a memo line's carats: a leg on the memo's own place is `sent` or `out`. */
export type Flow =
  | 'sent'
  | 'out'
  | 'returned'
  | 'kept'
  | 'converted'
  | 'missing'
  | 'written_off'
  | 'restated';

/**
 * How cost goes with a leg. `carried` leaves by share of weight, the last weight taking all; `given`
 * is a signed sum in minor units on a boundary place; `allotted` legs share what their pool's
 * sources gave, by largest remainder over integer weights, ties to the first leg.
 */
export type CostRule =
  | { how: 'none' }
  | { how: 'carried' }
  | { how: 'given'; amount: number }
  | { how: 'allotted'; pool: number; weight: number };

/** The memo line and the difference a leg hangs on. */
export interface Mark {
  line?: LineRef;
  flow?: Flow;
  difference?: DifferenceRef;
}

/** One side of a movement. Weight in thousandths of a carat and pieces are signed. */
export interface Leg extends Mark {
  lot: LotRef;
  place: PlaceRef;
  weight: number;
  pieces: number;
  cost: CostRule;
}

/** Legs and their pools, as the database's writer takes them; `of` are indices of source legs. */
export interface Legs {
  legs: Leg[];
  pools: { of: number[] }[];
}

/** A weight (thousandths of a carat) and the pieces that go with it. */
export interface Quantity {
  weight: number;
  pieces: number;
}

/** A leg with the cost it will have, in minor units. */
export interface Posting extends Quantity {
  lot: LotRef;
  place: PlaceRef;
  cost: number;
}
