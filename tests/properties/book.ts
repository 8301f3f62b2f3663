import type { Rules } from './rules.js';

/** Weight in thousandths of a carat, pieces, cost in minor units. */
export interface Quantity {
  weight: number;
  pieces: number;
  cost: number;
}

export interface Lot {
  key: string;
  kind: 'stone' | 'pair' | 'parcel';
  fixedPieces: number | null;
  isEstimated: boolean;
  isConsigned: boolean;
  places: Map<string, Quantity>;
}

export const FLOWS = [
  'sent',
  'returned',
  'kept',
  'converted',
  'missing',
  'written_off',
  'restated',
] as const;
export type Flow = (typeof FLOWS)[number] | 'out';

export interface Line {
  memo: string;
  lot: Lot;
  flows: Record<Exclude<Flow, 'out'>, { weight: number; pieces: number }>;
  /** Restated as it came back, held against the tolerance; signed. */
  cameBackOff: number;
}

export interface Memo {
  key: string;
  lines: Line[];
  cameFrom: string[];
}

export interface Difference {
  key: string;
  lot: Lot;
  line: Line | null;
  weight: number;
  pieces: number;
  isAnswered: boolean;
}

export type CostRule =
  | { how: 'none' }
  | { how: 'carried' }
  | { how: 'given'; amount: number }
  | { how: 'allotted'; pool: number; weight: number };

export interface Mark {
  line?: Line;
  flow?: Flow;
  difference?: Difference;
}

export interface Leg extends Quantity, Mark {
  lot: Lot;
  place: string;
  rule: CostRule;
}

/** What an act says besides its legs; movements and sales by their place in the book. */
export interface More {
  word?: string;
  reason?: string;
  answer?: string;
  memo?: string;
  reverses?: number;
  corrects?: number;
  sale?: number;
  refusedFor?: string;
}

export interface Movement {
  kind: string;
  legs: Leg[];
  more: More;
  answers: Difference[];
  newDifferences: Difference[];
  isUndone: boolean;
}

export const BOUNDARY = ['supplier', 'memo in', 'sold', 'loss', 'charges', 'conversion'];
export const isInside = (place: string) => !BOUNDARY.includes(place);
const NOTHING: Quantity = { weight: 0, pieces: 0, cost: 0 };

/** What is left of a line with the customer. */
export function stillOut({ flows }: Line): { weight: number; pieces: number } {
  const gone = FLOWS.filter((flow) => flow !== 'sent');
  return {
    weight: gone.reduce((left, flow) => left - flows[flow].weight, flows.sent.weight),
    pieces: gone.reduce((left, flow) => left - flows[flow].pieces, flows.sent.pieces),
  };
}

/** A house in memory: what lies where, at what cost, and all that happened. */
export class Book {
  readonly lots: Lot[] = [];
  readonly memos: Memo[] = [];
  readonly differences: Difference[] = [];
  readonly movements: Movement[] = [];

  constructor(readonly rules: Rules) {}

  addLot(kind: Lot['kind'], more: Partial<Omit<Lot, 'kind' | 'places'>> = {}): Lot {
    const fixedPieces = kind === 'stone' ? 1 : kind === 'pair' ? 2 : null;
    const lot: Lot = {
      key: `L${this.lots.length}`,
      kind,
      fixedPieces,
      isEstimated: false,
      isConsigned: false,
      ...more,
      places: new Map(),
    };
    this.lots.push(lot);
    return lot;
  }

  addLine(memo: Memo, lot: Lot): Line {
    const flows = Object.fromEntries(FLOWS.map((flow) => [flow, { weight: 0, pieces: 0 }]));
    const line = { memo: memo.key, lot, flows: flows as Line['flows'], cameBackOff: 0 };
    memo.lines.push(line);
    return line;
  }

  at(lot: Lot, place: string): Quantity {
    return lot.places.get(place) ?? NOTHING;
  }

  /** Puts one leg on the books: its balance, its line's flow, its difference. */
  post({ lot, place, weight, pieces, cost, line, flow, difference }: Omit<Leg, 'rule'>): void {
    const was = this.at(lot, place);
    lot.places.set(place, {
      weight: was.weight + weight,
      pieces: was.pieces + pieces,
      cost: was.cost + cost,
    });
    if (line && flow && flow !== 'out') {
      // On the memo's own place carats leave for their flow; anywhere else they arrive by it.
      const sign = place.startsWith('memo:') && flow !== 'sent' ? -1 : 1;
      line.flows[flow].weight += sign * weight;
      line.flows[flow].pieces += sign * pieces;
    }
    if (difference) {
      difference.weight += weight;
      difference.pieces += pieces;
    }
  }

  /** Whether what lies at an inside place is what the house's rules let lie there. */
  mayLie(lot: Lot, place: string, { weight, pieces, cost }: Quantity): boolean {
    if (!isInside(place)) return true;
    const isMissing = place === 'missing';
    if (weight < 0 || pieces < 0 || cost < 0) return false;
    if (weight === 0) return cost === 0 && (pieces === 0 || isMissing);
    if (lot.fixedPieces !== null && pieces !== 0 && pieces !== lot.fixedPieces) return false;
    if (lot.isEstimated || isMissing) return true;
    if (pieces > weight) return false;
    return pieces > 0 || (place === 'quarantine' && lot.fixedPieces === null);
  }
}
